import { line } from 'd3-shape';
import { formatNumber, formatSigned } from '../ui/format';
import { Staff } from '../ui/staff';
import { fillOf, type PatternIds } from './patterns';
import type { TideData, TideVisit } from './tide-data';
import { field, type TideScale } from './tide-scale';

interface Measured extends TideVisit {
  px: number;
  py: number;
}

/** Visits that were measured, in time, at their pixels. */
export function measuredVisits(visits: readonly TideVisit[], scale: TideScale): Measured[] {
  return visits
    .flatMap((visit) =>
      visit.on === null || visit.changePercent === null ? [] : [{ ...visit, px: scale.x(visit.on), py: scale.change(visit.changePercent) }],
    )
    .sort((a, b) => a.px - b.px);
}

/** The arm above the line: water to the change, the error band, high water. */
export function TideArm({ data, scale, ids }: { data: TideData; scale: TideScale; ids: PatternIds }) {
  const visits = measuredVisits(data.visits, scale);
  const zero = scale.change(0);
  const band = { top: scale.change(data.errorPercent), foot: scale.change(-data.errorPercent) };
  const high = scale.change(data.threshold.percent);
  const points = visits.map(({ px, py }) => [px, py] as [number, number]);
  const path = line()(points) ?? '';
  const [first, last] = [visits[0], visits.at(-1)];
  return (
    <g>
      <SideWords y={66} title="The arm" words={data.armWords} />
      <rect
        x={field.left}
        y={band.top}
        width={Math.max(0, scale.today - field.left)}
        height={band.foot - band.top}
        fill="var(--select)"
        opacity="0.75"
      />
      {first && last ? <path d={`M${first.px} ${zero}L${path.slice(1)}L${last.px} ${zero}Z`} fill={fillOf(ids.water)} /> : null}
      <path d={`M${field.left} ${zero}H${Math.max(field.left, scale.today)}`} stroke="var(--ink)" />
      <path d={`M${field.left} ${high}H${field.right}`} stroke="var(--note)" strokeWidth="1.5" strokeDasharray="11 4" />
      <path d={path} fill="none" stroke="var(--act)" strokeWidth="2.25" />
      {visits.map((visit) => (
        <Diamond key={visit.key} visit={visit} scale={scale} />
      ))}
      <ChangeLabels visits={visits} ground={high} />
      <text x={field.left + 16} y={high - 8} className="chart-note halo">
        <tspan fontWeight="600">High water, {formatNumber(data.threshold.percent)} %</tspan>: {data.threshold.words}
      </text>
      <text x={field.left + 16} y={Math.min(band.foot - 9, field.armFoot - 4)} className="axis-word halo">
        Within measurement error, ±{formatNumber(data.errorPercent, 1)} %
      </text>
      <Staff x={field.left} edges={scale.changeEdges.map((edge) => scale.change(edge))} ticks={changeTicks(data, scale)} />
    </g>
  );
}

/** Head and small words at the left of a part of the chart. */
export function SideWords({ y, title, words }: { y: number; title: string; words: readonly string[] }) {
  return (
    <>
      <text x="0" y={y} className="chart-head">
        {title}
      </text>
      {words.map((one, index) => (
        <text key={one} x="0" y={y + 18 + index * 16} className="axis-word">
          {one}
        </text>
      ))}
    </>
  );
}

/** Every second edge, and the threshold itself. */
function changeTicks({ threshold }: TideData, { change, changeEdges }: TideScale) {
  const step = (changeEdges[1] ?? 1) - (changeEdges[0] ?? 0);
  const wanted = changeEdges.filter((edge) => Math.round(edge / step) % 2 === 0 || edge === threshold.percent);
  return wanted.map((edge) => ({ y: change(edge), label: formatSigned(edge, 0) }));
}

/** Solid when measured, hollow when provisional; the upright joins its two trials. */
function Diamond({ visit, scale }: { visit: Measured; scale: TideScale }) {
  const { px, py, trialsPercent, provisional } = visit;
  const upright = trialsPercent ? `M${px} ${scale.change(trialsPercent[0])}V${scale.change(trialsPercent[1])}` : null;
  return (
    <>
      {upright ? <path d={upright} stroke="var(--ink)" strokeWidth="1.25" /> : null}
      <rect
        x={px - 4.5}
        y={py - 4.5}
        width="9"
        height="9"
        transform={`rotate(45 ${px} ${py})`}
        fill={provisional ? 'var(--ground)' : 'var(--act)'}
        stroke={provisional ? 'var(--act)' : 'var(--ground)'}
        strokeWidth={provisional ? 2 : 1.5}
      />
    </>
  );
}

/** Values stand over their diamonds; where two would meet, the later one drops below its point. */
function ChangeLabels({ visits, ground }: { visits: readonly Measured[]; ground: number }) {
  return labelled(visits, ground).map(({ visit, below }) => (
    <text
      key={visit.key}
      x={visit.provisional ? visit.px + 10 : visit.px}
      y={below ? visit.py + 24 : visit.py - 16}
      textAnchor={visit.provisional ? 'start' : 'middle'}
      className="chart-value halo"
    >
      {formatSigned(visit.changePercent ?? 0)}
      {visit.provisional ? <tspan className="axis-word"> provisional</tspan> : null}
    </text>
  ));
}

/** The baseline's own zero needs no words. */
function labelled(visits: readonly Measured[], ground: number): { visit: Measured; below: boolean }[] {
  let free = -Infinity;
  return visits
    .filter(({ changePercent }, index) => index > 0 || changePercent !== 0)
    .map((visit) => {
      const below = visit.px - free < 46 || (ground > visit.py - 32 && ground < visit.py - 12);
      if (!below) free = visit.px;
      return { visit, below };
    });
}

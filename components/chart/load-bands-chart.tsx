import { scaleLinear } from 'd3-scale';
import { area, line } from 'd3-shape';
import { formatCount, formatNumber } from '../ui/format';
import { PlainTable } from '../ui/plain-table';
import { ScaleBar, Staff } from '../ui/staff';
import { ChartFigure } from './chart-figure';
import { fillOf, Patterns, usePatterns } from './patterns';
import { edges, niceStep } from './tide-scale';

/** Quantiles of the heaviest load of a week, kg, over the people who trained in it. */
export interface LoadWeek {
  week: number;
  p10: number;
  p25: number;
  p50: number;
  p75: number;
  p90: number;
  people: number;
}

export interface LoadBandsChartProps {
  /** Ascending; weeks with nobody are left out and the bands bridge them. */
  weeks: readonly LoadWeek[];
  /** 'Chest press, heaviest set of the week'. */
  label: string;
  finding: string;
  /** The rule for the first load, named at week 1: [1, 2] kg. */
  firstLoadKg?: readonly [number, number];
}

const box = { left: 40, right: 512, top: 14, foot: 244 } as const;
const quantiles = [
  { key: 'p90', words: '90th' },
  { key: 'p75', words: '75th' },
  { key: 'p50', words: 'median' },
  { key: 'p25', words: '25th' },
  { key: 'p10', words: '10th' },
] as const;

/** Load week by week: outer band 10th to 90th, inner 25th to 75th under water, the median as the line. */
export function LoadBandsChart({ weeks, label, finding, firstLoadKg }: LoadBandsChartProps) {
  const ids = usePatterns();
  const [first, last] = [weeks[0]?.week ?? 1, weeks.at(-1)?.week ?? 2];
  const highest = Math.max(1, ...weeks.map(({ p90 }) => p90));
  const loadEdges = edges(0, highest, niceStep(highest / 7));
  const x = scaleLinear([first, Math.max(last, first + 1)], [box.left, box.right]);
  const y = scaleLinear([0, loadEdges.at(-1) ?? 1], [box.foot, box.top]);
  const band = (low: 'p10' | 'p25', high: 'p75' | 'p90') =>
    area<LoadWeek>()
      .x((one) => x(one.week))
      .y0((one) => y(one[low]))
      .y1((one) => y(one[high]))([...weeks]) ?? '';
  const median =
    line<LoadWeek>(
      (one) => x(one.week),
      (one) => y(one.p50),
    )([...weeks]) ?? '';
  return (
    <ChartFigure label={label} finding={finding} table={<WeekTable weeks={weeks} label={label} />}>
      <svg width="100%" viewBox="0 0 620 328" className="max-w-[620px]" role="img" aria-label={finding}>
        <Patterns ids={ids} />
        <path d={band('p10', 'p90')} fill="var(--band)" />
        <path d={band('p25', 'p75')} fill="var(--select)" />
        <path d={band('p25', 'p75')} fill={fillOf(ids.water)} opacity="0.55" />
        <path d={median} fill="none" stroke="var(--act)" strokeWidth="2.5" />
        <Staff
          x={box.left - 1}
          edges={loadEdges.map(y)}
          ticks={loadEdges
            .filter((_, index) => index % 2 === 0)
            .map((load) => ({ y: y(load), label: formatNumber(load, Number.isInteger(load) ? 0 : 1) }))}
        />
        <EndWords week={weeks.at(-1)} y={y} />
        {firstLoadKg ? <FirstLoad limits={firstLoadKg} y={y} /> : null}
        <WeekAxisFoot weeks={weeks} x={x} />
      </svg>
    </ChartFigure>
  );
}

/** Each line's name at its end; names that would touch are moved apart downward. */
function EndWords({ week, y }: { week: LoadWeek | undefined; y: (load: number) => number }) {
  if (!week) return null;
  return endPlaces(week, y).map(({ key, words, at }) => (
    <text key={key} x={box.right + 8} y={at} className={key === 'p50' ? 'chart-name' : 'axis-word'}>
      <tspan className="axis-figure">{formatNumber(week[key], 1)}</tspan> {words}
    </text>
  ));
}

function endPlaces(week: LoadWeek, y: (load: number) => number) {
  let free = -Infinity;
  return quantiles.map(({ key, words }) => {
    const at = Math.max(free, y(week[key]) + 4.5);
    free = at + 16;
    return { key, words, at };
  });
}

function FirstLoad({ limits, y }: { limits: readonly [number, number]; y: (load: number) => number }) {
  const [low, high] = [y(limits[0]), y(limits[1])];
  return (
    <g>
      <path
        d={`M${box.left + 6} ${low}H${box.left + 2}V${high}H${box.left + 6}M${box.left + 2} ${high}V${high - 70}`}
        fill="none"
        stroke="var(--ink)"
      />
      <text x={box.left + 8} y={high - 74} className="axis-word axis-gone">
        first load
      </text>
      <text x={box.left + 8} y={high - 58} className="axis-word axis-gone">
        {formatNumber(limits[0])} to {formatNumber(limits[1])} kg
      </text>
    </g>
  );
}

function WeekAxisFoot({ weeks, x }: { weeks: readonly LoadWeek[]; x: (week: number) => number }) {
  const [first, last] = [weeks[0]?.week ?? 1, weeks.at(-1)?.week ?? 2];
  const shown = [0, 0.25, 0.5, 0.75, 1].map((share) => Math.round(first + share * (last - first)));
  const segments = Array.from({ length: 17 }, (_, index) => ((x(last) - x(first)) * index) / 16);
  return (
    <g>
      <ScaleBar x={box.left} y={249} edges={segments} />
      {[...new Set(shown)].map((week) => (
        <g key={week}>
          <text x={x(week)} y="272" textAnchor="middle" className="axis-figure">
            {week}
          </text>
          <text x={x(week)} y="318" textAnchor="middle" className="chart-figure">
            {formatCount(weeks.find((one) => one.week === week)?.people ?? 0)}
          </text>
        </g>
      ))}
      <text x={box.left + 36} y="272" className="axis-word">
        week
      </text>
      <text x="0" y="298" className="axis-word">
        people with a session that week
      </text>
    </g>
  );
}

function WeekTable({ weeks, label }: { weeks: readonly LoadWeek[]; label: string }) {
  return (
    <PlainTable
      caption={`${label}, kg`}
      tight
      rows={weeks}
      getRowId={(one) => String(one.week)}
      columns={[
        { id: 'week', header: 'Week', cell: (one) => one.week },
        ...[...quantiles]
          .reverse()
          .map(({ key, words }) => ({ id: key, header: words, numeric: true, cell: (one: LoadWeek) => formatNumber(one[key], 1) })),
        { id: 'people', header: 'People', numeric: true, cell: (one) => formatCount(one.people) },
      ]}
    />
  );
}

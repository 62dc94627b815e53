import { formatLoadKg, formatNumber } from '../ui/format';
import { Staff } from '../ui/staff';
import { fillOf, type PatternIds } from './patterns';
import { SideWords } from './tide-arm';
import type { TideData, TideWeek } from './tide-data';
import { field, type TideScale } from './tide-scale';

/** Load hangs from its line: deeper is more. Series differ by fill, not by hue. */
export function TideLoad({ data, scale, ids }: { data: TideData; scale: TideScale; ids: PatternIds }) {
  const barWidth = Math.max(3, scale.dayWidth * 3.92);
  return (
    <g>
      <SideWords y={390} title="Load lifted" words={['kg in the week', '(weight × lifts)']} />
      <path d={`M${field.left} ${field.loadTop}H${Math.max(field.left, scale.today)}`} stroke="var(--ink)" />
      {data.weeks.map((week) => (
        <HangingBar
          key={week.starts}
          week={week}
          x={scale.x(week.starts) + scale.dayWidth * 1.5}
          width={barWidth}
          scale={scale}
          ids={ids}
        />
      ))}
      <Staff x={field.left} edges={scale.loadEdges.map((edge) => scale.load(edge))} ticks={loadTicks(scale)} />
      {data.pauses.map((pause) => (
        <Pause key={pause.from} left={scale.x(pause.from)} right={scale.x(pause.to)} words={pause.words} />
      ))}
      {data.callouts.map((callout) => (
        <Callout
          key={callout.week}
          x={scale.x(callout.week) + scale.dayWidth * 3.5}
          y={scale.load(totalOf(data.weeks, callout.week))}
          words={callout.words}
        />
      ))}
      <Latest data={data} scale={scale} />
    </g>
  );
}

interface HangingBarProps {
  week: TideWeek;
  x: number;
  width: number;
  scale: TideScale;
  ids: PatternIds;
}

function HangingBar({ week, x, width, scale, ids }: HangingBarProps) {
  let top = 0;
  return week.loadsKg.map((load, index) => {
    const y = scale.load(top);
    const height = scale.load(top + load) - y;
    top += load;
    if (load <= 0) return null;
    if (index % 3 === 0) return <rect key={index} x={x} y={y} width={width} height={height} fill="var(--act)" />;
    if (index % 3 === 1) {
      return (
        <g key={index}>
          <rect x={x} y={y} width={width} height={height} fill="var(--act-pale)" />
          <rect x={x} y={y} width={width} height={height} fill={fillOf(ids.hatch)} />
        </g>
      );
    }
    return (
      <rect
        key={index}
        x={x + 0.6}
        y={y}
        width={width - 1.2}
        height={Math.max(0, height - 0.6)}
        fill="var(--ground)"
        stroke="var(--act)"
        strokeWidth="1.2"
      />
    );
  });
}

function loadTicks({ load, loadEdges }: TideScale) {
  return loadEdges.filter((_, index) => index % 2 === 0).map((edge) => ({ y: load(edge), label: formatNumber(edge) }));
}

function totalOf(weeks: readonly TideWeek[], starts: string): number {
  return weeks.find((week) => week.starts === starts)?.loadsKg.reduce((sum, load) => sum + load, 0) ?? 0;
}

/** A pause is bracketed and named. */
function Pause({ left, right, words }: { left: number; right: number; words: readonly string[] }) {
  return (
    <g>
      <path d={`M${left} 384V390H${right}V384`} fill="none" stroke="var(--edge)" />
      {words.map((one, index) => (
        <text key={one} x={(left + right) / 2} y={407 + index * 16} textAnchor="middle" className="axis-word halo">
          {one}
        </text>
      ))}
    </g>
  );
}

function Callout({ x, y, words }: { x: number; y: number; words: string }) {
  const foot = Math.min(y + 3, field.loadFoot - 6);
  return (
    <g>
      <path d={`M${x} ${foot}v14`} stroke="var(--needs)" strokeWidth="1.5" />
      <text x={x} y={foot + 29} textAnchor="middle" className="chart-needs halo">
        {words}
      </text>
    </g>
  );
}

/** What was heaviest last week, tied to the parts of the last bar. */
function Latest({ data, scale }: { data: TideData; scale: TideScale }) {
  const last = data.weeks.at(-1);
  if (!last || data.latest.length === 0) return null;
  const bar = scale.x(last.starts) + scale.dayWidth * 5.5;
  // The longest name and load take about 150 units and stay inside the frame.
  const words = Math.min(Math.max(scale.today, bar) + 28, field.width - 150);
  return data.latest.map(({ exercise, loadKg }, index) => {
    const above = last.loadsKg.slice(0, index).reduce((sum, load) => sum + load, 0);
    const middle = scale.load(above + (last.loadsKg[index] ?? 0) / 2);
    const y = 394 + index * 22;
    return (
      <g key={exercise}>
        <path d={`M${bar + 2} ${middle}H${words - 14}L${words - 5} ${y - 5}`} fill="none" stroke="var(--edge)" />
        <text x={words} y={y} className="chart-label">
          <tspan fontWeight="600">{exercise}</tspan> <tspan className="axis-figure">{formatLoadKg(loadKg, true)}</tspan>
        </text>
      </g>
    );
  });
}

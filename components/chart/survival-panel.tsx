import { scaleLinear } from 'd3-scale';
import { area, curveStepAfter, line } from 'd3-shape';
import { formatNumber, formatPercent } from '../ui/format';
import { ScaleBar, Staff } from '../ui/staff';
import { riskWords as riskCountWords, stepAt, type Curve, type CurveStep } from './survival-chart';

const box = { left: 44, right: 430, top: 16, foot: 266 } as const;

export interface SurvivalPanelProps {
  curve: Curve;
  /** Repeated dashed, so that two panels can be compared. */
  beside?: Curve | undefined;
  riskTimes: readonly number[];
  timeUnit: string;
  readAt?: number | undefined;
  riskWords: string;
  eventWords: string;
  /** Proportions at the edges of the staff. */
  shareEdges: readonly number[];
}

/** One curve with its band, and who is still followed under the time. */
export function SurvivalPanel({ curve, beside, riskTimes, timeUnit, readAt, riskWords, eventWords, shareEdges }: SurvivalPanelProps) {
  const end = riskTimes.at(-1) ?? 1;
  const x = scaleLinear([0, end], [box.left, box.right]);
  const y = scaleLinear([0, shareEdges.at(-1) ?? 1], [box.foot, box.top]);
  const path = (one: Curve) =>
    line<CurveStep>(
      (step) => x(step.time),
      (step) => y(step.share),
    ).curve(curveStepAfter)(drawn(one, end)) ?? '';
  const band =
    area<CurveStep>()
      .x((step) => x(step.time))
      .y0((step) => y(step.lower ?? step.share))
      .y1((step) => y(step.upper ?? step.share))
      .curve(curveStepAfter)(drawn(curve, end)) ?? '';
  return (
    <svg width="100%" viewBox="0 0 470 350" className="max-w-[470px]" role="img" aria-label={spoken(curve, readAt, timeUnit, eventWords)}>
      <path d={band} fill="var(--select)" />
      {beside ? <path d={path(beside)} fill="none" stroke="var(--edge)" strokeWidth="1.25" strokeDasharray="3 3" /> : null}
      <path d={path(curve)} fill="none" stroke="var(--act)" strokeWidth="2.25" />
      <Staff
        x={box.left - 1}
        edges={shareEdges.map(y)}
        ticks={ticks(shareEdges).map((share) => ({ y: y(share), label: formatNumber(share * 100) }))}
      />
      <ScaleBar x={box.left} y={271} edges={riskTimes.map((time) => x(time) - box.left)} />
      <TimeWords riskTimes={riskTimes} x={x} timeUnit={timeUnit} />
      {readAt === undefined ? null : <ReadOff curve={curve} time={readAt} x={x(readAt)} y={y} timeUnit={timeUnit} />}
      <EndLetters curve={curve} beside={beside} end={end} x={x} y={y} />
      <text x="0" y="322" className="axis-word">
        {riskWords}
      </text>
      {riskTimes.map((time, index) => (
        <text key={time} x={x(time)} y="342" textAnchor="middle" className="chart-figure">
          {riskCountWords(curve.atRisk[index])}
        </text>
      ))}
    </svg>
  );
}

/** From zero at the start to the end of follow-up, inside the axis. */
function drawn(curve: Curve, end: number): CurveStep[] {
  const last = Math.min(curve.lastTime, end);
  const steps = curve.steps.filter(({ time }) => time <= last);
  const start: CurveStep = { time: 0, share: 0, lower: 0, upper: 0 };
  const held = steps.at(-1) ?? start;
  return [start, ...steps, { ...held, time: last }];
}

function ticks(shareEdges: readonly number[]): number[] {
  return shareEdges.filter((_, index) => index % 2 === 0);
}

function spoken(curve: Curve, readAt: number | undefined, timeUnit: string, eventWords: string): string {
  if (readAt === undefined) return `Curve ${curve.label}: ${curve.definition}`;
  return `Curve ${curve.label}: ${formatPercent(stepAt(curve, readAt)?.share ?? 0)} with ${eventWords} at ${readAt} ${timeUnit}.`;
}

function TimeWords({ riskTimes, x, timeUnit }: { riskTimes: readonly number[]; x: (time: number) => number; timeUnit: string }) {
  const [first, second] = [x(riskTimes[0] ?? 0), x(riskTimes[1] ?? 1)];
  return (
    <>
      {riskTimes.map((time, index) =>
        index % 2 === 0 ? (
          <text key={time} x={x(time)} y="294" textAnchor="middle" className="axis-figure">
            {time}
          </text>
        ) : null,
      )}
      <text x={second - first > 30 ? second : first + 40} y="294" textAnchor="middle" className="axis-word">
        {timeUnit}
      </text>
    </>
  );
}

interface ReadOffProps {
  curve: Curve;
  time: number;
  x: number;
  y: (share: number) => number;
  timeUnit: string;
}

/** A time of interest, read off in words over the band. */
function ReadOff({ curve, time, x, y, timeUnit }: ReadOffProps) {
  if (time > curve.lastTime) return null;
  const step = stepAt(curve, time);
  const share = step?.share ?? 0;
  const words = Math.max(box.top + 18, y(step?.upper ?? share) - 10);
  return (
    <g>
      <path d={`M${x} 270V${y(share)}`} stroke="var(--ink)" strokeDasharray="2 3" />
      <path d={`M${x - 6} ${y(share)}h12`} stroke="var(--ink)" strokeWidth="2" />
      <text x={x - 8} y={words - 17} textAnchor="end" className="axis-word halo">
        at {time} {timeUnit}
      </text>
      <text x={x - 8} y={words} textAnchor="end" className="chart-value halo">
        {formatPercent(share)}
      </text>
    </g>
  );
}

interface EndLettersProps {
  curve: Curve;
  beside: Curve | undefined;
  end: number;
  x: (time: number) => number;
  y: (share: number) => number;
}

/** A letter at the line's end instead of a legend. */
function EndLetters({ curve, beside, end, x, y }: EndLettersProps) {
  const at = (one: Curve) => ({ x: x(Math.min(one.lastTime, end)) + 4, y: y(stepAt(one, end)?.share ?? 0) + 5 });
  const [own, other] = [at(curve), beside ? at(beside) : null];
  return (
    <>
      <text {...own} className="chart-series">
        {curve.label}
      </text>
      {other && beside && Math.abs(other.y - own.y) > 12 ? (
        <text {...other} className="axis-word">
          {beside.label}
        </text>
      ) : null}
    </>
  );
}

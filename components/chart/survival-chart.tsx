import { formatCount, formatLimits, formatPercent } from '../ui/format';
import { PlainTable } from '../ui/plain-table';
import { ChartFigure } from './chart-figure';
import { SurvivalPanel } from './survival-panel';
import { edges } from './tide-scale';

/** One step of a curve: the share holds from `time` until the next step. Limits are null where they do not exist. */
export interface CurveStep {
  time: number;
  share: number;
  lower: number | null;
  upper: number | null;
}

export interface Curve {
  /** The letter at the line's end: 'A'. */
  label: string;
  /** Definition in words, over the panel, in the note hand. */
  definition: string;
  /** Cumulative incidence as proportions, ascending in time; the start at 0 is understood. */
  steps: readonly CurveStep[];
  /** Last time anybody was followed: the line ends there. */
  lastTime: number;
  /** Still followed without the event at each of `riskTimes`; null where a small count is not shown. */
  atRisk: readonly (number | null)[];
}

export interface SurvivalChartProps {
  curves: readonly Curve[];
  /** Times of the numbers at risk and of the axis, evenly spaced from 0: 0, 3, 6 … 18. */
  riskTimes: readonly number[];
  /** 'months'. */
  timeUnit: string;
  /** Time that is read off in words, as 12. */
  readAt?: number;
  /** 'still followed, without swelling'. */
  riskWords: string;
  /** 'swelling': what the share is of. */
  eventWords: string;
  finding: string;
}

/** Share with the event as time goes on: one panel a definition, one scale for all, the first curve dashed in the others. */
export function SurvivalChart({ curves, riskTimes, timeUnit, readAt, riskWords, eventWords, finding }: SurvivalChartProps) {
  const highest = Math.max(0.05, ...curves.flatMap(({ steps }) => steps.map(({ share, upper }) => upper ?? share)));
  const shareEdges = edges(0, highest * 100, highest > 0.25 ? 5 : highest > 0.1 ? 2.5 : 1).map((percent) => percent / 100);
  const [first] = curves;
  return (
    <ChartFigure
      label={`Share with ${eventWords}, as time goes on`}
      finding={finding}
      table={<CurveTable curves={curves} riskTimes={riskTimes} timeUnit={timeUnit} eventWords={eventWords} />}
    >
      <div className="chart-panels">
        {curves.map((curve) => (
          <div key={curve.label}>
            <h3>{curve.label}</h3>
            <p className="t-hand mb-2 text-[17px] lg:min-h-[48px]">{curve.definition}</p>
            <SurvivalPanel
              {...{ curve, riskTimes, timeUnit, readAt, riskWords, shareEdges, eventWords }}
              beside={first && curve !== first ? first : undefined}
            />
          </div>
        ))}
      </div>
    </ChartFigure>
  );
}

/** The step that holds at a time; null before the first. */
export function stepAt(curve: Curve, time: number): CurveStep | null {
  return curve.steps.filter((step) => step.time <= time).at(-1) ?? null;
}

/** '113'; a dash where a count is not shown, which may be a small one or one that would give a small one away. */
export const riskWords = (count: number | null | undefined): string => (count === null ? '–' : formatCount(count ?? 0));

function CurveTable({
  curves,
  riskTimes,
  timeUnit,
  eventWords,
}: Pick<SurvivalChartProps, 'curves' | 'riskTimes' | 'timeUnit' | 'eventWords'>) {
  return (
    <PlainTable
      caption={`Share with ${eventWords} by time`}
      tight
      rows={riskTimes}
      getRowId={(time) => String(time)}
      columns={[
        { id: 'time', header: `Time, ${timeUnit}`, cell: (time) => time },
        ...curves.flatMap((curve, index) => [
          { id: curve.label, header: `${curve.label}, 95 % interval`, numeric: true, cell: (time: number) => shareWords(curve, time) },
          {
            id: `${curve.label}-risk`,
            header: `${curve.label}, still followed`,
            numeric: true,
            cell: (time: number) => riskWords(curves[index]?.atRisk[riskTimes.indexOf(time)]),
          },
        ]),
      ]}
    />
  );
}

function shareWords(curve: Curve, time: number): string {
  if (time > curve.lastTime) return 'nobody followed';
  const step = stepAt(curve, time);
  if (!step) return formatPercent(0);
  return step.lower === null || step.upper === null
    ? formatPercent(step.share)
    : `${formatPercent(step.share)}, ${formatLimits(step.lower, step.upper)}`;
}

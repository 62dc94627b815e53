import { methodOf } from '../registry';
import { loadOnset, type LoadOnset } from './load-onset';
import { requireLevel, type Interval, type Provenance } from '../result';
import { kaplanMeier, type SurvivalCurve } from '../survival/kaplan-meier';
import type { LimitKind } from '../survival/limits';
import { quantileOf } from '../survival/quantile-of';

/** How long it took to reach a load, censored at the last log of those who did not. */
export interface TimeToLoad extends Provenance {
  readonly target: number;
  readonly onset: LoadOnset;
  /** Share not yet at the load, by week. */
  readonly curve: SurvivalCurve;
  readonly quartiles: { readonly q25: Interval; readonly median: Interval; readonly q75: Interval };
}

/**
 * Kaplan-Meier time in weeks to the first log at or above a load. Participants
 * whose first log qualifies have reached it at that week (0 included). The load
 * was truly reached between two logs; `loadIntervals` gives that view.
 *
 * @throws RangeError as `loadOnset`, or for a level outside (0, 1).
 * @see Kaplan & Meier, J Am Stat Assoc 1958;53:457
 */
export function timeToLoad(
  participants: ArrayLike<number>,
  weeks: ArrayLike<number>,
  loads: ArrayLike<number>,
  target: number,
  { level = 0.95, limits = 'log-log' }: { level?: number; limits?: LimitKind } = {},
): TimeToLoad {
  requireLevel(level);
  const onset = loadOnset(participants, weeks, loads, target);
  const curve = kaplanMeier({ time: onset.time, event: onset.event }, { level, limits });
  const quartiles = { q25: quantileOf(curve, 0.25), median: quantileOf(curve, 0.5), q75: quantileOf(curve, 0.75) };
  const method = `Time to the first log at or above the load: ${curve.method}`;
  return { target, onset, curve, quartiles, method, n: onset.n, events: curve.events, leftOut: onset.leftOut };
}

/** The interval-censored view: the load was reached in (left, right], right = Infinity where never seen. */
export interface LoadIntervals extends Provenance {
  readonly participants: Float64Array;
  readonly left: Float64Array;
  readonly right: Float64Array;
}

/**
 * Intervals for an interval-censored estimator, without those who were at the
 * load from week 0: for them there is no interval before the first log.
 * @param onset columns of one entry a participant, in weeks
 * @see Turnbull, J R Stat Soc B 1976;38:290 (interval censoring)
 */
export function loadIntervals(onset: LoadOnset): LoadIntervals {
  const kept = Int32Array.from(onset.right.keys()).filter((row) => onset.right[row]! > 0);
  const pick = (column: Float64Array): Float64Array => Float64Array.from(kept, (row) => column[row]!);
  const already = onset.n - kept.length;
  return {
    participants: pick(onset.participants),
    left: pick(onset.left),
    right: pick(onset.right),
    method: methodOf('loadIntervals'),
    n: kept.length,
    events: kept.reduce((sum, row) => sum + onset.event[row]!, 0),
    leftOut: already > 0 ? [...onset.leftOut, { reason: 'at the load from week 0', count: already }] : onset.leftOut,
  };
}

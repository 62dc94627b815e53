import { type Interval, requireRange } from '../result';
import type { SurvivalCurve } from './kaplan-meier';

/** S counts as equal to 1 - p within this: 3/4 times 2/3 is one half. */
const LEVEL_TOLERANCE = 1e-9;

/**
 * Time by which a share p has had the event: the first time with S(t) <= 1 - p,
 * and the middle of the flat part when S equals 1 - p along it (up to the next
 * fall, or to the last follow-up when there is none). The limits read the
 * pointwise limit curves by the same rule.
 * @param p share with the event, 0.5 for the median
 * @returns null (with the reason) for what the curve does not reach
 * @throws RangeError when p is not strictly between 0 and 1
 * @see Brookmeyer & Crowley, Biometrics 1982;38:29
 */
export function quantileOf(curve: SurvivalCurve, p: number): Interval {
  requireRange(p > 0 && p < 1, `A quantile lies between 0 and 1, not ${p}.`);
  const estimate = firstCrossing(curve.time, curve.survival, 1 - p);
  const lower = firstCrossing(curve.time, curve.lower, 1 - p);
  const upper = firstCrossing(curve.time, curve.upper, 1 - p);
  const reason =
    estimate === null ? `the curve does not fall to ${1 - p}` : lower === null || upper === null ? `a limit of the curve does not fall to ${1 - p}` : undefined;
  return { estimate, lower, upper, level: curve.level, ...(reason !== undefined && { reason }) };
}

function firstCrossing(time: Float64Array, curve: Float64Array, target: number): number | null {
  const at = curve.findIndex((value) => value <= target + LEVEL_TOLERANCE); // NaN compares false: not reached
  if (at < 0) return null;
  if (Math.abs(curve[at]! - target) > LEVEL_TOLERANCE) return time[at]!;
  const next = curve.findIndex((value, i) => i > at && value < curve[at]! - LEVEL_TOLERANCE);
  return (time[at]! + time[next < 0 ? time.length - 1 : next]!) / 2;
}

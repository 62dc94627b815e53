import type { Interval } from '../result';
import type { SurvivalCurve } from './kaplan-meier';
import { lastNotAfter } from './times';

/** S at one time, with its standard error. */
export interface SurvivalAt extends Interval {
  readonly time: number;
  readonly se: number | null;
  /** True when the time lies after the last follow-up: the last value is carried on. */
  readonly beyond: boolean;
}

/**
 * Reads a curve at a time: 1 before the first step, the last value after the end.
 * The standard error and limits are null where S is 0.
 */
export function survivalAt(curve: SurvivalCurve, time: number): SurvivalAt {
  const { level } = curve;
  const g = lastNotAfter(curve.time, time);
  const beyond = lastNotAfter([time], curve.time.at(-1) ?? -Infinity) < 0;
  if (curve.n === 0) return { time, estimate: null, se: null, lower: null, upper: null, level, beyond, reason: 'no follow-up' };
  if (g < 0) return { time, estimate: 1, se: 0, lower: 1, upper: 1, level, beyond };
  const estimate = curve.survival[g]!;
  if (estimate === 0) return { time, estimate, se: null, lower: null, upper: null, level, beyond, reason: 'the curve has reached 0, where limits do not exist' };
  return { time, estimate, se: curve.se[g]!, lower: curve.lower[g]!, upper: curve.upper[g]!, level, beyond };
}

import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { NOBODY_IN_A_GROUP, requireTwoGroups, type TwoGroups } from './counts';

export interface RatioEstimate extends Estimate {
  /** Standard error of the log ratio; null where it does not exist. */
  readonly standardErrorLog: number | null;
}

/**
 * p1 / p2 with log limits (Katz 1978). Where a group has no event the log
 * does not exist: limits are null with a reason, and nothing is added to any
 * cell. `riskRatio` falls back to score limits there.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 */
export function katzRiskRatio(groups: TwoGroups): RatioEstimate {
  const { events1, n1, events2, n2, level = 0.95 } = groups;
  requireTwoGroups(groups);
  const z = criticalValue(level);
  const about = { level, method: methodOf('katzRiskRatio'), n: n1 + n2, events: events1 + events2, leftOut: [] };
  const none = { lower: null, upper: null, standardErrorLog: null };
  if (n1 === 0 || n2 === 0) return { estimate: null, ...none, reason: NOBODY_IN_A_GROUP, ...about };
  const estimate = ratioOf(events1 * n2, n1 * events2);
  if (events1 === 0 || events2 === 0) return { estimate, ...none, reason: 'A group without events has no log risk.', ...about };
  const standardErrorLog = Math.sqrt((n1 - events1) / (n1 * events1) + (n2 - events2) / (n2 * events2));
  const ratio = (events1 * n2) / (n1 * events2);
  const reach = Math.exp(z * standardErrorLog);
  return { estimate, lower: ratio / reach, upper: ratio * reach, standardErrorLog, ...about };
}

/** A ratio that may be 0 or infinite; null for 0 over 0. */
export function ratioOf(top: number, bottom: number): number | null {
  return top === 0 && bottom === 0 ? null : top / bottom;
}

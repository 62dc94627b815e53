import { criticalValue } from '../critical-value';
import { normal } from '../distributions';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { NOBODY_IN_A_GROUP, requireTwoGroups, type TwoGroups } from './counts';

export interface WaldDifference extends Estimate {
  readonly standardError: number | null;
  /** Two-sided normal p of no difference; null where the standard error is 0. */
  readonly p: number | null;
}

/**
 * p1 - p2 with Wald limits (unpooled variance), uncut. Kept to read papers that used it; prefer Newcombe or a score interval.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 * @see Newcombe, Stat Med 1998;17:873, method 1
 */
export function waldDifference(groups: TwoGroups): WaldDifference {
  const { events1, n1, events2, n2, level = 0.95 } = groups;
  requireTwoGroups(groups);
  const z = criticalValue(level);
  const about = { level, method: methodOf('waldDifference'), n: n1 + n2, events: events1 + events2, leftOut: [] };
  if (n1 === 0 || n2 === 0) {
    return { estimate: null, lower: null, upper: null, standardError: null, p: null, reason: NOBODY_IN_A_GROUP, ...about };
  }
  const p1 = events1 / n1;
  const p2 = events2 / n2;
  const estimate = p1 - p2;
  const standardError = Math.sqrt((p1 * (1 - p1)) / n1 + (p2 * (1 - p2)) / n2);
  const p = standardError === 0 ? null : 2 * normal.sf(Math.abs(estimate) / standardError);
  return { estimate, lower: estimate - z * standardError, upper: estimate + z * standardError, standardError, p, ...about };
}

import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { NOBODY_IN_A_GROUP, requireTwoGroups, type TwoGroups } from './counts';
import { wilsonLower } from './wilson-interval';

/**
 * p1 - p2 with hybrid score limits (Newcombe 1998, method 10): the Wilson
 * limits of the two proportions, put together by the square-and-add rule.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 */
export function newcombeDifference(groups: TwoGroups): Estimate {
  const { events1, n1, events2, n2, level = 0.95 } = groups;
  requireTwoGroups(groups);
  const z = criticalValue(level);
  const about = { level, method: methodOf('newcombeDifference'), n: n1 + n2, events: events1 + events2, leftOut: [] };
  if (n1 === 0 || n2 === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY_IN_A_GROUP, ...about };
  const p1 = events1 / n1;
  const p2 = events2 / n2;
  const down1 = p1 - wilsonLower(events1, n1, z);
  const up1 = 1 - wilsonLower(n1 - events1, n1, z) - p1;
  const down2 = p2 - wilsonLower(events2, n2, z);
  const up2 = 1 - wilsonLower(n2 - events2, n2, z) - p2;
  const estimate = p1 - p2;
  return { estimate, lower: estimate - Math.hypot(down1, up2), upper: estimate + Math.hypot(up1, down2), ...about };
}

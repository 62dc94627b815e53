import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { findRoot } from '../special/find-root';
import { NOBODY_IN_A_GROUP, requireTwoGroups, type TwoGroups } from './counts';
import { ratioOf } from './katz-risk-ratio';

/**
 * p1 / p2 with score limits (Koopman 1984), which exist at zero cells too:
 * the lower limit is 0 without events in group 1, the upper infinite without
 * events in group 2.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 */
export function koopmanRiskRatio(groups: TwoGroups): Estimate {
  const { events1, n1, events2, n2, level = 0.95 } = groups;
  requireTwoGroups(groups);
  const z = criticalValue(level);
  const about = { level, method: methodOf('koopmanRiskRatio'), n: n1 + n2, events: events1 + events2, leftOut: [] };
  if (n1 === 0 || n2 === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY_IN_A_GROUP, ...about };
  const estimate = ratioOf(events1 * n2, n1 * events2);
  const reason = estimate === null ? { reason: 'Neither group has an event.' } : {};
  return {
    estimate,
    lower: events1 === 0 ? 0 : Math.exp(limit(groups, -z)),
    upper: events2 === 0 ? Number.POSITIVE_INFINITY : Math.exp(limit(groups, z)),
    ...reason,
    ...about,
  };
}

/** log ratio at which the score, which falls with the ratio, is -goal. */
function limit(groups: TwoGroups, goal: number): number {
  const miss = (log: number) => scoreOf(groups, Math.exp(log)) + goal;
  let from = 0;
  let to = 0;
  for (let width = 1; miss(from) < 0; width *= 2) from -= width;
  for (let width = 1; miss(to) > 0; width *= 2) to += width;
  return findRoot(miss, from, to);
}

function scoreOf({ events1, n1, events2, n2 }: TwoGroups, ratio: number): number {
  const top = events1 / n1 - (ratio * events2) / n2;
  // Constrained p2: smaller root of (n1 + n2) ratio p^2 - b p + (events1 + events2), written without cancellation.
  const b = (n1 + events2) * ratio + events1 + n2;
  const c = events1 + events2;
  const p2 = (2 * c) / (b + Math.sqrt(Math.max(0, b * b - 4 * (n1 + n2) * ratio * c)));
  const p1 = Math.min(1, ratio * p2);
  const variance = (p1 * (1 - p1)) / n1 + (ratio * ratio * p2 * Math.max(0, 1 - p2)) / n2;
  return top === 0 ? 0 : top / Math.sqrt(variance);
}

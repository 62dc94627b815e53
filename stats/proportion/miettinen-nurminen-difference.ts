import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { findRoot } from '../special/find-root';
import { NOBODY_IN_A_GROUP, requireTwoGroups, type TwoGroups } from './counts';

/**
 * p1 - p2 with score limits (Miettinen & Nurminen 1985): the differences whose
 * score test, with the variance at the constrained maximum-likelihood
 * proportions times N / (N - 1), does not reject. Limits end at -1 and 1.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 */
export function miettinenNurminenDifference(groups: TwoGroups): Estimate {
  const { events1, n1, events2, n2, level = 0.95 } = groups;
  requireTwoGroups(groups);
  const z = criticalValue(level);
  const about = { level, method: methodOf('miettinenNurminenDifference'), n: n1 + n2, events: events1 + events2, leftOut: [] };
  if (n1 === 0 || n2 === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY_IN_A_GROUP, ...about };
  const estimate = events1 / n1 - events2 / n2;
  return {
    estimate,
    lower: estimate <= -1 ? -1 : findRoot((delta) => scoreOf(groups, estimate, delta) - z, -1, estimate),
    upper: estimate >= 1 ? 1 : findRoot((delta) => scoreOf(groups, estimate, delta) + z, estimate, 1),
    ...about,
  };
}

function scoreOf({ events1, n1, events2, n2 }: TwoGroups, estimate: number, delta: number): number {
  const gap = estimate - delta;
  if (gap === 0) return 0;
  const p2 = constrained(events1, n1, events2, n2, delta);
  const p1 = Math.min(1, Math.max(0, p2 + delta));
  const total = n1 + n2;
  const variance = ((p1 * (1 - p1)) / n1 + (p2 * (1 - p2)) / n2) * (total / (total - 1));
  return gap / Math.sqrt(Math.max(0, variance));
}

/** Maximum-likelihood p2 under p1 = p2 + delta: the root of the score cubic that lies in the lawful range, by bisected Newton. */
function constrained(events1: number, n1: number, events2: number, n2: number, delta: number): number {
  let low = Math.max(0, -delta);
  let high = Math.min(1, 1 - delta);
  const third = n1 + n2;
  const second = (n1 + 2 * n2) * delta - third - events1 - events2;
  const first = (n2 * delta - third - 2 * events2) * delta + events1 + events2;
  const zeroth = events2 * delta * (1 - delta);
  // The cubic has the score's sign times a positive factor: not negative at the low end, not positive at the high end.
  let p = low + (high - low) / 2;
  for (let round = 0; round < 200; round++) {
    const value = ((third * p + second) * p + first) * p + zeroth;
    if (value > 0) low = p;
    else high = p;
    const slope = (3 * third * p + 2 * second) * p + first;
    let next = p - value / slope;
    if (!(next > low && next < high)) next = low + (high - low) / 2;
    if (Math.abs(next - p) <= 1e-17 || next === p) return next;
    p = next;
  }
  return p;
}

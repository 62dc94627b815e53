import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { NOBODY, requireEvents, type OneGroup } from './counts';

/**
 * One proportion with Wald limits, uncut: they pass 0 and 1, and shrink to a
 * point at either end. Kept to read papers that used it; prefer Wilson.
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 * @see Newcombe, Stat Med 1998;17:857, method 1
 */
export function waldProportion({ events, n, level = 0.95 }: OneGroup): Estimate {
  requireEvents(events, n);
  const z = criticalValue(level);
  const about = { level, method: methodOf('waldProportion'), n, events, leftOut: [] };
  if (n === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY, ...about };
  const estimate = events / n;
  const reach = z * Math.sqrt((estimate * (1 - estimate)) / n);
  return { estimate, lower: estimate - reach, upper: estimate + reach, ...about };
}

import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import type { Estimate } from '../result';
import { NOBODY, requireEvents, type OneGroup } from './counts';

/**
 * One proportion with Wilson score limits, no continuity correction
 * (Wilson 1927). Limits are exactly 0 or 1 at the ends. n = 0 gives nulls with
 * a reason; counts that are none throw RangeError.
 */
export function wilsonInterval({ events, n, level = 0.95 }: OneGroup): Estimate {
  requireEvents(events, n);
  const z = criticalValue(level);
  const about = { level, method: methodOf('wilsonInterval'), n, events, leftOut: [] };
  if (n === 0) return { estimate: null, lower: null, upper: null, reason: NOBODY, ...about };
  return { estimate: events / n, lower: wilsonLower(events, n, z), upper: 1 - wilsonLower(n - events, n, z), ...about };
}

/** Lower root of the score equation, as the product of the roots over the upper one: no cancellation for rare events. */
export function wilsonLower(events: number, n: number, z: number): number {
  if (events === 0) return 0;
  const square = z * z;
  const sum = 2 * events + square + z * Math.sqrt(square + (4 * events * (n - events)) / n);
  return (2 * events * events) / (n * sum);
}

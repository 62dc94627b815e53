import { normal } from './distributions';
import { requireLevel } from './result';

/**
 * Normal deviate of a two-sided confidence level: 1.959963984540054 at 0.95, never 1.96.
 * @param level a proportion
 * @throws RangeError unless the level lies inside (0, 1)
 */
export function criticalValue(level: number): number {
  requireLevel(level);
  return normal.isf((1 - level) / 2);
}

import { normal } from '../distributions';
import { requireLevel, requireRange } from '../result';

/**
 * Smallest detectable change between two readings of one person,
 * z sqrt(2) SEM, in the unit of the SEM. de Vet et al. 2006, J Clin Epidemiol
 * 59:1033.
 *
 * @param multiplier takes the place of z; published figures often carry 1.96 (or 1.645 at 90%).
 * @throws RangeError for a negative SEM or a level outside (0, 1).
 */
export function sdcFromSem(sem: number, { level = 0.95, multiplier }: { level?: number; multiplier?: number } = {}): number {
  requireLevel(level);
  requireRange(sem >= 0 && sem < Infinity, `A standard error of measurement is at or above 0, not ${sem}.`);
  return (multiplier ?? normal.isf((1 - level) / 2)) * Math.SQRT2 * sem;
}

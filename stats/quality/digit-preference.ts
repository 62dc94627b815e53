import { chiSquare } from '../distributions';
import { requireCount } from '../proportion/counts';
import { methodOf } from '../registry';
import { requireRange, type Provenance } from '../result';

export interface DigitPreference extends Provenance {
  readonly statistic: number | null;
  readonly degreesOfFreedom: 9;
  readonly p: number | null;
  /** Share of readings that end in 0 or 5; 0.2 is expected. */
  readonly shareZeroOrFive: number | null;
  /** True when readings look rounded: at least 50 of them, p < 0.001 and share above 0.40 (common practice, no source). */
  readonly flag: boolean;
}

/**
 * Whether measurements were read to the last digit or rounded.
 *
 * @param counts how many readings end in 0, 1, ... 9
 * @throws RangeError unless there are ten counts
 * @see Pearson 1900; the thresholds of the flag are common practice, no source
 */
export function digitPreference(counts: ArrayLike<number>): DigitPreference {
  requireRange(counts.length === 10, `There are ten terminal digits, not ${counts.length}.`);
  let n = 0;
  for (let digit = 0; digit < 10; digit++) {
    requireCount(counts[digit] as number, 'A count of terminal digits');
    n += counts[digit] as number;
  }
  const about = { degreesOfFreedom: 9 as const, method: methodOf('digitPreference'), n, leftOut: [] };
  if (n === 0) return { statistic: null, p: null, shareZeroOrFive: null, flag: false, ...about };
  let statistic = 0;
  for (let digit = 0; digit < 10; digit++) statistic += ((counts[digit] as number) - n / 10) ** 2 / (n / 10);
  const p = chiSquare.sf(statistic, 9);
  const shareZeroOrFive = ((counts[0] as number) + (counts[5] as number)) / n;
  return { statistic, p, shareZeroOrFive, flag: n >= 50 && p < 0.001 && shareZeroOrFive > 0.4, ...about };
}

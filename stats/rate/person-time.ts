import { requireRange } from '../result';

/** The year all person-time is told in. */
export const DAYS_PER_YEAR = 365.25;

export interface PersonTime {
  readonly days: number;
  /** Days over 365.25. */
  readonly years: number;
  readonly n: number;
}

/**
 * Person-time of follow-up given as whole or part days: summed first, divided
 * once, so that no rounding of single persons enters.
 *
 * @param days one entry a person, from 0 up; anything else throws RangeError
 * @see Rothman, Greenland & Lash, Modern Epidemiology 2008, ch. 3
 */
export function personTime(days: ArrayLike<number>): PersonTime {
  let sum = 0;
  for (let i = 0; i < days.length; i++) {
    const own = days[i] as number;
    requireRange(own >= 0 && own < Number.POSITIVE_INFINITY, `Follow-up is a number of days from 0 up, not ${own}.`);
    sum += own;
  }
  return { days: sum, years: sum / DAYS_PER_YEAR, n: days.length };
}

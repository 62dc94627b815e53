import { criticalValue } from '../critical-value';
import { requireCount } from '../proportion/counts';
import { methodOf } from '../registry';
import { requireRange } from '../result';
import type { RateRatioEstimate } from './counts';

/** Columns of equal length, one entry a stratum. Person-time may be 0 in a stratum, which then says nothing. */
export interface RateStrata {
  readonly events1: ArrayLike<number>;
  readonly personTime1: ArrayLike<number>;
  readonly events2: ArrayLike<number>;
  readonly personTime2: ArrayLike<number>;
  /** People in each, for the result to name. */
  readonly people1?: ArrayLike<number>;
  readonly people2?: ArrayLike<number>;
}

/**
 * Common ratio of rate 1 to rate 2 over strata, with the Greenland-Robins
 * variance of its log. Strata without person-time in both groups are left out
 * and said; sums of zero leave the limits null with a reason. `n` counts the
 * people of the strata used, where they are told; `leftOut` counts strata.
 * @throws RangeError on columns of different length, events that are no count or lack person-time
 * @see Greenland & Robins, Biometrics 1985;41:55
 */
export function mantelHaenszelRateRatio(strata: RateStrata, { level = 0.95 }: { readonly level?: number } = {}): RateRatioEstimate {
  const { events1, personTime1, events2, personTime2, people1, people2 } = strata;
  const z = criticalValue(level);
  const length = events1.length;
  requireRange([personTime1, events2, personTime2, people1 ?? events1, people2 ?? events1].every((column) => column.length === length), 'The columns of strata differ in length.');
  let top = 0;
  let bottom = 0;
  let information = 0;
  let events = 0;
  let people: number | null = people1 && people2 ? 0 : null;
  let empty = 0;
  for (let i = 0; i < length; i++) {
    const a = events1[i] as number;
    const b = events2[i] as number;
    const t1 = personTime1[i] as number;
    const t2 = personTime2[i] as number;
    requireCount(a, 'The number of events');
    requireCount(b, 'The number of events');
    requireRange(t1 >= 0 && t2 >= 0 && Number.isFinite(t1 + t2), 'Person-time is a number from 0 up.');
    requireRange((a === 0 || t1 > 0) && (b === 0 || t2 > 0), 'Events need person-time.');
    if (t1 === 0 || t2 === 0) {
      empty++;
      continue;
    }
    const t = t1 + t2;
    events += a + b;
    if (people1 && people2) people = (people ?? 0) + counted(people1[i] as number) + counted(people2[i] as number);
    top += (a * t2) / t;
    bottom += (b * t1) / t;
    information += (a + b) * (t1 / t) * (t2 / t);
  }
  const leftOut = empty === 0 ? [] : [{ reason: 'Strata without person-time in both groups', count: empty }];
  const about = { level, method: methodOf('mantelHaenszelRateRatio'), n: people, events, leftOut };
  if (top === 0 || bottom === 0) {
    const estimate = top === bottom ? null : top / bottom;
    return { estimate, lower: null, upper: null, standardErrorLog: null, reason: 'One side of the sum over strata is zero.', ...about };
  }
  const estimate = top / bottom;
  const standardErrorLog = Math.sqrt(information / (top * bottom));
  const reach = Math.exp(z * standardErrorLog);
  return { estimate, lower: estimate / reach, upper: estimate * reach, standardErrorLog, ...about };
}

function counted(people: number): number {
  requireCount(people, 'The number of people');
  return people;
}

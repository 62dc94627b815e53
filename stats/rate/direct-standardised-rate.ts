import { chiSquare } from '../distributions';
import { requireCount } from '../proportion/counts';
import { methodOf } from '../registry';
import { requireLevel, requireRange } from '../result';
import { requirePersonTime } from './counts';
import type { RateEstimate } from './exact-rate';

export interface StandardisedRate extends RateEstimate {
  /** Poisson variance of the estimate, in its reported unit squared. */
  readonly variance: number;
}

/**
 * Weighted mean of stratum rates, the weights being a standard population,
 * with gamma limits (Fay & Feuer 1997), which cover for few events and are
 * Garwood's with one stratum.
 *
 * @param strata events, person-time and standard weights, one entry a stratum; person-time positive, weights from 0 with a positive sum; `people` of each, where told, add up to `n`
 * @param options `per` the amount of person-time to report by (1), `level` (0.95)
 * @throws RangeError on columns of different length, events or people that are no count, person-time not positive, weights below 0 or all 0
 */
export function directStandardisedRate(
  strata: { readonly events: ArrayLike<number>; readonly personTime: ArrayLike<number>; readonly weights: ArrayLike<number>; readonly people?: ArrayLike<number> },
  { per = 1, level = 0.95 }: { readonly per?: number; readonly level?: number } = {},
): StandardisedRate {
  const { events, personTime, weights, people } = strata;
  requireLevel(level);
  requireRange(per > 0 && per < Number.POSITIVE_INFINITY, `A rate is reported per a positive amount, not ${per}.`);
  requireRange(events.length === personTime.length && events.length === weights.length && (people ?? events).length === events.length, 'The columns of strata differ in length.');
  let all = 0;
  for (let i = 0; i < weights.length; i++) {
    const weight = weights[i] as number;
    requireRange(weight >= 0 && weight < Number.POSITIVE_INFINITY, `A weight is a number from 0 up, not ${weight}.`);
    all += weight;
  }
  requireRange(all > 0, 'The standard weights add up to nothing.');
  let rate = 0;
  let variance = 0;
  let heaviest = 0;
  let count = 0;
  let persons = 0;
  let time = 0;
  for (let i = 0; i < events.length; i++) {
    const seen = events[i] as number;
    const watched = personTime[i] as number;
    requireCount(seen, 'The number of events');
    requirePersonTime(watched);
    const share = (weights[i] as number) / all / watched;
    rate += share * seen;
    variance += share * share * seen;
    heaviest = Math.max(heaviest, share);
    count += seen;
    if (people) {
      requireCount(people[i] as number, 'The number of people');
      persons += people[i] as number;
    }
    time += watched;
  }
  const tail = (1 - level) / 2;
  const more = { rate: rate + heaviest, variance: variance + heaviest * heaviest };
  return {
    estimate: rate * per,
    lower: rate === 0 ? 0 : (variance / (2 * rate)) * chiSquare.quantile(tail, (2 * rate * rate) / variance) * per,
    upper: (more.variance / (2 * more.rate)) * chiSquare.isf(tail, (2 * more.rate * more.rate) / more.variance) * per,
    level,
    variance: variance * per * per,
    method: methodOf('directStandardisedRate'),
    n: people ? persons : null,
    events: count,
    leftOut: [],
    personTime: time,
    per,
  };
}

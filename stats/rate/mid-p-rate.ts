import { gammaDist, poisson } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel } from '../result';
import { findRoot } from '../special/find-root';
import { requireOneRate, type OneRate } from './counts';
import { exactRate, type RateEstimate } from './exact-rate';

/**
 * Events per person-time with mid-P limits: the means at which the tail, the
 * observed count counted half, is half of 1 - level. Solved on the log of the
 * tail within the exact limits, which always hold them (Lancaster 1961).
 * @throws RangeError as `exactRate`
 */
export function midPRate(rate: OneRate): RateEstimate {
  const { events, personTime, per = 1, level = 0.95 } = rate;
  requireOneRate(rate);
  requireLevel(level);
  const exact = exactRate(rate);
  const tail = (1 - level) / 2;
  const scale = per / personTime;
  return {
    ...exact,
    lower: events === 0 ? 0 : lowerMean(events, tail) * scale,
    upper: upperMean(events, tail) * scale,
    method: methodOf('midPRate'),
  };
}

function lowerMean(events: number, tail: number): number {
  const miss = (mean: number) => Math.log(poisson.sf(events, mean) + poisson.pmf(events, mean) / 2) - Math.log(tail);
  return findRoot(miss, gammaDist.quantile(tail, events), gammaDist.quantile(tail, events + 1));
}

function upperMean(events: number, tail: number): number {
  if (events === 0) return -Math.log(2 * tail);
  const miss = (mean: number) => Math.log(poisson.cdf(events - 1, mean) + poisson.pmf(events, mean) / 2) - Math.log(tail);
  return findRoot(miss, gammaDist.isf(tail, events), gammaDist.isf(tail, events + 1));
}

import { requireRange } from '../result';
import { gammaTail, poissonWeight } from '../special/incomplete-gamma';
import { COUNT_SLACK, smallestCount } from './count-quantile';
import { requireNumber, requireProbability, type Discrete } from './shape';

function check(mean: number): void {
  requireRange(mean >= 0 && mean < Number.POSITIVE_INFINITY, `A Poisson mean is a number from 0 up, not ${mean}.`);
}

function tail(x: number, mean: number, upper: boolean): number {
  if (x < 0) return upper ? 1 : 0;
  if (x === Number.POSITIVE_INFINITY) return upper ? 0 : 1;
  return gammaTail(Math.floor(x) + 1, mean, !upper);
}

/** Poisson distribution: mass by Loader 2000, tails by the incomplete gamma. */
export const poisson: Discrete<[mean: number]> = {
  cdf(x, mean) {
    requireNumber(x);
    check(mean);
    return tail(x, mean, false);
  },
  sf(x, mean) {
    requireNumber(x);
    check(mean);
    return tail(x, mean, true);
  },
  quantile(p, mean) {
    requireProbability(p);
    check(mean);
    if (p === 1) return mean === 0 ? 0 : Number.POSITIVE_INFINITY;
    return smallestCount((k) => tail(k, mean, false) >= p * (1 - COUNT_SLACK), mean, 0, Number.MAX_SAFE_INTEGER);
  },
  isf(p, mean) {
    requireProbability(p);
    check(mean);
    if (p === 0) return mean === 0 ? 0 : Number.POSITIVE_INFINITY;
    return smallestCount((k) => tail(k, mean, true) <= p * (1 + COUNT_SLACK), mean, 0, Number.MAX_SAFE_INTEGER);
  },
  pmf(x, mean) {
    requireNumber(x);
    check(mean);
    if (x < 0 || !Number.isInteger(x)) return 0;
    return x === 0 ? Math.exp(-mean) : poissonWeight(x, mean);
  },
};

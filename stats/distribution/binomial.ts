import { requireRange } from '../result';
import { betaTail, binomialWeight } from '../special/incomplete-beta';
import { COUNT_SLACK, smallestCount } from './count-quantile';
import { requireNumber, requireProbability, type Discrete } from './shape';

function check(n: number, chance: number): void {
  requireRange(Number.isInteger(n) && n >= 0, `A number of trials is a whole number from 0 up, not ${n}.`);
  requireProbability(chance);
}

function tail(x: number, n: number, chance: number, upper: boolean): number {
  if (x < 0) return upper ? 1 : 0;
  if (x >= n) return upper ? 0 : 1;
  const k = Math.floor(x);
  return betaTail(k + 1, n - k, chance, 1 - chance, !upper);
}

/** Binomial distribution: mass by Loader 2000, tails by the incomplete beta. */
export const binomial: Discrete<[n: number, chance: number]> = {
  cdf(x, n, chance) {
    requireNumber(x);
    check(n, chance);
    return tail(x, n, chance, false);
  },
  sf(x, n, chance) {
    requireNumber(x);
    check(n, chance);
    return tail(x, n, chance, true);
  },
  quantile(p, n, chance) {
    requireProbability(p);
    check(n, chance);
    return smallestCount((k) => tail(k, n, chance, false) >= p * (1 - COUNT_SLACK), n * chance, 0, n);
  },
  isf(p, n, chance) {
    requireProbability(p);
    check(n, chance);
    return smallestCount((k) => tail(k, n, chance, true) <= p * (1 + COUNT_SLACK), n * chance, 0, n);
  },
  pmf(x, n, chance) {
    requireNumber(x);
    check(n, chance);
    if (x < 0 || x > n || !Number.isInteger(x)) return 0;
    return binomialWeight(x, n - x, chance, 1 - chance);
  },
};

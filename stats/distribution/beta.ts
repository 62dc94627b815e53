import { betaTail, betaWeight, logLeadingBeta } from '../special/incomplete-beta';
import { solveTail } from '../special/solve-tail';
import { requireNumber, requirePositive, requireProbability, type Continuous } from './shape';

function check(a: number, b: number): void {
  requirePositive(a, 'A beta shape');
  requirePositive(b, 'A beta shape');
}

/** Beta distribution by its two shapes. */
export const betaDist: Continuous<[a: number, b: number]> = {
  cdf(x, a, b) {
    requireNumber(x);
    check(a, b);
    return betaTail(a, b, x, 1 - x, false);
  },
  sf(x, a, b) {
    requireNumber(x);
    check(a, b);
    return betaTail(a, b, x, 1 - x, true);
  },
  quantile(p, a, b) {
    requireProbability(p);
    check(a, b);
    return fromLogOdds(betaLogOddsTail(a, b, p, 1 - p, false));
  },
  isf(p, a, b) {
    requireProbability(p);
    check(a, b);
    return fromLogOdds(betaLogOddsTail(a, b, p, 1 - p, true));
  },
  pdf(x, a, b) {
    requireNumber(x);
    check(a, b);
    if (x < 0 || x > 1) return 0;
    if (x === 0) return a < 1 ? Number.POSITIVE_INFINITY : a === 1 ? b : 0;
    if (x === 1) return b < 1 ? Number.POSITIVE_INFINITY : b === 1 ? a : 0;
    return betaWeight(a, b, x, 1 - x) / (x * (1 - x));
  },
};

/** 1 / (1 + e^-u): small values keep their digits. */
export function fromLogOdds(u: number): number {
  return 1 / (1 + Math.exp(-u));
}

/**
 * log(x / (1 - x)) of the beta quantile. On this scale both ends keep their
 * digits, which is what F and t quantiles are read from.
 *
 * @param p tail probability, `q` = 1 - p as the caller knows it best
 */
export function betaLogOddsTail(a: number, b: number, p: number, q: number, upper: boolean): number {
  if (p > 0.5) return betaLogOddsTail(a, b, q, p, !upper);
  if (upper) return -betaLogOddsTail(b, a, p, q, false);
  if (p === 0) return Number.NEGATIVE_INFINITY;
  const leading = (Math.log(p) + logLeadingBeta(a, b)) / a;
  if (leading < -600) return leading;
  return solveTail(
    (u) => betaTail(a, b, fromLogOdds(u), fromLogOdds(-u), false),
    (u) => betaWeight(a, b, fromLogOdds(u), fromLogOdds(-u)),
    p,
    true,
    Math.log(a / b),
  );
}

import { betaTail, betaWeight, logLeadingBeta } from '../special/incomplete-beta';
import { normalQuantileTail } from '../special/normal-quantile';
import { normalTail } from '../special/normal-tail';
import { requireRange } from '../result';
import { betaLogOddsTail } from './beta';
import { requireNumber, requireProbability, type Continuous } from './shape';

function check(df: number): void {
  requireRange(df > 0, `The degrees of freedom of t are positive, not ${df}.`);
}

/**
 * P(T > t) for t >= 0: half an incomplete beta at df / (df + t^2), of which
 * argument and complement are formed apart.
 */
function upperTail(t: number, df: number): number {
  if (df === Number.POSITIVE_INFINITY) return normalTail(t);
  if (t === Number.POSITIVE_INFINITY) return 0;
  const logOdds = 2 * Math.log(t) - Math.log(df);
  if (logOdds > 600) return 0.5 * Math.exp((-df / 2) * logOdds - logLeadingBeta(df / 2, 0.5));
  const odds = (t / df) * t;
  return 0.5 * betaTail(df / 2, 0.5, 1 / (1 + odds), odds / (1 + odds), false);
}

/** t >= 0 with P(T > t) = p <= 1/2. */
function upperQuantile(p: number, df: number): number {
  if (p === 0.5) return 0;
  if (df === Number.POSITIVE_INFINITY) return normalQuantileTail(p, true);
  const logOdds = betaLogOddsTail(df / 2, 0.5, 2 * p, 1 - 2 * p, false);
  return Math.exp((Math.log(df) - logOdds) / 2);
}

/** Student's t; degrees of freedom may be any positive number, infinity gives the normal. */
export const studentT: Continuous<[df: number]> = {
  cdf(x, df) {
    requireNumber(x);
    check(df);
    return x <= 0 ? upperTail(-x, df) : 1 - upperTail(x, df);
  },
  sf(x, df) {
    requireNumber(x);
    check(df);
    return x >= 0 ? upperTail(x, df) : 1 - upperTail(-x, df);
  },
  quantile(p, df) {
    requireProbability(p);
    check(df);
    return p <= 0.5 ? -upperQuantile(p, df) : upperQuantile(1 - p, df);
  },
  isf(p, df) {
    requireProbability(p);
    check(df);
    return p <= 0.5 ? upperQuantile(p, df) : -upperQuantile(1 - p, df);
  },
  pdf(x, df) {
    requireNumber(x);
    check(df);
    if (df === Number.POSITIVE_INFINITY) return Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
    // The beta weight at 1/2 and df/2, over |x|; at 0 its limit, through a point too near to differ.
    const at = Math.max(Math.abs(x), 1e-9);
    const odds = (at / df) * at;
    return betaWeight(df / 2, 0.5, 1 / (1 + odds), odds / (1 + odds)) / at;
  },
};

import { betaTail, betaWeight } from '../special/incomplete-beta';
import { betaLogOddsTail } from './beta';
import { requireNumber, requirePositive, requireProbability, type Continuous } from './shape';

function check(df1: number, df2: number): void {
  requirePositive(df1, 'The degrees of freedom of F');
  requirePositive(df2, 'The degrees of freedom of F');
}

/** Tail of F as an incomplete beta whose argument and complement are formed apart, never 1 - x. */
function tail(x: number, df1: number, df2: number, upper: boolean): number {
  if (x <= 0) return upper ? 1 : 0;
  if (x === Number.POSITIVE_INFINITY) return upper ? 0 : 1;
  const odds = (df1 / df2) * x;
  return betaTail(df1 / 2, df2 / 2, odds / (1 + odds), 1 / (1 + odds), upper);
}

function quantileTail(p: number, df1: number, df2: number, upper: boolean): number {
  return Math.exp(betaLogOddsTail(df1 / 2, df2 / 2, p, 1 - p, upper)) * (df2 / df1);
}

/** F distribution; degrees of freedom may be any positive numbers. */
export const fisherF: Continuous<[df1: number, df2: number]> = {
  cdf(x, df1, df2) {
    requireNumber(x);
    check(df1, df2);
    return tail(x, df1, df2, false);
  },
  sf(x, df1, df2) {
    requireNumber(x);
    check(df1, df2);
    return tail(x, df1, df2, true);
  },
  quantile(p, df1, df2) {
    requireProbability(p);
    check(df1, df2);
    return quantileTail(p, df1, df2, false);
  },
  isf(p, df1, df2) {
    requireProbability(p);
    check(df1, df2);
    return quantileTail(p, df1, df2, true);
  },
  pdf(x, df1, df2) {
    requireNumber(x);
    check(df1, df2);
    if (x < 0) return 0;
    if (x === 0) return df1 < 2 ? Number.POSITIVE_INFINITY : df1 === 2 ? 1 : 0;
    const odds = (df1 / df2) * x;
    return betaWeight(df1 / 2, df2 / 2, odds / (1 + odds), 1 / (1 + odds)) / x;
  },
};

import { gammaTail, poissonWeight } from '../special/incomplete-gamma';
import { gammaQuantileTail } from './gamma';
import { requireNumber, requirePositive, requireProbability, type Continuous } from './shape';

const NAME = 'The degrees of freedom of chi-square';

/** Chi-square distribution: a gamma of shape df / 2 and scale 2; df may be any positive number. */
export const chiSquare: Continuous<[df: number]> = {
  cdf(x, df) {
    requireNumber(x);
    requirePositive(df, NAME);
    return gammaTail(df / 2, x / 2, false);
  },
  sf(x, df) {
    requireNumber(x);
    requirePositive(df, NAME);
    return gammaTail(df / 2, x / 2, true);
  },
  quantile(p, df) {
    requireProbability(p);
    requirePositive(df, NAME);
    return 2 * gammaQuantileTail(df / 2, p, false);
  },
  isf(p, df) {
    requireProbability(p);
    requirePositive(df, NAME);
    return 2 * gammaQuantileTail(df / 2, p, true);
  },
  pdf(x, df) {
    requireNumber(x);
    requirePositive(df, NAME);
    if (x < 0) return 0;
    if (x === 0) return df < 2 ? Number.POSITIVE_INFINITY : df === 2 ? 0.5 : 0;
    return (poissonWeight(df / 2, x / 2) * df) / (2 * x);
  },
};

import { erfcx } from '../special/erfc';
import { normalQuantileTail } from '../special/normal-quantile';
import { normalTail } from '../special/normal-tail';
import { requireNumber, requireProbability, type Continuous } from './shape';

const ROOT_TWO = Math.SQRT2;

/** Standard normal distribution: Cody 1969 both tails, Wichura 1988 (AS 241) for quantiles. */
export const normal: Continuous<[]> = {
  cdf(x) {
    requireNumber(x);
    return normalTail(-x);
  },
  sf(x) {
    requireNumber(x);
    return normalTail(x);
  },
  quantile(p) {
    requireProbability(p);
    return normalQuantileTail(p, false);
  },
  isf(p) {
    requireProbability(p);
    return normalQuantileTail(p, true);
  },
  pdf(x) {
    requireNumber(x);
    return Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
  },
};

/** log P(X > x) for the standard normal, finite where the tail itself underflows. */
export function logNormalSf(x: number): number {
  return x > 5 ? Math.log(0.5 * erfcx(x / ROOT_TWO)) - 0.5 * x * x : Math.log(normalTail(x));
}

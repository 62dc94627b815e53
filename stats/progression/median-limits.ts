import { binomial } from '../distributions';
import { pickRows, usableRows } from '../missing/usable-rows';
import { quantileSorted } from './quantile';
import { requireLevel, requireRange, type Estimate } from '../result';

/** A quantile with distribution-free limits that are two of the observed values. */
export interface MedianLimits extends Estimate {
  readonly rankLower: number;
  readonly rankUpper: number;
  /** Exact probability that the two order statistics enclose the quantile (continuous data). */
  readonly coverage: number;
}

/**
 * Order-statistic limits of a quantile: ranks l = qbinom(alpha/2; n, p) and
 * u = qbinom(1 - alpha/2; n, p) + 1. Conover 1999, Practical Nonparametric
 * Statistics, sec. 3.2. The estimate is the type-7 quantile.
 *
 * @param p which quantile; 0.5 is the median.
 * @throws RangeError for infinite values, p or level outside (0, 1).
 */
export function medianLimits(values: ArrayLike<number>, { p = 0.5, level = 0.95 }: { p?: number; level?: number } = {}): MedianLimits {
  requireLevel(level);
  requireRange(p > 0 && p < 1, `Limits are given for a quantile strictly between 0 and 1, not ${p}.`);
  const usable = usableRows({ value: values });
  const sorted = pickRows(values, usable.rows).sort();
  const n = sorted.length;
  const provenance = { level, method: `Quantile (p = ${p}) with order-statistic limits`, n, leftOut: usable.leftOut };
  if (n === 0) {
    return { estimate: null, lower: null, upper: null, reason: 'No values.', rankLower: 0, rankUpper: 1, coverage: 0, ...provenance };
  }
  const tail = (1 - level) / 2;
  const rankLower = binomial.quantile(tail, n, p);
  const rankUpper = binomial.quantile(1 - tail, n, p) + 1;
  const coverage = binomial.cdf(rankUpper - 1, n, p) - binomial.cdf(rankLower - 1, n, p);
  const lower = rankLower < 1 ? null : sorted[rankLower - 1]!;
  const upper = rankUpper > n ? null : sorted[rankUpper - 1]!;
  const open = lower === null || upper === null;
  const reason = open ? { reason: 'Too few values for limits at this level.' } : {};
  return { estimate: quantileSorted(sorted, p), lower, upper, rankLower, rankUpper, coverage, ...reason, ...provenance };
}

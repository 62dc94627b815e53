import { binomial } from '../distributions';
import { isMeasure, requireRange } from '../result';

/** The bootstrap distribution of a median without any resampling. */
export interface ExactMedian {
  /** The values in ascending order. */
  readonly values: readonly number[];
  /** Probability that the resampled median is the k-th smallest value. */
  readonly probabilities: readonly number[];
  readonly mean: number;
  readonly se: number;
}

/**
 * Exact bootstrap distribution of the median of an odd number of values.
 * Efron 1982, The Jackknife, the Bootstrap and Other Resampling Plans, ch. 10.
 *
 * @throws RangeError for an even number of values, or one that is not finite.
 */
export function exactMedian(values: ArrayLike<number>): ExactMedian {
  const n = values.length;
  requireRange(n % 2 === 1, `The exact form is for an odd number of values, not ${n}.`);
  const sorted = Array.from(values).sort((a, b) => a - b);
  requireRange(sorted.every(isMeasure), 'Values are finite; leave missing ones out first.');
  const middle = (n - 1) / 2;
  /** P(resampled median > k-th smallest) = P(at most `middle` draws are among the k smallest). */
  const above = (k: number): number => (k === 0 ? 1 : k === n ? 0 : binomial.cdf(middle, n, k / n));
  const probabilities = sorted.map((_, k) => above(k) - above(k + 1));
  const mean = sorted.reduce((sum, value, k) => sum + probabilities[k]! * value, 0);
  const variance = sorted.reduce((sum, value, k) => sum + probabilities[k]! * (value - mean) ** 2, 0);
  return { values: sorted, probabilities, mean, se: Math.sqrt(variance) };
}

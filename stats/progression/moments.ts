import { isMeasure, requireRange } from '../result';

/** Mean, sum of squared deviations and standard deviation (n - 1) of a column. */
export interface Moments {
  readonly n: number;
  readonly mean: number | null;
  readonly sumOfSquares: number;
  /** null below two values. */
  readonly sd: number | null;
}

/**
 * Two passes with the mean refined once: 1e9 + a few millimetres keeps its
 * spread, where the textbook one-pass formula returns noise or a negative
 * variance. Chan, Golub & LeVeque 1983, Am Stat 37:242 (corrected two-pass).
 *
 * @throws RangeError for a value that is missing or infinite.
 */
export function moments(values: ArrayLike<number>): Moments {
  const n = values.length;
  if (n === 0) return { n, mean: null, sumOfSquares: 0, sd: null };
  // Deviations from the first value carry the digits that a plain sum of large values drops.
  const origin = values[0] as number;
  let sum = 0;
  let usable = true;
  for (let i = 0; i < n; i++) {
    usable &&= isMeasure(values[i] as number);
    sum += (values[i] as number) - origin;
  }
  requireRange(usable, 'Values are finite numbers; leave missing ones out first.');
  const centre = sum / n;
  let squares = 0;
  let residual = 0;
  for (let i = 0; i < n; i++) {
    const deviation = (values[i] as number) - origin - centre;
    squares += deviation * deviation;
    residual += deviation;
  }
  const sumOfSquares = Math.max(0, squares - (residual * residual) / n);
  return { n, mean: origin + (centre + residual / n), sumOfSquares, sd: n > 1 ? Math.sqrt(sumOfSquares / (n - 1)) : null };
}

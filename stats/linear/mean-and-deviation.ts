import { methodOf } from '../registry';
import { isMeasure, requireRange } from '../result';

export interface MeanAndDeviation {
  readonly n: number;
  /** null of no values. */
  readonly mean: number | null;
  /** Divisor n - 1; null of fewer than two values. */
  readonly standardDeviation: number | null;
  /** Sum of squares about the mean. */
  readonly sumOfSquares: number;
  readonly method: string;
}

/**
 * Mean and standard deviation in two passes over the values less their first,
 * with the rounding of the mean put right (Chan, Golub & LeVeque 1983). A
 * common offset of 1e9 costs no digits but those the values have lost already.
 *
 * @param values finite numbers; NaN or infinity throws RangeError
 */
export function meanAndDeviation(values: ArrayLike<number>): MeanAndDeviation {
  const n = values.length;
  const method = methodOf('meanAndDeviation');
  if (n === 0) return { n, mean: null, standardDeviation: null, sumOfSquares: 0, method };
  const first = values[0] as number;
  let sum = 0;
  let usable = true;
  for (let i = 0; i < n; i++) {
    usable &&= isMeasure(values[i] as number);
    sum += (values[i] as number) - first;
  }
  requireRange(usable, 'Values are finite numbers; leave missing ones out first.');
  const shift = sum / n;
  let squares = 0;
  let rest = 0;
  for (let i = 0; i < n; i++) {
    const deviation = (values[i] as number) - first - shift;
    squares += deviation * deviation;
    rest += deviation;
  }
  const sumOfSquares = Math.max(0, squares - (rest * rest) / n);
  return {
    n,
    mean: first + (shift + rest / n),
    standardDeviation: n < 2 ? null : Math.sqrt(sumOfSquares / (n - 1)),
    sumOfSquares,
    method,
  };
}

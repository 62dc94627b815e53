import { chiSquare } from '../distributions';
import { pickRows, usableRows } from '../missing/usable-rows';
import { moments } from '../progression/moments';
import { methodOf } from '../registry';
import { requireLevel, type Estimate } from '../result';

/** Technical error of measurement in the unit of the readings. */
export interface TechnicalError extends Estimate {
  /** 100 x TEM / mean of all readings; null where that mean is 0. */
  readonly relativePercent: number | null;
  /** SD of the differences / sqrt(2): a steady difference between the trials is taken out. */
  readonly biasFree: number | null;
  /** 1 - TEM^2 / variance of all readings; null where they do not vary. */
  readonly reliability: number | null;
}

/**
 * Technical error of two trials, sqrt(sum d^2 / 2n), with limits by chi-square
 * on n degrees of freedom (which take the trials to be free of a steady
 * difference). Dahlberg 1940; Ulijaszek & Kerr 1999, Br J Nutr 82:165.
 *
 * @param first and @param second reading of each subject; pairs with a missing one are left out.
 * @throws RangeError for unequal columns, infinite values or a level outside (0, 1).
 */
export function technicalError(first: ArrayLike<number>, second: ArrayLike<number>, level = 0.95): TechnicalError {
  requireLevel(level);
  const usable = usableRows({ first, second });
  const a = pickRows(first, usable.rows);
  const b = pickRows(second, usable.rows);
  const n = a.length;
  const provenance = { level, method: methodOf('technicalError'), n, leftOut: usable.leftOut };
  if (n === 0) {
    return { estimate: null, lower: null, upper: null, reason: 'No pairs of readings.', relativePercent: null, biasFree: null, reliability: null, ...provenance };
  }
  const difference = a.map((value, row) => value - b[row]!);
  const squares = difference.reduce((sum, d) => sum + d * d, 0);
  const tem = Math.sqrt(squares / (2 * n));
  const both = new Float64Array(2 * n);
  both.set(a);
  both.set(b, n);
  const all = moments(both);
  const variance = all.sumOfSquares / (2 * n - 1);
  const tail = (1 - level) / 2;
  const spread = moments(difference).sd;
  return {
    estimate: tem,
    lower: Math.sqrt(squares / 2 / chiSquare.isf(tail, n)),
    upper: Math.sqrt(squares / 2 / chiSquare.quantile(tail, n)),
    relativePercent: all.mean === 0 ? null : (100 * tem) / (all.mean as number),
    biasFree: spread === null ? null : spread / Math.SQRT2,
    reliability: variance > 0 ? 1 - tem ** 2 / variance : null,
    ...provenance,
  };
}

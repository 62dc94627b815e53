import { noncentralT, normal, studentT } from '../distributions';
import { pickRows, usableRows } from '../missing/usable-rows';
import { moments } from '../progression/moments';
import { methodOf } from '../registry';
import { requireLevel, requireRange, type Estimate, type Interval } from '../result';

/** Agreement of two methods; the estimate is the bias (first minus second), in the unit of the readings. */
export interface BlandAltman extends Estimate {
  readonly sdOfDifferences: number | null;
  readonly biasSe: number | null;
  /** Limits of agreement with approximate limits of their own (Bland & Altman 1999). */
  readonly lowerLimit: Interval;
  readonly upperLimit: Interval;
  /** The same limits with exact limits by non-central t (Carkeet 2015). */
  readonly lowerLimitExact: Interval;
  readonly upperLimitExact: Interval;
  readonly limitSe: number | null;
  /** The 1986 paper's rough sqrt(3 s^2 / n). */
  readonly limitSeRough: number | null;
  /** Least-squares slope of the difference on the mean of the two; null where the means do not vary. */
  readonly proportionalBias: number | null;
  readonly correlation: number | null;
}

interface Options {
  level?: number;
  /** Share of differences the limits are to hold. */
  agreement?: number;
  /** Takes the place of z in bias +- z s; published figures often carry 1.96. */
  multiplier?: number;
}

/**
 * Bland-Altman limits of agreement. Bland & Altman 1986, Lancet i:307; 1999,
 * Stat Methods Med Res 8:135 (limits of the limits by SE s sqrt(1/n + z^2/2(n-1))
 * and t on n - 1); Carkeet 2015, Optom Vis Sci 92:e71 (exact limits).
 * They assume differences that are normal and do not grow with the mean;
 * `proportionalBias` shows whether they do.
 *
 * @throws RangeError for unequal columns, infinite values, a level or share outside (0, 1).
 */
export function blandAltman(first: ArrayLike<number>, second: ArrayLike<number>, options: Options = {}): BlandAltman {
  const { level = 0.95, agreement = 0.95 } = options;
  requireLevel(level);
  requireLevel(agreement);
  const z = options.multiplier ?? normal.isf((1 - agreement) / 2);
  requireRange(z > 0, `The multiplier of the limits is above 0, not ${z}.`);
  const usable = usableRows({ first, second });
  const a = pickRows(first, usable.rows);
  const b = pickRows(second, usable.rows);
  const difference = a.map((value, row) => value - b[row]!);
  const { n, mean: bias, sd } = moments(difference);
  const provenance = { level, method: methodOf('blandAltman'), n, leftOut: usable.leftOut };
  if (bias === null || sd === null) return withoutLimits(bias, level, provenance);
  const t = studentT.isf((1 - level) / 2, n - 1);
  const biasSe = sd / Math.sqrt(n);
  const limitSe = sd * Math.sqrt(1 / n + z ** 2 / (2 * (n - 1)));
  const around = (estimate: number, se: number): Interval => ({ estimate, lower: estimate - t * se, upper: estimate + t * se, level });
  const near = exactFactor((1 - level) / 2, n, z) * sd;
  const far = exactFactor((1 + level) / 2, n, z) * sd;
  const lower = bias - z * sd;
  const upper = bias + z * sd;
  return {
    ...around(bias, biasSe),
    sdOfDifferences: sd,
    biasSe,
    lowerLimit: around(lower, limitSe),
    upperLimit: around(upper, limitSe),
    lowerLimitExact: { estimate: lower, lower: bias - far, upper: bias - near, level },
    upperLimitExact: { estimate: upper, lower: bias + near, upper: bias + far, level },
    limitSe,
    limitSeRough: Math.sqrt((3 * sd ** 2) / n),
    ...trend(difference, a, b),
    ...provenance,
  };
}

/** How many SDs from the bias the limit's own limit lies: a quantile of non-central t over sqrt(n). */
function exactFactor(p: number, n: number, z: number): number {
  return noncentralT.quantile(p, n - 1, z * Math.sqrt(n)) / Math.sqrt(n);
}

/** Slope and correlation of the difference on the mean of the two readings. */
function trend(difference: Float64Array, a: Float64Array, b: Float64Array): Pick<BlandAltman, 'proportionalBias' | 'correlation'> {
  const middle = a.map((value, row) => value + (b[row]! - value) / 2);
  const x = moments(middle);
  const y = moments(difference);
  const products = difference.reduce((sum, d, row) => sum + (d - (y.mean as number)) * (middle[row]! - (x.mean as number)), 0);
  return {
    proportionalBias: x.sumOfSquares > 0 ? products / x.sumOfSquares : null,
    correlation: x.sumOfSquares > 0 && y.sumOfSquares > 0 ? products / Math.sqrt(x.sumOfSquares * y.sumOfSquares) : null,
  };
}

function withoutLimits(bias: number | null, level: number, provenance: Omit<Estimate, keyof Interval> & { level: number }): BlandAltman {
  const reason = bias === null ? 'No pairs of readings.' : 'One pair only: its spread is unknown.';
  const none: Interval = { estimate: null, lower: null, upper: null, level, reason };
  return {
    ...none,
    estimate: bias,
    sdOfDifferences: null,
    biasSe: null,
    lowerLimit: none,
    upperLimit: none,
    lowerLimitExact: none,
    upperLimitExact: none,
    limitSe: null,
    limitSeRough: null,
    proportionalBias: null,
    correlation: null,
    ...provenance,
  };
}

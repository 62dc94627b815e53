import { deviancePart } from './deviance-part';
import { logGamma, logGamma1p } from './log-gamma';
import { stirlingError } from './stirling-error';

const EPSILON = 1.1e-16;
const TINY = 1e-300;

/**
 * x^a y^b Gamma(a + b + 1) / (Gamma(a + 1) Gamma(b + 1)) with y = 1 - x: the
 * binomial probability of a successes and b failures, continued to real
 * counts (Loader 2000).
 */
export function binomialWeight(a: number, b: number, x: number, y: number): number {
  if (a === 0) return Math.exp(b * (x < y ? Math.log1p(-x) : Math.log(y)));
  if (b === 0) return Math.exp(a * (y < x ? Math.log1p(-y) : Math.log(x)));
  if (x <= 0 || y <= 0) return 0;
  const n = a + b;
  const exponent = stirlingError(n) - stirlingError(a) - stirlingError(b) - deviancePart(a, n * x) - deviancePart(b, n * y);
  return Math.exp(exponent) * Math.sqrt(n / (2 * Math.PI * a * b));
}

/** x^a y^b / B(a, b): the beta density times x y, which is its density on the log-odds scale. */
export function betaWeight(a: number, b: number, x: number, y: number): number {
  return ((a * b) / (a + b)) * binomialWeight(a, b, x, y);
}

/** log of a B(a, b), the constant of the leading term x^a / (a B(a, b)). */
export function logLeadingBeta(a: number, b: number): number {
  const n = a + b;
  if (b < 10) return logGamma1p(a) + logGamma(b) - logGamma(n);
  // log Gamma(b) - log Gamma(a + b) through Stirling's formula, whose large parts are taken as one difference.
  const step = -(b - 0.5) * Math.log1p(a / b) - a * Math.log(n) + a;
  return logGamma1p(a) + step + stirlingError(b) - stirlingError(n);
}

/**
 * Incomplete beta ratio: lower I_x(a, b) or its complement, each computed as
 * itself where it is small.
 *
 * @param x argument in [0, 1]
 * @param y 1 - x, given by the caller so that it keeps its digits when small
 * The continued fraction of DiDonato & Morris (ACM Trans Math Softw
 * 1992;18:360-373, eq. 9), iterated to full accuracy on the side of the mean
 * where it converges.
 */
export function betaTail(a: number, b: number, x: number, y: number, upper: boolean): number {
  if (x <= 0) return upper ? 1 : 0;
  if (y <= 0) return upper ? 0 : 1;
  if (x * (a + b + 2) > a + 1) return lowerBeta(b, a, y, x, !upper);
  return lowerBeta(a, b, x, y, upper);
}

function lowerBeta(a: number, b: number, x: number, y: number, complement: boolean): number {
  const value = betaWeight(a, b, x, y) * betaFraction(a, b, x, y);
  return complement ? 1 - value : value;
}

function betaFraction(a: number, b: number, x: number, y: number): number {
  const lambda = a > b ? (a + b) * y - b : a - (a + b) * x;
  let value = (a * (lambda + 1)) / (a + 1) || TINY;
  let c = value;
  let d = 0;
  for (let n = 1; n < 2_000_000; n++) {
    const w = n * (b - n) * x;
    const s = a + 2 * n - 1;
    const alpha = ((((a + n - 1) / s) * (a + b + n - 1)) / s) * w * x;
    const beta = n + w / s + ((a + n) * (lambda + 1 + n * (1 + y))) / (s + 2);
    d = 1 / (alpha * d + beta || TINY);
    c = beta + alpha / c || TINY;
    const change = c * d;
    value *= change;
    if (Math.abs(change - 1) <= 2 * EPSILON) return 1 / value;
  }
  throw new RangeError(`The incomplete beta fraction did not settle at a = ${a}, b = ${b}, x = ${x}.`);
}

import { deviancePart } from './deviance-part';
import { logGamma1p } from './log-gamma';
import { stirlingError } from './stirling-error';
import { temmeTail } from './temme';

const EPSILON = 1.1e-16;
const TINY = 1e-300;

/**
 * x^a e^-x / Gamma(a + 1): the Poisson probability continued to real counts,
 * in Loader's saddle-point form.
 */
export function poissonWeight(a: number, x: number): number {
  if (x <= 0) return a === 0 ? 1 : 0;
  if (a < 1) return Math.exp(a * Math.log(x) - x - logGamma1p(a));
  if (x === Number.POSITIVE_INFINITY) return 0;
  return Math.exp(-stirlingError(a) - deviancePart(a, x)) / Math.sqrt(2 * Math.PI * a);
}

/**
 * Incomplete gamma ratio: lower P(a, x) or upper Q(a, x), each computed as
 * itself where it is small, so that a far tail keeps its digits.
 *
 * @param a shape, positive
 * @param x argument, 0 to infinity
 * Series below a + 1, Legendre's fraction above, Temme's expansion about a.
 */
export function gammaTail(a: number, x: number, upper: boolean): number {
  if (x <= 0) return upper ? 1 : 0;
  if (x === Number.POSITIVE_INFINITY) return upper ? 0 : 1;
  if (a >= 20 && Math.abs(x - a) <= 0.3 * a) return temmeTail(a, x, upper);
  if (a < 1 && x < 1) return upper ? smallUpper(a, x) : poissonWeight(a, x) * lowerSeries(a, x);
  if (a >= 1 && x < a + 1) {
    const lower = poissonWeight(a, x) * lowerSeries(a, x);
    return upper ? 1 - lower : lower;
  }
  const tail = poissonWeight(a, x) * a * upperFraction(a, x);
  return upper ? tail : 1 - tail;
}

/** 1 + x/(a+1) + x^2/((a+1)(a+2)) + ... */
function lowerSeries(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let n = 1; term > EPSILON * sum; n++) {
    term *= x / (a + n);
    sum += term;
  }
  return sum;
}

/** Gamma(a, x) x^-a e^x by the modified Lentz method. */
function upperFraction(a: number, x: number): number {
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / b;
  let value = d;
  for (let n = 1; n < 100_000; n++) {
    const an = n * (a - n);
    b += 2;
    d = 1 / (an * d + b || TINY);
    c = b + an / c || TINY;
    const change = c * d;
    value *= change;
    if (Math.abs(change - 1) <= 2 * EPSILON) return value;
  }
  throw new RangeError(`The incomplete gamma fraction did not settle at a = ${a}, x = ${x}.`);
}

/** Q(a, x) for a < 1, x < 1, where 1 - P would cancel as a nears 0. */
function smallUpper(a: number, x: number): number {
  const exponent = a * Math.log(x) - logGamma1p(a);
  let term = 1;
  let sum = 0;
  for (let n = 1; n < 40; n++) {
    term *= -x / n;
    const next = sum + term / (a + n);
    if (next === sum) break;
    sum = next;
  }
  return -Math.expm1(exponent) - Math.exp(exponent) * a * sum;
}

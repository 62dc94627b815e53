import { stirlingError } from './stirling-error';

const EULER = 0.57721566490153286061;
const HALF_LOG_TWO_PI = 0.91893853320467274178;

/** zeta(k) - 1 for k = 2..35 by Euler-Maclaurin after thirty terms. */
const ZETA_LESS_ONE = Float64Array.from({ length: 36 }, (_, k) => (k < 2 ? 0 : zetaLessOne(k)));

function zetaLessOne(k: number): number {
  const from = 30;
  const power = from ** -k;
  const step = 1 / (from * from);
  let tail = (from * power) / (k - 1) + power / 2;
  tail += (k * power) / from / 12;
  tail -= (k * (k + 1) * (k + 2) * power * step) / from / 720;
  tail += (k * (k + 1) * (k + 2) * (k + 3) * (k + 4) * power * step * step) / from / 30240;
  tail -= (k * (k + 1) * (k + 2) * (k + 3) * (k + 4) * (k + 5) * (k + 6) * power * step * step * step) / from / 1209600;
  for (let n = from - 1; n >= 2; n--) tail += n ** -k;
  return tail;
}

/** log Gamma(2 + z) for |z| <= 1/2 (Abramowitz & Stegun 6.1.33). */
function logGammaNearTwo(z: number): number {
  let sum = 0;
  for (let k = 35; k >= 2; k--) sum = ((ZETA_LESS_ONE[k] as number) / k - sum) * z;
  return z * (1 - EULER + sum);
}

/** log Gamma(1 + a) for a > -1, with its digits kept as a nears 0. */
export function logGamma1p(a: number): number {
  if (Math.abs(a) <= 0.5) return logGammaNearTwo(a) - Math.log1p(a);
  return logGamma(1 + a);
}

/**
 * log Gamma(x) for x > 0, by Stirling's formula with its error term above 2.5
 * and the zeta series about 2 below, so that the zeros at 1 and 2 keep their
 * relative accuracy. Any other x throws RangeError.
 */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`logGamma needs a positive number, not ${x}.`);
  if (x > 2.5) {
    const n = x - 1;
    return n < 1e15 ? (n + 0.5) * Math.log(n) - n + HALF_LOG_TWO_PI + stirlingError(n) : x * (Math.log(x) - 1);
  }
  if (x >= 1.5) return logGammaNearTwo(x - 2);
  if (x >= 0.5) return logGamma1p(x - 1);
  return logGamma1p(x) - Math.log(x);
}

import { requireRange } from '../result';
import { findRoot } from '../special/find-root';
import { stirlingError } from '../special/stirling-error';
import { logNormalSf } from './normal';
import { requireNumber, requirePositive, requireProbability, type Distribution } from './shape';
import { studentT } from './student-t';

function check(df: number, shift: number): void {
  requirePositive(df, 'The degrees of freedom of noncentral t');
  requireRange(Number.isFinite(shift), `The noncentrality is a finite number, not ${shift}.`);
}

/**
 * P(T <= t) or P(T > t) for T = (Z + shift) / sqrt(chi-square / df): the
 * normal tail averaged over the scale, by the trapezoid rule in w, the log of
 * the scale, where the integrand is analytic and falls off at both ends, so
 * that the rule converges geometrically. Either tail is a sum of positive
 * terms and keeps its digits, unlike the alternating series (Lenth 1989, AS 243).
 */
function tail(t: number, df: number, shift: number, upper: boolean): number {
  if (t === Number.POSITIVE_INFINITY || t === Number.NEGATIVE_INFINITY) return upper === t < 0 ? 1 : 0;
  const { peak, width } = shapeOf(t, df, shift, upper);
  const constant = 0.5 * Math.log(df / Math.PI) - stirlingError(df / 2);
  const log = (w: number): number => {
    const edge = t * Math.exp(w) - shift;
    return constant + (df / 2) * (2 * w - Math.expm1(2 * w)) + logNormalSf(upper ? edge : -edge);
  };
  const step = width / 8;
  const top = log(peak);
  return Math.exp(top) * step * (1 + oneSide(log, peak, step, top) + oneSide(log, peak, -step, top));
}

function oneSide(log: (w: number) => number, peak: number, step: number, top: number): number {
  let sum = 0;
  for (let k = 1; ; k++) {
    const term = Math.exp(log(peak + k * step) - top);
    sum += term;
    if (!(term > 1e-18)) return sum;
  }
}

/** Where the integrand is highest, and its width there from the second derivative of its log. */
function shapeOf(t: number, df: number, shift: number, upper: boolean): { peak: number; width: number } {
  const sign = upper ? 1 : -1;
  const slope = (w: number): number => {
    const along = t * Math.exp(w);
    return -df * Math.expm1(2 * w) - sign * hazard(sign * (along - shift)) * along;
  };
  // The slope is df far to the left and falls without end to the right.
  let low = 0;
  let high = 0;
  for (let reach = 1; slope(low) < 0; reach *= 2) low -= reach;
  for (let reach = 0.5; slope(high) > 0; reach *= 2) high += reach;
  const peak = low === high ? low : findRoot(slope, low, high, 1e-6);
  const along = t * Math.exp(peak);
  const edge = sign * (along - shift);
  const own = hazard(edge);
  const spread = 2 * df * Math.exp(2 * peak);
  const curvature = spread + own * (own - edge) * along * along + sign * own * along;
  return { peak, width: 1 / Math.sqrt(Math.max(curvature, spread)) };
}

/** Normal density over upper tail. */
function hazard(x: number): number {
  return Math.exp(-0.5 * x * x - 0.5 * Math.log(2 * Math.PI) - logNormalSf(x));
}

function quantileTail(p: number, df: number, shift: number, upper: boolean): number {
  if (p === 0) return upper ? Number.POSITIVE_INFINITY : Number.NEGATIVE_INFINITY;
  if (p === 1) return upper ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY;
  if (p > 0.5) return quantileTail(1 - p, df, shift, !upper);
  const goal = Math.log(p);
  const gap = (t: number) => Math.log(tail(t, df, shift, upper)) - goal;
  let from = shift;
  let width = 1 + Math.abs(shift) / Math.sqrt(df);
  const outward = upper ? 1 : -1;
  // Out until the tail is less than p, back until it is more.
  while (gap(from) < 0) from -= outward * width;
  let to = from + outward * width;
  while (gap(to) > 0) {
    from = to;
    width *= 2;
    to += outward * width;
  }
  return findRoot(gap, from, to);
}

/** Noncentral t: degrees of freedom and noncentrality ('shift'); used for exact limits of agreement and tolerance. */
export const noncentralT: Distribution<[df: number, shift: number]> = {
  cdf(x, df, shift) {
    requireNumber(x);
    check(df, shift);
    return shift === 0 ? studentT.cdf(x, df) : tail(x, df, shift, false);
  },
  sf(x, df, shift) {
    requireNumber(x);
    check(df, shift);
    return shift === 0 ? studentT.sf(x, df) : tail(x, df, shift, true);
  },
  quantile(p, df, shift) {
    requireProbability(p);
    check(df, shift);
    return shift === 0 ? studentT.quantile(p, df) : quantileTail(p, df, shift, false);
  },
  isf(p, df, shift) {
    requireProbability(p);
    check(df, shift);
    return shift === 0 ? studentT.isf(p, df) : quantileTail(p, df, shift, true);
  },
};

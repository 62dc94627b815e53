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

/** log of the density of log(chi / sqrt df) at w: the scale by which the normal is divided. */
function logScaleDensity(w: number, df: number, constant: number): number {
  return constant + (df / 2) * (2 * w - Math.expm1(2 * w));
}

/**
 * P(T <= t) or P(T > t) for T = (Z + shift) / sqrt(chi-square / df): the
 * normal tail averaged over the scale, by the trapezoid rule in the log of the
 * scale, where the integrand is analytic and falls off at both ends, so that
 * the rule converges geometrically. Either tail is a sum of positive terms
 * and keeps its digits, unlike the alternating series (Lenth 1989, AS 243).
 */
function tail(t: number, df: number, shift: number, upper: boolean): number {
  if (t === Number.POSITIVE_INFINITY || t === Number.NEGATIVE_INFINITY) return upper === t < 0 ? 1 : 0;
  const half = df / 2;
  const constant = 0.5 * Math.log(df / Math.PI) - stirlingError(half);
  const log = (w: number): number => {
    const edge = t * Math.exp(w) - shift;
    return logScaleDensity(w, df, constant) + logNormalSf(upper ? edge : -edge);
  };
  const peak = findPeak(log, df);
  const step = Math.min(0.05, 0.25 / Math.sqrt(df + t * t));
  const top = log(peak);
  return Math.exp(top) * step * (1 + oneSide(log, peak, step, top) + oneSide(log, peak, -step, top));
}

function oneSide(log: (w: number) => number, peak: number, step: number, top: number): number {
  let sum = 0;
  for (let k = 1; k < 100_000; k++) {
    const term = Math.exp(log(peak + k * step) - top);
    sum += term;
    if (term < 1e-18) return sum;
  }
  return sum;
}

/** Highest point of the integrand: a coarse grid, then ternary search. */
function findPeak(log: (w: number) => number, df: number): number {
  const spread = 40 / Math.sqrt(df);
  let best = 0;
  let most = log(0);
  for (let k = -60; k <= 60; k++) {
    const w = (k / 60) * Math.min(spread, 20);
    const value = log(w);
    if (value > most) {
      most = value;
      best = w;
    }
  }
  let low = best - Math.min(spread, 20) / 60;
  let high = best + Math.min(spread, 20) / 60;
  for (let round = 0; round < 40; round++) {
    const a = low + (high - low) / 3;
    const b = high - (high - low) / 3;
    if (log(a) < log(b)) low = a;
    else high = b;
  }
  return (low + high) / 2;
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

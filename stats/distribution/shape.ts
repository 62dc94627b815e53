import { requireRange } from '../result';

/**
 * Every distribution answers both tails as themselves: `sf` is never 1 - cdf,
 * `isf` never a quantile of 1 - p, because those lose all digits below 1e-16.
 */
export interface Distribution<P extends unknown[]> {
  /** P(X <= x). */
  cdf(x: number, ...params: P): number;
  /** P(X > x). */
  sf(x: number, ...params: P): number;
  /** x with P(X <= x) = p; for counts the smallest x with P(X <= x) >= p. */
  quantile(p: number, ...params: P): number;
  /** x with P(X > x) = p; for counts the smallest x with P(X > x) <= p. */
  isf(p: number, ...params: P): number;
}

export interface Continuous<P extends unknown[]> extends Distribution<P> {
  /** Density at x. */
  pdf(x: number, ...params: P): number;
}

export interface Discrete<P extends unknown[]> extends Distribution<P> {
  /** P(X = x); 0 between the counts. */
  pmf(x: number, ...params: P): number;
}

/** Probabilities lie in [0, 1]. Throws RangeError otherwise. */
export function requireProbability(p: number): void {
  requireRange(p >= 0 && p <= 1, `A probability lies between 0 and 1, not ${p}.`);
}

/** An argument is a number, infinities included. Throws RangeError for NaN. */
export function requireNumber(x: number): void {
  requireRange(!Number.isNaN(x), 'The argument of a distribution is a number, not NaN.');
}

/** A shape or degrees of freedom is positive and finite. Throws RangeError otherwise. */
export function requirePositive(value: number, what: string): void {
  requireRange(value > 0 && value < Number.POSITIVE_INFINITY, `${what} is a positive number, not ${value}.`);
}

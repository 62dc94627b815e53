import { normal, studentT } from '../distributions';
import { representable, type Interval } from '../result';

/** One coefficient of a fitted model with Wald limits. */
export interface Coefficient extends Interval {
  readonly name: string;
  readonly se: number;
  /** Two-sided p of no effect, on the same reference distribution as the limits; null where the standard error is 0. */
  readonly p: number | null;
  /** Degrees of freedom of the reference t distribution; absent where limits and p are normal. */
  readonly df?: number;
}

/** Wald limits and p; normal unless degrees of freedom are given. */
export function coefficient(name: string, estimate: number, se: number, level: number, df?: number): Coefficient {
  const tail = (1 - level) / 2;
  const z = df === undefined ? normal.isf(tail) : studentT.isf(tail, df);
  const statistic = Math.abs(estimate / se);
  const tailOf = (): number => 2 * (df === undefined ? normal.sf(statistic) : studentT.sf(statistic, df));
  const p = se > 0 ? tailOf() : null;
  // Few degrees of freedom send the quantile, and with it the limits, beyond all numbers.
  const base = representable({ name, estimate, se, lower: estimate - z * se, upper: estimate + z * se, level, p });
  return df === undefined ? base : { ...base, df };
}

/** exp of an interval: a log rate ratio to a rate ratio. */
export function exponentiate<T extends Interval>(interval: T): T {
  const exp = (value: number | null): number | null => (value === null ? null : Math.exp(value));
  return representable({ ...interval, estimate: exp(interval.estimate), lower: exp(interval.lower), upper: exp(interval.upper) });
}

/** A slope on the log scale as percent change for one unit: 100 (exp(b) - 1), without cancellation near 0. */
export function percentChange(interval: Interval): Interval {
  const percent = (value: number | null): number | null => (value === null ? null : 100 * Math.expm1(value));
  return representable({ ...interval, estimate: percent(interval.estimate), lower: percent(interval.lower), upper: percent(interval.upper) });
}

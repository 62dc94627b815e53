import { pickRows, usableRows } from '../missing/usable-rows';
import { moments } from './moments';
import { orderByTwo } from './order-by-two';
import { quantileSorted, type QuantileType } from './quantile';
import { requireRange, type Provenance } from '../result';

/** The spread of the values logged in one week. */
export interface WeekBand {
  readonly week: number;
  readonly n: number;
  /** One for each probability asked, in that order. */
  readonly quantiles: readonly number[];
  readonly mean: number;
  /** null where the week has one value. */
  readonly sd: number | null;
}

export interface QuantileBands extends Provenance {
  readonly probs: readonly number[];
  /** Ascending by week; a week without a value has no band. */
  readonly bands: readonly WeekBand[];
}

/**
 * Quantiles of a value, week by week. One row a log; rows with a missing value
 * or week are left out and counted.
 *
 * @param values in any unit, e.g. kg.
 * @param weeks the week of each value (any numbers; equal numbers are one week).
 * @param probs proportions in [0, 1], e.g. [0.1, 0.25, 0.5, 0.75, 0.9].
 * @throws RangeError for unequal columns, an infinite value or a probability outside [0, 1].
 * @see Hyndman & Fan, Am Stat 1996;50:361
 */
export function quantileBands(
  values: ArrayLike<number>,
  weeks: ArrayLike<number>,
  probs: readonly number[],
  type: QuantileType = 7,
): QuantileBands {
  for (const p of probs) requireRange(p >= 0 && p <= 1, `A quantile is asked at a proportion between 0 and 1, not ${p}.`);
  const usable = usableRows({ value: values, week: weeks });
  const value = pickRows(values, usable.rows);
  const week = pickRows(weeks, usable.rows);
  const order = orderByTwo(week, value);
  const bands: WeekBand[] = [];
  for (let start = 0; start < order.length; ) {
    const at = week[order[start]!]!;
    let end = start;
    while (end < order.length && week[order[end]!] === at) end++;
    bands.push(bandOf(at, pickRows(value, order.subarray(start, end)), probs, type));
    start = end;
  }
  const method = `Sample quantiles by week (Hyndman-Fan type ${type})`;
  return { probs, bands, method, n: value.length, leftOut: usable.leftOut };
}

function bandOf(week: number, sorted: Float64Array, probs: readonly number[], type: QuantileType): WeekBand {
  const { n, mean, sd } = moments(sorted);
  return { week, n, quantiles: probs.map((p) => quantileSorted(sorted, p, type) as number), mean: mean as number, sd };
}

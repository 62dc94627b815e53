import { orderOf } from './sort';

/**
 * Two times are one time when they differ by less than this share of the larger:
 * 0.1 + 0.2 and 0.3 are the same day, 1.0 and 1.000001 are not. Wide enough for
 * rounding, far below any difference that was measured.
 */
export const TIME_TOLERANCE = 1e-12;

/** True when a is earlier than b by more than rounding. */
export function isBefore(a: number, b: number): boolean {
  const gap = b - a;
  return gap > 0 && (gap === Infinity || gap > TIME_TOLERANCE * Math.max(Math.abs(a), Math.abs(b)));
}

/** Rows sorted by time, and where each distinct time starts in that order. */
export interface TimeOrder {
  /** Row numbers, earliest first. */
  readonly order: Uint32Array;
  /** Position in `order` of the first row of each distinct time, and n at the end. */
  readonly starts: Uint32Array;
  /** The distinct times, ascending. */
  readonly time: Float64Array;
}

/** Sorts a column of times and groups the ties, each group held to its earliest member. */
export function orderTimes(time: Float64Array, order: Uint32Array = orderOf(time)): TimeOrder {
  const n = order.length;
  let groups = 0;
  let anchor = NaN;
  for (let i = 0; i < n; i++) {
    const t = time[order[i]!]!;
    if (i === 0 || isBefore(anchor, t)) {
      anchor = t;
      groups++;
    }
  }
  const starts = new Uint32Array(groups + 1);
  const distinct = new Float64Array(groups);
  let g = -1;
  for (let i = 0; i < n; i++) {
    const t = time[order[i]!]!;
    if (i === 0 || isBefore(distinct[g]!, t)) {
      g++;
      starts[g] = i;
      distinct[g] = t;
    }
  }
  starts[groups] = n;
  return { order, starts, time: distinct };
}

/** Position of the last of the ascending values that is not after t; -1 when t is before them all. */
export function lastNotAfter(values: ArrayLike<number>, t: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (isBefore(t, values[middle]!)) high = middle;
    else low = middle + 1;
  }
  return low - 1;
}

/** How many of the ascending values are before t (strictly, to the tolerance of times). */
export function countBefore(values: ArrayLike<number>, t: number): number {
  let low = 0;
  let high = values.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (isBefore(values[middle]!, t)) low = middle + 1;
    else high = middle;
  }
  return low;
}

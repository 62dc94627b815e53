import { requireRange } from '../result';

/** The continuous sample quantiles of Hyndman & Fan; 7 is the default here and says so in every method line. */
export type QuantileType = 4 | 5 | 6 | 7 | 8 | 9;

/** Plotting-position constants [a, b] of each type: position = a + p(n + 1 - a - b). */
const POSITIONS: Readonly<Record<QuantileType, readonly [number, number]>> = {
  4: [0, 1],
  5: [0.5, 0.5],
  6: [0, 0],
  7: [1, 1],
  8: [1 / 3, 1 / 3],
  9: [3 / 8, 3 / 8],
};

/** (n - 1)p is often an integer on paper and one ulp off it in binary; a position this near an integer is that integer. */
const FUZZ = 4 * Number.EPSILON;

/**
 * The p-quantile of values already in ascending order.
 * Hyndman & Fan 1996, Am Stat 50:361.
 *
 * @param sorted ascending, without NaN; empty gives null.
 * @throws RangeError unless 0 <= p <= 1.
 */
export function quantileSorted(sorted: ArrayLike<number>, p: number, type: QuantileType = 7): number | null {
  requireRange(p >= 0 && p <= 1, `A quantile is asked at a proportion between 0 and 1, not ${p}.`);
  const n = sorted.length;
  if (n === 0) return null;
  const [a, b] = POSITIONS[type];
  const position = a + p * (n + 1 - a - b);
  const whole = Math.floor(position + FUZZ);
  const rest = position - whole;
  const at = (rank: number): number => sorted[Math.min(n, Math.max(1, rank)) - 1] as number;
  const low = at(whole);
  const high = at(whole + 1);
  // Equal neighbours are returned untouched: (1 - h)x + hx need not be x.
  if (rest < FUZZ || low === high) return low;
  return (1 - rest) * low + rest * high;
}

/**
 * Quantiles of unordered values.
 *
 * @throws RangeError for a value that is missing or infinite, or a probability outside [0, 1].
 * @see Hyndman & Fan, Am Stat 1996;50:361
 */
export function quantile(values: ArrayLike<number>, probs: readonly number[], type: QuantileType = 7): (number | null)[] {
  const sorted = Float64Array.from(values);
  requireRange(sorted.every(Number.isFinite), 'Quantiles are asked of finite values; leave missing ones out first.');
  sorted.sort();
  return probs.map((p) => quantileSorted(sorted, p, type));
}

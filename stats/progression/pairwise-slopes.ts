import { selectSlopes } from './slope-selection';

/** Up to this many rows every slope is made and sorted (two million numbers); beyond, slopes are selected without making them. */
const KEEP_ALL_ROWS = 2_000;

/**
 * Values of the ordered pairwise slopes at the ranks asked (1 = smallest);
 * pairs with equal x have no slope.
 */
export function slopesAtRanks(x: Float64Array, y: Float64Array, ranks: readonly number[]): (rank: number) => number {
  if (x.length <= KEEP_ALL_ROWS) {
    const sorted = allSlopes(x, y).sort();
    return (rank) => sorted[rank - 1]!;
  }
  const found = selectSlopes(x, y, ranks);
  return (rank) => found.get(rank)!;
}

/** Every slope, as it comes; exported for the test that holds the selection against it. */
export function allSlopes(x: Float64Array, y: Float64Array): Float64Array {
  const n = x.length;
  const slopes = new Float64Array((n * (n - 1)) / 2);
  let count = 0;
  for (let i = 0; i < n; i++) {
    for (let j = i + 1; j < n; j++) {
      const run = x[j]! - x[i]!;
      if (run !== 0) slopes[count++] = (y[j]! - y[i]!) / run + 0; // -0 + 0 is 0: the two zeros are one slope
    }
  }
  return slopes.subarray(0, count);
}

import { inversions } from './inversions';
import { inOrderByTwo } from './order-by-two';

/** Kendall's S with what its tests need. */
export interface Kendall {
  /** Concordant minus discordant pairs. */
  readonly s: number;
  /** Variance of S under no association, corrected for ties in either column. */
  readonly variance: number;
  /** Pairs with equal x. */
  readonly tiedX: number;
  /** Normal deviate with continuity correction; 0 where the variance is 0. */
  readonly z: number;
}

/**
 * Kendall's S in O(n log n): discordant pairs are the swaps of a merge sort
 * (Knight 1966, JASA 61:436); variance with ties from Kendall 1970, Rank
 * Correlation Methods, ch. 4; the continuity correction moves S one towards 0.
 */
export function kendall(x: Float64Array, y: Float64Array): Kendall {
  const n = x.length;
  const { x: byX, y: byXThenY } = inOrderByTwo(x, y);
  const sortedY = y.slice().sort();
  const xTies = tieSums((i, j) => byX[i] === byX[j], n);
  const yTies = tieSums((i, j) => sortedY[i] === sortedY[j], n);
  const bothTies = tieSums((i, j) => byX[i] === byX[j] && byXThenY[i] === byXThenY[j], n);
  const discordant = inversions(byXThenY, [new Float64Array(byXThenY.length), new Float64Array(byXThenY.length)]);
  const pairs = (n * (n - 1)) / 2;
  const s = pairs - xTies.two / 2 - yTies.two / 2 + bothTies.two / 2 - 2 * discordant;
  const variance = varianceOfS(n, xTies, yTies);
  const z = variance > 0 ? (s - Math.sign(s)) / Math.sqrt(variance) : 0;
  return { s, variance, tiedX: xTies.two / 2, z };
}

/** Sums over tie groups of size t: t(t-1), t(t-1)(t-2), t(t-1)(2t+5). */
interface TieSums {
  readonly two: number;
  readonly three: number;
  readonly weighted: number;
}

function tieSums(same: (i: number, j: number) => boolean, n: number): TieSums {
  let two = 0;
  let three = 0;
  let weighted = 0;
  for (let start = 0; start < n; ) {
    let end = start + 1;
    while (end < n && same(start, end)) end++;
    const t = end - start;
    two += t * (t - 1);
    three += t * (t - 1) * (t - 2);
    weighted += t * (t - 1) * (2 * t + 5);
    start = end;
  }
  return { two, three, weighted };
}

function varianceOfS(n: number, x: TieSums, y: TieSums): number {
  if (n < 2) return 0;
  const first = (n * (n - 1) * (2 * n + 5) - x.weighted - y.weighted) / 18;
  const second = (x.two * y.two) / (2 * n * (n - 1));
  const third = n > 2 ? (x.three * y.three) / (9 * n * (n - 1) * (n - 2)) : 0;
  return Math.max(0, first + second + third);
}

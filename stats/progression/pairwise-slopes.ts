/** Up to this many rows every slope is kept and sorted (two million numbers). */
const KEEP_ALL_ROWS = 2_000;
const DIGITS = 4;
const BINS = 65_536;

/**
 * Values of the ordered pairwise slopes at the ranks asked (1 = smallest);
 * pairs with equal x have no slope.
 *
 * Small data: all slopes, sorted. Large data: radix selection, four passes over
 * the pairs that each settle 16 bits of every wanted value, so memory stays at
 * a few counters and no slope is stored. Time grows as n^2 either way. The
 * O(n log n) forms (Matousek 1991) compare slopes by rounded residuals, which
 * the heavy ties of whole kilograms and whole weeks upset; this one never
 * compares anything but the slopes themselves.
 */
export function slopesAtRanks(x: Float64Array, y: Float64Array, ranks: readonly number[]): (rank: number) => number {
  if (x.length <= KEEP_ALL_ROWS) {
    const sorted = allSlopes(x, y).sort();
    return (rank) => sorted[rank - 1]!;
  }
  const found = selectByRadix(x, y, [...new Set(ranks)]);
  return (rank) => found.get(rank)!;
}

function allSlopes(x: Float64Array, y: Float64Array): Float64Array {
  const n = x.length;
  const slopes = new Float64Array((n * (n - 1)) / 2);
  let count = 0;
  for (let i = 0; i < n; i++) {
    for (let j = i + 1; j < n; j++) {
      const run = x[j]! - x[i]!;
      if (run !== 0) slopes[count++] = (y[j]! - y[i]!) / run;
    }
  }
  return slopes.subarray(0, count);
}

/** A rank on its way: the leading digits settled so far, and how many slopes precede them. */
interface Search {
  readonly rank: number;
  readonly prefix: Uint16Array;
  below: number;
}

/** Exported for the test that holds it against the plain sort. */
export function selectByRadix(x: Float64Array, y: Float64Array, ranks: readonly number[]): Map<number, number> {
  const searches: Search[] = ranks.map((rank) => ({ rank, prefix: new Uint16Array(DIGITS), below: 0 }));
  for (let digit = 0; digit < DIGITS; digit++) {
    const counts = searches.map(() => new Float64Array(BINS));
    countDigits(x, y, digit, searches, counts);
    searches.forEach((search, s) => settle(search, digit, counts[s]!));
  }
  return new Map(searches.map(({ rank, prefix }) => [rank, toSlope(prefix)]));
}

function countDigits(x: Float64Array, y: Float64Array, digit: number, searches: Search[], counts: Float64Array[]): void {
  const key = slopeKey();
  for (let i = 0; i < x.length; i++) {
    for (let j = i + 1; j < x.length; j++) {
      const run = x[j]! - x[i]!;
      if (run === 0) continue;
      const digits = key((y[j]! - y[i]!) / run);
      for (let s = 0; s < searches.length; s++) {
        const prefix = searches[s]!.prefix;
        let same = true;
        for (let d = 0; d < digit && same; d++) same = digits[d] === prefix[d];
        if (same) counts[s]![digits[digit]!]!++;
      }
    }
  }
}

/** Moves a search into the bin that holds its rank. */
function settle(search: Search, digit: number, counts: Float64Array): void {
  let bin = 0;
  while (search.below + counts[bin]! < search.rank) search.below += counts[bin++]!;
  search.prefix[digit] = bin;
}

/** Digits of a double, most significant first, in an order that sorts as the numbers do. */
function slopeKey(): (slope: number) => Uint16Array {
  const view = new DataView(new ArrayBuffer(8));
  const digits = new Uint16Array(DIGITS);
  return (slope) => {
    view.setFloat64(0, slope + 0); // -0 + 0 is +0: the two zeros are one slope
    const flip = view.getUint16(0) >= 0x8000;
    for (let d = 0; d < DIGITS; d++) digits[d] = view.getUint16(2 * d) ^ (flip ? 0xffff : d === 0 ? 0x8000 : 0);
    return digits;
  };
}

function toSlope(prefix: Uint16Array): number {
  const view = new DataView(new ArrayBuffer(8));
  const positive = prefix[0]! >= 0x8000;
  prefix.forEach((digit, d) => view.setUint16(2 * d, digit ^ (positive ? (d === 0 ? 0x8000 : 0) : 0xffff)));
  return view.getFloat64(0);
}

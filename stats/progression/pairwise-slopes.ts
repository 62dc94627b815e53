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

/** A rank on its way: the leading bits settled so far (as two words), and how many slopes precede them. */
interface Search {
  readonly rank: number;
  high: number;
  low: number;
  below: number;
}

const slopeCell = new Float64Array(1);
const words = new Uint32Array(slopeCell.buffer);
/** Which of the two words holds sign and exponent on this machine. */
const HIGH = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0;
const SIGN = 0x80000000;

/** Exported for the test that holds it against the plain sort. */
export function selectByRadix(x: Float64Array, y: Float64Array, ranks: readonly number[]): Map<number, number> {
  const searches: Search[] = ranks.map((rank) => ({ rank, high: 0, low: 0, below: 0 }));
  for (let digit = 0; digit < DIGITS; digit++) {
    // Ranks that share their leading bits share a counter.
    const counters = new Map<string, Counter>();
    for (const { high, low } of searches) counters.set(`${high} ${low}`, { high, low, counts: new Float64Array(BINS) });
    countDigits(x, y, digit, [...counters.values()]);
    const own = searches.map(({ high, low }) => counters.get(`${high} ${low}`)!);
    searches.forEach((search, s) => settle(search, digit, own[s]!.counts));
  }
  return new Map(searches.map(({ rank, high, low }) => [rank, toSlope(high, low)]));
}

interface Counter {
  readonly high: number;
  readonly low: number;
  readonly counts: Float64Array;
}

/** Adds each slope to the counters whose leading bits it has. */
function countDigits(x: Float64Array, y: Float64Array, digit: number, counters: readonly Counter[]): void {
  for (let i = 0; i < x.length; i++) {
    for (let j = i + 1; j < x.length; j++) {
      const run = x[j]! - x[i]!;
      if (run === 0) continue;
      slopeCell[0] = (y[j]! - y[i]!) / run + 0; // -0 + 0 is +0: the two zeros are one slope
      // Bits in an order that sorts as the numbers do: negatives turned about, positives above them.
      const negative = words[HIGH]! >= SIGN;
      const high = (negative ? ~words[HIGH]! : words[HIGH]! ^ SIGN) >>> 0;
      const low = (negative ? ~words[1 - HIGH]! : words[1 - HIGH]!) >>> 0;
      const bin = digit === 0 ? high >>> 16 : digit === 1 ? high & 0xffff : digit === 2 ? low >>> 16 : low & 0xffff;
      for (let c = 0; c < counters.length; c++) {
        const counter = counters[c]!;
        if (digit === 1 && high >>> 16 !== counter.high >>> 16) continue;
        if (digit > 1 && high !== counter.high) continue;
        if (digit === 3 && low >>> 16 !== counter.low >>> 16) continue;
        counter.counts[bin]!++;
      }
    }
  }
}

/** Moves a search into the bin that holds its rank. */
function settle(search: Search, digit: number, counts: Float64Array): void {
  let bin = 0;
  while (search.below + counts[bin]! < search.rank) search.below += counts[bin++]!;
  const bits = digit % 2 === 0 ? (bin << 16) >>> 0 : bin;
  if (digit < 2) search.high = (search.high | bits) >>> 0;
  else search.low = (search.low | bits) >>> 0;
}

function toSlope(high: number, low: number): number {
  const negative = high < SIGN;
  words[HIGH] = negative ? ~high : high ^ SIGN;
  words[1 - HIGH] = negative ? ~low : low;
  return slopeCell[0]!;
}

/**
 * One index sort a data set, shared by every estimator here. Whole days (the
 * usual case) go through a counting sort, continuous times through a radix sort
 * on the bits of the double; both are stable and O(n).
 */

const DIGIT_BITS = 11;
const DIGITS = 1 << DIGIT_BITS;
const PASSES = 6;

/** Working memory of one sort. */
export interface SortRoom {
  readonly words: Uint32Array;
  readonly rows: Uint32Array;
}

export function roomToSort(n: number): SortRoom {
  return { words: new Uint32Array(2 * n), rows: new Uint32Array(n) };
}

/**
 * Ascending, stable order of the keys.
 * @param keys finite numbers (no NaN)
 * @param room working memory for callers that sort often, `roomToSort` of as many keys
 * @param order taken for the answer
 * @returns the row numbers, smallest key first; equal keys keep their row order
 */
export function orderOf(keys: Float64Array, room?: SortRoom, order: Uint32Array = new Uint32Array(keys.length)): Uint32Array {
  const n = keys.length;
  let low = Infinity;
  let high = -Infinity;
  let sorted = true;
  let whole = true;
  for (let i = 0; i < n; i++) {
    const key = keys[i]!;
    if (i > 0 && key < keys[i - 1]!) sorted = false;
    if (key < low) low = key;
    if (key > high) high = key;
    if (whole && key !== Math.floor(key)) whole = false;
  }
  identity(order);
  if (sorted) return order;
  if (whole && high - low <= 4 * n + 1024) return countingOrder(keys, low, high - low + 1, order);
  if (n <= 256) return order.sort((a, b) => keys[a]! - keys[b]! || a - b);
  return radixOrder(keys, low < 0, room, order);
}

/** Rows in the order of a small integer code, keeping the given order within a code. */
export function regroup(order: Uint32Array, codes: ArrayLike<number>, count: number): { order: Uint32Array; starts: Uint32Array } {
  const starts = new Uint32Array(count + 1);
  for (let i = 0; i < order.length; i++) starts[codes[order[i]!]! + 1]!++;
  for (let c = 0; c < count; c++) starts[c + 1]! += starts[c]!;
  const next = starts.slice();
  const out = new Uint32Array(order.length);
  for (let i = 0; i < order.length; i++) {
    const row = order[i]!;
    out[next[codes[row]!]!++] = row;
  }
  return { order: out, starts };
}

function identity(order: Uint32Array): void {
  for (let i = 0; i < order.length; i++) order[i] = i;
}

function countingOrder(keys: Float64Array, low: number, range: number, order: Uint32Array): Uint32Array {
  const next = new Uint32Array(range + 1);
  for (let i = 0; i < keys.length; i++) next[keys[i]! - low + 1]!++;
  for (let k = 0; k < range; k++) next[k + 1]! += next[k]!;
  for (let i = 0; i < keys.length; i++) order[next[keys[i]! - low]!++] = i;
  return order;
}

/**
 * Least significant digit first, eleven bits at a time. The bits of non-negative
 * doubles already sort like unsigned integers; with negative keys present the
 * sign bit is flipped, and all bits of the negative ones.
 */
function radixOrder(keys: Float64Array, hasNegative: boolean, room: SortRoom | undefined, order: Uint32Array): Uint32Array {
  const n = keys.length;
  const words = sortableWords(keys, hasNegative, room);
  const counts = new Uint32Array(PASSES * DIGITS);
  for (let i = 0; i < n; i++) {
    for (let pass = 0; pass < PASSES; pass++) counts[pass * DIGITS + digit(words, i, pass)]!++;
  }
  let from = order;
  let to = room?.rows ?? new Uint32Array(n);
  for (let pass = 0; pass < PASSES; pass++) {
    const next = counts.subarray(pass * DIGITS, (pass + 1) * DIGITS);
    if (next[digit(words, 0, pass)] === n) continue; // every key has this digit in common
    let total = 0;
    for (let d = 0; d < DIGITS; d++) {
      const count = next[d]!;
      next[d] = total;
      total += count;
    }
    for (let i = 0; i < n; i++) {
      const row = from[i]!;
      to[next[digit(words, row, pass)]!++] = row;
    }
    [from, to] = [to, from];
  }
  if (from !== order) order.set(from);
  return order;
}

function digit(words: Uint32Array, row: number, pass: number): number {
  const low = words[2 * row]!;
  const high = words[2 * row + 1]!;
  switch (pass) {
    case 0:
      return low & 2047;
    case 1:
      return (low >>> 11) & 2047;
    case 2:
      return ((low >>> 22) | (high << 10)) & 2047;
    case 3:
      return (high >>> 1) & 2047;
    case 4:
      return (high >>> 12) & 2047;
    default:
      return high >>> 23;
  }
}

function sortableWords(keys: Float64Array, hasNegative: boolean, room: SortRoom | undefined): Uint32Array {
  const own = wordsOf(keys);
  if (!hasNegative && !keys.includes(-0) /* includes() takes 0 and -0 as one */) return own;
  const words = room?.words ?? new Uint32Array(2 * keys.length);
  for (let i = 0; i < keys.length; i++) {
    const high = own[2 * i + 1]!;
    const negative = high >>> 31 === 1 && keys[i] !== 0; // -0 goes with 0
    words[2 * i] = negative ? ~own[2 * i]! : own[2 * i]!;
    words[2 * i + 1] = negative ? ~high : high | 0x80000000;
  }
  return words;
}

function wordsOf(keys: Float64Array): Uint32Array {
  return new Uint32Array(keys.buffer, keys.byteOffset, 2 * keys.length);
}

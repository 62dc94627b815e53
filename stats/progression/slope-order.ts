import { inversions, type Swaps } from './inversions';
import { requireRange } from '../result';
import { stepsFrom } from '../special/double-steps';
import { orderOf, roomToSort, type SortRoom } from '../survival/sort';
import { inOrderByTwo } from './order-by-two';

/** The rows in order of y - b x, and how many pairs have a slope below b. */
export interface Cut {
  readonly slope: number;
  /** Row numbers (of the ordered rows), smallest residual first. */
  readonly order: Uint32Array;
  /** Pairs of rows whose slope is below b. */
  readonly below: number;
}

/** 2^27 + 1: splits a double into halves whose products are exact (Veltkamp; Dekker 1971, Numer Math 18:224). */
const SPLIT = 134217729;

/**
 * Counts slopes below a trial value without making them: two rows have a slope
 * below b exactly when their residuals y - b x stand in the other order than
 * their x, so the slopes below b are the inversions of one sort.
 *
 * The trap: a residual rounded to a double moves by far more than the slopes of
 * whole kilograms and whole weeks lie apart, and miscounts every tie. Residuals
 * are therefore kept as two doubles, exact to 31 digits of the largest term.
 */
export class SlopeOrder {
  readonly n: number;
  /** Rows in order of x, then y. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** The powers of two that bring the columns to about 1, where products neither overflow nor lose bits. */
  private readonly xPower: number;
  private readonly yPower: number;
  private readonly high: Float64Array;
  private readonly low: Float64Array;
  /** Working memory, made once: a search makes dozens of cuts. */
  private readonly room: SortRoom;
  private readonly merging: [Uint32Array, Uint32Array];
  /** Slopes nearer to 0 than this are beyond what a product of scaled columns can tell from 0. */
  readonly tiny: number;

  constructor(x: Float64Array, y: Float64Array) {
    this.n = x.length;
    ({ x: this.x, y: this.y } = inOrderByTwo(x, y));
    this.xPower = powerOfColumn('x', x);
    this.yPower = powerOfColumn('y', y);
    this.tiny = Math.min(2 ** (this.yPower - this.xPower - 400), Number.MAX_VALUE);
    this.high = new Float64Array(this.n);
    this.low = new Float64Array(this.n);
    this.room = roomToSort(this.n);
    this.merging = [new Uint32Array(this.n), new Uint32Array(this.n)];
  }

  /** Slope of two rows of different x, as a double; the two zeros are one. */
  slope(i: number, j: number): number {
    return (this.y[j]! - this.y[i]!) / (this.x[j]! - this.x[i]!) + 0;
  }

  /** Before every slope: rows stand as they are, by x and then y. */
  first(): Cut {
    const order = new Uint32Array(this.n);
    for (let i = 0; i < this.n; i++) order[i] = i;
    return { slope: -Infinity, order, below: 0 };
  }

  /** After every slope: x descending, y ascending within equal x. */
  last(): Cut {
    const order = new Uint32Array(this.n);
    for (let start = 0, at = this.n; start < this.n; ) {
      let end = start + 1;
      while (end < this.n && this.x[end] === this.x[start]) end++;
      at -= end - start;
      for (let i = start; i < end; i++) order[at + i - start] = i;
      start = end;
    }
    return { slope: Infinity, order, below: inversions(order, this.merging) };
  }

  /** So many doubles away, and outside what cannot be told from 0. */
  clear(slope: number, steps: number): number {
    const moved = stepsFrom(slope, steps);
    return Math.abs(moved) < this.tiny ? Math.sign(steps) * this.tiny : moved;
  }

  /** @param b finite; @param into taken for the order; @param more added to b beyond a double's digits, a power of two or 0 */
  at(b: number, into: Uint32Array, more = 0): Cut {
    this.residuals(b, more);
    const order = orderOf(this.high, this.room, into);
    this.settleTies(order);
    return { slope: b, order, below: inversions(order, this.merging) };
  }

  /** Shows every pair whose slope lies from one cut's (inclusive) to the other's; rows are told by their places in the second cut's order. */
  between(from: Cut, to: Cut, show: Swaps): void {
    // Rows as the first cut orders them, by their place at the second: its inversions are the slopes between.
    const place = this.room.rows;
    const swapped = this.room.words.subarray(0, this.n);
    for (let k = 0; k < this.n; k++) place[to.order[k]!] = k;
    for (let k = 0; k < this.n; k++) swapped[k] = place[from.order[k]!]!;
    inversions(swapped, this.merging, show);
  }

  /** y - (b + more) x of each row as high + low, high being the sum rounded, so that order by high and then low is order by value. */
  private residuals(b: number, more: number): void {
    const { xPower, yPower, high, low } = this;
    const down = b === 0 ? 0 : Math.max(0, powerOf(b) + xPower - yPower);
    const [xScale, xScaleToo] = twoFactors(-xPower);
    const [yScale, yScaleToo] = twoFactors(-yPower - down);
    const [bScale, bScaleToo] = twoFactors(xPower - yPower - down);
    const slope = b * bScale * bScaleToo;
    // Above 0 stays above 0: slopes of exactly 0 are below 'a little more than 0'.
    const rest = b === 0 && more > 0 ? Math.max(more * bScale * bScaleToo, 2 ** -400) : more * bScale * bScaleToo;
    const [slopeHead, slopeTail] = halves(slope);
    for (let i = 0; i < this.n; i++) {
      const x = this.x[i]! * xScale * xScaleToo;
      const y = this.y[i]! * yScale * yScaleToo;
      const product = slope * x;
      const split = SPLIT * x;
      const xHead = split - (split - x);
      const xTail = x - xHead;
      const lost = slopeTail * xTail - (product - slopeHead * xHead - slopeTail * xHead - slopeHead * xTail);
      // y - product = sum + error, then the small parts are gathered from the smallest up (Knuth's two-sum each).
      const sum = y - product;
      const back = sum - y;
      const error = y - (sum - back) - (product + back);
      const small = error - lost;
      const smallBack = small - error;
      const smallLost = error - (small - smallBack) - (lost + smallBack);
      const beyond = small - rest * x;
      const beyondBack = beyond - small;
      const beyondLost = small - (beyond - beyondBack) - (rest * x + beyondBack);
      const total = sum + beyond;
      const totalBack = total - sum;
      const tail = sum - (total - totalBack) + (beyond - totalBack) + (smallLost + beyondLost);
      const rounded = total + tail;
      high[i] = rounded;
      low[i] = total - rounded + tail;
    }
  }

  /** Orders each run of equal high parts by its low parts; what is then still equal stays in row order. */
  private settleTies(order: Uint32Array): void {
    const { high, low } = this;
    for (let start = 0; start < order.length; ) {
      let end = start + 1;
      let sorted = true;
      while (end < order.length && high[order[end]!] === high[order[start]!]) {
        if (low[order[end]!]! < low[order[end - 1]!]!) sorted = false;
        end++;
      }
      if (!sorted) {
        const run = order.slice(start, end);
        const within = orderOf(Float64Array.from(run, (row) => low[row]!));
        for (let k = 0; k < run.length; k++) order[start + k] = run[within[k]!]!;
      }
      start = end;
    }
  }
}

/** A column whose smallest value is this many powers of two below its largest is not one of measurements, and products of it would vanish. */
const WIDEST = 300;

function powerOfColumn(name: string, values: Float64Array): number {
  let most = 0;
  let least = Infinity;
  for (let i = 0; i < values.length; i++) {
    const size = Math.abs(values[i]!);
    if (size > most) most = size;
    if (size > 0 && size < least) least = size;
  }
  requireRange(most === 0 || powerOf(most) - powerOf(least) <= WIDEST, `${name} goes from ${least} to ${most}: too wide for one slope.`);
  return powerOf(most);
}

/** The power of two next to a number's size, within one; 0 of 0. */
function powerOf(value: number): number {
  return value === 0 ? 0 : Math.floor(Math.log2(Math.abs(value)));
}

/** 2^power as two factors: one alone may pass the largest double. */
function twoFactors(power: number): [number, number] {
  const half = Math.trunc(power / 2);
  return [2 ** half, 2 ** (power - half)];
}

function halves(value: number): [number, number] {
  const split = SPLIT * value;
  const head = split - (split - value);
  return [head, value - head];
}

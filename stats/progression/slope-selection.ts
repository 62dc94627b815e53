import { nextDouble, type RandomSource } from '../random/source';
import { Xoshiro128 } from '../random/xoshiro128';
import { doubleAt, placeOf, stepsFrom } from '../special/double-steps';
import { SlopeOrder, type Cut } from './slope-order';

/** Slopes drawn a round: as many as rows, within these; a round shrinks the window by about a third of the root of it. */
const LEAST_DRAWN = 1_024;
const MOST_DRAWN = 100_000;
/** A slope as a double is off by three roundings; cuts keep this many doubles clear of the slopes they are to part. */
const GUARD = 16;
/** The roundings of a slope, in doubles, generously. */
const ROUNDING = 8;
const MAX_ROUNDS = 60;

export interface SelectionOptions {
  /** Chance decides how soon the answer is found, never what it is. */
  readonly seed?: number;
  /** Slopes of a window that are looked at one by one; by default two a row. */
  readonly limit?: number;
}

/**
 * Slopes at the ranks asked among all pairs of rows, in O(n log n) expected
 * time and O(n) memory: a window of slopes known to hold the rank is narrowed
 * at slopes drawn from it, until it holds so few that they are made and sorted
 * (Matousek 1991, Inf Process Lett 39:183; Dillencourt, Mount & Netanyahu 1992,
 * Int J Comput Geom Appl 2:1).
 *
 * The answer is the very double that sorting all slopes would give: windows
 * only count, and the last choice is among the slopes themselves. One case
 * cannot be had that way. Where more slopes than the limit crowd within a few
 * neighbouring doubles (rows on a line) they can only be counted: there each
 * is taken as its exact quotient rounded once. That is the same double whenever
 * the differences of the columns are exact, as for whole numbers, and within
 * three neighbours of it otherwise.
 *
 * @param ranks 1 = smallest, at most the number of pairs with different x
 */
export function selectSlopes(x: Float64Array, y: Float64Array, ranks: readonly number[], options: SelectionOptions = {}): Map<number, number> {
  const search = new SlopeSearch(x, y, options);
  const found = new Map<number, number>();
  const sorted = [...new Set(ranks)].sort((a, b) => a - b);
  for (let k = 0; k < sorted.length; ) {
    // Neighbouring ranks share a window.
    let end = k + 1;
    while (end < sorted.length && sorted[end] === sorted[end - 1]! + 1) end++;
    search.find(sorted[k]!, sorted[end - 1]!, found);
    k = end;
  }
  return found;
}

/** Slopes from low's (inclusive) to high's. */
interface Window {
  readonly low: Cut;
  readonly high: Cut;
}

class SlopeSearch {
  private readonly rows: SlopeOrder;
  private readonly source: RandomSource;
  private readonly limit: number;
  private readonly all: Window;
  /** Room for the orders of the two cuts in use and of one on trial: a search makes dozens. */
  private spare: [Uint32Array, Uint32Array, Uint32Array];
  /** The first draw serves every rank. */
  private readonly fromAll: Float64Array;

  constructor(x: Float64Array, y: Float64Array, { seed = 1, limit = Math.max(2 * x.length, 1_024) }: SelectionOptions) {
    this.rows = new SlopeOrder(x, y);
    this.source = Xoshiro128.fromSeed(seed);
    this.limit = limit;
    this.spare = [new Uint32Array(x.length), new Uint32Array(x.length), new Uint32Array(x.length)];
    this.all = { low: this.rows.first(), high: this.rows.last() };
    this.fromAll = this.draw(this.all);
  }

  find(first: number, last: number, found: Map<number, number>): void {
    let window = this.all;
    for (let round = 0; round < MAX_ROUNDS; round++) {
      if (countOf(window) <= this.limit) {
        if (this.readOff(window, first, last, found)) return;
        break;
      }
      if (this.isNarrow(window)) break;
      const next = this.narrow(window, first, last);
      if (next === null) {
        // The ranks lie on two sides of a cut: each goes its own way.
        for (let rank = first; rank <= last; rank++) this.find(rank, rank, found);
        return;
      }
      window = next;
    }
    for (let rank = first; rank <= last; rank++) found.set(rank, this.rounded(window, rank));
  }

  /** A smaller window about the ranks, or null where a cut falls between them. */
  private narrow(window: Window, first: number, last: number): Window | null {
    const slopes = window === this.all ? this.fromAll : this.draw(window);
    const share = slopes.length / countOf(window);
    const reach = 1.5 * Math.sqrt(slopes.length);
    const from = Math.floor((first - window.low.below) * share - reach);
    const to = Math.ceil((last - window.low.below) * share + reach);
    const cuts: number[] = [];
    if (from >= 0) cuts.push(this.rows.clear(slopes[from]!, -GUARD));
    if (to < slopes.length) cuts.push(this.rows.clear(slopes[to]!, GUARD));
    let next = this.cutAt(window, cuts, first, last);
    if (next !== null && 4 * countOf(next) > countOf(window) && !this.isNarrow(next)) {
      // One value holds much of the window: step to one side of it, or stay on it.
      const middle = slopes[Math.max(0, Math.min(slopes.length - 1, Math.floor((first - window.low.below) * share)))]!;
      next = this.cutAt(next, [this.rows.clear(middle, -GUARD), this.rows.clear(middle, GUARD)], first, last);
    }
    return next;
  }

  private cutAt(window: Window, slopes: readonly number[], first: number, last: number): Window | null {
    let { low, high } = window;
    for (const slope of slopes) {
      if (!(slope > low.slope && slope < high.slope) || Math.abs(slope) === Infinity) continue;
      const [trial, lowRoom, highRoom] = this.spare;
      const cut = this.rows.at(slope, trial);
      // The order of the cut that is given up is the room of the next trial.
      if (cut.below < first) {
        low = cut;
        this.spare = [lowRoom, trial, highRoom];
      } else if (cut.below >= last) {
        high = cut;
        this.spare = [highRoom, lowRoom, trial];
      } else return null;
    }
    return { low, high };
  }

  /** Slopes of the window drawn with replacement, ascending. */
  private draw(window: Window): Float64Array {
    const count = countOf(window);
    const wanted = new Float64Array(Math.max(LEAST_DRAWN, Math.min(MOST_DRAWN, this.rows.n)));
    for (let k = 0; k < wanted.length; k++) wanted[k] = Math.floor(nextDouble(this.source) * count);
    wanted.sort();
    const slopes = new Float64Array(wanted.length);
    const rowOf = window.high.order;
    let seen = 0;
    let at = 0;
    this.rows.between(window.low, window.high, (from, start, end, value) => {
      const after = seen + end - start;
      while (at < wanted.length && wanted[at]! < after) {
        slopes[at] = this.rows.slope(rowOf[from[start + wanted[at]! - seen]!]!, rowOf[value]!);
        at++;
      }
      seen = after;
    });
    return slopes.subarray(0, at).sort();
  }

  /** Sorts the window's own slopes; false where one wanted lies too near an end for the count outside to be sure of it. */
  private readOff(window: Window, first: number, last: number, found: Map<number, number>): boolean {
    for (let wider = 0, around = window; wider < 4 && countOf(around) <= 4 * this.limit; wider++) {
      const { low, high } = around;
      const sorted = this.slopesOf(around);
      const [a, b] = [sorted[first - low.below - 1], sorted[last - low.below - 1]];
      const sure = a !== undefined && b !== undefined && stepsFrom(a, -ROUNDING) >= low.slope && stepsFrom(b, ROUNDING) <= high.slope;
      if (sure) {
        for (let rank = first; rank <= last; rank++) found.set(rank, sorted[rank - low.below - 1]!);
        return true;
      }
      around = { low: this.outward(low, -4 * GUARD, this.spare[1]), high: this.outward(high, 4 * GUARD, this.spare[2]) };
    }
    return false;
  }

  private outward(cut: Cut, steps: number, room: Uint32Array): Cut {
    const slope = this.rows.clear(cut.slope, steps);
    if (slope === -Infinity) return this.all.low;
    return slope === Infinity ? this.all.high : this.rows.at(slope, room);
  }

  private slopesOf(window: Window): Float64Array {
    const slopes = new Float64Array(countOf(window));
    const rowOf = window.high.order;
    let count = 0;
    this.rows.between(window.low, window.high, (from, start, end, value) => {
      for (let k = start; k < end; k++) slopes[count++] = this.rows.slope(rowOf[from[k]!]!, rowOf[value]!);
    });
    return slopes.subarray(0, count).sort();
  }

  /** The double that the exact slope of this rank rounds to, by bisection over the doubles of the window. */
  private rounded({ low, high }: Window, rank: number): number {
    if (low.slope <= 0 && high.slope > 0 && this.rows.at(0, this.spare[0]).below < rank && this.upTo(0) >= rank) return 0;
    let from = placeOf(Math.max(low.slope, -Number.MAX_VALUE));
    let to = placeOf(Math.min(high.slope, Number.MAX_VALUE));
    while (from < to) {
      const middle = from + (to - from) / 2n;
      if (this.upTo(doubleAt(middle)) >= rank) to = middle;
      else from = middle + 1n;
    }
    return doubleAt(from);
  }

  /** Slopes that round to this double or a smaller one: those below the middle between it and the next. */
  private upTo(value: number): number {
    const gap = stepsFrom(value, 1) - value;
    return this.rows.at(value, this.spare[0], gap / 2 || gap).below;
  }

  /** So few doubles between the cuts that drawing more slopes cannot part them. */
  private isNarrow({ low, high }: Window): boolean {
    const { tiny } = this.rows;
    return (low.slope >= -tiny && high.slope <= tiny) || placeOf(high.slope) - placeOf(low.slope) <= BigInt(4 * GUARD);
  }
}

function countOf({ low, high }: Window): number {
  return high.below - low.below;
}

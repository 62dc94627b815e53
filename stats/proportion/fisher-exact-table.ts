import { methodOf } from '../registry';
import { requireRange, type Provenance } from '../result';
import { logGamma } from '../special/log-gamma';
import { requireCount } from './counts';

export interface FisherExactTable extends Provenance {
  readonly p: number | null;
  /** Why p is null. */
  readonly reason?: string;
}

const TIE_SLACK = Math.log1p(1e-7);
/** Bound on work, some seconds; past it the answer is null. */
const MOST_PATHS = 5_000_000;

/**
 * Fisher's exact test of an r by c table: the probability of all tables with
 * its margins no more probable than it. Columns are taken one at a time; a
 * node is the set of row totals still to fill, and the longest and shortest
 * way on from a node settles most paths early (Mehta & Patel 1983). Work
 * grows with the table; past a bound the answer is null with a reason.
 *
 * @param rows equal-length rows of counts
 * @throws RangeError on rows of different length or cells that are no counts
 */
export function fisherExactTable(rows: readonly (readonly number[])[]): FisherExactTable {
  const width = rows[0]?.length ?? 0;
  requireRange(rows.every((row) => row.length === width), 'The rows of a table are equally long.');
  for (const cell of rows.flat()) requireCount(cell, 'A cell of a table');
  const n = rows.flat().reduce((sum, cell) => sum + cell, 0);
  const about = { method: methodOf('fisherExactTable'), n, leftOut: [] };
  const rowTotals = rows.map((row) => row.reduce((sum, cell) => sum + cell, 0)).filter((total) => total > 0);
  const columnTotals = Array.from({ length: width }, (_, j) => rows.reduce((sum, row) => sum + (row[j] as number), 0)).filter((t) => t > 0);
  if (rowTotals.length < 2 || columnTotals.length < 2) return { p: null, reason: 'Fewer than two rows or columns have counts.', ...about };
  const logFactorial = Float64Array.from({ length: n + 1 }, (_, k) => logGamma(k + 1));
  const observed = rows.flat().reduce((sum, cell) => sum - (logFactorial[cell] as number), 0);
  // The shorter side makes the nodes, the longer the stages.
  const [nodes, stages] = rowTotals.length <= columnTotals.length ? [rowTotals, columnTotals] : [columnTotals, rowTotals];
  const p = new Network(logFactorial, stages.sort((x, y) => y - x)).tail(nodes, observed + TIE_SLACK);
  return p === null ? { p, reason: 'The table is too large for an exact test.', ...about } : { p: Math.min(1, p), ...about };
}

interface Reach {
  readonly longest: number;
  readonly shortest: number;
}

/** A node with the weights of the paths that reach it, and how many share each. */
interface Front {
  readonly node: number[];
  readonly pasts: Map<number, { past: number; count: number }>;
}

class Network {
  private readonly reach: Map<string | number, Reach>[];
  private paths = 0;

  /** @param stages column totals, filled from the last to the first */
  constructor(
    private readonly logFactorial: Float64Array,
    private readonly stages: readonly number[],
  ) {
    this.reach = stages.map(() => new Map());
  }

  /** Probability of all tables whose log weight is at most `bound`; null past the bound on work. */
  tail(totals: readonly number[], bound: number): number | null {
    const logAll = this.logWays(totals, this.stages.length);
    let sum = 0;
    let front = new Map<string | number, Front>();
    const first = sorted(totals);
    front.set(this.keyOf(first), { node: first, pasts: new Map([[0, { past: 0, count: 1 }]]) });
    for (let left = this.stages.length; left > 0; left--) {
      const next: typeof front = new Map();
      for (const { node, pasts } of front.values()) {
        this.splits(node, this.stages[left - 1] as number, (rest, weight) => {
          const onward = sorted(rest);
          const key = this.keyOf(onward);
          const { longest, shortest } = this.reachOf(onward, left - 1);
          this.paths += pasts.size;
          for (const { past, count } of pasts.values()) {
            const here = past + weight;
            if (here + longest <= bound) sum += count * Math.exp(here + this.logWays(onward, left - 1) - logAll);
            else if (here + shortest <= bound) record(next, key, onward, here, count);
          }
        });
        if (this.isSpent()) return null;
      }
      front = next;
    }
    return sum;
  }

  /** A node as one number where it fits a double exactly, as text elsewhere. */
  private keyOf(node: readonly number[]): string | number {
    const base = this.logFactorial.length;
    if (base ** node.length > Number.MAX_SAFE_INTEGER) return node.join();
    let key = 0;
    for (const total of node) key = key * base + total;
    return key;
  }

  private isSpent(): boolean {
    return this.paths > MOST_PATHS;
  }

  /** log of the sum over completions of the product of 1 / cell!: multinomial in closed form. */
  private logWays(node: readonly number[], left: number): number {
    let remaining = 0;
    let log = 0;
    for (const total of node) {
      remaining += total;
      log -= this.logFactorial[total] as number;
    }
    for (let j = 0; j < left; j++) log -= this.logFactorial[this.stages[j] as number] as number;
    return log + (this.logFactorial[remaining] as number);
  }

  private reachOf(node: readonly number[], left: number): Reach {
    if (left === 0) return { longest: 0, shortest: 0 };
    const key = this.keyOf(node);
    const memo = this.reach[left - 1] as Map<string | number, Reach>;
    const known = memo.get(key);
    if (known !== undefined) return known;
    let longest = Number.NEGATIVE_INFINITY;
    let shortest = Number.POSITIVE_INFINITY;
    this.splits(node, this.stages[left - 1] as number, (rest, weight) => {
      const on = this.reachOf(sorted(rest), left - 1);
      longest = Math.max(longest, weight + on.longest);
      shortest = Math.min(shortest, weight + on.shortest);
    });
    const found = { longest, shortest };
    memo.set(key, found);
    return found;
  }

  /** Every way to spread a column total over the rows, with the log weight of the column. */
  private splits(node: readonly number[], total: number, visit: (rest: number[], weight: number) => void): void {
    const rest = [...node];
    const room = node.map((_, i) => node.slice(i + 1).reduce((sum, each) => sum + each, 0));
    const place = (row: number, left: number, weight: number): void => {
      if (this.isSpent()) return;
      const most = node[row] as number;
      if (row === node.length - 1) {
        rest[row] = most - left;
        this.paths++;
        visit(rest, weight - (this.logFactorial[left] as number));
        return;
      }
      for (let k = Math.max(0, left - (room[row] as number)); k <= Math.min(most, left); k++) {
        rest[row] = most - k;
        place(row + 1, left - k, weight - (this.logFactorial[k] as number));
      }
    };
    place(0, total, 0);
  }
}

/** Insertion sort of a copy: nodes have a handful of rows. */
function sorted(node: readonly number[]): number[] {
  const copy = node.slice();
  for (let i = 1; i < copy.length; i++) {
    const value = copy[i] as number;
    let at = i;
    while (at > 0 && (copy[at - 1] as number) > value) {
      copy[at] = copy[at - 1] as number;
      at--;
    }
    copy[at] = value;
  }
  return copy;
}

function record(
  front: Map<string | number, Front>,
  key: string | number,
  node: number[],
  past: number,
  count: number,
): void {
  const at = front.get(key) ?? { node, pasts: new Map() };
  front.set(key, at);
  // Paths whose weights agree to 1e-9 are one: far inside the slack for ties.
  const rounded = Math.round(past * 1e9);
  const own = at.pasts.get(rounded);
  if (own === undefined) at.pasts.set(rounded, { past, count });
  else own.count += count;
}

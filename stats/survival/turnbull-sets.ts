import { requireRange } from '../result';
import { orderOf } from './sort';
import { orderTimes } from './times';

/** An onset known to lie in (left, right]; left = right is a day seen exactly, right = Infinity one not yet seen. */
export interface IntervalData {
  readonly left: Float64Array;
  readonly right: Float64Array;
  /** How many people each row stands for; 1 unless given. */
  readonly weight?: Float64Array;
}

/** The only places where the estimate can put mass, and the run of them that each row covers. */
export interface TurnbullSets {
  /** Set j is (left[j], right[j]], or the single day left[j] where exact[j] is 1. */
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly exact: Uint8Array;
  /** Distinct rows: they cover sets from[i] … to[i], both included. */
  readonly from: Uint32Array;
  readonly to: Uint32Array;
  readonly weight: Float64Array;
}

/**
 * Turnbull's innermost intervals: a left end followed directly by a right end.
 * At one value the order is exact day, right end, open left end, because (3, 6]
 * and (6, 9] touch but do not overlap, and an exact 6 lies in the first only.
 * @see Turnbull, JRSS B 1976;38:290
 */
export function turnbullSets(data: IntervalData): TurnbullSets {
  const ends = codeEnds(data);
  const values = ends.value.length;
  const exactHere = new Uint8Array(values + 1);
  const rightHere = new Uint8Array(values + 1);
  const openHere = new Uint8Array(values + 1);
  for (let i = 0; i < data.left.length; i++) {
    const [l, r] = [ends.left[i]!, ends.right[i]!];
    rightHere[r] = 1;
    if (l === r) exactHere[l] = 1;
    else openHere[l] = 1;
  }

  const sets: { left: number; right: number; exact: 0 | 1 }[] = [];
  const firstAfter = new Uint32Array(values + 1); // first set to the right of an open left end
  const endingBy = new Uint32Array(values + 1); // sets whose right end is not after the value
  let pending: { left: number; exact: 0 | 1 } | undefined;
  for (let v = 0; v <= values; v++) {
    if (exactHere[v]) pending = { left: v, exact: 1 };
    if (rightHere[v] && pending) {
      sets.push({ ...pending, right: v });
      pending = undefined;
    }
    endingBy[v] = sets.length;
    firstAfter[v] = sets.length + (pending === undefined ? 0 : 1);
    if (openHere[v]) {
      pending = { left: v, exact: 0 };
      firstAfter[v] = sets.length;
    }
  }
  const at = (v: number) => (v === values ? Infinity : ends.value[v]!);
  return {
    left: Float64Array.from(sets, (set) => at(set.left)),
    right: Float64Array.from(sets, (set) => at(set.right)),
    exact: Uint8Array.from(sets, (set) => set.exact),
    ...mergeRows(ends, firstAfter, endingBy, data.weight, sets.length),
  };
}

/** Ends as ranks among the distinct finite ends; Infinity ranks after them all. */
function codeEnds({ left, right }: IntervalData) {
  const n = left.length;
  const finite = new Float64Array(2 * n);
  let count = n;
  finite.set(left);
  for (let i = 0; i < n; i++) if (right[i]! < Infinity) finite[count++] = right[i]!;
  const sorted = orderTimes(finite.subarray(0, count));
  const rank = new Uint32Array(count);
  for (let g = 0; g < sorted.time.length; g++) {
    for (let i = sorted.starts[g]!; i < sorted.starts[g + 1]!; i++) rank[sorted.order[i]!] = g;
  }
  const rightRank = new Uint32Array(n);
  let next = n;
  for (let i = 0; i < n; i++) rightRank[i] = right[i]! < Infinity ? rank[next++]! : sorted.time.length;
  for (let i = 0; i < n; i++) requireRange(rank[i]! <= rightRank[i]!, `Row ${i} has its onset between ${left[i]} and ${right[i]}; the left end comes first.`);
  return { value: sorted.time, left: rank.subarray(0, n), right: rightRank };
}

/** Rows that cover the same sets are one row with the sum of their weights. */
function mergeRows(ends: { left: Uint32Array; right: Uint32Array }, firstAfter: Uint32Array, endingBy: Uint32Array, weights: Float64Array | undefined, sets: number) {
  const n = ends.left.length;
  const keys = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const [l, r] = [ends.left[i]!, ends.right[i]!];
    const to = endingBy[r]! - 1;
    keys[i] = (l === r ? to : firstAfter[l]!) * sets + to;
  }
  const order = orderOf(keys);
  let rows = 0;
  for (let i = 0; i < n; i++) if (i === 0 || keys[order[i]!] !== keys[order[i - 1]!]) rows++;
  const [from, to, weight] = [new Uint32Array(rows), new Uint32Array(rows), new Float64Array(rows)];
  let row = -1;
  for (let i = 0; i < n; i++) {
    const key = keys[order[i]!]!;
    if (i === 0 || key !== keys[order[i - 1]!]) {
      row++;
      from[row] = Math.floor(key / sets);
      to[row] = key % sets;
    }
    weight[row]! += weights === undefined ? 1 : weights[order[i]!]!;
  }
  return { from, to, weight };
}

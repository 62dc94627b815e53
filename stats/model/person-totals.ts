import { dot, sweepOut, type Design } from './design';

/**
 * Everything the likelihood needs of each person: O(people) numbers, whatever
 * the number of visits. Z = [1, t] with t the centred and scaled time (a column
 * of zeros where only the intercept is random); y is the residual of ordinary
 * least squares, so that its size is the size of what is left to explain.
 */
export interface PersonTotals {
  readonly people: number;
  readonly n: number;
  readonly p: number;
  /** Z'Z of each person: count, sum t, sum t^2. */
  readonly zz: Float64Array;
  /** Z'Q of each person: p sums of q, then p sums of t q. */
  readonly zq: Float64Array;
  /** Z'y of each person: sum y, sum t y. */
  readonly zy: Float64Array;
  readonly yy: number;
}

/** Time as the model sees it: (t - centre) / scale. */
export interface Scaling {
  readonly centre: number;
  readonly scale: number;
}

/** Row numbers to people 0, 1, 2 …, in order of first appearance. */
export function peopleOf(group: ArrayLike<number>, rows: Int32Array): { person: Int32Array; ids: Float64Array } {
  const numbers = new Map<number, number>();
  const person = new Int32Array(rows.length);
  for (let row = 0; row < rows.length; row++) {
    const id = group[rows[row]!]!;
    let number = numbers.get(id);
    if (number === undefined) numbers.set(id, (number = numbers.size));
    person[row] = number;
  }
  return { person, ids: Float64Array.from(numbers.keys()) };
}

export function scalingOf(time: Float64Array): Scaling {
  const origin = time[0] ?? 0;
  const centre = origin + time.reduce((sum, t) => sum + (t - origin), 0) / time.length;
  const scale = Math.sqrt(time.reduce((sum, t) => sum + (t - centre) ** 2, 0) / time.length);
  return { centre, scale: scale > 0 ? scale : 1 };
}

/** Residuals of y on the basis; swept twice, as the basis was. */
export function residualOf(y: Float64Array, { basis, p }: Design): { gamma: Float64Array; residual: Float64Array } {
  const residual = y.slice();
  const gamma = new Float64Array(p);
  for (let sweep = 0; sweep < 2; sweep++) {
    basis.forEach((q, j) => {
      gamma[j]! += sweepOut(residual, q);
    });
  }
  return { gamma, residual };
}

export function personTotals(design: Design, residual: Float64Array, person: Int32Array, people: number, time: Float64Array | null): PersonTotals {
  const { n, p, basis } = design;
  const zz = new Float64Array(3 * people);
  const zq = new Float64Array(2 * p * people);
  const zy = new Float64Array(2 * people);
  for (let row = 0; row < n; row++) {
    const i = person[row]!;
    const t = time === null ? 0 : time[row]!;
    zz[3 * i]! += 1;
    zz[3 * i + 1]! += t;
    zz[3 * i + 2]! += t * t;
    zy[2 * i]! += residual[row]!;
    zy[2 * i + 1]! += t * residual[row]!;
    const at = 2 * p * i;
    for (let j = 0; j < p; j++) {
      const q = basis[j]![row]!;
      zq[at + j]! += q;
      zq[at + p + j]! += t * q;
    }
  }
  return { people, n, p, zz, zq, zy, yy: dot(residual, residual) };
}

import { requireRange, type Provenance } from '../result';
import { emicm } from './emicm';
import type { LeftOut } from './follow-up';
import { polish } from './support-newton';
import { isBefore } from './times';
import { turnbullSets, type IntervalData } from './turnbull-sets';

/** Where the onset distribution has mass. How the mass lies inside a set is not known. */
export interface IntervalOnset extends Provenance {
  /** Sets (left, right], or the single day left where exact is true; ascending. */
  readonly left: number[];
  readonly right: number[];
  readonly exact: boolean[];
  readonly mass: number[];
  readonly logLikelihood: number;
  /** Largest excess of the score over its bound; the estimate is proven to this. */
  readonly kktGap: number;
  readonly converged: boolean;
  readonly iterations: number;
  readonly candidateSets: number;
  /**
   * True when no other masses give the same likelihood. On one line that is
   * always so (each set ends some row); it is checked by rank, null when there were too many sets to check.
   */
  readonly unique: boolean | null;
}

/**
 * Non-parametric maximum likelihood estimate of an onset that was only seen
 * between two visits, (left, right]. It stops on the Karush-Kuhn-Tucker gap,
 * not on small changes, which stop early.
 * @param options.tolerance gap at which to stop, 1e-9 unless given
 * @throws RangeError when ends are negative, infinite on the left, or out of order
 * @see Turnbull 1976; Wellner & Zhan 1997; uniqueness: Gentleman & Vandal, Can J Stat 2002;30:557
 */
export function intervalOnset(data: IntervalData, options: { readonly tolerance?: number; readonly maxIterations?: number } = {}): IntervalOnset {
  const { tolerance = 1e-9, maxIterations = 5000 } = options;
  requireRange(tolerance > 0, `The tolerance must be above 0, not ${tolerance}.`);
  const { data: usable, leftOut } = informativeRows(data);
  const method = 'Non-parametric maximum likelihood for interval-censored onset (Turnbull sets, EMICM)';
  const n = usable.left.length;
  if (n === 0) {
    return { method, n, leftOut, left: [], right: [], exact: [], mass: [], logLikelihood: 0, kktGap: 0, converged: true, iterations: 0, candidateSets: 0, unique: null };
  }
  const sets = turnbullSets(usable);
  const fit = polish(sets, emicm(sets, tolerance, maxIterations));
  const held = [...fit.mass.keys()].filter((j) => fit.mass[j]! > 1e-10);
  return {
    method,
    n,
    leftOut,
    left: held.map((j) => sets.left[j]!),
    right: held.map((j) => sets.right[j]!),
    exact: held.map((j) => sets.exact[j] === 1),
    mass: held.map((j) => fit.mass[j]!),
    logLikelihood: fit.logLikelihood,
    kktGap: fit.gap,
    converged: fit.gap <= tolerance,
    iterations: fit.iterations,
    candidateSets: sets.left.length,
    unique: fit.unique,
  };
}

/** Checks the columns; rows without an end, or with no information (0, Infinity], are left out and counted. */
export function informativeRows(data: IntervalData): { data: IntervalData; rows: number[]; leftOut: LeftOut } {
  const { left, right, weight } = data;
  requireRange(left.length === right.length, `There are ${left.length} left ends but ${right.length} right ends.`);
  requireRange(weight === undefined || weight.length === left.length, `There are ${left.length} rows but ${weight?.length} weights.`);
  const rows: number[] = [];
  let missing = 0;
  let empty = 0;
  for (let i = 0; i < left.length; i++) {
    const [l, r] = [left[i]!, right[i]!];
    if (l !== l || r !== r) {
      missing++;
      continue;
    }
    if (!(l >= 0 && l < Infinity)) throw new RangeError(`Row ${i} has left end ${l}; left ends are finite and not negative.`);
    if (isBefore(r, l)) throw new RangeError(`Row ${i} has its onset between ${l} and ${r}; the left end comes first.`);
    if (weight !== undefined && !(weight[i]! >= 0 && weight[i]! < Infinity)) throw new RangeError(`Row ${i} has weight ${weight[i]}; weights are finite and not negative.`);
    if ((l === 0 && r === Infinity) || weight?.[i] === 0) empty++;
    else rows.push(i);
  }
  const leftOut = [
    { reason: 'an end missing', count: missing },
    { reason: 'no information on onset', count: empty },
  ].filter(({ count }) => count > 0);
  if (leftOut.length === 0) return { data, rows, leftOut };
  const pick = (column: Float64Array) => Float64Array.from(rows, (i) => column[i]!);
  return { data: { left: pick(left), right: pick(right), ...(weight && { weight: pick(weight) }) }, rows, leftOut };
}

/**
 * Share still free of onset at a time. Inside a set the estimate says only that
 * it lies between the two figures; outside they are one.
 */
export function onsetFreeAt({ left, right, exact, mass }: IntervalOnset, time: number): { readonly lower: number; readonly upper: number } {
  let begun = 0;
  let ended = 0;
  for (let j = 0; j < mass.length; j++) {
    if (isBefore(left[j]!, time) || (exact[j]! && !isBefore(time, left[j]!))) begun += mass[j]!;
    if (!isBefore(time, right[j]!)) ended += mass[j]!;
  }
  return { lower: Math.max(0, 1 - begun), upper: Math.max(0, 1 - ended) };
}

import { pickRows } from '../missing/usable-rows';
import { isMeasure, requireRange } from '../result';

/** One column of a model, named as the reader of the result will see it. */
export interface Term {
  readonly name: string;
  readonly values: ArrayLike<number>;
}

/** The name of the constant column. */
export const INTERCEPT = '(Intercept)';

/**
 * An orthonormal basis of the model's columns: design = Q R. Working in Q makes
 * a fit indifferent to the origin and unit of a covariate (years as 1875 to
 * 1972, a volume in microlitres); R takes the answer back.
 */
export interface Design {
  readonly names: readonly string[];
  readonly n: number;
  readonly p: number;
  /** p columns of length n, orthonormal. */
  readonly basis: readonly Float64Array[];
  /** Inverse of R, row-major p x p, upper triangular. */
  readonly backwards: Float64Array;
  /** log |det R|. */
  readonly logDeterminant: number;
}

/** A column left with less than this share of its length has been spanned by those before it. */
const COLLINEAR = 1e-11;

/**
 * Thin QR by modified Gram-Schmidt, each column swept twice (Giraud, Langou &
 * Rozloznik 2005: twice is enough for full orthogonality).
 *
 * @throws RangeError when a column is a combination of those before it.
 */
export function designOf(terms: readonly Term[], rows: Int32Array, intercept = true): Design {
  const n = rows.length;
  const constant: Term[] = intercept ? [{ name: INTERCEPT, values: new Float64Array(0) }] : [];
  const all = [...constant, ...terms];
  const p = all.length;
  const basis: Float64Array[] = [];
  const r = new Float64Array(p * p);
  all.forEach((term, j) => {
    const column = term.name === INTERCEPT && intercept ? new Float64Array(n).fill(1) : pickRows(term.values, rows);
    const before = norm(column);
    for (let sweep = 0; sweep < 2; sweep++) {
      basis.forEach((q, i) => {
        r[i * p + j]! += sweepOut(column, q);
      });
    }
    const after = norm(column);
    // With fewer rows than columns no fit exists, and the caller says so.
    requireRange(n < p || after > COLLINEAR * before, `Column ${term.name} is a combination of the columns before it.`);
    requireRange(isMeasure(after), `Column ${term.name} varies by ${after} only: give it in a smaller unit.`);
    r[j * p + j] = after;
    for (let row = 0; row < n; row++) column[row]! /= after;
    basis.push(column);
  });
  let logDeterminant = 0;
  for (let j = 0; j < p; j++) logDeterminant += Math.log(r[j * p + j]!);
  return { names: all.map(({ name }) => name), n, p, basis, backwards: invertUpper(r, p), logDeterminant };
}

/** Coefficients of the named columns from those of the basis. */
export function backTransform({ backwards, p }: Design, gamma: ArrayLike<number>): Float64Array {
  const beta = new Float64Array(p);
  for (let i = 0; i < p; i++) for (let j = i; j < p; j++) beta[i]! += backwards[i * p + j]! * gamma[j]!;
  return beta;
}

/** Covariance of the named columns' coefficients, R^-1 V R^-T, row-major. */
export function backTransformCovariance(design: Design, covariance: Float64Array): Float64Array {
  const { p } = design;
  const half = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    const column = backTransform(design, Float64Array.from({ length: p }, (_, i) => covariance[i * p + j]!));
    for (let i = 0; i < p; i++) half[i * p + j] = column[i]!;
  }
  const whole = new Float64Array(p * p);
  for (let i = 0; i < p; i++) whole.set(backTransform(design, half.subarray(i * p, (i + 1) * p)), i * p);
  return whole;
}

/** Row k of R^-1: the contrast on the basis that is coefficient k. */
export function contrastOf({ backwards, p }: Design, k: number): Float64Array {
  return backwards.slice(k * p, (k + 1) * p);
}

/** Takes the part along q (unit length) out of a column, and answers how much that was. */
export function sweepOut(column: Float64Array, q: Float64Array): number {
  const share = dot(q, column);
  for (let row = 0; row < column.length; row++) column[row]! -= share * q[row]!;
  return share;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/** Scaled so that squares of very large or very small values neither overflow nor vanish. */
function norm(a: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < a.length; i++) largest = Math.max(largest, Math.abs(a[i]!));
  if (largest === 0) return 0;
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i]! / largest) ** 2;
  return largest * Math.sqrt(sum);
}

function invertUpper(r: Float64Array, p: number): Float64Array {
  const inverse = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    inverse[j * p + j] = 1 / r[j * p + j]!;
    for (let i = j - 1; i >= 0; i--) {
      let sum = 0;
      for (let k = i + 1; k <= j; k++) sum += r[i * p + k]! * inverse[k * p + j]!;
      inverse[i * p + j] = -sum / r[i * p + i]!;
    }
  }
  return inverse;
}

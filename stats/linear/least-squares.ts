import { fisherF, studentT } from '../distributions';
import { methodOf } from '../registry';
import { isMeasure, requireLevel, requireRange, type Interval, type Provenance } from '../result';
import { Householder } from './householder';
import { meanAndDeviation } from './mean-and-deviation';

export interface LinearCoefficient extends Interval {
  readonly standardError: number | null;
  readonly t: number | null;
  readonly p: number | null;
}

export interface LeastSquares extends Provenance {
  /** Intercept first where there is one, then the columns in order. */
  readonly coefficients: readonly LinearCoefficient[];
  readonly residualDeviation: number | null;
  /** About the mean with an intercept, about 0 without. */
  readonly rSquared: number | null;
  readonly f: number | null;
  readonly p: number | null;
  readonly degreesOfFreedom: number;
}

/**
 * Linear regression by Householder triangularisation with two rounds of
 * refinement on the residuals. A column that is a combination of earlier ones
 * gets null coefficients with a reason.
 *
 * @param y outcomes, finite
 * @param columns predictors, each as long as y, finite
 * @param options `intercept` (true), `level` (0.95)
 * @throws RangeError on columns of different length, values that are not finite, or fewer values than coefficients
 * @see Golub, Numer Math 1965;7:206
 */
export function leastSquares(
  y: ArrayLike<number>,
  columns: readonly ArrayLike<number>[],
  { intercept = true, level = 0.95 }: { readonly intercept?: boolean; readonly level?: number } = {},
): LeastSquares {
  requireLevel(level);
  const n = y.length;
  const design = intercept ? [new Float64Array(n).fill(1), ...columns] : columns;
  requireRange(design.length > 0 && n >= design.length, `${n} outcomes cannot determine ${design.length} coefficients.`);
  requireRange(design.every((column) => column.length === n), 'Predictors are as long as the outcome.');
  requireRange([y, ...design].every(allFinite), 'Values are finite numbers; leave missing ones out first.');
  const triangle = new Householder(design);
  const { solution, residuals } = refined(triangle, design, y);
  const df = n - triangle.rank;
  const residualSquares = squaresOf(residuals);
  const variance = df > 0 ? residualSquares / df : null;
  const inverse = triangle.inverseDiagonal();
  const critical = df > 0 ? studentT.isf((1 - level) / 2, df) : Number.NaN;
  const coefficients = Array.from(solution, (estimate, j) => coefficient(estimate, inverse[j] as number, variance, df, critical, level));
  return {
    coefficients,
    residualDeviation: variance === null ? null : Math.sqrt(variance),
    ...fitOf(y, intercept, residualSquares, triangle.rank - (intercept ? 1 : 0), df),
    degreesOfFreedom: df,
    method: methodOf('leastSquares'),
    n,
    leftOut: [],
  };
}

function allFinite(column: ArrayLike<number>): boolean {
  for (let i = 0; i < column.length; i++) if (!isMeasure(column[i] as number)) return false;
  return true;
}

function refined(triangle: Householder, design: readonly ArrayLike<number>[], y: ArrayLike<number>) {
  const solution = triangle.solve(y);
  let residuals = residualsOf(design, solution, y);
  for (let round = 0; round < 2; round++) {
    triangle.solve(residuals).forEach((step, j) => (solution[j] = (solution[j] as number) + step));
    residuals = residualsOf(design, solution, y);
  }
  return { solution, residuals };
}

/** y less the fit, summed with Neumaier's compensation: the terms of a polynomial fit cancel. */
function residualsOf(design: readonly ArrayLike<number>[], solution: Float64Array, y: ArrayLike<number>): Float64Array {
  return Float64Array.from(y, (outcome, i) => {
    let sum = outcome;
    let lost = 0;
    for (let j = 0; j < design.length; j++) {
      if (Number.isNaN(solution[j])) continue;
      const term = -((design[j] as ArrayLike<number>)[i] as number) * (solution[j] as number);
      const next = sum + term;
      lost += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
      sum = next;
    }
    return sum + lost;
  });
}

function squaresOf(values: Float64Array): number {
  let sum = 0;
  for (const value of values) sum += value * value;
  return sum;
}

function coefficient(estimate: number, inverse: number, variance: number | null, df: number, critical: number, level: number): LinearCoefficient {
  const none = { lower: null, upper: null, standardError: null, t: null, p: null, level };
  if (Number.isNaN(estimate)) return { estimate: null, ...none, reason: 'The column is a combination of earlier ones.' };
  if (variance === null) return { estimate, ...none, reason: 'No residual degrees of freedom are left.' };
  const standardError = Math.sqrt(variance * inverse);
  const t = standardError === 0 ? null : estimate / standardError;
  const reach = critical * standardError;
  return { estimate, lower: estimate - reach, upper: estimate + reach, standardError, t, p: t === null ? null : 2 * studentT.sf(Math.abs(t), df), level };
}

function fitOf(y: ArrayLike<number>, intercept: boolean, residualSquares: number, df1: number, df2: number) {
  const total = intercept ? meanAndDeviation(y).sumOfSquares : squaresOf(Float64Array.from(y));
  if (total === 0) return { rSquared: null, f: null, p: null };
  const rSquared = 1 - residualSquares / total;
  if (df1 < 1 || df2 < 1 || residualSquares === 0) return { rSquared, f: null, p: null };
  const f = (total - residualSquares) / df1 / (residualSquares / df2);
  return { rSquared, f, p: fisherF.sf(f, df1, df2) };
}

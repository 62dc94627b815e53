/**
 * Symmetric systems of the small sizes met here (groups, covariates), by a
 * Cholesky factor that steps over columns which add nothing: a row of zeros
 * (an empty group) or a combination of earlier columns leaves the rank lower,
 * never a division by zero.
 */
export interface Factor {
  readonly size: number;
  /** Row-major lower triangle; rows of stepped-over columns are zero. */
  readonly lower: Float64Array;
  /** 1 where the column was used, 0 where it was stepped over. */
  readonly used: Uint8Array;
  readonly rank: number;
}

/** A pivot below this share of its diagonal is rounding, not information. */
const PIVOT_TOLERANCE = 1e-10;

/** @param matrix row-major size x size, symmetric and positive semi-definite */
export function factor(matrix: Float64Array, size: number, tolerance = PIVOT_TOLERANCE): Factor {
  const lower = new Float64Array(size * size);
  const used = new Uint8Array(size);
  let rank = 0;
  for (let j = 0; j < size; j++) {
    let pivot = matrix[j * size + j]!;
    for (let k = 0; k < j; k++) pivot -= lower[j * size + k]! ** 2;
    if (!(pivot > tolerance * matrix[j * size + j]!)) {
      lower.fill(0, j * size, (j + 1) * size);
      continue;
    }
    used[j] = 1;
    rank++;
    const root = Math.sqrt(pivot);
    lower[j * size + j] = root;
    for (let i = j + 1; i < size; i++) {
      let sum = matrix[i * size + j]!;
      for (let k = 0; k < j; k++) sum -= lower[i * size + k]! * lower[j * size + k]!;
      lower[i * size + j] = sum / root;
    }
  }
  return { size, lower, used, rank };
}

/** Solves matrix · x = b; x is 0 in the stepped-over columns. */
export function solve({ size, lower, used }: Factor, b: ArrayLike<number>): Float64Array {
  const x = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    if (used[i] === 0) continue;
    let sum = b[i]!;
    for (let k = 0; k < i; k++) sum -= lower[i * size + k]! * x[k]!;
    x[i] = sum / lower[i * size + i]!;
  }
  for (let i = size - 1; i >= 0; i--) {
    if (used[i] === 0) continue;
    let sum = x[i]!;
    for (let k = i + 1; k < size; k++) sum -= lower[k * size + i]! * x[k]!;
    x[i] = sum / lower[i * size + i]!;
  }
  return x;
}

/** Inverse (zero rows and columns where a column was stepped over). */
export function inverse(factored: Factor): Float64Array {
  const { size } = factored;
  const out = new Float64Array(size * size);
  const unit = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    if (factored.used[j] === 0) continue;
    unit.fill(0);
    unit[j] = 1;
    const column = solve(factored, unit);
    for (let i = 0; i < size; i++) out[i * size + j] = column[i]!;
  }
  return out;
}

/** score' · variance⁻¹ · score and its rank, the degrees of freedom. */
export function quadraticForm(score: ArrayLike<number>, variance: Float64Array, size: number): { chiSquare: number; df: number } {
  const factored = factor(variance, size);
  const x = solve(factored, score);
  let chiSquare = 0;
  for (let i = 0; i < size; i++) chiSquare += score[i]! * x[i]!;
  return { chiSquare, df: factored.rank };
}

/** Rows of a row-major square matrix, for results. */
export function rowsOf(matrix: Float64Array, size: number): number[][] {
  return Array.from({ length: size }, (_, i) => Array.from(matrix.subarray(i * size, (i + 1) * size)));
}

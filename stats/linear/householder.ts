/**
 * Householder triangularisation of a tall matrix (Golub 1965; Businger &
 * Golub 1965), the stable way to least squares: it works on the columns
 * themselves and never forms their cross-products, which would square the
 * condition number.
 */
export class Householder {
  /** Columns that are combinations of earlier ones to within rounding; they get no coefficient. */
  readonly aliased: readonly boolean[];
  /** How many columns are not aliased. */
  readonly rank: number;
  private readonly diagonal: Float64Array;
  /** The row at which each column's reflection begins. */
  private readonly rows: Int32Array;
  private readonly columns: Float64Array[];

  /** @param columns equal-length columns, at least as long as they are many; copied */
  constructor(columns: readonly ArrayLike<number>[]) {
    this.columns = columns.map((column) => Float64Array.from(column));
    this.diagonal = new Float64Array(columns.length);
    const aliased: boolean[] = [];
    const norms = this.columns.map((column) => normFrom(column, 0));
    let row = 0;
    this.rows = new Int32Array(columns.length);
    for (let j = 0; j < this.columns.length; j++) {
      this.rows[j] = row;
      const own = this.columns[j] as Float64Array;
      const norm = normFrom(own, row);
      aliased.push(!(norm > 1e-11 * (norms[j] as number)));
      if (aliased[j]) continue;
      const pivot = own[row] as number;
      const head = pivot > 0 ? -norm : norm;
      this.diagonal[j] = head;
      own[row] = pivot - head;
      for (let k = j + 1; k < this.columns.length; k++) this.reflect(j, this.columns[k] as Float64Array);
      row++;
    }
    this.aliased = aliased;
    this.rank = row;
  }

  /** Coefficients of the least-squares fit to y, NaN for aliased columns. */
  solve(y: ArrayLike<number>): Float64Array {
    const rotated = Float64Array.from(y);
    this.columns.forEach((_, j) => this.aliased[j] || this.reflect(j, rotated));
    return this.backSubstitute(rotated);
  }

  /** Diagonal of the inverse cross-product matrix, NaN for aliased columns. */
  inverseDiagonal(): Float64Array {
    const inverse = new Float64Array(this.columns.length).fill(Number.NaN);
    const unit = new Float64Array(this.rank);
    const sums = new Float64Array(this.columns.length);
    for (let at = 0; at < this.rank; at++) {
      unit.fill(0);
      unit[at] = 1;
      this.backSubstitute(unit).forEach((value, j) => {
        if (!this.aliased[j]) sums[j] = (sums[j] as number) + value * value;
      });
    }
    return inverse.map((none, j) => (this.aliased[j] ? none : (sums[j] as number)));
  }

  private reflect(j: number, target: Float64Array): void {
    const mirror = this.columns[j] as Float64Array;
    const row = this.rows[j] as number;
    let dot = 0;
    for (let i = row; i < mirror.length; i++) dot += (mirror[i] as number) * (target[i] as number);
    const factor = dot / ((this.diagonal[j] as number) * (mirror[row] as number));
    for (let i = row; i < mirror.length; i++) target[i] = (target[i] as number) + factor * (mirror[i] as number);
  }

  private backSubstitute(rotated: ArrayLike<number>): Float64Array {
    const solution = new Float64Array(this.columns.length).fill(Number.NaN);
    for (let j = this.columns.length - 1; j >= 0; j--) {
      if (this.aliased[j]) continue;
      const row = this.rows[j] as number;
      let value = rotated[row] as number;
      for (let k = j + 1; k < this.columns.length; k++) {
        if (!this.aliased[k]) value -= ((this.columns[k] as Float64Array)[row] as number) * (solution[k] as number);
      }
      solution[j] = value / (this.diagonal[j] as number);
    }
    return solution;
  }
}

/** Length of a column from a row on, scaled so that squares neither overflow nor vanish. */
function normFrom(column: Float64Array, row: number): number {
  let largest = 0;
  for (let i = row; i < column.length; i++) largest = Math.max(largest, Math.abs(column[i] as number));
  if (largest === 0) return 0;
  let sum = 0;
  for (let i = row; i < column.length; i++) sum += ((column[i] as number) / largest) ** 2;
  return largest * Math.sqrt(sum);
}

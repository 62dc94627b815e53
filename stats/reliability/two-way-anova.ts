import { pickRows, usableRows } from '../missing/usable-rows';
import { requireRange, type Provenance } from '../result';

/** Mean squares of a table with one row a subject and one column a rater (trial, method). */
export interface TwoWayAnova extends Provenance {
  /** Columns: raters, trials or methods. */
  readonly k: number;
  /** Mean squares are null where they have no degrees of freedom. */
  readonly meanSquareRows: number | null;
  readonly meanSquareColumns: number | null;
  /** Rows x columns residual. */
  readonly meanSquareError: number | null;
  /** Within rows: columns and residual together (the one-way model's error). */
  readonly meanSquareWithin: number | null;
}

/**
 * Two-way analysis of variance without replication. Every sum of squares is a
 * sum of squared deviations of centred values, never a difference of large
 * totals, so that readings near 1e9 keep their digits.
 *
 * @param columns one per rater, equally long; a subject with a missing rating is left out.
 * @throws RangeError for fewer than two columns, unequal lengths or infinite values.
 */
export function twoWayAnova(columns: readonly ArrayLike<number>[]): TwoWayAnova {
  const k = columns.length;
  requireRange(k >= 2, `Agreement needs two or more columns of ratings, not ${k}.`);
  const usable = usableRows(Object.fromEntries(columns.map((column, at) => [`column ${at + 1}`, column])));
  const n = usable.rows.length;
  const origin = n > 0 ? columns[0]![usable.rows[0]!]! : 0;
  const table = columns.map((column) => pickRows(column, usable.rows).map((value) => value - origin));
  const columnMeans = table.map((column) => column.reduce((sum, value) => sum + value, 0) / n);
  const grand = columnMeans.reduce((sum, mean) => sum + mean, 0) / k;
  let rows = 0;
  let error = 0;
  let within = 0;
  for (let row = 0; row < n; row++) {
    const mean = table.reduce((sum, column) => sum + column[row]!, 0) / k;
    rows += (mean - grand) ** 2;
    for (let c = 0; c < k; c++) {
      const deviation = table[c]![row]! - mean;
      within += deviation ** 2;
      error += (deviation - (columnMeans[c]! - grand)) ** 2;
    }
  }
  const largest = table.reduce((most, column) => column.reduce((m, value) => Math.max(m, Math.abs(value)), most), 0);
  // Readings that agree exactly leave dust of this size behind; it is none, not an F ratio of 1e31.
  const dust = n * k * (4 * Number.EPSILON * largest) ** 2;
  const settle = (sum: number): number => (sum <= dust ? 0 : sum);
  const between = columnMeans.reduce((sum, mean) => sum + (mean - grand) ** 2, 0);
  return {
    method: 'Two-way analysis of variance, one reading a cell',
    n,
    k,
    leftOut: usable.leftOut,
    meanSquareRows: n > 1 ? (k * settle(rows)) / (n - 1) : null,
    meanSquareColumns: n > 0 ? (n * settle(between)) / (k - 1) : null,
    meanSquareError: n > 1 ? settle(error) / ((n - 1) * (k - 1)) : null,
    meanSquareWithin: n > 0 ? settle(within) / (n * (k - 1)) : null,
  };
}

import { isMeasure, requireRange } from '../result';

/** The rows on which every column has a value, and how many rows that leaves out. */
export interface UsableRows {
  /** Row numbers in the order given. */
  readonly rows: Int32Array;
  readonly total: number;
  readonly leftOut: readonly { readonly reason: string; readonly count: number }[];
}

/**
 * Complete rows of one or more equally long columns. NaN is a missing value:
 * its row is left out and counted. A value that is infinite, or whose square no
 * double can hold, is a mistake of the caller.
 *
 * @throws RangeError for columns of different length or such a value.
 */
export function usableRows(columns: Readonly<Record<string, ArrayLike<number>>>): UsableRows {
  const named = Object.entries(columns);
  const total = named[0]?.[1].length ?? 0;
  for (const [name, column] of named) {
    requireRange(column.length === total, `Columns must be equally long: ${name} has ${column.length} rows, not ${total}.`);
  }
  // Column by column: a mark for each row that lacks a value, so that a million rows cost one plain loop a column.
  const gap = new Uint8Array(total);
  for (const [name, column] of named) {
    for (let row = 0; row < total; row++) {
      const value = column[row] as number;
      if (isMeasure(value)) continue;
      requireRange(Number.isNaN(value), `${name} is ${value} in row ${row}, which is no measurement.`);
      gap[row] = 1;
    }
  }
  const rows = new Int32Array(total);
  let used = 0;
  for (let row = 0; row < total; row++) if (gap[row] === 0) rows[used++] = row;
  const missing = total - used;
  return { rows: rows.slice(0, used), total, leftOut: missing > 0 ? [{ reason: 'value missing', count: missing }] : [] };
}

/** The named rows of a column, as a new Float64Array. */
export function pickRows(column: ArrayLike<number>, rows: Int32Array | Uint32Array): Float64Array {
  const picked = new Float64Array(rows.length);
  for (let i = 0; i < rows.length; i++) picked[i] = column[rows[i] as number] as number;
  return picked;
}

import { requireRange } from '../result';
import { isBefore } from './times';

/** Follow-up of n people (or n rows of follow-up), one column each. */
export interface FollowUp {
  /** End of follow-up, in any one unit (days here), from 0 upwards. */
  readonly time: Float64Array;
  /** 1 where the event happened at that time, 0 where follow-up was censored. */
  readonly event: Uint8Array;
  /** Delayed entry: at risk only when entry < t <= time. Absent: at risk from the start. */
  readonly entry?: Float64Array;
}

/** Rows that could not be used, by reason. */
export type LeftOut = readonly { readonly reason: string; readonly count: number }[];

/** The rows that have all they need, and the count of the others. */
export interface Usable {
  /** Row numbers in the caller's columns; absent when all rows are usable. */
  readonly rows?: Uint32Array;
  readonly leftOut: LeftOut;
}

/**
 * Checks the columns of a follow-up and picks the rows without a missing (NaN) time.
 * @throws RangeError when lengths differ, a code is above `highestCode`, a time is
 * negative or infinite, or a row leaves before it enters
 */
export function checkFollowUp(time: Float64Array, codes: ArrayLike<number>, entry: Float64Array | undefined, highestCode: number): Usable {
  const n = time.length;
  requireRange(codes.length === n, `There are ${n} times but ${codes.length} event codes.`);
  requireRange(entry === undefined || entry.length === n, `There are ${n} times but ${entry?.length} entry times.`);
  let missing = 0;
  for (let i = 0; i < n; i++) {
    const t = time[i]!;
    const code = codes[i]!;
    if (!(code >= 0 && code <= highestCode && code === Math.floor(code))) throw new RangeError(`Row ${i} has event code ${code}; codes are whole numbers from 0 to ${highestCode}.`);
    if (t !== t || (entry !== undefined && entry[i] !== entry[i])) {
      missing++;
      continue;
    }
    if (!(t >= 0 && t < Infinity)) throw new RangeError(`Row ${i} has time ${t}; times are finite and not negative.`);
    if (entry !== undefined && !isBefore(entry[i]!, t)) throw new RangeError(`Row ${i} enters at ${entry[i]} and leaves at ${t}; a row must leave after it enters.`);
  }
  if (missing === 0) return { leftOut: [] };
  const rows = new Uint32Array(n - missing);
  let kept = 0;
  for (let i = 0; i < n; i++) {
    if (time[i] === time[i] && (entry === undefined || entry[i] === entry[i])) rows[kept++] = i;
  }
  return { rows, leftOut: [{ reason: 'time missing', count: missing }] };
}

/** The chosen rows of a column, or the column itself when all rows are chosen. */
export function take(column: Float64Array, rows: Uint32Array | undefined): Float64Array;
export function take(column: Uint8Array, rows: Uint32Array | undefined): Uint8Array;
export function take(column: Int32Array, rows: Uint32Array | undefined): Int32Array;
export function take(column: Float64Array | Uint8Array | Int32Array, rows: Uint32Array | undefined): Float64Array | Uint8Array | Int32Array {
  if (rows === undefined) return column;
  const out = column instanceof Float64Array ? new Float64Array(rows.length) : column instanceof Int32Array ? new Int32Array(rows.length) : new Uint8Array(rows.length);
  for (let i = 0; i < rows.length; i++) out[i] = column[rows[i]!]!;
  return out;
}

/** Checked follow-up: the same columns without the rows that miss a time. */
export function usableFollowUp(data: FollowUp): { data: FollowUp; leftOut: LeftOut } {
  const { rows, leftOut } = checkFollowUp(data.time, data.event, data.entry, 1);
  if (rows === undefined) return { data, leftOut };
  return {
    data: { time: take(data.time, rows), event: take(data.event, rows), ...(data.entry && { entry: take(data.entry, rows) }) },
    leftOut,
  };
}

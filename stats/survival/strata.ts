import { requireRange } from '../result';
import { orderOf, regroup } from './sort';

/** Codes 0, 1, 2 … of a grouping column. */
export type Codes = Uint8Array | Uint16Array | Int32Array | Uint32Array;

/** Rows of each stratum in time order; one stratum when there is no such column. */
export function timeOrderByStratum(time: Float64Array, stratum: Codes | undefined): Uint32Array[] {
  const order = orderOf(time);
  if (stratum === undefined) return [order];
  const { order: byStratum, starts } = regroup(order, stratum, countCodes(stratum, time.length, 'stratum'));
  return Array.from({ length: starts.length - 1 }, (_, s) => byStratum.subarray(starts[s], starts[s + 1])).filter((rows) => rows.length > 0);
}

/** Number of codes, highest + 1. @throws RangeError on a negative code, one far beyond the number of rows, or a column of another length */
export function countCodes(codes: Codes, n: number, name: string): number {
  requireRange(codes.length === n, `There are ${n} rows but ${codes.length} values of ${name}.`);
  let highest = -1;
  for (let i = 0; i < codes.length; i++) {
    const code = codes[i]!;
    if (code < 0) throw new RangeError(`Row ${i} has ${name} ${code}; codes count up from 0.`);
    if (code > highest) highest = code;
  }
  requireRange(highest <= n + 255, `The highest ${name} is ${highest} for ${n} rows; codes count up from 0 without great gaps.`);
  return highest + 1;
}

/** The chosen rows of a grouping column. */
export function takeCodes(codes: Codes, rows: Uint32Array | undefined): Codes {
  return rows === undefined ? codes : Int32Array.from(rows, (row) => codes[row]!);
}

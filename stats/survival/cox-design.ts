import { requireRange } from '../result';
import { checkFollowUp, type FollowUp, type LeftOut } from './follow-up';
import { countCodes, takeCodes, timeOrderByStratum, type Codes } from './strata';
import { orderTimes } from './times';

/** Follow-up with covariates, one column each, and perhaps strata and clusters. */
export interface CoxData extends FollowUp {
  readonly x: readonly Float64Array[];
  /** Codes 0, 1, 2 …: each stratum has its own baseline hazard. */
  readonly stratum?: Codes;
  /** Codes 0, 1, 2 …: rows of one person or site, for the robust standard errors. */
  readonly cluster?: Codes;
}

/**
 * The rows as the sweep needs them: by stratum, then by time, covariates centred
 * and scaled (a covariate of a thousand million with a spread of one keeps its
 * digits) and laid out row by row.
 */
export interface CoxDesign {
  /** Rows and covariates used. */
  readonly n: number;
  readonly p: number;
  readonly events: number;
  readonly leftOut: LeftOut;
  /** Position in the sweep to row number in the caller's columns. */
  readonly rows: Uint32Array;
  readonly event: Uint8Array;
  /** n x p, row-major. */
  readonly x: Float64Array;
  readonly centre: Float64Array;
  readonly spread: Float64Array;
  /** First position of each distinct time of a stratum, and n at the end. */
  readonly starts: Uint32Array;
  readonly time: Float64Array;
  /** First distinct time of each stratum, and their number at the end; and the code of each stratum. */
  readonly stratumStarts: Uint32Array;
  readonly stratumCodes: Int32Array;
  /** Entry times by position, and the positions of each stratum by entry, latest first; absent without delayed entry. */
  readonly entry?: Float64Array;
  readonly byEntry?: Uint32Array;
}

/** Checks the columns and lays them out. Rows that miss a time or a covariate are left out and counted. */
export function coxDesign(data: CoxData): CoxDesign {
  const all = data.time.length;
  const p = data.x.length;
  data.x.forEach((column, j) => requireRange(column.length === all, `There are ${all} rows but ${column.length} values of covariate ${j}.`));
  if (data.stratum) countCodes(data.stratum, all, 'stratum');
  if (data.cluster) requireRange(data.cluster.length === all, `There are ${all} rows but ${data.cluster.length} clusters.`);
  const { kept, leftOut } = completeRows(data);
  const time = kept === undefined ? data.time : Float64Array.from(kept, (row) => data.time[row]!);
  const strata = timeOrderByStratum(time, data.stratum && takeCodes(data.stratum, kept));
  const n = time.length;

  const rows = new Uint32Array(n);
  const event = new Uint8Array(n);
  const starts: Uint32Array[] = [];
  const times: Float64Array[] = [];
  const stratumStarts = new Uint32Array(strata.length + 1);
  const stratumCodes = new Int32Array(strata.length);
  let position = 0;
  strata.forEach((order, s) => {
    const groups = orderTimes(time, order);
    const from = position;
    starts.push(groups.starts.subarray(0, groups.time.length).map((start) => start + from));
    times.push(groups.time);
    stratumStarts[s + 1] = stratumStarts[s]! + groups.time.length;
    for (const index of order) rows[position++] = kept === undefined ? index : kept[index]!;
    stratumCodes[s] = data.stratum === undefined || order.length === 0 ? 0 : data.stratum[rows[from]!]!;
  });
  for (let i = 0; i < n; i++) event[i] = data.event[rows[i]!]!;
  return {
    n,
    p,
    events: event.reduce((sum, e) => sum + e, 0),
    leftOut,
    rows,
    event,
    ...scaledColumns(data.x, rows),
    starts: concatenate([...starts, Uint32Array.of(n)], Uint32Array),
    time: concatenate(times, Float64Array),
    stratumStarts,
    stratumCodes,
    ...(data.entry && entryColumns(data.entry, rows, strata)),
  };
}

function completeRows(data: CoxData): { kept: Uint32Array | undefined; leftOut: LeftOut } {
  const { rows, leftOut } = checkFollowUp(data.time, data.event, data.entry, 1);
  const complete = data.x.every((column) => column.every(Number.isFinite));
  if (complete) return { kept: rows, leftOut };
  const candidates = rows ?? Uint32Array.from(data.time.keys());
  data.x.forEach((column, j) => requireRange(!column.includes(Infinity) && !column.includes(-Infinity), `Covariate ${j} has an infinite value.`));
  const kept = candidates.filter((row) => data.x.every((column) => !Number.isNaN(column[row]!)));
  const missing = candidates.length - kept.length;
  return { kept, leftOut: missing === 0 ? leftOut : [...leftOut, { reason: 'covariate missing', count: missing }] };
}

function scaledColumns(columns: readonly Float64Array[], rows: Uint32Array) {
  const [n, p] = [rows.length, columns.length];
  const x = new Float64Array(n * p);
  const centre = new Float64Array(p);
  const spread = new Float64Array(p).fill(1);
  columns.forEach((column, j) => {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += column[rows[i]!]!;
    const mean = n > 0 ? sum / n : 0;
    let squares = 0;
    for (let i = 0; i < n; i++) squares += (column[rows[i]!]! - mean) ** 2;
    const sd = Math.sqrt(squares / n);
    centre[j] = mean;
    if (sd > 1e-13 * Math.abs(mean)) spread[j] = sd;
    for (let i = 0; i < n; i++) x[i * p + j] = (column[rows[i]!]! - mean) / spread[j]!;
  });
  return { x, centre, spread };
}

function entryColumns(column: Float64Array, rows: Uint32Array, strata: readonly Uint32Array[]) {
  const entry = Float64Array.from(rows, (row) => column[row]!);
  const byEntry = new Uint32Array(rows.length);
  let from = 0;
  for (const { length } of strata) {
    const part = byEntry.subarray(from, from + length);
    for (let i = 0; i < length; i++) part[i] = from + i;
    part.sort((a, b) => entry[b]! - entry[a]!);
    from += length;
  }
  return { entry, byEntry };
}

function concatenate<T extends Uint32Array | Float64Array>(parts: readonly T[], Kind: new (length: number) => T): T {
  const out = new Kind(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    out.set(part, at);
    at += part.length;
  }
  return out;
}

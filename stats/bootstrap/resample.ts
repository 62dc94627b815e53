import { nextBelow } from '../random/source';
import { Xoshiro128 } from '../random/xoshiro128';
import { requireRange } from '../result';

/**
 * A statistic of resampled rows: `counts[row]` says how often the row was
 * drawn. NaN where the resample does not have the statistic. Counting instead
 * of copying rows lets a statistic sort its data once for all resamples.
 */
export type ResampledStatistic = (counts: Int32Array) => number;

/** Which rows go together in a draw. */
export interface Drawing {
  /** Rows of the data. */
  readonly rows: number;
  /** Cluster number 0..G-1 of each row: whole clusters are drawn. Absent: single rows. */
  readonly clusters?: Int32Array;
}

/** Replicates from..to-1 of a seeded run. */
export interface ReplicateRange {
  readonly seed: number;
  readonly from: number;
  readonly to: number;
}

/**
 * Bootstrap replicates of one range. Each replicate draws from a stream of its
 * own, named by (seed, replicate), so a run gives the same numbers in one piece
 * or shared among any number of workers. Efron 1979, Ann Stat 7:1; clusters:
 * Field & Welsh 2007, JRSS B 69:369.
 *
 * @throws RangeError for no rows, cluster numbers with gaps, or a range out of order.
 */
export function bootstrapReplicates(statistic: ResampledStatistic, drawing: Drawing, { seed, from, to }: ReplicateRange): Float64Array {
  requireRange(Number.isInteger(from) && Number.isInteger(to) && from >= 0 && to >= from, `Replicates run from a whole number up, not from ${from} to ${to}.`);
  const { units, members } = unitsOf(drawing);
  const counts = new Int32Array(drawing.rows);
  const drawn = members === null ? counts : new Int32Array(units);
  const out = new Float64Array(to - from);
  for (let replicate = from; replicate < to; replicate++) {
    const source = Xoshiro128.forReplicate(seed, replicate);
    drawn.fill(0);
    for (let draw = 0; draw < units; draw++) drawn[nextBelow(source, units)]!++;
    if (members !== null) for (let row = 0; row < drawing.rows; row++) counts[row] = drawn[members[row]!]!;
    out[replicate - from] = statistic(counts);
  }
  return out;
}

/**
 * The statistic with each row (or cluster) left out in turn, for the acceleration of BCa limits.
 * @returns one value a row, or a cluster
 * @throws RangeError for no rows or cluster numbers with gaps
 * @see Efron, J Am Stat Assoc 1987;82:171
 */
export function jackknife(statistic: ResampledStatistic, drawing: Drawing): Float64Array {
  const { units, members } = unitsOf(drawing);
  const counts = new Int32Array(drawing.rows);
  return Float64Array.from({ length: units }, (_, left) => {
    for (let row = 0; row < drawing.rows; row++) counts[row] = (members === null ? row : members[row]!) === left ? 0 : 1;
    return statistic(counts);
  });
}

/**
 * The statistic of the data as they are.
 */
export function observed(statistic: ResampledStatistic, { rows }: Drawing): number {
  return statistic(new Int32Array(rows).fill(1));
}

function unitsOf({ rows, clusters }: Drawing): { units: number; members: Int32Array | null } {
  requireRange(Number.isInteger(rows) && rows > 0, 'A bootstrap needs one row or more.');
  if (clusters === undefined) return { units: rows, members: null };
  requireRange(clusters.length === rows, `There are ${rows} rows but ${clusters.length} cluster numbers.`);
  const units = new Set(clusters).size;
  requireRange(clusters.every((cluster) => cluster >= 0 && cluster < units), 'Clusters are numbered 0, 1, 2 … without a gap.');
  return { units, members: clusters };
}

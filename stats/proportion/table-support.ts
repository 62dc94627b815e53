import { requireRange } from '../result';
import type { FourfoldTable } from './counts';

/** Beyond this many tables an exact method is no longer worth its memory, and no table of people gets there. */
const MOST_TABLES = 2 ** 24;

/**
 * The tables that share a fourfold table's margins, as log weights of the
 * first cell from its least to its greatest value, 0 at the most probable.
 * Laid out once by the ratio of neighbours from the mode outwards, so that
 * errors do not grow from a far end.
 */
export interface TableSupport {
  readonly least: number;
  readonly logWeights: Float64Array;
  /** Index of the observed table. */
  readonly observed: number;
}

export function supportOf({ a, b, c, d }: FourfoldTable): TableSupport {
  const row = a + b;
  const other = c + d;
  const events = a + c;
  const least = Math.max(0, events - other);
  const greatest = Math.min(row, events);
  requireRange(greatest - least < MOST_TABLES, `${greatest - least + 1} tables share these margins: too many to sum one by one.`);
  const logWeights = new Float64Array(greatest - least + 1);
  const mode = Math.min(greatest, Math.max(least, Math.floor(((row + 1) * (events + 1)) / (row + other + 2))));
  for (let k = mode; k < greatest; k++) {
    const ratio = ((row - k) / (k + 1)) * ((events - k) / (other - events + k + 1));
    logWeights[k + 1 - least] = (logWeights[k - least] as number) + Math.log(ratio);
  }
  for (let k = mode; k > least; k--) {
    const ratio = (k / (row - k + 1)) * ((other - events + k) / (events - k + 1));
    logWeights[k - 1 - least] = (logWeights[k - least] as number) + Math.log(ratio);
  }
  return { least, logWeights, observed: a - least };
}

/**
 * log P(X >= observed) or log P(X <= observed) when the odds ratio's log is
 * `tilt`; with mid-P the observed table counts half. The largest term is taken
 * out before the sum, so that no odds ratio overflows.
 */
export function logTailAt({ logWeights, observed }: TableSupport, tilt: number, upper: boolean, mid: boolean): number {
  let top = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < logWeights.length; k++) top = Math.max(top, (logWeights[k] as number) + k * tilt);
  let all = 0;
  let tail = 0;
  for (let k = 0; k < logWeights.length; k++) {
    const weight = Math.exp((logWeights[k] as number) + k * tilt - top);
    all += weight;
    if (k === observed) tail += mid ? weight / 2 : weight;
    else if (k > observed === upper) tail += weight;
  }
  return Math.log(tail) - Math.log(all);
}

/** Mean of the first cell, less its observed value, when the log odds ratio is `tilt`. */
export function meanExcessAt({ logWeights, observed }: TableSupport, tilt: number): number {
  let top = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < logWeights.length; k++) top = Math.max(top, (logWeights[k] as number) + k * tilt);
  let all = 0;
  let excess = 0;
  for (let k = 0; k < logWeights.length; k++) {
    const weight = Math.exp((logWeights[k] as number) + k * tilt - top);
    all += weight;
    excess += (k - observed) * weight;
  }
  return excess / all;
}

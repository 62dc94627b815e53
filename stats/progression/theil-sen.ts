import { normal } from '../distributions';
import { pickRows, usableRows } from '../missing/usable-rows';
import { methodOf } from '../registry';
import { kendall } from './kendall';
import { quantile } from './quantile';
import { inOrderByTwo } from './order-by-two';
import { slopesAtRanks } from './pairwise-slopes';
import { requireLevel, requireRange, type Estimate } from '../result';

/** A median slope with its rank limits; `estimate` is the slope, in units of y for one unit of x. */
export interface TheilSen extends Estimate {
  /** Pairs of rows with different x. */
  readonly slopes: number;
  /** Median of y - slope x; null where there is no slope. */
  readonly interceptMedianResidual: number | null;
  /** median(y) - slope median(x), the other common convention. */
  readonly interceptMedians: number | null;
  readonly kendallS: number;
  /** Variance of S corrected for ties. */
  readonly varianceS: number;
  /** z sqrt(variance of S): how many ordered slopes lie between the two limits. */
  readonly spread: number;
  /** Ranks of the limits among the ordered slopes, before interpolation. */
  readonly rankLower: number;
  readonly rankUpper: number;
  /** Mann-Kendall test of no trend, with continuity correction. */
  readonly z: number;
  readonly p: number;
  /** Set where the ordered slopes end before the rank of a limit: the most extreme slope is then shown. */
  readonly note?: string;
}

const METHOD = methodOf('theilSen');

/**
 * Theil-Sen slope: the median over all pairs of rows of (yj - yi)/(xj - xi),
 * pairs with equal x left out. Theil 1950, Proc KNAW 53; Sen 1968, JASA 63:1379;
 * limits at ranks (N - C)/2 and (N + C)/2 + 1, interpolated between ordered
 * slopes, with C = z sqrt(tie-corrected variance of Kendall's S). O(n log n)
 * expected beyond 2,000 rows, see slope-selection.ts.
 *
 * @param x e.g. weeks; @param y e.g. kg. Rows with a missing value are left out.
 * @throws RangeError for unequal columns, infinite values, a level outside (0, 1), or more than 2,000 rows of
 * which a column goes over more than 300 powers of two.
 */
export function theilSen(x: ArrayLike<number>, y: ArrayLike<number>, level = 0.95): TheilSen {
  requireLevel(level);
  requireRange(x.length === y.length, `Columns must be equally long: ${x.length} and ${y.length} rows.`);
  const usable = usableRows({ x, y });
  const { x: xs, y: ys } = inOrderByTwo(pickRows(x, usable.rows), pickRows(y, usable.rows));
  const n = xs.length;
  const { s, variance, tiedX, z } = kendall(xs, ys);
  const slopes = (n * (n - 1)) / 2 - tiedX;
  const spread = normal.isf((1 - level) / 2) * Math.sqrt(variance);
  const ranks = { rankLower: (slopes - spread) / 2, rankUpper: (slopes + spread) / 2 + 1 };
  const test = { kendallS: s, varianceS: variance, spread, ...ranks, z, p: 2 * normal.sf(Math.abs(z)) };
  const provenance = { level, method: METHOD, n, leftOut: usable.leftOut };
  if (slopes === 0) {
    const reason = n < 2 ? 'A slope needs two rows.' : 'All rows share one x: no slope exists.';
    return { estimate: null, lower: null, upper: null, reason, slopes, interceptMedianResidual: null, interceptMedians: null, ...test, ...provenance };
  }
  const middle = [Math.floor((slopes + 1) / 2), Math.ceil((slopes + 1) / 2)] as const;
  const at = slopesAtRanks(xs, ys, [...middle, ...around(ranks.rankLower, slopes), ...around(ranks.rankUpper, slopes)]);
  const estimate = meanOfTwo(at(middle[0]), at(middle[1]));
  const [medianX] = quantile(xs, [0.5]);
  const [medianY] = quantile(ys, [0.5]);
  const [medianResidual] = quantile(ys.map((value, row) => value - estimate * xs[row]!), [0.5]);
  const intercepts = { interceptMedianResidual: medianResidual!, interceptMedians: medianY! - estimate * medianX! };
  if (variance === 0) {
    const reason = 'Every y is equal: the ranks carry no information on limits.';
    return { estimate, lower: null, upper: null, reason, slopes, ...intercepts, ...test, ...provenance };
  }
  const lower = interpolate(at, ranks.rankLower, slopes);
  const upper = interpolate(at, ranks.rankUpper, slopes);
  const short = ranks.rankLower < 1 || ranks.rankUpper > slopes;
  const note = short ? { note: 'Too few slopes for limits at this level; the extreme slopes are shown.' } : {};
  return { estimate, lower, upper, slopes, ...intercepts, ...test, ...provenance, ...note };
}

/** The ordered slopes on both sides of a fractional rank, kept inside 1..slopes. */
function around(rank: number, slopes: number): [number, number] {
  const clamp = (k: number): number => Math.min(slopes, Math.max(1, k));
  return [clamp(Math.floor(rank)), clamp(Math.ceil(rank))];
}

function interpolate(at: (rank: number) => number, rank: number, slopes: number): number {
  const [low, high] = around(rank, slopes);
  if (low === high) return at(low);
  return at(low) + (rank - low) * (at(high) - at(low));
}

/** Half the sum as halves: two slopes near the largest double must not overflow. */
function meanOfTwo(a: number, b: number): number {
  return a === b ? a : a / 2 + b / 2;
}

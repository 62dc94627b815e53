import { studentT } from '../distributions';
import { usableRows } from '../missing/usable-rows';
import { methodOf } from '../registry';
import { requireLevel, type Estimate } from '../result';

/** A pooled proportion whose standard error knows that rows of one participant go together. */
export interface ClusteredProportion extends Estimate {
  readonly clusters: number;
  /** Standard error between clusters; null with one cluster. */
  readonly se: number | null;
  /** Mean over clusters of each cluster's own proportion; every participant counts once. */
  readonly meanOfClusters: number | null;
}

/**
 * Ratio estimator of a proportion, sum(y)/sum(m) over clusters, with its
 * linearised variance sum (y - p m)^2 / (sum m)^2 x G/(G - 1) and limits by t
 * on G - 1 degrees of freedom. Cochran 1977, Sampling Techniques, ch. 6 and 9.
 *
 * The limits are not cut at 0 and 1: a limit outside says that the
 * approximation is out of its depth.
 *
 * @param yes 1 where the row counts, 0 where not; NaN is left out.
 * @param clusters whole numbers that name the cluster of each row.
 * @throws RangeError for unequal columns, values other than 0 and 1, or a level outside (0, 1).
 */
export function clusteredProportion(yes: ArrayLike<number>, clusters: ArrayLike<number>, level = 0.95): ClusteredProportion {
  requireLevel(level);
  const usable = usableRows({ yes, cluster: clusters });
  const totals = new Map<number, { yes: number; rows: number }>();
  let events = 0;
  for (const row of usable.rows) {
    const value = yes[row]!;
    if (!(value === 0 || value === 1)) throw new RangeError(`A row counts (1) or not (0); row ${row} holds ${value}.`);
    const total = totals.get(clusters[row]!) ?? { yes: 0, rows: 0 };
    total.yes += value;
    total.rows += 1;
    totals.set(clusters[row]!, total);
    events += value;
  }
  const n = usable.rows.length;
  const groups = [...totals.values()];
  const g = groups.length;
  const base = { level, method: methodOf('clusteredProportion'), n, events, clusters: g, leftOut: usable.leftOut };
  if (n === 0) return { estimate: null, lower: null, upper: null, reason: 'No rows.', se: null, meanOfClusters: null, ...base };
  const estimate = events / n;
  const meanOfClusters = groups.reduce((sum, group) => sum + group.yes / group.rows, 0) / g;
  if (g === 1) {
    return { estimate, lower: null, upper: null, reason: 'One participant only: no spread between participants.', se: null, meanOfClusters, ...base };
  }
  const squares = groups.reduce((sum, group) => sum + (group.yes - estimate * group.rows) ** 2, 0);
  const se = Math.sqrt(((squares / n / n) * g) / (g - 1));
  const half = studentT.isf((1 - level) / 2, g - 1) * se;
  return { estimate, lower: estimate - half, upper: estimate + half, se, meanOfClusters, ...base };
}

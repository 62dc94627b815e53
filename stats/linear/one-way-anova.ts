import { fisherF } from '../distributions';
import { methodOf } from '../registry';
import { isMeasure, requireRange, type Provenance } from '../result';

export interface OneWayAnova extends Provenance {
  readonly groups: number;
  readonly degreesOfFreedomBetween: number;
  readonly degreesOfFreedomWithin: number;
  readonly sumOfSquaresBetween: number;
  readonly sumOfSquaresWithin: number;
  /** null where the groups do not vary within. */
  readonly f: number | null;
  readonly p: number | null;
  readonly rSquared: number | null;
  readonly residualDeviation: number | null;
  readonly reason?: string;
}

/**
 * One-way analysis of variance, sums of squares about means of values less
 * the first value, in two passes.
 *
 * @param values finite numbers
 * @param group one whole-number label a value; labels need not be consecutive
 * @throws RangeError on no values, values that are not finite, or columns of different length
 * @see Fisher, Statistical Methods for Research Workers, 1925
 */
export function oneWayAnova(values: ArrayLike<number>, group: ArrayLike<number>): OneWayAnova {
  const n = values.length;
  requireRange(group.length === n, 'Every value has a group.');
  requireRange(n > 0, 'An analysis of variance needs values.');
  const first = values[0] as number;
  const sums = new Map<number, { n: number; sum: number; mean: number }>();
  let total = 0;
  for (let i = 0; i < n; i++) {
    const label = group[i] as number;
    const value = (values[i] as number) - first;
    requireRange(isMeasure(values[i] as number) && Number.isFinite(label), 'Values and groups are finite numbers; leave missing ones out first.');
    const own = sums.get(label) ?? { n: 0, sum: 0, mean: 0 };
    own.n++;
    own.sum += value;
    total += value;
    sums.set(label, own);
  }
  let between = 0;
  for (const own of sums.values()) {
    own.mean = own.sum / own.n;
    between += own.n * (own.mean - total / n) ** 2;
  }
  let within = 0;
  for (let i = 0; i < n; i++) within += ((values[i] as number) - first - (sums.get(group[i] as number)?.mean as number)) ** 2;
  const df1 = sums.size - 1;
  const df2 = n - sums.size;
  const about = {
    groups: sums.size,
    degreesOfFreedomBetween: df1,
    degreesOfFreedomWithin: df2,
    sumOfSquaresBetween: between,
    sumOfSquaresWithin: within,
    rSquared: between + within > 0 ? between / (between + within) : null,
    residualDeviation: df2 > 0 ? Math.sqrt(within / df2) : null,
    method: methodOf('oneWayAnova'),
    n,
    leftOut: [],
  };
  if (df1 < 1 || df2 < 1 || within === 0) return { f: null, p: null, reason: reasonFor(df1, df2), ...about };
  const f = between / df1 / (within / df2);
  return { f, p: fisherF.sf(f, df1, df2), ...about };
}

function reasonFor(df1: number, df2: number): string {
  if (df1 < 1) return 'There is one group only.';
  return df2 < 1 ? 'No group has two values.' : 'Values do not vary within groups.';
}

import { normal } from '../distributions';
import { moments } from '../progression/moments';
import { quantileSorted } from '../progression/quantile';
import { requireLevel, requireRange, type Estimate } from '../result';

export type BootstrapKind = 'percentile' | 'basic' | 'normal' | 'bca';
/**
 * How a quantile of the replicates is read: 'order' is the (B + 1)p-th order
 * statistic, interpolated on the normal scale (Davison & Hinkley 1997, sec.
 * 5.2.1); 'type-7' the usual sample quantile.
 */
export type ReplicateQuantile = 'order' | 'type-7';

export interface BootstrapLimits extends Estimate {
  readonly kind: BootstrapKind;
  readonly replicates: number;
  /** Standard deviation of the replicates. */
  readonly se: number | null;
  /** Mean of the replicates minus the estimate. */
  readonly bias: number | null;
  /** Bias correction and acceleration, for BCa. */
  readonly z0?: number;
  readonly acceleration?: number;
  /** The two proportions at which the replicates were read. */
  readonly levels?: readonly [number, number];
  readonly note?: string;
}

export interface BootstrapOptions {
  readonly kind: BootstrapKind;
  readonly level?: number;
  readonly quantile?: ReplicateQuantile;
  /** Leave-one-out values, needed by BCa. */
  readonly jackknife?: Float64Array;
  /** Rows behind the estimate, for the record. */
  readonly n: number;
}

const NAMES: Readonly<Record<BootstrapKind, string>> = {
  percentile: 'percentile',
  basic: 'basic',
  normal: 'bias-corrected normal',
  bca: 'bias-corrected and accelerated (BCa)',
};

/**
 * Limits from bootstrap replicates. Percentile: Efron 1979; BCa: Efron 1987,
 * JASA 82:171; DiCiccio & Efron 1996, Stat Sci 11:189 (z0 from the share of
 * replicates below the estimate, acceleration from the jackknife). Replicates
 * that are NaN, where a resample did not have the statistic, are left out and counted.
 *
 * Where all or no replicates lie below the estimate the bias correction is
 * infinite: percentile limits are returned and the note says so.
 *
 * @throws RangeError for a level outside (0, 1), or BCa without a jackknife.
 */
export function bootstrapLimits(estimate: number, replicates: Float64Array, options: BootstrapOptions): BootstrapLimits {
  const { kind, level = 0.95, quantile = 'type-7', jackknife, n } = options;
  requireLevel(level);
  requireRange(kind !== 'bca' || jackknife !== undefined, 'BCa limits need the jackknife values.');
  const sorted = replicates.filter((value) => !Number.isNaN(value)).sort();
  const missing = replicates.length - sorted.length;
  const leftOut = missing > 0 ? [{ reason: 'resample without the statistic', count: missing }] : [];
  const { mean, sd } = moments(sorted);
  const method = `Bootstrap, ${sorted.length} replicates, ${NAMES[kind]} limits, ${quantile === 'order' ? '(B + 1)p order statistics' : 'type-7 quantiles'}`;
  const shared = { estimate, level, method, n, leftOut, kind, replicates: sorted.length, se: sd, bias: mean === null ? null : mean - estimate };
  if (sd === null || mean === null) return { ...shared, lower: null, upper: null, reason: 'Fewer than two replicates have the statistic.' };
  const tail = (1 - level) / 2;
  const at = (p: number): number => (quantile === 'order' ? orderQuantile(sorted, p) : (quantileSorted(sorted, p) as number));
  switch (kind) {
    case 'percentile':
      return { ...shared, lower: at(tail), upper: at(1 - tail), levels: [tail, 1 - tail] };
    case 'basic':
      return { ...shared, lower: 2 * estimate - at(1 - tail), upper: 2 * estimate - at(tail), levels: [tail, 1 - tail] };
    case 'normal': {
      const centre = 2 * estimate - mean;
      const half = normal.isf(tail) * sd;
      return { ...shared, lower: centre - half, upper: centre + half };
    }
    case 'bca': {
      const corrected = bcaLevels(estimate, sorted, jackknife!, tail);
      if (typeof corrected === 'string') return { ...shared, lower: at(tail), upper: at(1 - tail), levels: [tail, 1 - tail], note: corrected };
      const [low, high] = corrected.levels;
      return { ...shared, ...corrected, lower: at(low), upper: at(high) };
    }
  }
}

/** The proportions that bias correction and acceleration put in the place of alpha/2 and 1 - alpha/2, or why there are none. */
function bcaLevels(estimate: number, sorted: Float64Array, jackknife: Float64Array, tail: number): { z0: number; acceleration: number; levels: [number, number] } | string {
  const below = sorted.reduce((count, value) => count + (value < estimate ? 1 : 0), 0);
  if (below === 0 || below === sorted.length) return 'All replicates lie on one side of the estimate: no bias correction exists, percentile limits are shown.';
  const z0 = normal.quantile(below / sorted.length);
  const acceleration = accelerationOf(jackknife);
  if (acceleration === null) return 'A leave-one-out value does not exist: no acceleration, percentile limits are shown.';
  const level = (z: number): number | null => {
    const shifted = z0 + z;
    const stretch = 1 - acceleration * shifted;
    // Beyond the pole of the correction the levels would turn back on themselves.
    return stretch > 0 ? normal.cdf(z0 + shifted / stretch) : null;
  };
  const z = normal.isf(tail);
  const low = level(-z);
  const high = level(z);
  if (low === null || high === null) return 'The acceleration is too large for the correction: percentile limits are shown.';
  return { z0, acceleration, levels: [low, high] };
}

/** sum L^3 / 6 (sum L^2)^1.5 with L = mean - leave-one-out; 0 where they do not vary. */
function accelerationOf(jackknife: Float64Array): number | null {
  const { mean } = moments(jackknife);
  if (mean === null || jackknife.some(Number.isNaN)) return null;
  let squares = 0;
  let cubes = 0;
  for (const value of jackknife) {
    const influence = mean - value;
    squares += influence ** 2;
    cubes += influence ** 3;
  }
  return squares > 0 ? cubes / (6 * squares ** 1.5) : 0;
}

/** Order statistic (B + 1)p, between two of them on the normal scale; the extreme one where p lies beyond. */
function orderQuantile(sorted: Float64Array, p: number): number {
  const b = sorted.length;
  const rank = (b + 1) * p;
  const nearest = Math.round(rank);
  // (999 + 1) x 0.025 is 25 on paper and a little off in binary.
  const whole = Math.abs(rank - nearest) < 1e-9 * rank ? nearest : Math.floor(rank);
  if (whole < 1) return sorted[0]!;
  if (whole >= b) return sorted[b - 1]!;
  const low = sorted[whole - 1]!;
  if (whole === nearest && Math.abs(rank - nearest) < 1e-9 * rank) return low;
  const [from, to] = [normal.quantile(whole / (b + 1)), normal.quantile((whole + 1) / (b + 1))];
  return low + ((normal.quantile(p) - from) / (to - from)) * (sorted[whole]! - low);
}

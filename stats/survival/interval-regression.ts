import { criticalValue } from '../critical-value';
import { chiSquare } from '../distributions';
import { representable, requireLevel, requireRange, type Interval, type Provenance } from '../result';
import { factor, inverse, rowsOf } from './cholesky';
import { informativeRows } from './interval-onset';
import { fitWeibull, type WeibullFit } from './weibull-newton';
import type { ChiSquareTest } from './log-rank';
import type { IntervalData } from './turnbull-sets';

/** Intervals with covariates, one column each. */
export interface IntervalRegressionData extends IntervalData {
  readonly x?: readonly Float64Array[];
}

export interface IntervalRegressionOptions {
  readonly distribution?: 'weibull' | 'exponential';
  readonly level?: number;
}

export interface IntervalRegression extends Provenance {
  readonly events: number;
  readonly distribution: 'weibull' | 'exponential';
  /** Of log T = intercept + x · coefficients + sigma W. Null when there is no maximum. */
  readonly intercept: number | null;
  readonly coefficients: readonly (number | null)[];
  readonly sigma: number | null;
  /** 1 / sigma. */
  readonly shape: number | null;
  /** exp(intercept): the time by which 63% have had the event at x = 0. */
  readonly scale: number | null;
  readonly logLikelihood: number | null;
  /** Of intercept, coefficients and (Weibull) log sigma, in that order. */
  readonly covariance: number[][];
  readonly se: readonly number[];
  readonly logHazardRatios: readonly { readonly estimate: number; readonly se: number }[];
  readonly hazardRatios: readonly Interval[];
  /** Against the same distribution without covariates; absent when there are none. */
  readonly likelihoodRatio?: ChiSquareTest;
  readonly reason?: string;
}

/**
 * Weibull or exponential fit to onsets seen between two visits: (0, R] is 'by R',
 * (L, Infinity] 'not by L', left = right a day seen exactly. Times in any one unit.
 * @returns nulls with the reason when the likelihood has no maximum (no onset seen, or groups separated)
 * @throws RangeError on columns of different length, missing covariates, or onset at time 0 exactly
 * @see Odell, Anderson & D'Agostino, Biometrics 1992;48:951. Lindsey & Ryan, Stat Med 1998;17:219
 */
export function intervalRegression(data: IntervalRegressionData, options: IntervalRegressionOptions = {}): IntervalRegression {
  const { distribution = 'weibull', level = 0.95 } = options;
  requireLevel(level);
  const { rows, leftOut } = informativeRows(data);
  const x = (data.x ?? []).map((column, j) => checkedColumn(column, j, rows, data.left.length));
  const pick = (column: Float64Array) => Float64Array.from(rows, (i) => column[i]!);
  const left = pick(data.left);
  const right = pick(data.right);
  const weight = data.weight ? pick(data.weight) : undefined;
  requireRange(!right.some((r) => r === 0), 'An onset at time 0 exactly has no likelihood here; left ends may be 0, right ends must be above 0.');

  const events = right.filter((r) => r < Infinity).length;
  const about = { distribution, n: rows.length, events, leftOut, method: `${distribution === 'weibull' ? 'Weibull' : 'Exponential'} regression for interval-censored times, maximum likelihood` };
  if (events === 0) return { ...about, ...nothing(x.length), reason: 'no onset was seen: the rate is 0 and its scale infinite' };
  const input = { left, right, weight, fixedSigma: distribution === 'exponential' };
  const fit = fitWeibull({ ...input, x });
  if (!fit.converged) return { ...about, ...nothing(x.length), reason: fit.reason };
  const base = x.length === 0 ? fit : fitWeibull({ ...input, x: [] });
  return { ...about, ...describe(fit, x.length, distribution, level), ...(x.length > 0 && { likelihoodRatio: ratioTest(fit, base, x.length) }) };
}

function checkedColumn(column: Float64Array, j: number, rows: readonly number[], n: number): Float64Array {
  requireRange(column.length === n, `There are ${n} rows but ${column.length} values of covariate ${j}.`);
  const out = Float64Array.from(rows, (i) => column[i]!);
  requireRange(out.every(Number.isFinite), `Covariate ${j} has a value that is missing or infinite; leave such rows out first.`);
  return out;
}

function nothing(covariates: number) {
  const none = Array.from({ length: covariates }, () => null);
  return { intercept: null, coefficients: none, sigma: null, shape: null, scale: null, logLikelihood: null, covariance: [], se: [], logHazardRatios: [], hazardRatios: [] };
}

function describe({ parameters, information, logLikelihood }: WeibullFit, p: number, distribution: 'weibull' | 'exponential', level: number) {
  const size = p + (distribution === 'weibull' ? 2 : 1);
  const covariance = inverse(factor(information, size));
  const sigma = distribution === 'weibull' ? Math.exp(parameters[p + 1]!) : 1;
  const z = criticalValue(level);
  const ratios = Array.from({ length: p }, (_, j) => {
    const estimate = -parameters[j + 1]! / sigma;
    const at = (a: number, b: number) => covariance[a * size + b]!;
    // delta method in (coefficient, log sigma): d(-b/s) = -db/s + (b/s) d log s
    const own = at(j + 1, j + 1) / (sigma * sigma);
    const shared = distribution === 'weibull' ? estimate * estimate * at(p + 1, p + 1) + (2 * estimate * at(j + 1, p + 1)) / sigma : 0;
    return { estimate, se: Math.sqrt(own + shared) };
  });
  return {
    intercept: parameters[0]!,
    coefficients: [...parameters.subarray(1, p + 1)],
    sigma,
    shape: 1 / sigma,
    scale: finiteOrNull(Math.exp(parameters[0]!)), // covariates far from 0 put x = 0 far from every row
    logLikelihood,
    covariance: rowsOf(covariance, size),
    se: Array.from({ length: size }, (_, j) => Math.sqrt(covariance[j * size + j]!)),
    logHazardRatios: ratios,
    hazardRatios: ratios.map(({ estimate, se }) => representable({ estimate: Math.exp(estimate), lower: Math.exp(estimate - z * se), upper: Math.exp(estimate + z * se), level })),
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function ratioTest(fit: WeibullFit, base: WeibullFit, df: number): ChiSquareTest {
  if (!base.converged) return { chiSquare: null, df, p: null, reason: base.reason };
  const statistic = Math.max(0, 2 * (fit.logLikelihood - base.logLikelihood));
  return { chiSquare: statistic, df, p: chiSquare.sf(statistic, df) };
}

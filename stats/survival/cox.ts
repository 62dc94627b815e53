import { criticalValue } from '../critical-value';
import { chiSquare, normal } from '../distributions';
import { representable, requireLevel, requireRange, type Interval, type Provenance } from '../result';
import { quadraticForm, rowsOf } from './cholesky';
import { coxDesign, type CoxData, type CoxDesign } from './cox-design';
import { fitCox, type Missing, type ScaledFit } from './cox-newton';
import { clusterScores } from './cox-robust';
import type { Ties } from './cox-sweep';
import type { ChiSquareTest } from './log-rank';

export interface CoxOptions {
  readonly ties?: Ties;
  readonly level?: number;
  /** Names of the covariates, for results and reasons. */
  readonly names?: readonly string[];
  /** Robust standard errors although there is no cluster column: each row stands alone. */
  readonly robust?: boolean;
}

/** One covariate. Numbers are null (with the reason) where the data give no estimate. */
export interface CoxCoefficient {
  readonly name: string;
  /** Log hazard ratio for one unit of the covariate. */
  readonly estimate: number | null;
  readonly se: number | null;
  readonly robustSe?: number | null;
  readonly hazardRatio: Interval;
  /** The same with limits from the robust standard error. */
  readonly robustHazardRatio?: Interval;
  /** Wald test, with the robust standard error where there is one. */
  readonly p: number | null;
  readonly reason?: string;
}

export interface CoxFit extends Provenance {
  readonly events: number;
  readonly ties: Ties;
  readonly level: number;
  readonly coefficients: readonly CoxCoefficient[];
  readonly covariance: number[][];
  readonly robustCovariance?: number[][];
  readonly clusters?: number;
  readonly logLikelihoodNull: number;
  readonly logLikelihood: number;
  readonly likelihoodRatio: ChiSquareTest;
  readonly wald: ChiSquareTest;
  readonly score: ChiSquareTest;
  readonly robustWald?: ChiSquareTest;
  readonly iterations: number;
  readonly converged: boolean;
}

export const REASONS: Record<Missing, string> = {
  aliased: 'constant, or a combination of other covariates, in every risk set',
  monotone: 'monotone likelihood: it keeps rising as the coefficient grows without end; firthCox, the penalised fit, has a finite estimate',
};

/**
 * Cox proportional-hazards regression: Efron's or Breslow's ties, (entry, time]
 * rows, strata, and Lin-Wei robust standard errors by cluster (no small-sample factor).
 * @throws RangeError on columns of different length, codes out of range, infinite covariates
 * @see Cox, JRSS B 1972;34:187. Efron 1977. Lin & Wei 1989
 */
export function cox(data: CoxData, options: CoxOptions = {}): CoxFit {
  const { ties = 'efron', level = 0.95 } = options;
  requireLevel(level);
  const names = options.names ?? data.x.map((_, j) => `x${j + 1}`);
  requireRange(names.length === data.x.length, `There are ${data.x.length} covariates but ${names.length} names.`);
  const design = coxDesign(data);
  const fit = fitCox(design, ties);
  const robust = data.cluster !== undefined || options.robust === true ? robustCovariance(design, ties, fit, data) : undefined;
  const p = names.length;
  const covariance = unscale(fit.covariance, design);
  const z = criticalValue(level);
  const beta = Array.from(fit.beta, (b, j) => b / design.spread[j]!);
  const whole = wholeTests(fit, design.events);
  return {
    method: methodName(ties, data, robust !== undefined),
    n: design.n,
    events: design.events,
    leftOut: design.leftOut,
    ties,
    level,
    coefficients: names.map((name, j) => coefficient(name, beta[j]!, fit.missing[j], covariance[j * p + j]!, robust?.covariance[j * p + j], z, level)),
    covariance: rowsOf(covariance, p),
    ...(robust && { robustCovariance: rowsOf(robust.covariance, p), clusters: robust.clusters, robustWald: waldTest(beta, robust.covariance, fit) }),
    logLikelihoodNull: fit.logLikelihoodNull,
    logLikelihood: fit.logLikelihood,
    ...whole,
    wald: waldTest(beta, covariance, fit),
    iterations: fit.iterations,
    converged: fit.converged,
  };
}

/** The coefficients as numbers, those without an estimate as 0. */
export function coefficientsOf(fit: CoxFit): Float64Array {
  return Float64Array.from(fit.coefficients, ({ estimate }) => estimate ?? 0);
}

function coefficient(name: string, estimate: number, missing: Missing | undefined, variance: number, robustVariance: number | undefined, z: number, level: number): CoxCoefficient {
  if (missing !== undefined) {
    const reason = REASONS[missing];
    return { name, estimate: null, se: null, p: null, reason, hazardRatio: { estimate: null, lower: null, upper: null, level, reason } };
  }
  const ratio = (se: number): Interval => representable({ estimate: Math.exp(estimate), lower: Math.exp(estimate - z * se), upper: Math.exp(estimate + z * se), level });
  const se = Math.sqrt(variance);
  const robustSe = robustVariance === undefined ? undefined : Math.sqrt(Math.max(0, robustVariance));
  const used = robustSe ?? se;
  return {
    name,
    estimate,
    se,
    hazardRatio: ratio(se),
    ...(robustSe !== undefined && { robustSe, robustHazardRatio: ratio(robustSe) }),
    p: used > 0 ? 2 * normal.sf(Math.abs(estimate) / used) : null,
    ...(used > 0 ? {} : { reason: 'the standard error is 0' }),
  };
}

/** Inverse information times the cross-products of the clusters' scores times inverse information. */
function robustCovariance(design: CoxDesign, ties: Ties, fit: ScaledFit, data: CoxData): { covariance: Float64Array; clusters: number } {
  const { p } = design;
  const scores = clusterScores(design, ties, fit.beta, data.cluster);
  const clusters = p === 0 ? 0 : scores.length / p;
  const shift = new Float64Array(p); // change of the coefficients by one cluster
  const out = new Float64Array(p * p);
  for (let c = 0; c < clusters; c++) {
    for (let j = 0; j < p; j++) {
      shift[j] = 0;
      // A coefficient without an estimate has no variance; its scores need not be numbers.
      for (let l = 0; l < p; l++) if (fit.missing[l] === undefined) shift[j]! += fit.covariance[j * p + l]! * scores[c * p + l]!;
    }
    for (let j = 0; j < p; j++) for (let l = 0; l < p; l++) out[j * p + l]! += shift[j]! * shift[l]!;
  }
  return { covariance: unscale(out, design), clusters };
}

export function unscale(matrix: Float64Array, { p, spread }: CoxDesign): Float64Array {
  return matrix.map((value, at) => value / (spread[Math.floor(at / p)]! * spread[at % p]!));
}

function wholeTests(fit: ScaledFit, events: number): { likelihoodRatio: ChiSquareTest; score: ChiSquareTest } {
  const df = fit.rank;
  if (df === 0) {
    const none: ChiSquareTest = { chiSquare: null, df, p: null, reason: events === 0 ? 'no events' : 'no covariate varies in a risk set' };
    return { likelihoodRatio: none, score: none };
  }
  const ratio = Math.max(0, 2 * (fit.logLikelihood - fit.logLikelihoodNull));
  return {
    likelihoodRatio: { chiSquare: ratio, df, p: chiSquare.sf(ratio, df) },
    score: { chiSquare: fit.scoreStatistic, df, p: chiSquare.sf(fit.scoreStatistic, df) },
  };
}

function waldTest(beta: readonly number[], covariance: Float64Array, fit: ScaledFit): ChiSquareTest {
  if (fit.missing.includes('monotone')) return { chiSquare: null, df: fit.rank, p: null, reason: REASONS.monotone };
  const { chiSquare: statistic, df } = quadraticForm(beta, covariance, beta.length);
  if (df === 0) return { chiSquare: null, df, p: null, reason: 'no coefficient has an estimate' };
  return { chiSquare: statistic, df, p: chiSquare.sf(statistic, df) };
}

function methodName(ties: Ties, data: CoxData, robust: boolean): string {
  const parts = [`Cox proportional-hazards regression, ${ties === 'efron' ? "Efron's" : "Breslow's"} ties`];
  if (data.stratum) parts.push('stratified');
  if (robust) parts.push(data.cluster ? 'Lin-Wei standard errors by cluster' : 'Lin-Wei robust standard errors');
  return parts.join(', ');
}

import { criticalValue } from '../critical-value';
import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import { representable, requireLevel, requireRange, type Interval, type Provenance } from '../result';
import { rowsOf } from './cholesky';
import { REASONS, unscale } from './cox';
import { coxDesign, type CoxData, type CoxDesign } from './cox-design';
import type { Ties } from './cox-sweep';
import { FirthLikelihood, type Point } from './firth-newton';
import type { ChiSquareTest } from './log-rank';

export interface FirthCoxOptions {
  /** 'efron' unless asked otherwise. */
  readonly ties?: Ties;
  readonly level?: number;
  /** Names of the covariates, for results and reasons. */
  readonly names?: readonly string[];
}

/** One covariate. Numbers are null (with the reason) where the data give no estimate. */
export interface FirthCoefficient {
  readonly name: string;
  /** Log hazard ratio for one unit of the covariate. */
  readonly estimate: number | null;
  /** From the inverse information; the limits do not use it. */
  readonly se: number | null;
  /** Profile penalised-likelihood limits of the log hazard ratio. */
  readonly lower: number | null;
  readonly upper: number | null;
  readonly hazardRatio: Interval;
  /** Penalised likelihood-ratio test that the coefficient is 0, on 1 df. */
  readonly chiSquare: number | null;
  readonly p: number | null;
  readonly reason?: string;
}

export interface FirthCoxFit extends Provenance {
  readonly events: number;
  readonly ties: Ties;
  readonly level: number;
  readonly coefficients: readonly FirthCoefficient[];
  /** Inverse information, zero rows where there is no estimate. */
  readonly covariance: number[][];
  /** log L + 1/2 log det I with the covariates in their own units; null where there is no estimate at all. */
  readonly penalisedLogLikelihoodNull: number | null;
  readonly penalisedLogLikelihood: number | null;
  /** All coefficients 0 against none, both penalised. */
  readonly likelihoodRatio: ChiSquareTest;
  readonly iterations: number;
  readonly converged: boolean;
}

const UNSETTLED = 'the penalised likelihood was not brought to its maximum';
const OPEN = 'the profile of the penalised likelihood could not be followed to a limit';

/**
 * Cox proportional-hazards regression by Firth's penalised likelihood, for few
 * events and where the likelihood is monotone: the estimates stay finite.
 * Limits and p come from the profile of the penalised likelihood. Efron's or
 * Breslow's ties, (entry, time] rows and strata as in `cox`.
 *
 * The profile is followed from the estimate outwards. With hardly more events
 * than covariates it can have a second, higher branch, which is not searched for;
 * a limit is then too near. Trust no such fit.
 * @param data columns of equal length, one entry a row, as for `cox`; times in any one unit
 * @throws RangeError on columns of different length, codes out of range, infinite
 *   covariates, and on clusters, for which the method has no standard errors
 * @see Firth, Biometrika 1993;80:27. Heinze & Schemper, Biometrics 2001;57:114
 */
export function firthCox(data: CoxData, options: FirthCoxOptions = {}): FirthCoxFit {
  const { ties = 'efron', level = 0.95 } = options;
  requireLevel(level);
  const names = options.names ?? data.x.map((_, j) => `x${j + 1}`);
  requireRange(names.length === data.x.length, `There are ${data.x.length} covariates but ${names.length} names.`);
  requireRange(data.cluster === undefined, 'The penalised fit has no standard errors by cluster: leave the clusters out.');
  const design = coxDesign(data);
  const likelihood = new FirthLikelihood(design, ties);
  const peak = likelihood.maximise(new Float64Array(design.p));
  const units = likelihood.missing.reduce((sum, why, j) => sum + (why === undefined ? Math.log(design.spread[j]!) : 0), 0);
  const none = likelihood.rank === 0;
  return {
    method: `${methodOf('firthCox')}; ${ties === 'efron' ? 'Efron’s' : 'Breslow’s'} ties${data.stratum ? ', stratified' : ''}`,
    n: design.n,
    events: design.events,
    leftOut: design.leftOut,
    ties,
    level,
    coefficients: names.map((name, j) => ({ name, ...coefficient(likelihood, peak, j, level) })),
    covariance: rowsOf(unscale(peak.covariance, design), design.p),
    penalisedLogLikelihoodNull: none ? null : likelihood.atNull + units,
    penalisedLogLikelihood: none ? null : peak.value + units,
    likelihoodRatio: wholeTest(likelihood, peak),
    iterations: peak.rounds,
    converged: peak.converged,
  };
}

function coefficient(likelihood: FirthLikelihood, peak: Point, j: number, level: number): Omit<FirthCoefficient, 'name'> {
  const { design, missing } = likelihood;
  const why = missing[j] === undefined ? undefined : reasonOf(design);
  const reason = why ?? (peak.converged ? undefined : UNSETTLED);
  if (reason !== undefined) {
    const nothing = { estimate: null, lower: null, upper: null, reason };
    return { ...nothing, se: null, chiSquare: null, p: null, hazardRatio: { ...nothing, level } };
  }
  const scale = design.spread[j]!;
  const [lower, upper] = ([-1, 1] as const).map((side) => {
    const limit = profileLimit(likelihood, peak, j, side, criticalValue(level));
    return limit === null ? null : limit / scale;
  }) as [number | null, number | null];
  const estimate = peak.beta[j]! / scale;
  const open = lower === null || upper === null ? { reason: OPEN } : {};
  const ratio = { estimate: Math.exp(estimate), lower: lower === null ? null : Math.exp(lower), upper: upper === null ? null : Math.exp(upper), level, ...open };
  const statistic = Math.max(0, 2 * (peak.value - profileAt(likelihood, peak, j, 0).value));
  return {
    estimate,
    se: Math.sqrt(peak.covariance[j * design.p + j]!) / scale,
    lower,
    upper,
    hazardRatio: representable(ratio),
    chiSquare: statistic,
    p: chiSquare.sf(statistic, 1),
    ...open,
  };
}

function reasonOf({ events }: CoxDesign): string {
  return events === 0 ? 'no events' : REASONS.aliased;
}

function wholeTest({ rank, design, atNull }: FirthLikelihood, peak: Point): ChiSquareTest {
  if (rank === 0) return { chiSquare: null, df: 0, p: null, reason: design.events === 0 ? 'no events' : 'no covariate varies in a risk set' };
  if (!peak.converged) return { chiSquare: null, df: rank, p: null, reason: UNSETTLED };
  const statistic = Math.max(0, 2 * (peak.value - atNull));
  return { chiSquare: statistic, df: rank, p: chiSquare.sf(statistic, rank) };
}

/** The maximum with coefficient j at `value`; the others start along the ridge through `from`. */
function profileAt(likelihood: FirthLikelihood, from: Point, j: number, value: number): Point {
  const { p } = likelihood.design;
  const shift = (value - from.beta[j]!) / from.covariance[j * p + j]!;
  const start = from.beta.map((b, l) => (l === j ? value : b + shift * from.covariance[l * p + j]!));
  return likelihood.maximise(start, j);
}

/**
 * Where the signed root of twice the penalised log-likelihood lost is z: Newton's
 * steps on the root, which is close to a line, kept inside a bracket. The slope
 * of the profile is the modified score of the held coefficient.
 */
function profileLimit(likelihood: FirthLikelihood, peak: Point, j: number, side: -1 | 1, z: number): number | null {
  const { p } = likelihood.design;
  const centre = peak.beta[j]!;
  const se = Math.sqrt(peak.covariance[j * p + j]!);
  let [near, far] = [0, Infinity]; // distances from the estimate, in standard errors
  let at = z;
  let point = peak;
  for (let round = 0; round < 100; round++) {
    const next = profileAt(likelihood, point, j, centre + side * at * se);
    const root = Math.sqrt(Math.max(0, 2 * (peak.value - next.value)));
    if (next.converged && Number.isFinite(next.value)) point = next;
    if (root < z) near = at;
    else far = at;
    const slope = (-side * se * next.score[j]!) / root;
    const newton = at + (z - root) / slope;
    const isInside = newton > near && newton < Math.min(far, 4 * at + 1);
    if (Math.abs(newton - at) < 1e-8 && next.converged) return centre + side * newton * se;
    at = isInside ? newton : far === Infinity ? 2 * at : (near + far) / 2;
    // A bracket that closes on no root closes on a fit that did not settle: no limit to give.
    if (at > 1e4 || far - near < 1e-14 * far) return null;
  }
  return null;
}

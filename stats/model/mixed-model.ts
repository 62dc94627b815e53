import { pickRows, usableRows } from '../missing/usable-rows';
import { coefficient, type Coefficient } from './coefficient';
import { backTransform, backTransformCovariance, designOf, type Design, type Term } from './design';
import type { Refusal } from './fit';
import { minimise, type Minimum } from './newton';
import { peopleOf, personTotals, residualOf, scalingOf, type PersonTotals, type Scaling } from './person-totals';
import { profile, relativeCovariance, type Criterion, type Profile } from './profile';
import { satterthwaiteDf } from './satterthwaite';
import { requireLevel, requireRange, type Provenance } from '../result';

/** Rows of repeated measurements and the model for them. */
export interface MixedModelInput {
  /** The outcome, one row a measurement. */
  readonly y: ArrayLike<number>;
  /** Fixed effects beside the intercept. */
  readonly fixed: readonly Term[];
  /** Whole numbers that name the person of each row. */
  readonly person: ArrayLike<number>;
  /** Time of each row: gives each person an own slope. Absent: an own intercept only. */
  readonly slope?: ArrayLike<number>;
  /** Restricted likelihood (default) or plain; compare fixed effects only under the plain one. */
  readonly reml?: boolean;
  readonly level?: number;
}

/** What one person differs by from the fixed part, shrunk towards it (best linear unbiased prediction). */
export interface PersonEffect {
  readonly person: number;
  readonly intercept: number;
  /** null where only the intercept is random. */
  readonly slope: number | null;
}

export interface MixedModel extends Provenance {
  readonly fitted: true;
  readonly reml: boolean;
  readonly people: number;
  readonly logLikelihood: number;
  /** -2 log (restricted) likelihood. */
  readonly deviance: number;
  /** Wald limits by the normal; `satterthwaite` has the same by t. */
  readonly fixed: readonly Coefficient[];
  readonly satterthwaite: readonly Coefficient[];
  readonly covarianceFixed: readonly (readonly number[])[];
  /** Covariance of the random effects, [[intercept]] or 2 x 2 with the slope. */
  readonly covarianceRandom: readonly (readonly number[])[];
  /** Between intercept and slope at time 0; null where one of them has no variance. */
  readonly correlation: number | null;
  readonly residualVariance: number;
  readonly effects: readonly PersonEffect[];
  /** A variance is 0 or the correlation is +-1: the optimum lies on the edge, and is one all the same. */
  readonly singular: boolean;
  readonly converged: boolean;
  readonly iterations: number;
  /** What a reader must know before trusting the fit. */
  readonly notes: readonly string[];
}

/** A relative standard deviation below this is 0 (residual standard deviation = 1). */
const SINGULAR = 1e-4;
/** Share of the least-squares sum of squares below which nothing is left to explain. */
const EXACT = 1e-13;
const NO_RESIDUAL = 'The rows of each person lie on an own line: no residual variation is left to estimate.';

/**
 * Linear mixed model with a random intercept and, when asked, slope by person
 * (unstructured covariance), by profiled REML or ML over per-person totals:
 * O(people) an evaluation. Laird & Ware 1982, Biometrics 38:963; Lindstrom &
 * Bates 1988, JASA 83:1014; Bates et al. 2015, J Stat Softw 67(1). Time and
 * covariates are centred and scaled inside, so years as 1875 to 1972 fit as
 * well as 0 to 97.
 *
 * Rows with a missing value are left out and counted. A variance at 0 is
 * reported as singular, never hidden.
 *
 * @returns a refusal with its reason where the data cannot carry the model.
 * @throws RangeError for unequal columns, infinite values, collinear fixed effects or a level outside (0, 1).
 */
export function mixedModel(input: MixedModelInput): MixedModel | Refusal {
  const { reml = true, level = 0.95 } = input;
  requireLevel(level);
  requireRange(new Set(input.fixed.map(({ name }) => name)).size === input.fixed.length, 'Terms of a model need different names.');
  const named = Object.fromEntries(input.fixed.map(({ name, values }) => [`fixed ${name}`, values]));
  const columns: Record<string, ArrayLike<number>> = { y: input.y, person: input.person, ...named };
  if (input.slope !== undefined) columns.slope = input.slope;
  const usable = usableRows(columns);
  const random = input.slope === undefined ? 'random intercept' : 'random intercept and slope';
  const method = `Linear mixed model, ${random}, ${reml ? 'REML' : 'maximum likelihood'}`;
  const provenance = { method, n: usable.rows.length, leftOut: usable.leftOut };
  if (usable.rows.length <= input.fixed.length + 1) return { fitted: false, reason: 'There are no more rows than fixed effects.', ...provenance };
  const design = designOf(input.fixed, usable.rows);
  const { person, ids } = peopleOf(input.person, usable.rows);
  const raw = input.slope === undefined ? null : pickRows(input.slope, usable.rows);
  const scaling = raw === null ? { centre: 0, scale: 1 } : scalingOf(raw);
  const time = raw === null ? null : raw.map((t) => (t - scaling.centre) / scaling.scale);
  const y = pickRows(input.y, usable.rows);
  const { gamma, residual } = residualOf(y, design);
  const totals = personTotals(design, residual, person, ids.length, time);
  const why = whyNot(totals, residual, y, time, person);
  if (why !== null) return { fitted: false, reason: why, ...provenance };
  const criterion: Criterion = { reml, logDeterminant: design.logDeterminant };
  const at = (theta: Float64Array): Profile & { value: number } => {
    const point = profile(totals, theta, criterion);
    // Below this share the residual sum of squares is rounding: a wall keeps the search where the criterion means something.
    return { ...point, value: point.rss > EXACT * totals.yy ? point.deviance : Infinity };
  };
  const minimum = minimise(at, time === null ? Float64Array.of(1) : Float64Array.of(1, 0, 1));
  if (!(at(minimum.x).rss > 1e3 * EXACT * totals.yy)) {
    return { fitted: false, reason: NO_RESIDUAL, ...provenance };
  }
  return { fitted: true, reml, ...answer(design, totals, criterion, minimum, gamma, ids, scaling, time !== null, level), ...provenance };
}

/** Reasons for which no optimum exists. */
function whyNot(totals: PersonTotals, residual: Float64Array, y: Float64Array, time: Float64Array | null, person: Int32Array): string | null {
  const { people, n, zz } = totals;
  if (people < 2) return 'Variation between people needs two people or more.';
  if (time !== null && time.every((t) => t === time[0])) return 'Every row has one time: a random slope does not exist.';
  const parameters = time === null ? 1 : 2;
  if (n <= parameters * people) return 'There are no more rows than random effects: residual and random variation cannot be told apart.';
  let spare = n;
  for (let i = 0; i < people; i++) {
    const [rows, t, tt] = [zz[3 * i]!, zz[3 * i + 1]!, zz[3 * i + 2]!];
    spare -= time !== null && rows * tt - t * t > 1e-12 * rows * tt ? 2 : 1;
  }
  if (spare <= 0) return 'No person has rows to spare: residual and random variation cannot be told apart.';
  const size = y.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (residual.every((value) => Math.abs(value) <= 1e-13 * size)) return 'The fixed effects explain every row exactly: no variance is left to estimate.';
  return ownLinesLeave(totals, residual, time, person) > EXACT * totals.yy ? null : NO_RESIDUAL;
}

/** Sum of squares left when each person is given an own line (or level). */
function ownLinesLeave({ people, zz, zy }: PersonTotals, residual: Float64Array, time: Float64Array | null, person: Int32Array): number {
  const lines = new Float64Array(2 * people);
  for (let i = 0; i < people; i++) {
    const [rows, t, tt] = [zz[3 * i]!, zz[3 * i + 1]!, zz[3 * i + 2]!];
    const spread = rows * tt - t * t;
    const slope = spread > 1e-12 * rows * tt ? (rows * zy[2 * i + 1]! - t * zy[2 * i]!) / spread : 0;
    lines[2 * i] = (zy[2 * i]! - slope * t) / rows;
    lines[2 * i + 1] = slope;
  }
  return residual.reduce((sum, r, row) => sum + (r - lines[2 * person[row]!]! - (time === null ? 0 : lines[2 * person[row]! + 1]! * time[row]!)) ** 2, 0);
}

function answer(
  design: Design,
  totals: PersonTotals,
  criterion: Criterion,
  minimum: Minimum,
  leastSquares: Float64Array,
  ids: Float64Array,
  scaling: Scaling,
  withSlope: boolean,
  level: number,
) {
  const { theta, singular } = settle(minimum, totals, criterion);
  const at = profile(totals, theta, criterion);
  const { p } = design;
  const beta = backTransform(design, leastSquares.map((value, j) => value + at.gamma[j]!));
  const covariance = backTransformCovariance(design, at.inverseInformation.map((value) => value * at.sigma2));
  const df = satterthwaiteDf(design, totals, theta, at, criterion);
  const se = (k: number): number => Math.sqrt(covariance[k * p + k]!);
  const random = randomCovariance(relativeCovariance(theta), at.sigma2, scaling, withSlope);
  const notes: string[] = [];
  if (singular) notes.push('Singular fit: a variance is 0 or the correlation is -1 or 1; the data do not tell all random effects apart.');
  if (!minimum.converged) notes.push('The search for the optimum stopped early; do not rely on these figures.');
  return {
    people: ids.length,
    logLikelihood: -at.deviance / 2,
    deviance: at.deviance,
    fixed: design.names.map((name, k) => coefficient(name, beta[k]!, se(k), level)),
    satterthwaite: design.names.map((name, k) => coefficient(name, beta[k]!, se(k), level, df[k] ?? undefined)),
    covarianceFixed: Array.from({ length: p }, (_, i) => Array.from(covariance.subarray(i * p, (i + 1) * p))),
    covarianceRandom: random,
    correlation: correlationOf(random),
    residualVariance: at.sigma2,
    effects: effectsOf(theta, at.u, ids, scaling, withSlope),
    singular,
    converged: minimum.converged,
    iterations: minimum.iterations,
    notes,
  };
}

/** Sets an entry that is 0 to rounding to 0, when the criterion is no worse for it. */
function settle(minimum: Minimum, totals: PersonTotals, criterion: Criterion): { theta: Float64Array; singular: boolean } {
  const theta = minimum.x.map(Math.abs);
  if (theta.length === 3) theta[1] = minimum.x[1]! * (minimum.x[0]! < 0 ? -1 : 1);
  const slack = 1e-9 * (1 + Math.abs(minimum.value));
  for (const entry of theta.length === 1 ? [0] : [0, 2]) {
    if (theta[entry]! >= SINGULAR) continue;
    const without = theta.slice();
    without[entry] = 0;
    if (profile(totals, without, criterion).deviance <= minimum.value + slack) theta[entry] = 0;
  }
  const singular = theta.length === 1 ? theta[0]! < SINGULAR : theta[0]! < SINGULAR || theta[2]! < SINGULAR;
  return { theta, singular };
}

/** From centred, scaled time back to the time given: b0 + b1 (t - m)/s. */
function randomCovariance([o11, o12, o22]: readonly [number, number, number], sigma2: number, { centre, scale }: Scaling, withSlope: boolean): number[][] {
  if (!withSlope) return [[sigma2 * o11]];
  const shift = centre / scale;
  const g11 = sigma2 * (o11 - 2 * shift * o12 + shift * shift * o22);
  const g12 = (sigma2 * (o12 - shift * o22)) / scale;
  return [[g11, g12], [g12, (sigma2 * o22) / scale ** 2]];
}

function correlationOf(random: readonly (readonly number[])[]): number | null {
  if (random.length < 2) return null;
  const product = random[0]![0]! * random[1]![1]!;
  return product > 0 ? Math.min(1, Math.max(-1, random[0]![1]! / Math.sqrt(product))) : null;
}

function effectsOf(theta: Float64Array, u: Float64Array, ids: Float64Array, { centre, scale }: Scaling, withSlope: boolean): PersonEffect[] {
  const [o11, o12, o22] = relativeCovariance(theta);
  return Array.from(ids, (person, i) => {
    const atCentre = o11 * u[2 * i]! + o12 * u[2 * i + 1]!;
    const slope = (o12 * u[2 * i]! + o22 * u[2 * i + 1]!) / scale;
    return withSlope ? { person, intercept: atCentre - centre * slope, slope } : { person, intercept: atCentre, slope: null };
  });
}

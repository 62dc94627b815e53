import { usableRows, pickRows } from '../missing/usable-rows';
import { requireLevel, requireRange, type Provenance } from '../result';
import { coefficient, exponentiate, type Coefficient } from './coefficient';
import { backTransform, backTransformCovariance, designOf, type Design, type Term } from './design';
import type { Refusal } from './fit';
import type { Family } from './glm-family';
import { irls, type GlmData, type IrlsFit } from './irls';
import { peopleOf } from './person-totals';
import { sandwich } from './sandwich';
import { tallyOf } from './tally';

/** Columns of a generalised linear model; an intercept is always part of it. */
export interface GlmInput {
  /** Whole numbers from 0 up. */
  readonly y: ArrayLike<number>;
  readonly terms: readonly Term[];
  /** Trials of each row, for grouped outcomes; 1 where absent. */
  readonly trials?: ArrayLike<number>;
  /** Time at risk (or another exposure) above 0; its log is the offset. */
  readonly exposure?: ArrayLike<number>;
  /** Whole numbers that name the cluster of each row: adds clustered standard errors. */
  readonly cluster?: ArrayLike<number>;
  readonly level?: number;
}

/** Coefficients with standard errors that hold when rows of one cluster go together. */
export interface Clustered {
  readonly clusters: number;
  /** Without a small-sample factor. */
  readonly uncorrected: readonly Coefficient[];
  /** Variance times G/(G - 1); null with one cluster. */
  readonly corrected: readonly Coefficient[] | null;
}

export interface Glm extends Provenance {
  readonly fitted: true;
  /** On the scale of the linear predictor, Wald limits. */
  readonly coefficients: readonly Coefficient[];
  /** Rate or odds ratios. */
  readonly ratios: readonly Coefficient[];
  readonly covariance: readonly (readonly number[])[];
  /** Heteroscedasticity-robust standard errors (HC0). */
  readonly robust: readonly Coefficient[];
  readonly clustered: Clustered | null;
  readonly logLikelihood: number;
  readonly deviance: number;
  /** Deviance of the intercept alone (with the same offset). */
  readonly nullDeviance: number;
  readonly dfResidual: number;
  readonly aic: number;
  readonly pearson: number;
  readonly converged: boolean;
  readonly iterations: number;
}

/** Checked columns of the complete rows. */
export interface Prepared {
  readonly data: GlmData;
  readonly rows: Int32Array;
  readonly cluster: { readonly person: Int32Array; readonly ids: Float64Array } | null;
  readonly level: number;
  readonly leftOut: Provenance['leftOut'];
}

/**
 * Picks the complete rows and checks them.
 * @throws RangeError for counts that are not whole, more events than trials, an
 * exposure that is not above 0, repeated names or collinear columns.
 */
export function prepare(input: GlmInput): Prepared {
  const { level = 0.95, terms } = input;
  requireLevel(level);
  requireRange(new Set(terms.map(({ name }) => name)).size === terms.length, 'Terms of a model need different names.');
  const columns: Record<string, ArrayLike<number>> = { y: input.y };
  for (const { name, values } of terms) columns[`term ${name}`] = values;
  for (const name of ['trials', 'exposure', 'cluster'] as const) if (input[name] !== undefined) columns[name] = input[name];
  const { rows, leftOut } = usableRows(columns);
  const pick = (column: ArrayLike<number> | undefined): Float64Array => (column === undefined ? new Float64Array(rows.length).fill(1) : pickRows(column, rows));
  const y = pick(input.y);
  const m = pick(input.trials);
  const exposure = pick(input.exposure);
  for (let row = 0; row < y.length; row++) {
    // Plain throws: a sentence built for each of a million good rows would cost more than the fit.
    if (!(y[row]! >= 0 && Number.isSafeInteger(y[row]))) throw new RangeError(`A count is a whole number from 0 up, not ${y[row]}.`);
    if (!(exposure[row]! > 0)) throw new RangeError(`An exposure is above 0, not ${exposure[row]}.`);
    if (input.trials === undefined) continue;
    if (!(m[row]! >= y[row]! && Number.isSafeInteger(m[row]) && m[row]! > 0)) throw new RangeError(`There are ${y[row]} events of ${m[row]} trials.`);
  }
  const data = { design: designOf(terms, rows), y, m, offset: exposure.map(Math.log), tally: tallyOf(y, m) };
  return { data, rows, cluster: input.cluster === undefined ? null : peopleOf(input.cluster, rows), level, leftOut };
}

/** Why no finite estimate exists, or null. */
export function refusal(prepared: Prepared, family: Family, fit: IrlsFit): string | null {
  const { design, y, m, offset } = prepared.data;
  if (!Number.isFinite(family.commonEta(y, m, offset))) return 'The outcome is the same in every row: there is nothing to model.';
  if (fit.escape === null) return null;
  return `Separation: ${separating(design, fit.escape).join(', ')} tell${separating(design, fit.escape).length === 1 ? 's' : ''} rows with and without the event apart, so the estimate is infinite.`;
}

/** The named columns along which the likelihood rises for ever. */
function separating(design: Design, escape: Float64Array): string[] {
  const beta = backTransform(design, escape);
  const reach = design.names.map((_, k) => Math.abs(beta[k]!) * spanOf(design, k));
  const longest = Math.max(...reach);
  const names = design.names.filter((name, k) => name !== design.names[0] && reach[k]! > 1e-4 * longest);
  return names.length > 0 ? names : [design.names[0]!];
}

/** How far one unit of a coefficient moves rows apart: the length of its column outside those before it. */
function spanOf(design: Design, k: number): number {
  return 1 / Math.abs(design.backwards[k * design.p + k]!);
}

/** Everything a reader is shown of a fit. `extraParameters` counts what was estimated beside the coefficients. */
export function report(prepared: Prepared, family: Family, fit: IrlsFit, method: string, extraParameters = 0): Glm {
  const { data, cluster, level, leftOut } = prepared;
  const { design, y, m } = data;
  const { n, p, names } = design;
  const beta = backTransform(design, fit.gamma);
  const covariance = backTransformCovariance(design, fit.covariance);
  const withSe = (variance: Float64Array, factor = 1): Coefficient[] =>
    names.map((name, k) => coefficient(name, beta[k]!, Math.sqrt(Math.max(0, factor * variance[k * p + k]!)), level)); // rounding may leave a variance of 0 just below it
  const coefficients = withSe(covariance);
  let deviance = 0;
  let pearson = 0;
  for (let row = 0; row < n; row++) {
    const eta = fit.eta[row]!;
    deviance += family.deviance(y[row]!, eta, m[row]!);
    const residual = y[row]! - family.mean(eta, m[row]!);
    if (residual !== 0) pearson += residual ** 2 / family.variance(eta, m[row]!); // a mean of 0 has no variance either
  }
  return {
    fitted: true,
    method,
    n,
    events: y.reduce((sum, value) => sum + value, 0),
    leftOut,
    coefficients,
    ratios: coefficients.map(exponentiate),
    covariance: Array.from({ length: p }, (_, i) => Array.from(covariance.subarray(i * p, (i + 1) * p))),
    robust: withSe(sandwich(data, fit, family, null)),
    clustered: cluster === null ? null : clusteredOf(prepared, fit, family, withSe),
    logLikelihood: fit.logLikelihood,
    deviance,
    nullDeviance: nullDeviance(data, family),
    dfResidual: n - p,
    aic: -2 * fit.logLikelihood + 2 * (p + extraParameters),
    pearson,
    converged: fit.converged,
    iterations: fit.iterations,
  };
}

function clusteredOf({ data, cluster }: Prepared, fit: IrlsFit, family: Family, withSe: (variance: Float64Array, factor?: number) => Coefficient[]): Clustered {
  const clusters = cluster!.ids.length;
  const variance = sandwich(data, fit, family, cluster!.person);
  return { clusters, uncorrected: withSe(variance), corrected: clusters > 1 ? withSe(variance, clusters / (clusters - 1)) : null };
}

function nullDeviance(data: GlmData, family: Family): number {
  const { design, y, m, offset } = data;
  const common = family.commonEta(y, m, offset);
  let sum = 0;
  if (family.commonIsBest) {
    for (let row = 0; row < y.length; row++) sum += family.deviance(y[row]!, common + offset[row]!, m[row]!);
    return sum;
  }
  const rows = Int32Array.from({ length: design.n }, (_, row) => row);
  const { eta } = irls({ ...data, design: designOf([], rows) }, family, Float64Array.of(common * Math.sqrt(design.n)));
  for (let row = 0; row < y.length; row++) sum += family.deviance(y[row]!, eta[row]!, m[row]!);
  return sum;
}

/** Fit, refuse or report: the way of the models whose family is known beforehand. */
export function fitGlm(input: GlmInput, family: Family, method: string): Glm | Refusal {
  const prepared = prepare(input);
  const { n, p } = prepared.data.design;
  const provenance = { method, n, leftOut: prepared.leftOut };
  if (n < p) return { fitted: false, reason: 'There are fewer rows than coefficients.', ...provenance };
  const fit = irls(prepared.data, family);
  const why = refusal(prepared, family, fit);
  return why === null ? report(prepared, family, fit, method) : { fitted: false, reason: why, ...provenance };
}

import { requireRange, type Provenance } from '../result';
import { factor, inverse, solve } from '../survival/cholesky';
import { coefficient, exponentiate, type Coefficient } from './coefficient';
import { backTransform, backTransformCovariance } from './design';
import type { Refusal } from './fit';
import { prepare, refusal, type GlmInput, type Prepared } from './glm';
import { binomialFamily, poissonFamily, type Family } from './glm-family';
import { irls, predict } from './irls';
import { filled } from './sandwich';

/** A population-averaged model of clustered outcomes. */
export interface Gee extends Provenance {
  readonly fitted: true;
  readonly correlation: 'independence' | 'exchangeable';
  readonly clusters: number;
  /** Robust (sandwich) standard errors, no small-sample factor. */
  readonly coefficients: readonly Coefficient[];
  readonly ratios: readonly Coefficient[];
  /** Common working correlation within clusters; null under independence. */
  readonly alpha: number | null;
  readonly converged: boolean;
  readonly iterations: number;
}

export interface GeeInput extends GlmInput {
  readonly cluster: ArrayLike<number>;
  readonly kind: 'poisson' | 'logistic';
  readonly correlation: 'independence' | 'exchangeable';
}

const MAX_ITERATIONS = 200;
const FAMILIES: Readonly<Record<GeeInput['kind'], Family>> = { poisson: poissonFamily, logistic: binomialFamily };

/**
 * Generalised estimating equations, canonical link, scale 1, robust standard
 * errors. Liang & Zeger 1986, Biometrika 73:13. The exchangeable correlation is
 * the mean product of Pearson residuals over all pairs within clusters, over
 * their mean square under independence; its inverse is (I - c J)/(1 - alpha),
 * so a cluster costs its own size and no matrix.
 *
 * @returns a refusal where the independence model has no finite estimate, or no cluster has two rows for a correlation.
 * @throws RangeError as the regressions.
 */
export function gee(input: GeeInput): Gee | Refusal {
  const family = FAMILIES[input.kind];
  requireRange(input.kind === 'logistic' || input.trials === undefined, 'Trials belong to a logistic model.');
  const prepared = prepare(input);
  const { data, level, leftOut } = prepared;
  const { design } = data;
  const cluster = prepared.cluster!.person;
  const clusters = prepared.cluster!.ids.length;
  const method = `Generalised estimating equations (${family.name}, ${input.correlation} working correlation), robust standard errors`;
  const provenance = { method, n: design.n, leftOut };
  const start = irls(data, family);
  const why = refusal(prepared, family, start) ?? (input.correlation === 'exchangeable' && clusters === design.n ? 'No cluster has two rows: a correlation within clusters does not exist.' : null);
  if (why !== null) return { fitted: false, reason: why, ...provenance };
  const { gamma, alpha, converged, iterations } = iterate(prepared, family, start.gamma, input.correlation === 'exchangeable');
  if (!isCorrelation(alpha, cluster) || !gamma.every(Number.isFinite)) {
    return { fitted: false, reason: 'The working correlation runs out of the range that a correlation within these clusters can have: the equations have no solution.', ...provenance };
  }
  const { bread, scores } = equations(prepared, family, gamma, alpha);
  const { p, names } = design;
  const covariance = backTransformCovariance(design, filled(inverse(factor(bread, p, 0)), scores, p));
  const beta = backTransform(design, gamma);
  const coefficients = names.map((name, k) => coefficient(name, beta[k]!, Math.sqrt(Math.max(0, covariance[k * p + k]!)), level));
  return {
    fitted: true,
    correlation: input.correlation,
    clusters: 1 + cluster.reduce((most, g) => Math.max(most, g), -1),
    coefficients,
    ratios: coefficients.map(exponentiate),
    alpha: input.correlation === 'exchangeable' ? alpha : null,
    converged,
    iterations,
    events: data.y.reduce((sum, value) => sum + value, 0),
    ...provenance,
  };
}

/** Correlations of c rows are possible above -1/(c - 1) only; at that edge and at 1 the working matrix has no inverse. */
function isCorrelation(alpha: number, cluster: Int32Array): boolean {
  const sizes = new Map<number, number>();
  let largest = 0;
  for (const own of cluster) {
    const size = (sizes.get(own) ?? 0) + 1;
    sizes.set(own, size);
    largest = Math.max(largest, size);
  }
  return alpha < 1 && 1 + (largest - 1) * alpha > 0;
}

function iterate(prepared: Prepared, family: Family, start: Float64Array, exchangeable: boolean) {
  let gamma = start;
  let alpha = 0;
  const { square } = residualMoments(prepared, family, start);
  for (let iterations = 1; iterations <= MAX_ITERATIONS; iterations++) {
    const before = alpha;
    if (exchangeable) alpha = residualMoments(prepared, family, gamma).product / square;
    const { bread, scores } = equations(prepared, family, gamma, alpha);
    const p = gamma.length;
    const sum = new Float64Array(p);
    scores.forEach((value, at) => { sum[at % p]! += value; });
    const step = solve(factor(bread, p, 0), sum);
    gamma = gamma.map((value, j) => value + step[j]!);
    const still = step.every((s, j) => Math.abs(s) <= 1e-12 * (1 + Math.abs(gamma[j]!))) && Math.abs(alpha - before) <= 1e-12;
    if (still) return { gamma, alpha, converged: true, iterations };
  }
  return { gamma, alpha, converged: false, iterations: MAX_ITERATIONS };
}

/** Mean square of the Pearson residuals, and mean product over all pairs of one cluster. */
function residualMoments({ data, cluster }: Prepared, family: Family, gamma: Float64Array): { square: number; product: number } {
  const { design, y, m, offset } = data;
  const eta = predict(design, gamma, offset);
  const groups = cluster!.ids.length;
  const sums = new Float64Array(groups);
  const squares = new Float64Array(groups);
  const sizes = new Float64Array(groups);
  for (let row = 0; row < design.n; row++) {
    const g = cluster!.person[row]!;
    const r = (y[row]! - family.mean(eta[row]!, m[row]!)) / Math.sqrt(family.variance(eta[row]!, m[row]!));
    sums[g]! += r;
    squares[g]! += r * r;
    sizes[g]! += 1;
  }
  let products = 0;
  let pairs = 0;
  for (let g = 0; g < groups; g++) {
    products += (sums[g]! ** 2 - squares[g]!) / 2;
    pairs += (sizes[g]! * (sizes[g]! - 1)) / 2;
  }
  return { square: squares.reduce((sum, value) => sum + value, 0) / design.n, product: products / pairs };
}

/** Sum of D'V^-1 D, and D'V^-1 (y - mu) of each cluster, on the basis. */
function equations({ data, cluster }: Prepared, family: Family, gamma: Float64Array, alpha: number) {
  const { design, y, m, offset } = data;
  const { n, p, basis } = design;
  const eta = predict(design, gamma, offset);
  const groups = cluster!.ids.length;
  const rootSums = new Float64Array(groups * p);
  const residualSums = new Float64Array(groups);
  const sizes = new Float64Array(groups);
  const scores = new Float64Array(groups * p);
  const bread = new Float64Array(p * p);
  for (let row = 0; row < n; row++) {
    const g = cluster!.person[row]!;
    const root = Math.sqrt(family.variance(eta[row]!, m[row]!));
    const r = (y[row]! - family.mean(eta[row]!, m[row]!)) / root;
    sizes[g]! += 1;
    residualSums[g]! += r;
    for (let j = 0; j < p; j++) {
      const scaled = root * basis[j]![row]!;
      rootSums[g * p + j]! += scaled;
      scores[g * p + j]! += scaled * r;
      for (let k = 0; k < p; k++) bread[j * p + k]! += scaled * root * basis[k]![row]!;
    }
  }
  for (let g = 0; g < groups; g++) {
    const c = alpha / (1 + (sizes[g]! - 1) * alpha);
    for (let j = 0; j < p; j++) {
      scores[g * p + j]! -= c * rootSums[g * p + j]! * residualSums[g]!;
      for (let k = 0; k < p; k++) bread[j * p + k]! -= c * rootSums[g * p + j]! * rootSums[g * p + k]!;
    }
  }
  return { bread: bread.map((value) => value / (1 - alpha)), scores: scores.map((value) => value / (1 - alpha)) };
}

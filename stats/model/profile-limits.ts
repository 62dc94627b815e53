import { normal } from '../distributions';
import { pickRows } from '../missing/usable-rows';
import { requireRange, type Interval } from '../result';
import { findRoot } from '../special/find-root';
import { backTransform, backTransformCovariance, designOf, type Term } from './design';
import { prepare, type GlmInput } from './glm';
import { binomialFamily, poissonFamily, type Family } from './glm-family';
import { irls, type GlmData } from './irls';
import { fourPointSpline } from './spline';

const FAMILIES: Readonly<Record<'poisson' | 'logistic', Family>> = { poisson: poissonFamily, logistic: binomialFamily };
/** Doublings of the first bracket before a limit counts as not reached. */
const REACH = 12;

export interface ProfileOptions {
  readonly kind: 'poisson' | 'logistic';
  /**
   * Read the limits off a spline through a dozen points of the profile
   * (Venables & Ripley 2002, sec. 7.2), as widely used programs do: agrees
   * with their print, and is off by up to 3e-4 of a limit.
   */
  readonly interpolated?: boolean;
}

/** One coefficient's profile: its estimate, Wald standard error, and the signed root of the deviance lost at a value. */
interface CoefficientProfile {
  readonly estimate: number;
  readonly se: number;
  signedRoot(value: number): number;
}

/**
 * Profile-likelihood limits of each coefficient: where twice the log likelihood
 * lost, the other coefficients refitted, equals the chi-square quantile on 1 df.
 * Venzon & Moolgavkar 1988, Appl Stat 37:87. On the scale of the linear
 * predictor; a limit that the likelihood never reaches is null.
 *
 * @throws RangeError as the regressions, and where the model itself has no finite estimate.
 */
export function profileLimits(input: GlmInput, { kind, interpolated = false }: ProfileOptions): (Interval & { readonly name: string })[] {
  const { data, rows, level } = prepare(input);
  const z = normal.isf((1 - level) / 2);
  const read = interpolated ? splineLimit : rootLimit;
  return profilesOf(input, data, rows, FAMILIES[kind]).map((profile, k) => {
    const lower = read(profile, -1, z);
    const upper = read(profile, 1, z);
    const open = lower === null || upper === null ? { reason: 'The likelihood does not fall far enough for a limit.' } : {};
    return { name: data.design.names[k]!, estimate: profile.estimate, lower, upper, level, ...open };
  });
}

function profilesOf(input: GlmInput, data: GlmData, rows: Int32Array, family: Family): CoefficientProfile[] {
  const { design, offset } = data;
  const full = irls(data, family);
  requireRange(full.escape === null && full.converged, 'Profile limits need a model with a finite estimate.');
  const { names, p, n } = design;
  const beta = backTransform(design, full.gamma);
  const covariance = backTransformCovariance(design, full.covariance);
  const constant: Term = { name: names[0]!, values: new Float64Array(input.y.length).fill(1) };
  const terms = [constant, ...input.terms];
  return names.map((_, k) => {
    const others = designOf(terms.filter((__, j) => j !== k), rows, false);
    const column = pickRows(terms[k]!.values, rows);
    let warm: Float64Array | undefined;
    const signedRoot = (value: number): number => {
      const held = Float64Array.from({ length: n }, (__, row) => offset[row]! + value * column[row]!);
      const fit = irls({ ...data, design: others, offset: held }, family, warm);
      warm = fit.converged ? fit.gamma : undefined;
      return Math.sign(value - beta[k]!) * Math.sqrt(Math.max(0, 2 * (full.logLikelihood - fit.logLikelihood)));
    };
    return { estimate: beta[k]!, se: Math.sqrt(covariance[k * p + k]!), signedRoot };
  });
}

/** The limit itself, to the last digits. */
function rootLimit({ estimate, se, signedRoot }: CoefficientProfile, side: -1 | 1, z: number): number | null {
  const gap = (value: number): number => Math.abs(signedRoot(value)) - z;
  let reach = 0.5 * z * se;
  for (let doubling = 0; doubling < REACH; doubling++, reach *= 2) {
    if (gap(estimate + side * reach) > 0) return findRoot(gap, estimate, estimate + side * reach, 1e-12 * se);
  }
  return null;
}

/** Steps of a fifth of a deviate well beyond z until that is passed; then a cubic spline, read at three times as many points. */
function splineLimit({ estimate, se, signedRoot }: CoefficientProfile, side: -1 | 1, z: number): number | null {
  const far = normal.isf(normal.sf(z) / 4);
  const points: [number, number][] = [[estimate, 0]];
  for (const way of [-1, 1]) {
    for (let step = 1, root = 0; step < 10 && Math.abs(root) < far; step++) {
      const value = estimate + (way * step * far * se) / 5;
      root = signedRoot(value);
      points.push([value, root]);
    }
  }
  points.sort(([, a], [, b]) => a - b);
  const curve = fourPointSpline(points);
  const first = points[0]![0];
  const span = points.at(-1)![0] - first;
  const read = Array.from({ length: 3 * points.length }, (_, i) => first + (span * i) / (3 * points.length - 1)).map((x) => [x, curve(x)] as const);
  for (let i = 1; i < read.length; i++) {
    const [[x0, y0], [x1, y1]] = [read[i - 1]!, read[i]!];
    if (y0 <= side * z && side * z <= y1) return x0 + ((side * z - y0) / (y1 - y0)) * (x1 - x0);
  }
  return null;
}

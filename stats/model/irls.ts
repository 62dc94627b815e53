import { factor, inverse, solve } from '../survival/cholesky';
import type { Design } from './design';
import type { Family } from './glm-family';

/** Columns of one fit: y events of m trials, linear predictor = design x gamma + offset. */
export interface GlmData {
  readonly design: Design;
  readonly y: Float64Array;
  readonly m: Float64Array;
  readonly offset: Float64Array;
}

export interface IrlsFit {
  readonly gamma: Float64Array;
  readonly eta: Float64Array;
  readonly logLikelihood: number;
  /** Inverse information on the basis as the last weighted least-squares step had it, row-major. */
  readonly covariance: Float64Array;
  readonly converged: boolean;
  readonly iterations: number;
  /** A direction on the basis along which the likelihood rises for ever; null where the estimate is finite. */
  readonly escape: Float64Array | null;
}

const MAX_ITERATIONS = 100;
const STEP = 1e-9;
/** Change of the deviance that is rounding. */
const FLAT = 1e-15;
/** From here on a lasting step is looked at as a way to infinity. */
const SUSPECT_AFTER = 6;
/** Share of the longest move by which a row may move the wrong way and still count as standing still. */
const STILL = 1e-6;

/**
 * Maximum likelihood by Fisher scoring with step halving, on an orthonormal
 * basis (McCullagh & Nelder 1989, ch. 2). Separation (Albert & Anderson 1984,
 * Biometrika 71:1) is proven and not guessed from large coefficients: when the
 * steps do not die down, the last step is a certificate if along it every row
 * gains or stands still.
 */
export function irls(data: GlmData, family: Family, start?: Float64Array): IrlsFit {
  const { design, y, m, offset } = data;
  const { n, p, basis } = design;
  let gamma = start?.slice() ?? firstStep(data, family);
  let eta = predict(design, gamma, offset);
  // The deviance itself, up to rounding: loss less that of the rows' own means.
  const own = total(data, eta, family.loss) - total(data, eta, family.deviance) / 2;
  let deviance = 2 * (total(data, eta, family.loss) - own);
  let factored = factor(new Float64Array(p * p), p);
  let converged = false;
  let iterations = 0;
  const answer = (escape: Float64Array | null): IrlsFit => {
    return { gamma, eta, logLikelihood: total(data, eta, family.logLikelihood), covariance: inverse(factored), converged, iterations, escape };
  };
  while (!converged && iterations < MAX_ITERATIONS) {
    iterations++;
    const { information, score } = informationOf(data, eta, family);
    factored = factor(information, p, 1e-14);
    if (factored.rank < p) break;
    let step = solve(factored, score);
    const move = combine(basis, step, n);
    if (iterations > SUSPECT_AFTER && isEscape(move, y, m, family)) return answer(step);
    const before = deviance;
    const small = longest(move) < STEP;
    for (let halving = 0; halving < 40; halving++) {
      const tried = gamma.map((value, j) => value + step[j]!);
      const there = predict(design, tried, offset);
      const value = 2 * (total(data, there, family.loss) - own);
      // Near the optimum the deviance is flat to rounding: a full step is then always taken.
      if (value <= before + 1e-10 * Math.abs(before) || (small && Number.isFinite(value))) {
        gamma = tried;
        eta = there;
        deviance = value;
        break;
      }
      step = step.map((s) => s / 2);
    }
    converged = small || Math.abs(deviance - before) < FLAT * (Math.abs(deviance) + 0.1);
  }
  if (converged) {
    // The deviance is flat before the last digits of the coefficients are in: one more step with the curvature at hand.
    const { score } = informationOf(data, eta, family);
    const step = solve(factored, score);
    gamma = gamma.map((value, j) => value + step[j]!);
    eta = predict(design, gamma, offset);
  }
  return answer(null);
}

/** Q' W Q and the score, on the basis. */
function informationOf({ design, y, m }: GlmData, eta: Float64Array, family: Family): { information: Float64Array; score: Float64Array } {
  const { n, p, basis } = design;
  const weights = new Float64Array(n);
  const slopes = new Float64Array(n);
  for (let row = 0; row < n; row++) {
    weights[row] = family.weight(eta[row]!, m[row]!);
    slopes[row] = family.score(y[row]!, eta[row]!, m[row]!);
  }
  const information = new Float64Array(p * p);
  const score = new Float64Array(p);
  for (let j = 0; j < p; j++) {
    const q = basis[j]!;
    let sum = 0;
    for (let row = 0; row < n; row++) sum += q[row]! * slopes[row]!;
    score[j] = sum;
    for (let k = 0; k <= j; k++) {
      const r = basis[k]!;
      let cross = 0;
      for (let row = 0; row < n; row++) cross += q[row]! * weights[row]! * r[row]!;
      information[j * p + k] = cross;
      information[k * p + j] = cross;
    }
  }
  return { information, score };
}

/**
 * Weighted least squares from each row's own count, the classic first step;
 * the common mean where that lands outside the numbers.
 */
function firstStep(data: GlmData, family: Family): Float64Array {
  const { design, y, m, offset } = data;
  const eta = y.map((count, row) => family.ownEta(count, m[row]!));
  const { information, score } = informationOf(data, eta, family);
  // Q'W z with working response z = eta - offset + score/weight.
  design.basis.forEach((q, j) => {
    for (let row = 0; row < design.n; row++) score[j]! += q[row]! * family.weight(eta[row]!, m[row]!) * (eta[row]! - offset[row]!);
  });
  const gamma = solve(factor(information, design.p, 1e-14), score);
  if (Number.isFinite(total(data, predict(design, gamma, offset), family.deviance))) return gamma;
  const common = family.commonEta(y, m, offset);
  return Float64Array.from(design.basis, (q) => (Number.isFinite(common) ? common : 0) * q.reduce((sum, value) => sum + value, 0));
}

export function predict({ basis, n }: Design, gamma: Float64Array, offset: Float64Array): Float64Array {
  const eta = combine(basis, gamma, n);
  for (let row = 0; row < n; row++) eta[row]! += offset[row]!;
  return eta;
}

function combine(basis: readonly Float64Array[], gamma: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n);
  basis.forEach((q, j) => {
    const share = gamma[j]!;
    for (let row = 0; row < n; row++) out[row]! += share * q[row]!;
  });
  return out;
}

function total({ y, m }: GlmData, eta: Float64Array, of: (y: number, eta: number, m: number) => number): number {
  let sum = 0;
  for (let row = 0; row < y.length; row++) sum += of(y[row]!, eta[row]!, m[row]!);
  return sum;
}

function longest(move: Float64Array): number {
  return move.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
}

/** Does every row gain or stand still along this move, and does one of them gain? */
function isEscape(move: Float64Array, y: Float64Array, m: Float64Array, family: Family): boolean {
  const most = longest(move);
  if (most < 0.1) return false;
  for (let row = 0; row < move.length; row++) {
    const way = family.escape(y[row]!, m[row]!);
    const wrong = way === 0 ? Math.abs(move[row]!) : -way * move[row]!;
    if (wrong > STILL * most) return false;
  }
  return true;
}

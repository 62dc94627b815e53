import { factor, inverse, solve } from '../survival/cholesky';
import { dot, type Design } from './design';
import type { Family } from './glm-family';
import { sumOver, type Tally } from './tally';

/** Columns of one fit: y events of m trials, linear predictor = design x gamma + offset. */
export interface GlmData {
  readonly design: Design;
  readonly y: Float64Array;
  readonly m: Float64Array;
  readonly offset: Float64Array;
  readonly tally: Tally;
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
  // Columns made once: a fit of a million rows allocates nothing inside its loop.
  const local: Local = { weight: new Float64Array(n), score: new Float64Array(n) };
  const move = new Float64Array(n);
  let gamma = start?.slice() ?? firstStep(data, family, local, move);
  let eta: Float64Array = predict(design, gamma, offset);
  let tried: Float64Array = new Float64Array(n);
  const least = sumOver(data.tally, family.leastLoss);
  const devianceAt = (at: Float64Array): number => 2 * (family.sweep(data, at, local.weight, local.score) - least);
  let deviance = devianceAt(eta);
  let factored = factor(new Float64Array(p * p), p);
  let converged = false;
  let iterations = 0;
  const answer = (escape: Float64Array | null): IrlsFit => {
    const logLikelihood = sumOver(data.tally, family.constant) - least - devianceAt(eta) / 2;
    return { gamma, eta, logLikelihood, covariance: inverse(factored), converged, iterations, escape };
  };
  while (!converged && iterations < MAX_ITERATIONS) {
    iterations++;
    const { information, score } = informationOf(design, local, tried);
    factored = factor(information, p, 1e-14);
    if (factored.rank < p) break;
    const step = solve(factored, score);
    combine(basis, step, move);
    if (iterations > SUSPECT_AFTER && isEscape(move, y, m, family)) return answer(step);
    const before = deviance;
    const small = longest(move) < STEP;
    let taken = false;
    for (let share = 1, halving = 0; halving < 40 && !taken; halving++, share /= 2) {
      for (let row = 0; row < n; row++) tried[row] = eta[row]! + share * move[row]!;
      const value = devianceAt(tried);
      // Near the optimum the deviance is flat to rounding: a full step is then always taken.
      if (!(value <= before + 1e-10 * Math.abs(before) || (small && Number.isFinite(value)))) continue;
      taken = true;
      gamma = gamma.map((old, j) => old + share * step[j]!);
      [eta, tried] = [tried, eta];
      deviance = value;
    }
    if (!taken) devianceAt(eta); // weights and scores of the last trial are not those of where we stand
    converged = small || Math.abs(deviance - before) < FLAT * (Math.abs(deviance) + 0.1);
  }
  if (converged) {
    // The deviance is flat before the last digits of the coefficients are in: one more step with the curvature at hand.
    const step = solve(factored, scoreOf(design, local.score));
    gamma = gamma.map((value, j) => value + step[j]!);
    eta = predict(design, gamma, offset);
  }
  return answer(null);
}

/** Each row's weight and score at the linear predictor last swept. */
interface Local {
  readonly weight: Float64Array;
  readonly score: Float64Array;
}

/** Q' W Q and the score, on the basis; `room` is overwritten. */
function informationOf({ n, p, basis }: Design, { weight, score }: Local, room: Float64Array): { information: Float64Array; score: Float64Array } {
  const information = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    const q = basis[j]!;
    for (let row = 0; row < n; row++) room[row] = q[row]! * weight[row]!;
    for (let k = 0; k <= j; k++) information[j * p + k] = information[k * p + j] = dot(room, basis[k]!);
  }
  return { information, score: scoreOf({ basis }, score) };
}

function scoreOf({ basis }: Pick<Design, 'basis'>, score: Float64Array): Float64Array {
  return Float64Array.from(basis, (q) => dot(q, score));
}

/**
 * Weighted least squares from each row's own count, the classic first step;
 * the common mean where that lands outside the numbers.
 */
function firstStep(data: GlmData, family: Family, local: Local, room: Float64Array): Float64Array {
  const { design, y, m, offset } = data;
  const eta = y.map((count, row) => family.ownEta(count, m[row]!));
  family.sweep(data, eta, local.weight, local.score);
  const { information, score } = informationOf(design, local, room);
  // Q'W z with working response z = eta - offset + score/weight.
  for (let row = 0; row < design.n; row++) room[row] = local.weight[row]! * (eta[row]! - offset[row]!);
  design.basis.forEach((q, j) => (score[j]! += dot(q, room)));
  const gamma = solve(factor(information, design.p, 1e-14), score);
  if (Number.isFinite(family.sweep(data, predict(design, gamma, offset), local.weight, local.score))) return gamma;
  const common = family.commonEta(y, m, offset);
  return Float64Array.from(design.basis, (q) => (Number.isFinite(common) ? common : 0) * q.reduce((sum, value) => sum + value, 0));
}

export function predict({ basis, n }: Design, gamma: Float64Array, offset: Float64Array): Float64Array {
  const eta = new Float64Array(n);
  combine(basis, gamma, eta);
  for (let row = 0; row < n; row++) eta[row]! += offset[row]!;
  return eta;
}

/** Basis x gamma, into a column. */
function combine(basis: readonly Float64Array[], gamma: Float64Array, into: Float64Array): void {
  into.fill(0);
  basis.forEach((q, j) => {
    const share = gamma[j]!;
    for (let row = 0; row < into.length; row++) into[row]! += share * q[row]!;
  });
}

function longest(move: Float64Array): number {
  let most = 0;
  for (let row = 0; row < move.length; row++) most = Math.max(most, Math.abs(move[row]!));
  return most;
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

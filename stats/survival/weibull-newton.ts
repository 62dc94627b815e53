import { factor, solve } from './cholesky';
import { exactRow, intervalRow, newRowDerivatives } from './weibull-likelihood';

export interface WeibullInput {
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly weight?: Float64Array | undefined;
  readonly x: readonly Float64Array[];
  /** True for the exponential: sigma stays 1. */
  readonly fixedSigma: boolean;
}

export interface WeibullFit {
  /** Intercept, coefficients, and log sigma unless it is fixed. */
  readonly parameters: Float64Array;
  readonly logLikelihood: number;
  /** Minus the second derivatives, row-major. */
  readonly information: Float64Array;
  readonly converged: boolean;
  readonly reason: string;
}

/** Beyond this a coefficient (of a scaled covariate, on the log-time scale) runs to infinity. */
const RUNAWAY = 15;
/** A step of this size when the likelihood has stopped rising means that there is no maximum. */
const RESTLESS = 1e-3;

const ALIASED = 'a covariate is constant or a combination of others';
const SEPARATED = 'the likelihood keeps rising as a coefficient grows: a covariate separates those with onset';

/**
 * Newton's method with halving, on covariates centred and scaled inside (a year
 * of 1972 is no obstacle) and turned back at the end.
 */
export function fitWeibull(input: WeibullInput): WeibullFit {
  const p = input.x.length;
  const scales = input.x.map(centreAndSpread);
  const scaled = input.x.map((column, j) => column.map((value) => (value - scales[j]!.centre) / scales[j]!.spread));
  const size = p + (input.fixedSigma ? 1 : 2);
  const state = new Likelihood({ ...input, x: scaled }, size);
  let parameters = start(input, size);
  let value = state.evaluate(parameters);
  const done = (reason: string) => unscaled(state, parameters, value, scales, reason);
  if (isAliased(scaled, input.left.length)) return done(ALIASED);
  for (let iteration = 0; iteration < 100; iteration++) {
    const step = ascent(state, size);
    const promised = step.reduce((sum, s, j) => sum + s * state.score[j]!, 0);
    const next = halvedStep(state, parameters, step, value);
    if (next !== undefined) ({ parameters, value } = next);
    else value = state.evaluate(parameters);
    const running = parameters.some((b, j) => j > 0 && j <= p && (Math.abs(b) > RUNAWAY || (promised < 1e-9 && Math.abs(step[j]!) > RESTLESS)));
    if (running) return done(SEPARATED);
    if (promised < 1e-18 * (1 + Math.abs(value))) return done('');
    if (next === undefined) return done(promised < 1e-9 ? '' : 'no maximum was found');
  }
  return done('no maximum was found');
}

function halvedStep(state: Likelihood, parameters: Float64Array, step: Float64Array, value: number): { parameters: Float64Array; value: number } | undefined {
  for (let share = 1; share > 1e-10; share /= 2) {
    const trial = parameters.map((b, j) => b + share * step[j]!);
    const reached = state.evaluate(trial);
    if (reached >= value - 1e-13 * Math.abs(value)) return { parameters: trial, value: reached };
  }
  return undefined;
}

/** True when the scaled covariates (already centred) do not span as many directions as there are columns. */
function isAliased(scaled: readonly Float64Array[], n: number): boolean {
  const p = scaled.length;
  const products = new Float64Array(p * p);
  scaled.forEach((a, j) => scaled.forEach((b, l) => a.forEach((value, i) => (products[j * p + l]! += (value * b[i]!) / n))));
  return factor(products, p).rank < p;
}

class Likelihood {
  readonly score: Float64Array;
  readonly information: Float64Array;
  private readonly row = newRowDerivatives();

  constructor(
    private readonly input: WeibullInput,
    private readonly size: number,
  ) {
    this.score = new Float64Array(size);
    this.information = new Float64Array(size * size);
  }

  evaluate(parameters: Float64Array): number {
    const { left, right, weight, x, fixedSigma } = this.input;
    const { score, information, size, row } = this;
    const p = x.length;
    const sigma = fixedSigma ? 1 : Math.exp(parameters[p + 1]!);
    const design = new Float64Array(p + 1).fill(1);
    let value = 0;
    score.fill(0);
    information.fill(0);
    for (let i = 0; i < left.length; i++) {
      let eta = parameters[0]!;
      for (let j = 0; j < p; j++) {
        design[j + 1] = x[j]![i]!;
        eta += parameters[j + 1]! * design[j + 1]!;
      }
      if (left[i] === right[i]) exactRow(row, Math.log(left[i]!), eta, sigma);
      else intervalRow(row, left[i]!, right[i]!, eta, sigma);
      const w = weight === undefined ? 1 : weight[i]!;
      value += w * row.value;
      for (let a = 0; a <= p; a++) {
        score[a]! += w * row.eta * design[a]!;
        for (let b = 0; b <= a; b++) information[a * size + b]! -= w * row.etaEta * design[a]! * design[b]!;
        if (!fixedSigma) information[(p + 1) * size + a]! -= w * row.etaLogSigma * design[a]!;
      }
      if (fixedSigma) continue;
      score[p + 1]! += w * row.logSigma;
      information[(p + 1) * size + p + 1]! -= w * row.logSigmaLogSigma;
    }
    for (let a = 0; a < size; a++) for (let b = 0; b < a; b++) information[b * size + a] = information[a * size + b]!;
    return Number.isFinite(value) ? value : -Infinity;
  }
}

/** Newton's step; far from the maximum the information may not be positive, and its diagonal is raised until it is. */
function ascent({ information, score }: Likelihood, size: number): Float64Array {
  const raised = information.slice();
  for (let ridge = 0; ridge < 40; ridge++) {
    const factored = factor(raised, size);
    if (factored.rank === size || ridge === 39) return solve(factored, score);
    for (let j = 0; j < size; j++) raised[j * size + j]! += Math.max(1e-6, Math.abs(information[j * size + j]!)) * 10 ** (ridge / 3 - 6);
  }
  return new Float64Array(size);
}

/** Moments of the log of the interval's middle: a smallest extreme value has mean -0.5772 and sd pi / sqrt 6. */
function start({ left, right, fixedSigma }: WeibullInput, size: number): Float64Array {
  const middles = Float64Array.from(left, (l, i) => Math.log(right[i]! < Infinity ? (l + right[i]!) / 2 : l));
  const { centre, spread } = centreAndSpread(middles);
  const out = new Float64Array(size);
  const sigma = fixedSigma ? 1 : Math.max(0.1, (spread * Math.sqrt(6)) / Math.PI);
  out[0] = centre + 0.5772 * sigma;
  if (!fixedSigma) out[size - 1] = Math.log(sigma);
  return out;
}

function centreAndSpread(column: Float64Array): { centre: number; spread: number } {
  const centre = column.reduce((sum, value) => sum + value, 0) / column.length;
  const spread = Math.sqrt(column.reduce((sum, value) => sum + (value - centre) ** 2, 0) / column.length);
  return { centre, spread: spread > 1e-12 * Math.abs(centre) ? spread : 1 };
}

/** Back to the caller's covariates: a linear change of parameters, so information' = J' information J. */
function unscaled(state: Likelihood, parameters: Float64Array, value: number, scales: readonly { centre: number; spread: number }[], reason: string): WeibullFit {
  const size = parameters.length;
  const out = parameters.slice();
  const jacobian = new Float64Array(size * size); // d scaled / d caller's
  for (let j = 0; j < size; j++) jacobian[j * size + j] = 1;
  scales.forEach(({ centre, spread }, j) => {
    out[j + 1]! /= spread;
    out[0]! -= out[j + 1]! * centre;
    jacobian[(j + 1) * size + j + 1] = spread;
    jacobian[j + 1] = centre;
  });
  return { parameters: out, logLikelihood: value, information: sandwich(jacobian, state.information, size), converged: reason === '', reason };
}

function sandwich(jacobian: Float64Array, middle: Float64Array, size: number): Float64Array {
  const out = new Float64Array(size * size);
  for (let a = 0; a < size; a++) {
    for (let b = 0; b < size; b++) {
      let sum = 0;
      for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) sum += jacobian[i * size + a]! * middle[i * size + j]! * jacobian[j * size + b]!;
      out[a * size + b] = sum;
    }
  }
  return out;
}

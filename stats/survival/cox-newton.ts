import { factor, inverse, solve, type Factor } from './cholesky';
import type { CoxDesign } from './cox-design';
import { addInformation, addScore, CoxSweep, fullMatrix, type Ties } from './cox-sweep';

/** Why a coefficient has no estimate. */
export type Missing = 'aliased' | 'monotone';

/** The fit on the scaled covariates. */
export interface ScaledFit {
  readonly beta: Float64Array;
  /** Inverse information; zero for coefficients without an estimate. */
  readonly covariance: Float64Array;
  readonly information: Float64Array;
  readonly missing: readonly (Missing | undefined)[];
  readonly logLikelihoodNull: number;
  readonly logLikelihood: number;
  /** Score test at 0. */
  readonly scoreStatistic: number;
  readonly rank: number;
  readonly iterations: number;
  readonly converged: boolean;
}

/** A coefficient of this many units per standard deviation is on its way to infinity. */
const RUNAWAY = 15;
/** A step of this size when the likelihood has stopped rising means that there is no maximum. */
const RESTLESS = 1e-3;

/** Share of its information at 0 below which a coefficient has none left. */
const DRAINED = 1e-10;

export interface Look {
  readonly value: number;
  readonly score: Float64Array;
  readonly information: Float64Array;
}

/**
 * Newton's method with step halving from 0. It ends when a step promises less
 * than 1e-11 of log-likelihood. A covariate that is constant or a combination of
 * others in every risk set is stepped over; one whose coefficient keeps growing
 * while the likelihood stands still is flagged.
 */
export function fitCox(design: CoxDesign, ties: Ties): ScaledFit {
  const { p } = design;
  const sweep = new CoxSweep(design, ties);
  let look = lookAt(sweep, new Float64Array(p));
  const start = look;
  const free = factor(steady(look.information, p, design.events), p);
  const missing: (Missing | undefined)[] = Array.from(free.used, (used) => (used ? undefined : 'aliased'));
  const first = solve(free, look.score);
  let beta = new Float64Array(p);
  let iterations = 0;
  let converged = free.rank === 0;
  while (!converged && iterations < 50) {
    iterations++;
    const step = iterations === 1 ? first : solve(restricted(look.information, p, missing), look.score);
    const promised = dot(step, look.score);
    const next = halvedStep(sweep, beta, step, look);
    if (next === undefined) {
      converged = promised < 1e-8;
      if (converged) markRunaways(missing, beta, step);
      break;
    }
    ({ beta, look } = next);
    if (promised < 1e-11) {
      markRunaways(missing, beta, step);
      converged = true;
    }
  }
  if (!converged) markRunaways(missing, beta, new Float64Array(p));
  markDrained(missing, look.information, start.information, p);
  return {
    beta,
    covariance: inverse(restricted(look.information, p, missing)),
    information: look.information,
    missing,
    logLikelihoodNull: start.value,
    logLikelihood: look.value,
    scoreStatistic: dot(first, start.score),
    rank: free.rank,
    iterations,
    converged,
  };
}

export function lookAt(sweep: CoxSweep, beta: Float64Array): Look {
  const { p } = sweep.design;
  const score = new Float64Array(p);
  const triangle = new Float64Array((p * (p + 1)) / 2);
  let value = 0;
  sweep.run(beta, (_group, sums, ties) => {
    value += sums.etaSum - ties.log;
    addScore(score, sums, ties);
    addInformation(triangle, sums, ties);
  });
  return { value, score, information: fullMatrix(triangle, p) };
}

function halvedStep(sweep: CoxSweep, beta: Float64Array, step: Float64Array, look: Look): { beta: Float64Array<ArrayBuffer>; look: Look } | undefined {
  for (let share = 1; share > 1e-4; share /= 2) {
    const trial = beta.map((b, j) => b + share * step[j]!);
    const next = lookAt(sweep, trial);
    // Above 0 no partial likelihood gets: there a whole risk set has lost its weight to one outside it.
    const isPossible = next.value <= 1e-6 * (1 + Math.abs(look.value));
    if (isPossible && next.value >= look.value - 1e-12 * Math.abs(look.value)) return { beta: trial, look: next };
  }
  return undefined;
}

/** A variance that is rounding only (a covariate constant within every risk set) counts as none. */
export function steady(information: Float64Array, p: number, events: number): Float64Array {
  const out = information.slice();
  for (let j = 0; j < p; j++) if (out[j * p + j]! < 1e-10 * events) out[j * p + j] = 0;
  return out;
}

/** Factor of the information of the coefficients that have an estimate. */
export function restricted(information: Float64Array, p: number, missing: readonly (Missing | undefined)[]): Factor {
  const out = information.slice();
  missing.forEach((why, j) => {
    if (why === undefined) return;
    for (let l = 0; l < p; l++) out[j * p + l] = out[l * p + j] = 0;
  });
  return factor(out, p, 0);
}

function markRunaways(missing: (Missing | undefined)[], beta: Float64Array, step: Float64Array): void {
  for (let j = 0; j < beta.length; j++) {
    if (missing[j] === undefined && (Math.abs(beta[j]!) > RUNAWAY || Math.abs(step[j]!) > RESTLESS)) missing[j] = 'monotone';
  }
}

/** Where one coefficient has run away, another whose information went with it has no estimate either. */
function markDrained(missing: (Missing | undefined)[], now: Float64Array, first: Float64Array, p: number): void {
  if (!missing.includes('monotone')) return;
  for (let j = 0; j < p; j++) if (missing[j] === undefined && !(now[j * p + j]! > DRAINED * first[j * p + j]!)) missing[j] = 'monotone';
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

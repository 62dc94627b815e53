import { factor, inverse, type Factor } from './cholesky';
import type { CoxDesign } from './cox-design';
import { dot, lookAt, restricted, steady, type Look, type Missing } from './cox-newton';
import { addInformation, CoxSweep, fullMatrix, type RiskSums, type Ties, type TieSums } from './cox-sweep';

/** A point of the penalised log-likelihood log L + 1/2 log det I, on the scaled covariates. */
export interface Point {
  readonly beta: Float64Array;
  readonly value: number;
  /** Inverse information of all coefficients in play. */
  readonly covariance: Float64Array;
  /** Gradient of `value` (Firth's modified score). */
  readonly score: Float64Array;
  readonly rounds: number;
  readonly converged: boolean;
}

/** A step of this many standard errors, squared, is none; on a profile only the value is wanted, and that errs by half as much. */
const STILL = 1e-24;
const STILL_ON_PROFILE = 1e-14;
/** What may be left at the end for it to count as the maximum. */
const SETTLED = 1e-12;
/** Where a step by the information promises less than this, the true curvature is learnt. */
const CLOSE = 0.1;
const ROUNDS = 500;

/**
 * The penalised likelihood of a data set and its maximum, with or without one
 * coefficient held. The penalty is the determinant over all coefficients
 * either way, as Heinze & Schemper (2001) profile it.
 */
export class FirthLikelihood {
  readonly missing: readonly (Missing | undefined)[];
  /** Columns that vary in some risk set and are no combination of others. */
  readonly rank: number;
  readonly atNull: number;
  private readonly sweep: CoxSweep;
  /** The same rows with one more column, which takes x'Vx; its coefficient is 0. */
  private readonly wide: CoxSweep;

  constructor(
    readonly design: CoxDesign,
    private readonly ties: Ties,
  ) {
    const { n, p, x, events } = design;
    this.sweep = new CoxSweep(design, ties);
    const wide = new Float64Array(n * (p + 1));
    for (let i = 0; i < n; i++) wide.set(x.subarray(i * p, (i + 1) * p), i * (p + 1));
    this.wide = new CoxSweep({ ...design, p: p + 1, x: wide }, ties);
    const start = lookAt(this.sweep, new Float64Array(p));
    const free = factor(steady(start.information, p, events), p);
    this.missing = Array.from(free.used, (used) => (used ? undefined : 'aliased'));
    this.rank = free.rank;
    this.atNull = this.penalised(start).value;
  }

  /** @param held a coefficient that stays where `from` has it */
  maximise(from: Float64Array, held?: number): Point {
    const { p } = this.design;
    const out = this.missing.map((why, j) => (j === held ? 'aliased' : why));
    let at = { beta: from, ...this.look(from) };
    const still = held === undefined ? STILL : STILL_ON_PROFILE;
    let ascent: Ascent | undefined;
    for (let rounds = 0; ; rounds++) {
      const covariance = inverse(at.factored);
      const slopes = this.slopes(at.beta, covariance);
      const score = at.score.map((own, j) => own + slopes[j]! / 2);
      ascent = ascend(inverse(restricted(at.information, p, out)), at.beta, score, ascent);
      const next = ascent.promised > still && rounds < ROUNDS ? this.halvedStep(at.beta, ascent, at.value) : undefined;
      // Where no share of the step rises, what it promises is rounding, or there is no maximum to be found.
      if (next === undefined) return { beta: at.beta, value: at.value, covariance, score, rounds, converged: ascent.promised < SETTLED };
      at = next;
    }
  }

  private halvedStep(beta: Float64Array, { step, promised }: Ascent, value: number) {
    for (let share = 1; share > 1e-6; share /= 2) {
      const trial = beta.map((b, j) => b + share * step[j]!);
      const next = this.look(trial);
      if (next.value >= value + 1e-4 * share * promised - 1e-13 * Math.abs(value)) return { beta: trial, ...next };
    }
    return undefined;
  }

  private look(beta: Float64Array) {
    const look = lookAt(this.sweep, beta);
    // Above 0 no partial likelihood gets: there a whole risk set has lost its weight to one outside it.
    if (look.value > 1e-6) return { ...look, ...this.penalised({ ...look, value: -Infinity }) };
    return { ...look, ...this.penalised(look) };
  }

  private penalised({ value, information }: Look): { value: number; factored: Factor } {
    const { p } = this.design;
    const factored = restricted(information, p, this.missing);
    let sum = value;
    this.missing.forEach((why, j) => {
      if (why === undefined) sum += Math.log(factored.lower[j * p + j]!); // -Infinity where the information is gone
    });
    return { value: sum, factored };
  }

  /**
   * Slopes of log det I: trace(V dI/db) for each b. dI/db is the third central
   * moment of x in the risk set, and with m its mean
   * E (x-m)'V(x-m)(x-m) = Cov(x'Vx, x) - 2 Cov(x) V m:
   * the first part is an entry of the information once x'Vx is a column.
   */
  private slopes(beta: Float64Array, covariance: Float64Array): Float64Array {
    const { n, p } = this.design;
    const wide = this.wide.design.x;
    for (let i = 0; i < n; i++) wide[i * (p + 1) + p] = quadratic(wide, i * (p + 1), covariance, p);
    const triangle = new Float64Array(((p + 1) * (p + 2)) / 2);
    const out = new Float64Array(p);
    const vector = () => new Float64Array(p);
    const room = { u: vector(), v: vector(), su: vector(), sv: vector(), du: vector(), dv: vector() };
    const padded = new Float64Array(p + 1);
    padded.set(beta);
    this.wide.run(padded, (_group, sums, ties) => {
      addInformation(triangle, sums, ties);
      takeMeanPart(out, sums, ties, this.ties, covariance, room);
    });
    const full = fullMatrix(triangle, p + 1);
    for (let j = 0; j < p; j++) out[j]! += full[p * (p + 1) + j]!;
    return out;
  }
}

/** A direction of ascent and what it is made of. */
interface Ascent {
  readonly beta: Float64Array;
  readonly score: Float64Array;
  /** Inverse of the curvature, row-major. */
  readonly inverse: Float64Array;
  readonly step: Float64Array;
  readonly promised: number;
}

/**
 * Step V U, V the inverse information and U the modified score. The curvature
 * is that of log L less that of the penalty, which with few events is no small
 * part; close to the maximum it is learnt from one step to the next (the
 * update of Broyden, Fletcher, Goldfarb and Shanno, 1970).
 */
function ascend(information: Float64Array, beta: Float64Array, score: Float64Array, last: Ascent | undefined): Ascent {
  const plain = times(information, score);
  const isFar = dot(plain, score) > CLOSE;
  const learnt = last === undefined || isFar ? undefined : updated(last, beta, score);
  const inverse = learnt ?? information;
  const step = learnt === undefined ? plain : times(learnt, score);
  return { beta, score, inverse, step, promised: dot(step, score) };
}

function updated({ beta, score, inverse }: Ascent, newBeta: Float64Array, newScore: Float64Array): Float64Array | undefined {
  const p = beta.length;
  const moved = newBeta.map((b, j) => b - beta[j]!);
  const fall = score.map((u, j) => u - newScore[j]!);
  // The score of a held coefficient moves too, but the coefficient does not.
  for (let j = 0; j < p; j++) if (inverse[j * p + j] === 0) fall[j] = 0;
  const bend = dot(moved, fall);
  if (!(bend > 0)) return undefined;
  const image = times(inverse, fall);
  const whole = 1 + dot(fall, image) / bend;
  return inverse.map((value, at) => {
    const [j, l] = [Math.floor(at / p), at % p];
    return value + (whole * moved[j]! * moved[l]! - image[j]! * moved[l]! - moved[j]! * image[l]!) / bend;
  });
}

function times(matrix: Float64Array, v: Float64Array): Float64Array {
  const p = v.length;
  return v.map((_, j) => dot(matrix.subarray(j * p, (j + 1) * p), v));
}

/** x'Mx of one row, M symmetric. */
function quadratic(x: Float64Array, at: number, matrix: Float64Array, p: number): number {
  let sum = 0;
  for (let j = 0; j < p; j++) {
    let inner = (matrix[j * p + j]! * x[at + j]!) / 2;
    for (let l = 0; l < j; l++) inner += matrix[j * p + l]! * x[at + l]!;
    sum += 2 * x[at + j]! * inner;
  }
  return sum;
}

interface Room {
  readonly u: Float64Array;
  readonly v: Float64Array;
  readonly su: Float64Array;
  readonly sv: Float64Array;
  readonly du: Float64Array;
  readonly dv: Float64Array;
}

/**
 * Takes off 2 Cov(x) V m, summed over the steps of an event time. At a step
 * m = (s1 - f d1) / f0 and Cov(x) = (s2 - f d2) / f0 - mm', so that the steps
 * come in by the sums of the ties and by two of the third order, over m'Vm.
 */
function takeMeanPart(out: Float64Array, sums: RiskSums, { h2, h2f, h2ff }: TieSums, ties: Ties, covariance: Float64Array, { u, v, su, sv, du, dv }: Room): void {
  const { s0, s1, s2, d0, d1, d2, deaths } = sums;
  const p = out.length;
  let [a, b, c] = [0, 0, 0]; // s1'Vs1, s1'Vd1, d1'Vd1
  for (let j = 0; j < p; j++) {
    u[j] = v[j] = 0;
    for (let l = 0; l < p; l++) {
      u[j]! += covariance[j * p + l]! * s1[l]!;
      v[j]! += covariance[j * p + l]! * d1[l]!;
    }
    a += s1[j]! * u[j]!;
    b += s1[j]! * v[j]!;
    c += d1[j]! * v[j]!;
  }
  let [m, mf] = [0, 0]; // sums of m'Vm / f0 and of f m'Vm / f0
  for (let k = 0; k < deaths; k++) {
    const f = ties === 'efron' ? k / deaths : 0;
    const f0 = s0 - f * d0;
    const along = (a - 2 * f * b + f * f * c) / (f0 * f0 * f0);
    m += along;
    mf += f * along;
  }
  triangleTimes(su, s2, u);
  triangleTimes(sv, s2, v);
  triangleTimes(du, d2, u);
  triangleTimes(dv, d2, v);
  for (let j = 0; j < p; j++) out[j]! += 2 * (s1[j]! * m - d1[j]! * mf - (su[j]! * h2 - (sv[j]! + du[j]!) * h2f + dv[j]! * h2ff));
}

/** A symmetric matrix, given by the rows of its lower triangle, times a vector that may be shorter. */
function triangleTimes(out: Float64Array, triangle: Float64Array, v: Float64Array): void {
  out.fill(0);
  for (let j = 0, k = 0; j < v.length; j++) {
    for (let l = 0; l < j; l++, k++) {
      out[j]! += triangle[k]! * v[l]!;
      out[l]! += triangle[k]! * v[j]!;
    }
    out[j]! += triangle[k++]! * v[j]!;
  }
}

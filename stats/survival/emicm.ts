import type { TurnbullSets } from './turnbull-sets';

/** Masses on the sets with what the last look at them gave. */
export interface MassFit {
  readonly mass: Float64Array;
  readonly logLikelihood: number;
  /** Largest excess of the score over its bound, (max d - W) / W: 0 at the maximum, whatever the steps did. */
  readonly gap: number;
  readonly iterations: number;
}

/**
 * Maximises the likelihood of interval-censored onset by turns of one EM step,
 * which never lowers it, and one step of the iterative convex minorant, which
 * moves far and can set a mass to zero. Sums over the sets a row covers are
 * differences of running sums, so that a turn costs O(rows + sets).
 * @see Wellner & Zhan, JASA 1997;92:945. Jongbloed, JCGS 1998;7:310. Anderson-Bergman, JCGS 2017;26:463
 */
export function emicm(sets: TurnbullSets, tolerance: number, maxIterations: number): MassFit {
  const work = new LikelihoodWork(sets);
  let mass: Float64Array = new Float64Array(sets.left.length).fill(1 / sets.left.length);
  let logLikelihood = work.logLikelihood(mass);
  let gap = Infinity;
  let iterations = 0;
  for (; iterations < maxIterations; iterations++) {
    const score = work.score(mass);
    gap = work.gapOf(score);
    if (gap <= tolerance) break;
    for (let j = 0; j < mass.length; j++) mass[j]! *= score[j]! / work.total;
    ({ mass, logLikelihood } = minorantStep(work, mass));
  }
  return { mass, logLikelihood, gap, iterations };
}

/** The likelihood of masses on sets, with its buffers. */
export class LikelihoodWork {
  /** Sum of the weights. */
  readonly total: number;
  /** F: mass before each set, and 1 at the end. */
  readonly cumulative: Float64Array;
  private readonly change: Float64Array;
  private readonly scores: Float64Array;

  constructor(readonly sets: TurnbullSets) {
    const m = sets.left.length;
    this.total = sets.weight.reduce((sum, w) => sum + w, 0);
    this.cumulative = new Float64Array(m + 1);
    this.change = new Float64Array(m + 1);
    this.scores = new Float64Array(m);
  }

  /** Fills `cumulative`, and returns the log-likelihood (-Infinity where a row has no mass). */
  logLikelihood(mass: Float64Array): number {
    let sum = 0;
    for (let j = 0; j < mass.length; j++) {
      this.cumulative[j] = sum;
      sum += mass[j]!;
    }
    this.cumulative[mass.length] = sum;
    return this.logLikelihoodOf(this.cumulative);
  }

  logLikelihoodOf(cumulative: Float64Array): number {
    const { from, to, weight } = this.sets;
    let value = 0;
    for (let i = 0; i < from.length; i++) value += weight[i]! * Math.log(cumulative[to[i]! + 1]! - cumulative[from[i]!]!);
    return Number.isNaN(value) ? -Infinity : value;
  }

  /** d_j, the derivative of the log-likelihood for the mass of set j. The buffer is reused by the next call. */
  score(mass: Float64Array): Float64Array {
    this.logLikelihood(mass);
    const { from, to, weight } = this.sets;
    this.change.fill(0);
    for (let i = 0; i < from.length; i++) {
      const ratio = weight[i]! / (this.cumulative[to[i]! + 1]! - this.cumulative[from[i]!]!);
      this.change[from[i]!]! += ratio;
      this.change[to[i]! + 1]! -= ratio;
    }
    let running = 0;
    for (let j = 0; j < mass.length; j++) {
      running += this.change[j]!;
      this.scores[j] = running;
    }
    return this.scores;
  }

  gapOf(score: Float64Array): number {
    let highest = -Infinity;
    for (let j = 0; j < score.length; j++) if (score[j]! > highest) highest = score[j]!;
    return Math.max(0, highest / this.total - 1);
  }
}

/**
 * One step of the iterative convex minorant: Newton on F with the diagonal of
 * the information only, made monotone by weighted isotonic regression, then
 * halved until the likelihood rises enough (Armijo).
 */
function minorantStep(work: LikelihoodWork, mass: Float64Array): { mass: Float64Array; logLikelihood: number } {
  const { from, to, weight } = work.sets;
  const m = mass.length;
  const before = work.logLikelihood(mass);
  const current = work.cumulative.slice();
  const slope = new Float64Array(m + 1);
  const curvature = new Float64Array(m + 1);
  for (let i = 0; i < from.length; i++) {
    const [a, b] = [from[i]!, to[i]! + 1];
    const inverse = 1 / (current[b]! - current[a]!);
    const first = weight[i]! * inverse;
    slope[b]! += first;
    slope[a]! -= first;
    curvature[b]! += first * inverse;
    curvature[a]! += first * inverse;
  }
  const target = isotonicTarget(current, slope, curvature);
  let promised = 0;
  for (let k = 1; k < m; k++) promised += slope[k]! * (target[k]! - current[k]!);
  const trial = new Float64Array(m + 1);
  for (let step = 1; step > 1e-6; step /= 2) {
    for (let k = 0; k <= m; k++) trial[k] = current[k]! + step * (target[k]! - current[k]!);
    const value = work.logLikelihoodOf(trial);
    if (value >= before + 0.1 * step * promised) return { mass: differences(trial), logLikelihood: value };
  }
  return { mass, logLikelihood: before };
}

/** Pools adjacent violators of F + slope / curvature with weights curvature, kept inside [0, 1]. */
function isotonicTarget(current: Float64Array, slope: Float64Array, curvature: Float64Array): Float64Array {
  const m = current.length - 1;
  const target = new Float64Array(m + 1);
  target[m] = 1;
  const value = new Float64Array(m);
  const weight = new Float64Array(m);
  const last = new Uint32Array(m);
  let blocks = 0;
  for (let k = 1; k < m; k++) {
    let w = curvature[k]!;
    let y = current[k]! + (w > 0 ? slope[k]! / w : 0);
    while (blocks > 0 && value[blocks - 1]! >= y) {
      blocks--;
      const pooled = weight[blocks]! + w;
      if (pooled > 0) y = (value[blocks]! * weight[blocks]! + y * w) / pooled;
      w = pooled;
    }
    value[blocks] = y;
    weight[blocks] = w;
    last[blocks] = k;
    blocks++;
  }
  let k = 1;
  for (let b = 0; b < blocks; b++) {
    const y = Math.min(1, Math.max(0, value[b]!));
    for (; k <= last[b]!; k++) target[k] = y;
  }
  return target;
}

function differences(cumulative: Float64Array): Float64Array {
  const out = new Float64Array(cumulative.length - 1);
  for (let j = 0; j < out.length; j++) out[j] = Math.max(0, cumulative[j + 1]! - cumulative[j]!);
  return out;
}

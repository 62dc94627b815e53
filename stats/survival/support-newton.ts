import { factor, solve } from './cholesky';
import { LikelihoodWork, type MassFit } from './emicm';
import type { TurnbullSets } from './turnbull-sets';

/** Above this many sets with mass the dense system is not worth its memory. */
const MOST_SETS = 600;

/** Masses after the last digits were won, and whether they are the only ones. */
export interface PolishedFit extends MassFit {
  /** False when other masses on the same sets give the same likelihood; null when there are too many sets to tell. */
  readonly unique: boolean | null;
}

/**
 * Newton's method on the sets that carry mass: EMICM comes near the maximum
 * fast, but its last digits come slowly. A mass that would turn negative leaves,
 * a set whose score is above the bound comes back in.
 */
export function polish(sets: TurnbullSets, fit: MassFit): PolishedFit {
  const work = new LikelihoodWork(sets);
  let support = supportOf(fit.mass);
  if (support.length > MOST_SETS) return { ...fit, unique: null };
  let mass = fit.mass;
  let best: MassFit = fit;
  for (let round = 0; round < 50; round++) {
    mass = newtonStep(work, mass, support);
    const score = work.score(mass);
    const gap = work.gapOf(score);
    const logLikelihood = work.logLikelihood(mass);
    if (gap < best.gap) best = { mass, logLikelihood, gap, iterations: fit.iterations + round + 1 };
    else if (round > 2 && gap >= best.gap && gap < 1e-12) break;
    if (gap <= 1e-15) break;
    support = enter(supportOf(mass), mass, score, work.total);
    if (support.length > MOST_SETS) break;
  }
  const finalSupport = supportOf(best.mass);
  const rank = factor(information(work, best.mass, finalSupport), finalSupport.length).rank;
  return { ...best, unique: rank === finalSupport.length };
}

function supportOf(mass: Float64Array): number[] {
  return [...mass.keys()].filter((j) => mass[j]! > 0);
}

/** Brings back the set with the highest score when that is above the bound by more than rounding. */
function enter(support: number[], mass: Float64Array, score: Float64Array, total: number): number[] {
  const highest = score.reduce((best, value, j) => (value > score[best]! ? j : best), 0);
  if (score[highest]! <= total * (1 + 1e-13) || mass[highest]! > 0) return support;
  return [...support, highest].sort((a, b) => a - b);
}

/** One Newton step for sum w log f - W sum p on the support, cut where the first mass reaches 0. */
function newtonStep(work: LikelihoodWork, mass: Float64Array, support: readonly number[]): Float64Array {
  const score = work.score(mass);
  const step = solve(
    factor(information(work, mass, support), support.length),
    support.map((j) => score[j]! - work.total),
  );
  let cut = 1;
  support.forEach((j, s) => {
    if (step[s]! < 0 && mass[j]! + step[s]! < 0) cut = Math.min(cut, mass[j]! / -step[s]!);
  });
  const before = work.logLikelihood(mass);
  for (let halvings = 0; halvings < 30; halvings++, cut /= 2) {
    const next = mass.slice();
    support.forEach((j, s) => {
      const moved = mass[j]! + cut * step[s]!;
      next[j] = moved < 1e-14 ? 0 : moved;
    });
    const sum = next.reduce((total, p) => total + p, 0);
    for (let j = 0; j < next.length; j++) next[j]! /= sum;
    if (work.logLikelihood(next) >= before - 1e-13 * Math.abs(before)) return next;
  }
  return mass;
}

/** Sum of w / f² over the rows that cover both sets: each row adds one rectangle, so corners suffice. */
function information(work: LikelihoodWork, mass: Float64Array, support: readonly number[]): Float64Array {
  const { from, to, weight } = work.sets;
  const s = support.length;
  work.logLikelihood(mass);
  const before = new Uint32Array(mass.length + 1); // support members before each set
  for (let j = 0, seen = 0; j <= mass.length; j++) {
    before[j] = seen;
    if (support[seen] === j) seen++;
  }
  const size = s + 1;
  const corners = new Float64Array(size * size);
  for (let i = 0; i < from.length; i++) {
    const f = work.cumulative[to[i]! + 1]! - work.cumulative[from[i]!]!;
    const value = weight[i]! / (f * f);
    const [a, b] = [before[from[i]!]!, before[to[i]! + 1]!];
    corners[a * size + a]! += value;
    corners[a * size + b]! -= value;
    corners[b * size + a]! -= value;
    corners[b * size + b]! += value;
  }
  const out = new Float64Array(s * s);
  const above = new Float64Array(s); // column sums so far
  for (let j = 0; j < s; j++) {
    let running = 0;
    for (let k = 0; k < s; k++) {
      above[k]! += corners[j * size + k]!;
      running += above[k]!;
      out[j * s + k] = running;
    }
  }
  return out;
}

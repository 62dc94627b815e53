import { chiSquare } from '../distributions';
import type { Provenance } from '../result';
import { factor, inverse, quadraticForm, solve } from './cholesky';
import { coefficientsOf, type CoxFit } from './cox';
import { coxDesign, type CoxData, type CoxDesign } from './cox-design';
import { addInformation, addScore, CoxSweep, fullMatrix } from './cox-sweep';
import { kaplanMeier } from './kaplan-meier';
import type { ChiSquareTest } from './log-rank';
import { orderTimes } from './times';
import { countBefore } from './times';

/** How time enters the interaction: 1 - S(t-), its rank, itself, or its logarithm. */
export type TimeTransform = 'km' | 'rank' | 'identity' | 'log';

/** 'score' tests the time interaction with its full information; 'classic' is the 1994 approximation by scaled residuals. */
export type PhForm = 'score' | 'classic';

export interface PhTest extends Provenance {
  readonly form: PhForm;
  readonly transform: TimeTransform;
  readonly covariates: readonly (ChiSquareTest & { readonly name: string; /** Correlation of scaled residuals with time (classic form). */ readonly rho?: number | null })[];
  readonly global: ChiSquareTest;
}

/**
 * Tests that hazard ratios do not change with time.
 *
 * 'rank' ranks among all observation times in the score form and among event
 * rows in the classic form, as the two forms are published and used.
 * @see Grambsch & Therneau, Biometrika 1994;81:515. Therneau & Grambsch 2000, ch. 6
 * @param data the data of the fit
 */
export function proportionalHazardsTest(data: CoxData, fit: CoxFit, options: { readonly form?: PhForm; readonly transform?: TimeTransform } = {}): PhTest {
  const { form = 'score', transform = 'km' } = options;
  const design = coxDesign(data);
  const beta = coefficientsOf(fit).map((b, j) => b * design.spread[j]!);
  const moments = eventMoments(design, fit, beta);
  const times = moments.groups.map((g) => design.time[g]!);
  const g = transformTimes(transform, form, times, moments.deaths, data, design);
  const about = {
    method: `Proportional-hazards test, ${form === 'score' ? 'score form' : 'scaled Schoenfeld residuals (1994 form)'}, time as ${transform}`,
    n: fit.n,
    events: fit.events,
    leftOut: fit.leftOut,
    form,
    transform,
  };
  const usable = fit.coefficients.map(({ estimate }) => estimate !== null);
  const names = fit.coefficients.map(({ name }) => name);
  if (!g.every(Number.isFinite) || times.length < 2 || !usable.includes(true)) {
    const none: ChiSquareTest = { chiSquare: null, df: 0, p: null, reason: times.length < 2 ? 'fewer than two event times' : usable.includes(true) ? 'an event at time 0 has no logarithm' : 'no coefficient has an estimate' };
    return { ...about, covariates: names.map((name) => ({ name, ...none })), global: none };
  }
  const result = form === 'score' ? scoreForm(g, moments, usable) : classicForm(g, moments, usable);
  return { ...about, covariates: names.map((name, j) => ({ name, ...result.covariates[j]! })), global: result.global };
}

interface Moments {
  readonly p: number;
  /** Indices of the event times, in the design. */
  readonly groups: number[];
  readonly deaths: number[];
  /** Score (p) and information (p x p) of each event time. */
  readonly scores: Float64Array[];
  readonly informations: Float64Array[];
  /** Each event's x less the mean of its time's risk sets. */
  readonly residuals: Float64Array[][];
}

function eventMoments(design: CoxDesign, fit: CoxFit, beta: Float64Array): Moments {
  const { p, x, event, starts } = design;
  const out: Moments = { p, groups: [], deaths: [], scores: [], informations: [], residuals: [] };
  new CoxSweep(design, fit.ties).run(beta, (group, sums, ties) => {
    const score = new Float64Array(p);
    const triangle = new Float64Array((p * (p + 1)) / 2);
    addScore(score, sums, ties);
    addInformation(triangle, sums, ties);
    const rows: Float64Array[] = [];
    for (let i = starts[group]!; i < starts[group + 1]!; i++) {
      if (event[i] === 0) continue;
      rows.push(Float64Array.from({ length: p }, (_, j) => x[i * p + j]! - (sums.s1[j]! * ties.h - sums.d1[j]! * ties.hf) / sums.deaths));
    }
    out.groups.push(group);
    out.deaths.push(sums.deaths);
    out.scores.push(score);
    out.informations.push(fullMatrix(triangle, p));
    out.residuals.push(rows);
  });
  return out;
}

/** Time on the chosen scale, centred on the mean over events: a constant moves no test, but costs digits. */
function transformTimes(transform: TimeTransform, form: PhForm, times: number[], deaths: number[], data: CoxData, design: CoxDesign): number[] {
  const scale = scaleOf(transform, form, times, deaths, data, design);
  const g = times.map(scale);
  const total = deaths.reduce((sum, d) => sum + d, 0);
  const mean = g.reduce((sum, value, k) => sum + value * deaths[k]!, 0) / total;
  return g.map((value) => value - mean);
}

function scaleOf(transform: TimeTransform, form: PhForm, times: number[], deaths: number[], data: CoxData, design: CoxDesign): (t: number) => number {
  if (transform === 'identity') return (t) => t;
  if (transform === 'log') return (t) => Math.log(t);
  const pick = (column: Float64Array) => Float64Array.from(design.rows, (row) => column[row]!);
  if (transform === 'km') {
    const curve = kaplanMeier({ time: pick(data.time), event: design.event, ...(data.entry && { entry: pick(data.entry) }) });
    return (t) => 1 - (curve.survival[countBefore(curve.time, t) - 1] ?? 1);
  }
  const ranked = form === 'score' ? pick(data.time) : Float64Array.from(times.flatMap((t, k) => Array.from({ length: deaths[k]! }, () => t)));
  const { starts, time } = orderTimes(ranked);
  return (t) => {
    const k = countBefore(time, t);
    return (starts[k]! + 1 + starts[k + 1]!) / 2; // ties share the middle of their ranks
  };
}

function scoreForm(g: number[], { p, scores, informations }: Moments, usable: boolean[]) {
  const size = p * p;
  const [plain, mixed, squared, score] = [new Float64Array(size), new Float64Array(size), new Float64Array(size), new Float64Array(p)];
  g.forEach((value, k) => {
    for (let j = 0; j < p; j++) score[j]! += value * scores[k]![j]!;
    for (let at = 0; at < size; at++) {
      const v = informations[k]![at]!;
      plain[at]! += v;
      mixed[at]! += value * v;
      squared[at]! += value * value * v;
    }
  });
  for (let j = 0; j < p; j++) if (!usable[j]) for (let l = 0; l < p; l++) plain[j * p + l] = plain[l * p + j] = squared[j * p + l] = squared[l * p + j] = 0;
  const factored = factor(plain, p);
  const rest = squared.slice(); // information on the interaction, the coefficients being estimated
  for (let j = 0; j < p; j++) {
    const column = solve(factored, mixed.subarray(j * p, (j + 1) * p));
    for (let l = 0; l < p; l++) for (let i = 0; i < p; i++) rest[j * p + l]! -= column[i]! * mixed[l * p + i]!;
  }
  const covariates = usable.map((use, j): ChiSquareTest => (use ? test(score[j]! ** 2 / rest[j * p + j]!, 1) : unavailable));
  for (let j = 0; j < p; j++) if (!usable[j]) for (let l = 0; l < p; l++) rest[j * p + l] = rest[l * p + j] = 0;
  const { chiSquare: statistic, df } = quadraticForm(score, rest, p);
  return { covariates, global: test(statistic, df) };
}

/** Residuals times covariance times number of events, set against time; one average variance for all times. */
function classicForm(g: number[], { p, deaths, residuals, informations }: Moments, usable: boolean[]) {
  const plain = new Float64Array(p * p);
  for (const information of informations) for (let at = 0; at < p * p; at++) plain[at]! += information[at]!;
  for (let j = 0; j < p; j++) if (!usable[j]) for (let l = 0; l < p; l++) plain[j * p + l] = plain[l * p + j] = 0;
  const covariance = inverse(factor(plain, p));
  const events = deaths.reduce((sum, d) => sum + d, 0);
  const spread = g.reduce((sum, value, k) => sum + value * value * deaths[k]!, 0);
  const trend = new Float64Array(p);
  const scaled = residuals.map((rows) => rows.map((row) => multiply(covariance, row, p)));
  residuals.forEach((rows, k) => rows.forEach((row) => row.forEach((value, j) => (trend[j]! += g[k]! * value))));
  const slope = multiply(covariance, trend, p); // of scaled residuals on time, before dividing
  const covariates = usable.map((use, j): ChiSquareTest & { rho: number | null } => {
    if (!use) return { ...unavailable, rho: null };
    const statistic = (slope[j]! ** 2 * events) / (covariance[j * p + j]! * spread);
    return { ...test(statistic, 1), rho: correlation(g, scaled, j) };
  });
  const whole = (trend.reduce((sum, value, j) => sum + value * slope[j]!, 0) * events) / spread;
  return { covariates, global: test(whole, usable.filter(Boolean).length) };
}

/** Over event rows; g has mean 0 already, the residuals need not. */
function correlation(g: number[], scaled: Float64Array[][], j: number): number {
  const values = scaled.flatMap((rows, k) => rows.map((row) => [g[k]!, row[j]!] as const));
  const mean = values.reduce((sum, [, r]) => sum + r, 0) / values.length;
  let [xy, xx, yy] = [0, 0, 0];
  for (const [time, residual] of values) {
    xy += time * (residual - mean);
    xx += time * time;
    yy += (residual - mean) ** 2;
  }
  return xy / Math.sqrt(xx * yy);
}

const unavailable: ChiSquareTest = { chiSquare: null, df: 0, p: null, reason: 'the coefficient has no estimate' };

function test(statistic: number, df: number): ChiSquareTest {
  if (df === 0 || !Number.isFinite(statistic)) return { chiSquare: null, df, p: null, reason: 'time does not vary over the events' };
  return { chiSquare: statistic, df, p: chiSquare.sf(statistic, df) };
}

function multiply(matrix: Float64Array, v: Float64Array, p: number): Float64Array {
  const out = new Float64Array(p);
  for (let j = 0; j < p; j++) for (let l = 0; l < p; l++) out[j]! += matrix[j * p + l]! * v[l]!;
  return out;
}

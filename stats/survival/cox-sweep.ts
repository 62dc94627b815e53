import type { CoxDesign } from './cox-design';
import { isBefore } from './times';

export type Ties = 'efron' | 'breslow';

/**
 * Sums over the risk set, and over those with the event, at one event time.
 * w = exp(eta - shift); s0 sums w, s1 sums w x, s2 sums w x x' (lower triangle
 * by rows). The d sums run over those with the event only.
 */
export interface RiskSums {
  readonly s1: Float64Array;
  readonly s2: Float64Array;
  readonly d1: Float64Array;
  readonly d2: Float64Array;
  /** Plain sum of x over those with the event. */
  readonly xSum: Float64Array;
  s0: number;
  d0: number;
  /** Number with the event, and the sum of their eta - shift. */
  deaths: number;
  etaSum: number;
}

/**
 * Efron's d steps at a time, k = 0 … d-1 with share f = k/d of the dying taken
 * off the risk set, come into every result only through these sums over k
 * (f0 is the step's own s0). Breslow's rule is f = 0 throughout.
 */
export interface TieSums {
  /** Sum of 1/f0: the step of the baseline hazard. */
  h: number;
  /** Sum of f/f0. */
  hf: number;
  /** Sums of 1/f0², f/f0², f²/f0². */
  h2: number;
  h2f: number;
  h2ff: number;
  /** Sum of log f0. */
  log: number;
}

/** Called at each event time of a stratum, the last first. `group` indexes the design's distinct times. */
export type AtEvents = (group: number, sums: RiskSums, ties: TieSums) => void;

/** Linear predictors and weights of the last sweep, by position. */
export interface Predictors {
  readonly eta: Float64Array;
  readonly weight: Float64Array;
  shift: number;
}

/**
 * When rows taken off leave less than this share of the largest sum so far, the
 * digits of what remains went with them, and the risk set is summed afresh.
 */
const WORN = 1e-3;

/**
 * One pass from the last time to the first, each row added once when its time
 * comes and, with delayed entry, taken off once when its entry is reached.
 * @see Efron, JASA 1977;72:557. Therneau & Grambsch, Modeling Survival Data, 2000
 */
export class CoxSweep {
  readonly predictors: Predictors;
  private readonly sums: RiskSums;
  private readonly tieSums: TieSums = { h: 0, hf: 0, h2: 0, h2f: 0, h2ff: 0, log: 0 };

  constructor(
    readonly design: CoxDesign,
    private readonly ties: Ties,
  ) {
    const { n, p } = design;
    const triangle = (p * (p + 1)) / 2;
    this.predictors = { eta: new Float64Array(n), weight: new Float64Array(n), shift: 0 };
    this.sums = {
      s1: new Float64Array(p),
      s2: new Float64Array(triangle),
      d1: new Float64Array(p),
      d2: new Float64Array(triangle),
      xSum: new Float64Array(p),
      s0: 0,
      d0: 0,
      deaths: 0,
      etaSum: 0,
    };
  }

  /** @param beta coefficients of the scaled covariates */
  run(beta: Float64Array, atEvents: AtEvents): void {
    this.predict(beta);
    const { stratumStarts } = this.design;
    for (let s = 0; s + 1 < stratumStarts.length; s++) this.stratum(stratumStarts[s]!, stratumStarts[s + 1]!, atEvents);
  }

  /** The largest eta is taken off before exp, so that no weight overflows. */
  private predict(beta: Float64Array): void {
    const { n, p, x } = this.design;
    const { eta, weight } = this.predictors;
    let highest = -Infinity;
    for (let i = 0, at = 0; i < n; i++) {
      let sum = 0;
      for (let j = 0; j < p; j++) sum += beta[j]! * x[at++]!;
      eta[i] = sum;
      if (sum > highest) highest = sum;
    }
    for (let i = 0; i < n; i++) weight[i] = Math.exp(eta[i]! - highest);
    this.predictors.shift = highest;
  }

  private stratum(from: number, to: number, atEvents: AtEvents): void {
    const { starts, time, event, entry, byEntry } = this.design;
    const { sums } = this;
    this.clearRisk();
    let highest = 0;
    let leaving = starts[from]!;
    for (let g = to - 1; g >= from; g--) {
      if (entry !== undefined && byEntry !== undefined) {
        while (leaving < starts[to]! && !isBefore(entry[byEntry[leaving]!]!, time[g]!)) this.addRow(byEntry[leaving++]!, -1);
        if (sums.s0 < WORN * highest) {
          this.sumAfresh(starts[g + 1]!, starts[to]!, time[g]!);
          highest = 0;
        }
      }
      let deaths = 0;
      for (let i = starts[g]!; i < starts[g + 1]!; i++) {
        this.addRow(i, 1);
        deaths += event[i]!;
      }
      if (sums.s0 > highest) highest = sums.s0;
      if (deaths === 0) continue;
      this.sumDeaths(starts[g]!, starts[g + 1]!);
      sums.deaths = deaths;
      this.sumTies();
      atEvents(g, sums, this.tieSums);
    }
  }

  private clearRisk(): void {
    this.sums.s0 = 0;
    this.sums.s1.fill(0);
    this.sums.s2.fill(0);
  }

  /** The risk set just before the rows of time t join: those who leave later and entered before. */
  private sumAfresh(from: number, to: number, t: number): void {
    this.clearRisk();
    for (let i = from; i < to; i++) if (isBefore(this.design.entry![i]!, t)) this.addRow(i, 1);
  }

  private addRow(i: number, sign: 1 | -1): void {
    const { p, x } = this.design;
    const { s1, s2 } = this.sums;
    const w = sign * this.predictors.weight[i]!;
    const at = i * p;
    this.sums.s0 += w;
    for (let j = 0, k = 0; j < p; j++) {
      const wx = w * x[at + j]!;
      s1[j]! += wx;
      for (let l = 0; l <= j; l++) s2[k++]! += wx * x[at + l]!;
    }
  }

  private sumDeaths(from: number, to: number): void {
    const { p, x, event } = this.design;
    const { sums } = this;
    const { eta, weight, shift } = this.predictors;
    const { d1, d2, xSum } = sums;
    sums.d0 = 0;
    sums.etaSum = 0;
    d1.fill(0);
    d2.fill(0);
    xSum.fill(0);
    for (let i = from; i < to; i++) {
      if (event[i] === 0) continue;
      const w = weight[i]!;
      const at = i * p;
      sums.d0 += w;
      sums.etaSum += eta[i]! - shift;
      for (let j = 0, k = 0; j < p; j++) {
        const value = x[at + j]!;
        const wx = w * value;
        xSum[j]! += value;
        d1[j]! += wx;
        for (let l = 0; l <= j; l++) d2[k++]! += wx * x[at + l]!;
      }
    }
  }

  private sumTies(): void {
    const { s0, d0, deaths } = this.sums;
    const t = this.tieSums;
    t.h = t.hf = t.h2 = t.h2f = t.h2ff = t.log = 0;
    for (let k = 0; k < deaths; k++) {
      const f = this.ties === 'efron' ? k / deaths : 0;
      const f0 = s0 - f * d0;
      const inverse = 1 / f0;
      t.log += Math.log(f0);
      t.h += inverse;
      t.hf += f * inverse;
      t.h2 += inverse * inverse;
      t.h2f += f * inverse * inverse;
      t.h2ff += f * f * inverse * inverse;
    }
  }
}

/** Score of one event time: x of those with the event, less the risk-set means of the steps. Adds to `out`. */
export function addScore(out: Float64Array, { s1, d1, xSum }: RiskSums, { h, hf }: TieSums): void {
  for (let j = 0; j < out.length; j++) out[j]! += xSum[j]! - (s1[j]! * h - d1[j]! * hf);
}

/** Information of one event time, the variance of x in the risk set summed over the steps. Adds to the lower triangle by rows. */
export function addInformation(out: Float64Array, { s1, s2, d1, d2 }: RiskSums, { h, hf, h2, h2f, h2ff }: TieSums): void {
  const p = s1.length;
  for (let j = 0, k = 0; j < p; j++) {
    const a = s1[j]! * h2 - d1[j]! * h2f;
    const b = s1[j]! * h2f - d1[j]! * h2ff;
    for (let l = 0; l <= j; l++, k++) out[k]! += s2[k]! * h - d2[k]! * hf - (a * s1[l]! - b * d1[l]!);
  }
}

/** Lower triangle by rows to a full symmetric matrix. */
export function fullMatrix(triangle: Float64Array, p: number): Float64Array {
  const out = new Float64Array(p * p);
  for (let j = 0, k = 0; j < p; j++) {
    for (let l = 0; l <= j; l++, k++) {
      out[j * p + l] = triangle[k]!;
      out[l * p + j] = triangle[k]!;
    }
  }
  return out;
}

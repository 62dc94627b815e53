import { chiSquare } from '../distributions';
import { requireRange, type Provenance } from '../result';
import { quadraticForm, rowsOf } from './cholesky';
import type { CompetingFollowUp } from './cumulative-incidence';
import { checkFollowUp, take } from './follow-up';
import type { ChiSquareTest } from './log-rank';
import { countCodes, takeCodes, timeOrderByStratum, type Codes } from './strata';
import { orderTimes, type TimeOrder } from './times';

export interface GroupedCompetingFollowUp extends Omit<CompetingFollowUp, 'entry'> {
  readonly group: Codes;
  readonly stratum?: Codes;
}

export interface GrayTest extends Provenance, ChiSquareTest {
  readonly cause: number;
  /** Events of the cause. */
  readonly events: number;
  readonly score: readonly number[];
  /** Covariance matrix of the score; null where it does not exist. */
  readonly variance: number[][] | null;
}

/**
 * Gray's test that k groups share one cumulative incidence of a cause: it
 * compares hazards of the subdistribution, so that it answers for incidence
 * where the log-rank test answers for the cause-specific hazard.
 * @param options.rho power of the weight (1 - F)^rho, 0 unless given
 * @throws RangeError on columns of different length or codes out of range
 * @see Gray, Ann Stat 1988;16:1141
 */
export function grayTest(data: GroupedCompetingFollowUp, options: { readonly cause?: number; readonly rho?: number; readonly groups?: number } = {}): GrayTest {
  const { cause = 1, rho = 0 } = options;
  requireRange(Number.isInteger(cause) && cause > 0, `Causes are whole numbers from 1, not ${cause}.`);
  requireRange(Number.isFinite(rho), `The weight's power must be a number, not ${rho}.`);
  const { rows, leftOut } = checkFollowUp(data.time, data.cause, undefined, 255);
  const k = Math.max(countCodes(data.group, data.time.length, 'group'), options.groups ?? 0);
  if (data.stratum) countCodes(data.stratum, data.time.length, 'stratum');
  const time = take(data.time, rows);
  const codes = take(data.cause, rows);
  const group = takeCodes(data.group, rows);

  const score = new Float64Array(k);
  const variance = new Float64Array(k * k);
  for (const stratum of timeOrderByStratum(time, data.stratum && takeCodes(data.stratum, rows))) {
    new StratumSweep(orderTimes(time, stratum), codes, group, k, cause, rho).addTo(score, variance);
  }
  const { chiSquare: statistic, df } = quadraticForm(score, variance, k);
  const about = {
    cause,
    method: `Gray's test of cumulative incidence${rho === 0 ? '' : ` (rho ${rho})`}${data.stratum ? ', stratified' : ''}`,
    n: time.length,
    events: codes.reduce((sum, code) => sum + (code === cause ? 1 : 0), 0),
    leftOut,
    score: [...score],
    variance: rowsOf(variance, k),
  };
  if (!variance.every(Number.isFinite)) {
    const reason = 'the pooled incidence reaches 1 while rows are still at risk, so the variance does not exist';
    return { ...about, variance: null, chiSquare: null, df: 0, p: null, reason };
  }
  if (df === 0) return { ...about, chiSquare: null, df, p: null, reason: 'no event of the cause at a time when two groups were at risk' };
  return { ...about, chiSquare: statistic, df, p: chiSquare.sf(statistic, df) };
}

/** What one time brings: events by group, and the curves before and after it. */
interface Moment {
  /** Events of the cause, all groups. */
  readonly d1: number;
  /** Sum over groups of risk set / S before. */
  readonly spread: number;
  /** Pooled incidence after the time. */
  readonly pooled: number;
}

/**
 * Two sweeps over one stratum. The score needs one; its variance needs, at each
 * time, how much of the running weight c is still to come, hence the second.
 */
class StratumSweep {
  private readonly atRisk: Float64Array;
  private readonly own: Float64Array; // events of the cause by group, at one time
  private readonly other: Float64Array;
  private readonly before: Float64Array; // S before the time
  private readonly after: Float64Array;
  private readonly incidence: Float64Array; // F of the group before the time
  private readonly weights: Float64Array; // a: k x k at one time
  private readonly running: Float64Array; // c: k x k so far

  constructor(
    private readonly sorted: TimeOrder,
    private readonly codes: Uint8Array,
    private readonly group: Codes,
    private readonly k: number,
    private readonly cause: number,
    private readonly rho: number,
  ) {
    const column = () => new Float64Array(k);
    [this.atRisk, this.own, this.other, this.before, this.after, this.incidence] = [column(), column(), column(), column(), column(), column()];
    [this.weights, this.running] = [new Float64Array(k * k), new Float64Array(k * k)];
  }

  addTo(score: Float64Array, variance: Float64Array): void {
    this.sweep((weight, { d1 }) => this.addScore(score, weight, d1));
    const total = this.running.slice();
    const x = new Float64Array(this.k);
    this.sweep((_weight, moment) => this.addVariance(variance, total, x, moment));
  }

  private sweep(visit: (weight: number, moment: Moment) => void): void {
    const { order, starts, time } = this.sorted;
    this.atRisk.fill(0);
    for (const row of order) this.atRisk[this.group[row]!]!++;
    this.before.fill(1);
    this.incidence.fill(0);
    this.running.fill(0);
    let pooled = 0;
    for (let g = 0; g < time.length; g++) {
      const { d1, d2 } = this.count(starts[g]!, starts[g + 1]!);
      if (d1 + d2 > 0) {
        let spread = 0;
        for (let r = 0; r < this.k; r++) {
          const n = this.atRisk[r]!;
          if (n === 0) continue;
          this.after[r] = (this.before[r]! * (n - this.own[r]! - this.other[r]!)) / n;
          spread += n / this.before[r]!;
        }
        const weight = Math.pow(1 - pooled, this.rho);
        if (d1 > 0) this.addWeights(weight, spread, d1 / (spread * (1 - pooled)));
        else this.weights.fill(0);
        const next = pooled + d1 / spread;
        visit(weight, { d1, spread, pooled: next });
        this.stepCurves();
        pooled = next;
      }
      for (let i = starts[g]!; i < starts[g + 1]!; i++) this.atRisk[this.group[order[i]!]!]!--;
    }
  }

  private count(from: number, to: number): { d1: number; d2: number } {
    this.own.fill(0);
    this.other.fill(0);
    let d1 = 0;
    let d2 = 0;
    for (let i = from; i < to; i++) {
      const row = this.sorted.order[i]!;
      const code = this.codes[row]!;
      if (code === 0) continue;
      if (code === this.cause) {
        this.own[this.group[row]!]!++;
        d1++;
      } else {
        this.other[this.group[row]!]!++;
        d2++;
      }
    }
    return { d1, d2 };
  }

  /** a = weight h (1{same group} - h / sum of h), h = risk set / S; c gathers a times the pooled hazard. */
  private addWeights(weight: number, spread: number, hazard: number): void {
    for (let i = 0; i < this.k; i++) {
      const h = this.atRisk[i]! === 0 ? 0 : this.atRisk[i]! / this.before[i]!;
      for (let r = 0; r < this.k; r++) {
        const share = this.atRisk[r]! === 0 ? 0 : this.atRisk[r]! / this.before[r]! / spread;
        const a = weight * h * ((i === r ? 1 : 0) - share);
        this.weights[i * this.k + r] = a;
        this.running[i * this.k + r]! += a * hazard;
      }
    }
  }

  private addScore(score: Float64Array, weight: number, d1: number): void {
    if (d1 === 0) return;
    let total = 0;
    for (let r = 0; r < this.k; r++) total += this.subRisk(r);
    for (let r = 0; r < this.k; r++) score[r]! += weight * (this.own[r]! - (d1 * this.subRisk(r)) / total);
  }

  /** Risk set of the subdistribution: those at risk, scaled up by those gone from another cause. */
  private subRisk(r: number): number {
    return this.atRisk[r] === 0 ? 0 : (this.atRisk[r]! * (1 - this.incidence[r]!)) / this.before[r]!;
  }

  private addVariance(variance: Float64Array, total: Float64Array, x: Float64Array, { d1, spread, pooled }: Moment): void {
    for (let r = 0; r < this.k; r++) {
      const n = this.atRisk[r]!;
      if (n === 0) continue;
      const s = this.before[r]!;
      const ratio = this.after[r]! > 0 ? (1 - pooled) / this.after[r]! : 0;
      if (d1 > 0) {
        const ties = d1 > 1 ? 1 - (d1 - 1) / (spread * s - 1) : 1;
        this.addOuter(variance, total, x, r, 1, 1 - ratio, (ties * s * d1) / (spread * n));
      }
      const d2 = this.other[r]!;
      if (d2 > 0) {
        const ties = d2 > 1 ? 1 - (d2 - 1) / (n - 1) : 1;
        this.addOuter(variance, total, x, r, 0, -ratio, (ties * s * s * d2) / (n * n));
      }
    }
  }

  /** variance += factor x x', x = now a + later (c still to come), for the terms of group r. */
  private addOuter(variance: Float64Array, total: Float64Array, x: Float64Array, r: number, now: number, later: number, factor: number): void {
    const { k } = this;
    for (let i = 0; i < k; i++) {
      const at = i * k + r;
      x[i] = now * this.weights[at]! + later * (total[at]! - this.running[at]!);
    }
    for (let i = 0; i < k; i++) for (let j = 0; j < k; j++) variance[i * k + j]! += factor * x[i]! * x[j]!;
  }

  private stepCurves(): void {
    for (let r = 0; r < this.k; r++) {
      const n = this.atRisk[r]!;
      if (n === 0) continue;
      this.incidence[r]! += (this.before[r]! * this.own[r]!) / n;
      this.before[r] = this.after[r]!;
    }
  }
}

import { criticalValue } from '../critical-value';
import { requireLevel, requireRange, type Interval, type Provenance } from '../result';
import { checkFollowUp, take } from './follow-up';
import { atRiskAt } from './risk-table';
import { RunningSquares } from './running-squares';
import { lastNotAfter, orderTimes } from './times';

/** Follow-up that can end in one of several causes. */
export interface CompetingFollowUp {
  readonly time: Float64Array;
  /** 0 where follow-up was censored, 1, 2, 3 … for the cause that ended it. */
  readonly cause: Uint8Array;
  /** Delayed entry: at risk only when entry < t <= time. */
  readonly entry?: Float64Array;
}

/**
 * 'greenwood' takes the increments at a time as multinomial (it equals Greenwood's
 * variance when there is one cause); 'aalen' is Aalen's counting-process form, slightly larger.
 */
export type IncidenceVariance = 'greenwood' | 'aalen';

export interface CumulativeIncidenceOptions {
  readonly level?: number;
  readonly variance?: IncidenceVariance;
  /** Causes to report; all that occur unless given. */
  readonly causes?: readonly number[];
}

/** Cumulative incidence of one cause, one element for each distinct time. */
export interface CauseCurve {
  readonly cause: number;
  readonly events: number;
  readonly incidence: Float64Array;
  readonly se: Float64Array;
  /** Log-log limits; NaN where they do not exist (incidence 1). */
  readonly lower: Float64Array;
  readonly upper: Float64Array;
}

export interface CumulativeIncidence extends Provenance {
  readonly events: number;
  readonly level: number;
  readonly time: Float64Array;
  readonly atRisk: Uint32Array;
  /** Free of every cause. */
  readonly survival: Float64Array;
  readonly causes: readonly CauseCurve[];
}

/**
 * Aalen-Johansen cumulative incidence of each cause while the others compete.
 * One minus Kaplan-Meier with the other causes censored is larger, and wrong.
 * @throws RangeError as `kaplanMeier`, or for an asked cause below 1
 * @see Aalen & Johansen, Scand J Stat 1978;5:141. Variance: Marubini & Valsecchi 1995, ch. 10; Aalen, Ann Stat 1978;6:534
 */
export function cumulativeIncidence(data: CompetingFollowUp, options: CumulativeIncidenceOptions = {}): CumulativeIncidence {
  const { level = 0.95, variance = 'greenwood' } = options;
  requireLevel(level);
  const { rows, leftOut } = checkFollowUp(data.time, data.cause, data.entry, 255);
  const time = take(data.time, rows);
  const cause = take(data.cause, rows);
  const sorted = orderTimes(time);
  const asked = options.causes ?? [...new Set(cause)].filter((code) => code > 0).sort((a, b) => a - b);
  requireRange(asked.every((code) => Number.isInteger(code) && code > 0), 'Causes are whole numbers from 1.');

  const atRisk = atRiskAt(data.entry && take(data.entry, rows), sorted);
  const eventsAt = new Uint32Array(sorted.time.length);
  const causeAt = new Map(asked.map((code) => [code, new Uint32Array(sorted.time.length)]));
  for (let g = 0; g < sorted.time.length; g++) {
    for (let i = sorted.starts[g]!; i < sorted.starts[g + 1]!; i++) {
      const code = cause[sorted.order[i]!]!;
      if (code === 0) continue;
      eventsAt[g]!++;
      const counts = causeAt.get(code);
      if (counts) counts[g]!++;
    }
  }
  const z = criticalValue(level);
  return {
    time: sorted.time,
    atRisk,
    survival: allCauseSurvival(atRisk, eventsAt),
    causes: asked.map((code) => causeCurve(code, atRisk, eventsAt, causeAt.get(code)!, z, variance)),
    level,
    method: `Aalen-Johansen cumulative incidence, ${variance === 'aalen' ? "Aalen's" : 'multinomial (Greenwood-type)'} variance, ${level * 100}% log-log limits`,
    n: time.length,
    events: eventsAt.reduce((sum, d) => sum + d, 0),
    leftOut,
  };
}

function allCauseSurvival(atRisk: Uint32Array, eventsAt: Uint32Array): Float64Array {
  const survival = new Float64Array(atRisk.length);
  let s = 1;
  for (let g = 0; g < atRisk.length; g++) {
    s *= (atRisk[g]! - eventsAt[g]!) / atRisk[g]!;
    survival[g] = s;
  }
  return survival;
}

function causeCurve(cause: number, atRisk: Uint32Array, eventsAt: Uint32Array, causeAt: Uint32Array, z: number, form: IncidenceVariance): CauseCurve {
  const m = atRisk.length;
  const out = { incidence: new Float64Array(m), se: new Float64Array(m), lower: new Float64Array(m), upper: new Float64Array(m) };
  const variance = form === 'aalen' ? new AalenVariance() : new MultinomialVariance();
  let s = 1;
  let incidence = 0;
  let events = 0;
  for (let g = 0; g < m; g++) {
    const [n, d, d1] = [atRisk[g]!, eventsAt[g]!, causeAt[g]!];
    if (d > 0) {
      const step = (s * d1) / n;
      incidence += step;
      variance.step(step, s, n, d, d1);
      s *= (n - d) / n;
      events += d1;
    }
    const se = Math.sqrt(Math.max(0, variance.value));
    out.incidence[g] = incidence;
    out.se[g] = se;
    out.lower[g] = incidenceLimit(incidence, se, z, -1);
    out.upper[g] = incidenceLimit(incidence, se, z, 1);
  }
  return { cause, events, ...out };
}

/**
 * Var F(t) = sum over times of (F(t) - F)² d / (n (n - d)) + S² d1 (n - d1) / n³
 * - 2 (F(t) - F) S d1 / n², S before and F after the time. The first term ends
 * where everyone at risk leaves: F does not move after that.
 */
class MultinomialVariance {
  private readonly allCauses = new RunningSquares();
  private readonly shared = new RunningSquares();
  private own = 0;

  step(step: number, s: number, n: number, d: number, d1: number): void {
    this.allCauses.move(step);
    this.shared.move(step);
    if (n > d) this.allCauses.add(d / (n * (n - d)), 0);
    this.own += (s * s * d1 * (n - d1)) / (n * n * n);
    this.shared.add((s * d1) / (n * n), 0);
  }

  get value(): number {
    return this.allCauses.sum + this.own - 2 * this.shared.firstMoment;
  }
}

/**
 * The same in martingale form: an event of the cause moves F(t) by S/n times
 * 1 - (F(t) - F)/S+, one of another cause by -S/n times (F(t) - F)/S+, S+ being
 * survival after the time; each with its hypergeometric correction for ties.
 */
class AalenVariance {
  private readonly ofCause = new RunningSquares();
  private readonly ofOthers = new RunningSquares();
  private last = 0;

  step(step: number, s: number, n: number, d: number, d1: number): void {
    this.ofCause.move(-step);
    this.ofOthers.move(step);
    const d2 = d - d1;
    const after = (s * (n - d)) / n;
    const ties = (count: number) => (n > 1 ? (count * (n - count)) / (n - 1) : count);
    const scale = (s * s) / (n * n);
    if (after === 0) {
      this.last += scale * ties(d1);
      return;
    }
    this.ofCause.add((scale * ties(d1)) / (after * after), after);
    this.ofOthers.add((scale * ties(d2)) / (after * after), 0);
  }

  get value(): number {
    return this.ofCause.sum + this.ofOthers.sum + this.last;
  }
}

/** F to the power exp(-/+ z se / (F log F)): limits on the log(-log) scale. */
function incidenceLimit(incidence: number, se: number, z: number, side: -1 | 1): number {
  if (incidence >= 1 - 1e-12) return NaN;
  if (incidence === 0 || se === 0) return incidence;
  return Math.pow(incidence, Math.exp((side * z * se) / (incidence * Math.log(incidence))));
}

/** Cumulative incidence of a cause at one time; the last value is carried on beyond the end. */
export function incidenceAt(curves: CumulativeIncidence, cause: number, time: number): Interval & { readonly time: number; readonly se: number | null } {
  const { level } = curves;
  const curve = curves.causes.find((one) => one.cause === cause);
  if (curves.n === 0) return { time, estimate: null, se: null, lower: null, upper: null, level, reason: 'no follow-up' };
  const g = lastNotAfter(curves.time, time);
  if (curve === undefined || g < 0) return { time, estimate: 0, se: 0, lower: 0, upper: 0, level };
  const [estimate, se, lower, upper] = [curve.incidence[g]!, curve.se[g]!, curve.lower[g]!, curve.upper[g]!];
  if (Number.isNaN(lower)) return { time, estimate, se, lower: null, upper: null, level, reason: 'the incidence has reached 1, where limits do not exist' };
  return { time, estimate, se, lower, upper, level };
}

import { criticalValue } from '../critical-value';
import { requireLevel, type Provenance } from '../result';
import { type FollowUp, usableFollowUp } from './follow-up';
import { LIMIT_NAMES, type LimitKind, survivalLimit } from './limits';
import { riskTable, type RiskTable } from './risk-table';
import { orderTimes, type TimeOrder } from './times';

/** A survival curve: one element for each distinct time at which a row leaves, ascending. */
export interface SurvivalCurve extends RiskTable, Provenance {
  readonly events: number;
  /** S just after each time. */
  readonly survival: Float64Array;
  /** Greenwood's standard error of S; NaN where S is 0, because it does not exist there. */
  readonly se: Float64Array;
  /** Pointwise limits; NaN where S is 0. */
  readonly lower: Float64Array;
  readonly upper: Float64Array;
  readonly level: number;
  readonly limits: LimitKind;
  /** What a reader must know before trusting the curve. */
  readonly notes: readonly string[];
}

export interface KaplanMeierOptions {
  /** Confidence level, 0.95 unless asked otherwise. */
  readonly level?: number;
  readonly limits?: LimitKind;
  /** Survival given that it lasted beyond this time; rows that leave by then are left out. */
  readonly given?: number;
  /** The order of the times, when the caller has it already (same rows, none missing). */
  readonly order?: TimeOrder;
}

/**
 * Product-limit survival curve with Greenwood's variance.
 *
 * Events count before censorings at a tied time; times within a relative 1e-12
 * are one time. With delayed entry a row is at risk when entry < t <= time.
 * @throws RangeError on columns of different length, codes other than 0 and 1, negative or infinite times
 * @see Kaplan & Meier, JASA 1958;53:457. Greenwood 1926. Kalbfleisch & Prentice, The Statistical Analysis of Failure Time Data, section 1.4
 */
export function kaplanMeier(data: FollowUp, options: KaplanMeierOptions = {}): SurvivalCurve {
  const { level = 0.95, limits = 'log-log' } = options;
  requireLevel(level);
  const usable = usableFollowUp(data);
  const chosen = options.given === undefined ? usable : conditional(usable, options.given);
  const table = riskTable(chosen.data, options.order ?? orderTimes(chosen.data.time));
  const z = criticalValue(level);
  const curve = productLimit(table, z, limits);
  return {
    ...table,
    ...curve,
    level,
    limits,
    method: `Kaplan-Meier, Greenwood variance, ${level * 100}% ${LIMIT_NAMES[limits]}`,
    n: chosen.data.time.length,
    leftOut: chosen.leftOut,
    notes: notesOn(table, curve.survival, chosen.data.entry !== undefined),
  };
}

/**
 * Direct products for S; logs only in the variance. Greenwood's term is infinite
 * when everyone at risk has the event: S is 0 from there on and has no standard error.
 */
function productLimit({ atRisk, eventsAt }: RiskTable, z: number, kind: LimitKind) {
  const groups = atRisk.length;
  const survival = new Float64Array(groups);
  const se = new Float64Array(groups);
  const lower = new Float64Array(groups);
  const upper = new Float64Array(groups);
  let s = 1;
  let greenwood = 0;
  let events = 0;
  for (let g = 0; g < groups; g++) {
    const d = eventsAt[g]!;
    if (d > 0 || g === 0) {
      const n = atRisk[g]!;
      events += d;
      s *= (n - d) / n;
      if (d > 0) greenwood += d / (n * (n - d));
      const hazardSe = Math.sqrt(greenwood);
      survival[g] = s;
      se[g] = s === 0 ? NaN : s * hazardSe;
      lower[g] = survivalLimit(s, hazardSe, z, kind, -1);
      upper[g] = survivalLimit(s, hazardSe, z, kind, 1);
    } else {
      survival[g] = s;
      se[g] = se[g - 1]!;
      lower[g] = lower[g - 1]!;
      upper[g] = upper[g - 1]!;
    }
  }
  return { survival, se, lower, upper, events };
}

function conditional({ data, leftOut }: ReturnType<typeof usableFollowUp>, given: number) {
  const kept = [...data.time.keys()].filter((i) => data.time[i]! > given);
  const entry = Float64Array.from(kept, (i) => Math.max(given, data.entry?.[i] ?? given));
  return {
    data: { time: Float64Array.from(kept, (i) => data.time[i]!), event: Uint8Array.from(kept, (i) => data.event[i]!), entry },
    leftOut: [...leftOut, { reason: `follow-up ended by ${given}`, count: data.time.length - kept.length }],
  };
}

/**
 * With delayed entry the first risk sets can be tiny: when the only person at
 * risk has the event the curve falls to 0 and stays there, whatever comes later.
 */
function notesOn({ atRisk, time }: RiskTable, survival: Float64Array, delayedEntry: boolean): string[] {
  if (!delayedEntry) return [];
  const fall = survival.indexOf(0);
  if (fall < 0 || fall === survival.length - 1) return [];
  return [`All ${atRisk[fall]} at risk at ${time[fall]} had the event, so the curve is 0 from there although others entered later; ask for survival given a later start.`];
}

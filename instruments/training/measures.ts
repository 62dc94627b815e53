import { roundKg } from '../units';

/** Sum of repetitions times load; sets without kilograms (bands, body weight) count in repetitions only. `hands` 2 doubles a per-hand load. */
export function volumeLoad(sets: readonly { reps: number; loadKg: number | null }[], hands: 1 | 2 = 1): { volumeLoadKg: number; totalReps: number } {
  return {
    volumeLoadKg: roundKg(hands * sets.reduce((sum, { reps, loadKg }) => sum + reps * (loadKg ?? 0), 0)),
    totalReps: sets.reduce((sum, { reps }) => sum + reps, 0),
  };
}

/** Session load in arbitrary units: rating of effort (0–10) times minutes. Form: Foster 2001, from memory. */
export function sessionLoad({ effort, minutes }: { effort: number; minutes: number }): number {
  return effort * minutes;
}

export interface OneRepMax {
  readonly epleyKg: number | null;
  readonly brzyckiKg: number | null;
  /** Beyond ten repetitions both formulas wander; say so beside the figure. */
  readonly isReliable: boolean;
}

/**
 * One-repetition maximum from a set to exhaustion: Epley w(1 + r/30), Brzycki 36w/(37 − r). One repetition is the
 * maximum itself. From 37 repetitions Brzycki does not exist (null). Throws RangeError below one repetition or at no load.
 */
export function oneRepMax({ loadKg, reps }: { loadKg: number; reps: number }): OneRepMax {
  if (!(loadKg > 0) || !Number.isInteger(reps) || reps < 1) throw new RangeError('One-repetition maximum needs a load and one repetition or more.');
  if (reps === 1) return { epleyKg: loadKg, brzyckiKg: loadKg, isReliable: true };
  return { epleyKg: loadKg * (1 + reps / 30), brzyckiKg: reps < 37 ? (36 * loadKg) / (37 - reps) : null, isReliable: reps <= 10 };
}

/** Done over prescribed, in percent; null when nothing was prescribed. */
export function adherencePct({ done, prescribed }: { done: number; prescribed: number }): number | null {
  return prescribed > 0 ? (100 * done) / prescribed : null;
}

/** Volume load lifted over volume load prescribed, in percent, over matching sessions. */
export function relativeDosePct({ doneKg, prescribedKg }: { doneKg: readonly number[]; prescribedKg: readonly number[] }): number | null {
  const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
  return adherencePct({ done: sum(doneKg), prescribed: sum(prescribedKg) });
}

/**
 * The published way back after missed weeks: two training weeks back for every week missed, never before the first week.
 * Returns the load to resume at. Source: table 2 of PMC6186337. It differs from the 20–50 % rule for short breaks; the
 * protocol says which applies. Throws RangeError on an empty history.
 */
export function resumeTwoWeeksPerWeek({ weeklyLoadsKg, weeksMissed }: { weeklyLoadsKg: readonly number[]; weeksMissed: number }): number {
  const load = weeklyLoadsKg[Math.max(0, weeklyLoadsKg.length - 1 - 2 * weeksMissed)];
  if (load === undefined) throw new RangeError('There is no training week to step back to.');
  return load;
}

export interface WeeklyProgression {
  /** Least-squares slope over week number. */
  readonly slopeKgPerWeek: number | null;
  readonly totalChangeKg: number;
  readonly changePct: number | null;
  readonly weeksWithRaise: number;
  readonly maxStepKg: number;
}

/** How load moved over consecutive weeks; the slope needs two weeks, the percentage a first load above zero. */
export function weeklyProgression(weeklyLoadsKg: readonly number[]): WeeklyProgression {
  const first = weeklyLoadsKg[0] ?? 0;
  const totalChangeKg = (weeklyLoadsKg.at(-1) ?? first) - first;
  const steps = weeklyLoadsKg.slice(1).map((load, i) => load - (weeklyLoadsKg[i] ?? load));
  return {
    slopeKgPerWeek: slope(weeklyLoadsKg),
    totalChangeKg,
    changePct: first > 0 ? (100 * totalChangeKg) / first : null,
    weeksWithRaise: steps.filter((step) => step > 1e-6).length,
    maxStepKg: Math.max(0, ...steps),
  };
}

function slope(values: readonly number[]): number | null {
  if (values.length < 2) return null;
  const meanX = (values.length - 1) / 2;
  const meanY = values.reduce((sum, y) => sum + y, 0) / values.length;
  const sxy = values.reduce((sum, y, x) => sum + (x - meanX) * (y - meanY), 0);
  const sxx = values.reduce((sum, _, x) => sum + (x - meanX) ** 2, 0);
  return sxy / sxx;
}

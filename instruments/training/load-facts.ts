import { addDays, daysBetween, type LocalDate, mondayOf } from '../calendar';
import type { ArmState, LoadFacts, PastLoad } from './define-training-rule';
import { LOAD_EPSILON_KG, type TrainingSettings } from './settings';

/** Places one load in its history. `past` is oldest first and holds only earlier sessions of the same key. */
export function loadFacts(
  { load, isBand, on, arm, past }: { load: number; isBand: boolean; on: LocalDate; arm: ArmState; past: readonly PastLoad[] },
  settings: TrainingSettings,
): LoadFacts {
  const previous = past.at(-1) ?? null;
  const gapDays = previous && daysBetween({ from: previous.on, to: on });
  // Oldest first, so a week is a run at the end: a long log is not walked again for every load.
  const thisWeekAt = startOfWeekRun(past, mondayOf(on), past.length);
  const lastBefore = past[thisWeekAt - 1];
  const lastWeek = lastBefore ? past.slice(startOfWeekRun(past, mondayOf(lastBefore.on), thisWeekAt), thisWeekAt) : [];
  return {
    load,
    isBand,
    on,
    arm,
    past,
    previous,
    gapDays,
    isAfterBreak: gapDays !== null && gapDays >= settings.breakDays,
    firstLoadThisWeek: past[thisWeekAt]?.load ?? null,
    lastWeekMax: lastWeek.length > 0 ? Math.max(...lastWeek.map((session) => session.load)) : null,
  };
}

/** Index of the first session on or after `monday` among those before `end`. */
function startOfWeekRun(past: readonly PastLoad[], monday: LocalDate, end: number): number {
  let start = end;
  while (start > 0 && (past[start - 1]?.on ?? monday) >= monday) start -= 1;
  return start;
}

/** The loads a break lets one resume at, and whether any step of the equipment falls among them. */
export function resumeWindow(preBreakKg: number, settings: TrainingSettings): { fromKg: number; toKg: number; isFeasible: boolean } {
  const fromKg = preBreakKg * settings.resumeFromFraction;
  const toKg = preBreakKg * settings.resumeToFraction;
  const lightest = Math.ceil(fromKg / settings.incrementKg - 1e-9) * settings.incrementKg;
  return { fromKg, toKg, isFeasible: lightest <= toKg + 1e-9 };
}

/** The day the load last rose above all it had been in the `withinDays` before; a first session counts as a raise. */
export function lastRaiseOn(past: readonly PastLoad[], withinDays: number): LocalDate | null {
  return past.findLast((session, i) => isRaise(past, i, addDays(session.on, -withinDays)))?.on ?? null;
}

/** Whether every session between `after` and the one at `index` was lighter. Walks back only as far as it must. */
function isRaise(past: readonly PastLoad[], index: number, after: LocalDate): boolean {
  const load = past[index]?.load ?? 0;
  for (let i = index - 1; i >= 0; i -= 1) {
    const before = past[i];
    if (!before || before.on <= after) return true;
    if (before.load >= load - LOAD_EPSILON_KG) return false;
  }
  return true;
}

/** Sessions at `load` or above in the `withinDays` before `on`. */
export function sessionsAtLoad(past: readonly PastLoad[], { load, on, withinDays }: { load: number; on: LocalDate; withinDays: number }): number {
  return past.filter((session) => session.load >= load - LOAD_EPSILON_KG && daysBetween({ from: session.on, to: on }) < withinDays).length;
}

/** How far a week's first session lies above the last active week; null when the weekly rule does not apply to it. */
export function weeklyRise({ load, previous, isAfterBreak, firstLoadThisWeek, lastWeekMax }: LoadFacts): number | null {
  if (previous === null || isAfterBreak || firstLoadThisWeek !== null || lastWeekMax === null) return null;
  return load - lastWeekMax;
}

/** Tolerance belongs to kilograms; a band's level is exact. */
export function toleranceFor({ isBand }: LoadFacts, settings: TrainingSettings): number {
  return (isBand ? 0 : settings.toleranceKg) + LOAD_EPSILON_KG;
}

import { daysBetween, type LocalDate, mondayOf } from '../calendar';
import type { ArmState, LoadFacts, PastLoad } from './define-training-rule';
import { LOAD_EPSILON_KG, type TrainingSettings } from './settings';

/** Places one load in its history. `past` is oldest first and holds only earlier sessions of the same key. */
export function loadFacts(
  { load, isBand, on, arm, past }: { load: number; isBand: boolean; on: LocalDate; arm: ArmState; past: readonly PastLoad[] },
  settings: TrainingSettings,
): LoadFacts {
  const previous = past.at(-1) ?? null;
  const gapDays = previous && daysBetween({ from: previous.on, to: on });
  const thisMonday = mondayOf(on);
  const earlier = past.filter((session) => mondayOf(session.on) !== thisMonday);
  const lastMonday = earlier.at(-1) && mondayOf(earlier.at(-1)?.on ?? on);
  const lastWeek = earlier.filter((session) => mondayOf(session.on) === lastMonday);
  return {
    load,
    isBand,
    on,
    arm,
    past,
    previous,
    gapDays,
    isAfterBreak: gapDays !== null && gapDays >= settings.breakDays,
    firstLoadThisWeek: past.find((session) => mondayOf(session.on) === thisMonday)?.load ?? null,
    lastWeekMax: lastWeek.length > 0 ? Math.max(...lastWeek.map((session) => session.load)) : null,
  };
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
  const isRaise = (session: PastLoad, i: number): boolean =>
    past.slice(0, i).every((before) => before.load < session.load - LOAD_EPSILON_KG || daysBetween({ from: before.on, to: session.on }) >= withinDays);
  return past.findLast(isRaise)?.on ?? null;
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

import { addDays, daysBetween, type LocalDate, visitWindow, weekday } from '@/instruments/calendar';
import type { Draw } from './draw';
import type { Person } from './person';
import type { Plan } from './plan';

/** What became of a visit, as far as today. */
export type VisitOutcome =
  | { readonly kind: 'done'; readonly on: LocalDate; readonly minutes: number }
  | { readonly kind: 'under way'; readonly on: LocalDate }
  | { readonly kind: 'missed'; readonly on: LocalDate; readonly reason: string }
  | { readonly kind: 'booked'; readonly on: LocalDate; readonly minutes: number }
  /** Not done, and nobody has said why; or simply still to come. */
  | { readonly kind: 'open' };

export interface PlannedVisit {
  readonly id: string;
  readonly key: string;
  readonly name: string;
  readonly targetOn: LocalDate;
  readonly opensOn: LocalDate;
  readonly closesOn: LocalDate;
  readonly questionnaires: readonly string[];
  readonly unscheduledReason: string | null;
  readonly outcome: VisitOutcome;
}

export interface Leaving {
  readonly on: LocalDate;
  readonly grade: 'stops training' | 'no visits' | 'no further data';
  readonly reason: string;
}

const missedReasons = ['Unwell on the day', 'Could not be reached', 'Away from home', 'Family matters', 'Clinic was closed', 'Did not come to the appointment'];
const leavingReasons = ['No time for the training', 'Moved away', 'Too many appointments', 'Unwell for another reason', 'Worried about the arm', 'No reason given'];

export function planLeaving(plan: Plan, person: Person, draw: Draw): Leaving | null {
  const day = draw.whole(40, 900);
  const grade = draw.weighted<Leaving['grade']>([['stops training', 5], ['no visits', 3], ['no further data', 2]]);
  const reason = draw.pick(leavingReasons);
  const leaves = draw.chance(0.2);
  const on = addDays(person.enrolledOn, day);
  return leaves && !person.cast && day < 720 && plan.clock.age(on, person.site.timeZone) >= 2 ? { on, grade, reason } : null;
}

/** A working day at or after the date. */
const workday = (date: LocalDate): LocalDate => addDays(date, weekday(date) === 6 ? 2 : weekday(date) === 7 ? 1 : 0);
const visitMinutes = (draw: Draw): number => draw.pick([570, 585, 600, 630, 660, 690, 780, 810, 840, 870, 900, 930]);

export function planVisits(plan: Plan, person: Person, leaving: Leaving | null, ids: Draw): PlannedVisit[] {
  const draw = person.draw('visits');
  draw.uniform(0, 1);
  return plan.protocol.visits.map((visit) => {
    const window = visitWindow({ anchorOn: person.enrolledOn, offsetDays: visit.offsetDays, beforeDays: visit.earlyDays, afterDays: visit.lateDays });
    return {
      id: ids.uuid(), key: visit.key, name: visit.name, ...window, questionnaires: visit.questionnaires, unscheduledReason: null,
      outcome: outcomeOf({ plan, person, draw, leaving, window, key: visit.key }),
    };
  });
}

function outcomeOf({ plan, person, draw, leaving, window, key }: {
  plan: Plan; person: Person; draw: Draw; leaving: Leaving | null; key: string;
  window: { targetOn: LocalDate; opensOn: LocalDate; closesOn: LocalDate };
}): VisitOutcome {
  // Every visit takes the same draws whatever comes of it, so that one outcome does not move the next.
  const spread = key === 'baseline' ? Math.abs(draw.normal(0, 3)) : draw.normal(1, daysBetween({ from: window.targetOn, to: window.closesOn }) / 2.6);
  const [minutes, fate, reason, lateDays] = [visitMinutes(draw), draw.uniform(0, 1), draw.pick(missedReasons), draw.whole(2, 18)];
  const age = (date: LocalDate): number => plan.clock.age(date, person.site.timeZone);
  const scripted = scriptedOutcome(plan, person, key);
  if (scripted) return scripted;
  if (leaving && leaving.grade !== 'stops training' && leaving.on < window.closesOn) return { kind: 'missed', on: leaving.on, reason: 'Left the study' };
  const missShare = key === 'baseline' || person.cast ? 0 : 0.2 * (1.35 - person.diligence);
  if (fate < missShare) return age(window.closesOn) > 15 ? { kind: 'missed', on: workday(addDays(window.closesOn, 1 + (lateDays % 9))), reason } : { kind: 'open' };
  const isLate = fate > 0.945 && key !== 'baseline' && !person.cast;
  const wanted = isLate ? addDays(window.closesOn, lateDays) : workday(clampDate(addDays(window.targetOn, Math.round(spread)), window));
  if (age(wanted) > 0) return { kind: 'done', on: wanted, minutes };
  const bookable = age(window.opensOn) > -14 && fate > missShare + 0.2;
  return bookable || (age(wanted) === 0 && age(window.opensOn) >= 0) ? { kind: 'booked', on: wanted, minutes } : { kind: 'open' };
}

function clampDate(date: LocalDate, { opensOn, closesOn }: { opensOn: LocalDate; closesOn: LocalDate }): LocalDate {
  if (date < opensOn) return opensOn;
  // Two days off the end leave room for a weekend.
  return date > closesOn ? addDays(closesOn, -2) : date;
}

function scriptedOutcome(plan: Plan, person: Person, key: string): VisitOutcome | null {
  const today = plan.clock.today(person.site.timeZone);
  const part = person.cast?.part;
  if (part === 'middle of the programme') {
    const days: Record<string, number> = { baseline: 0, 'month-3': 94, 'month-6': 177 };
    const day = days[key];
    if (day !== undefined) return { kind: 'done', on: addDays(person.enrolledOn, day), minutes: 640 };
    return key === 'month-9' ? { kind: 'under way', on: today } : { kind: 'open' };
  }
  if (part === 'baseline booked' && key === 'baseline') return nextSlot(plan, person, [840, 930]);
  if (part === 'before month 3' && key === 'month-3') return { kind: 'booked', on: workday(addDays(today, 3)), minutes: 630 };
  return null;
}

function nextSlot(plan: Plan, { site }: Person, slots: readonly number[]): VisitOutcome {
  const today = plan.clock.today(site.timeZone);
  const free = slots.find((minutes) => !plan.clock.isPast(plan.clock.at(today, minutes - 30, site.timeZone)));
  return { kind: 'booked', on: free === undefined ? addDays(today, 1) : today, minutes: free ?? slots[0] ?? 840 };
}

/** An unscheduled visit after a report. */
export const extraVisit = (ids: Draw, on: LocalDate, minutes: number): PlannedVisit => ({
  id: ids.uuid(), key: 'extra', name: 'Unscheduled visit', targetOn: on, opensOn: on, closesOn: addDays(on, 7), questionnaires: [], unscheduledReason: 'Change in the arm reported',
  outcome: { kind: 'done', on, minutes },
});

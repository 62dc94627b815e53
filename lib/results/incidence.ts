import { kaplanMeier, type SurvivalCurve } from '@/stats/survival/kaplan-meier';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { survivalAt } from '@/stats/survival/survival-at';
import { methodOf, statistics } from '@/stats/registry';
import { swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import type { Population } from '@/lib/summary/population';
import { readSwellingCourses, swellingFollowUp, type Confirmation, type SwellingFollowUp } from '@/lib/summary/swelling-timelines';
import type { Work } from '@/lib/work/work';
import { foldSmall, showCount, type ShownCount } from './hide-small';

/** A share read off the curve at one time. */
export interface IncidenceAt {
  readonly months: number;
  readonly share: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  /** People with swelling by then, as observed. */
  readonly events: ShownCount;
  readonly atRisk: ShownCount;
  /** Why there is no share. */
  readonly reason: string | null;
}

/** Cumulative incidence of one definition: proportions, days from baseline. */
export interface IncidenceView {
  readonly code: SwellingCode;
  readonly name: string;
  readonly sentence: string;
  readonly steps: readonly { readonly day: number; readonly month: number; readonly share: number; readonly lower: number | null; readonly upper: number | null }[];
  readonly lastDay: number;
  /** The same in mean months, as drawn. */
  readonly lastMonth: number;
  /** Still followed at each of `riskMonths`. */
  readonly atRisk: readonly ShownCount[];
  readonly at: readonly IncidenceAt[];
  readonly n: ShownCount;
  readonly events: ShownCount;
  readonly method: string;
  readonly reference: string;
  readonly leftOut: readonly { readonly reason: string; readonly count: ShownCount }[];
  readonly notes: readonly string[];
}

/** A mean month (365.25 days over 12), for reading a curve in days at months. */
const monthDays = 30.4375;
export const riskMonths = [0, 3, 6, 9, 12, 15, 18, 21, 24] as const;
const readMonths = [6, 12, 24] as const;

/** One minus a survival limit; null where it does not exist. */
const complement = (limit: number | null | undefined): number | null => (limit == null || Number.isNaN(limit) ? null : 1 - limit);

/** The steps at which somebody swells; where only follow-up ends the curve does not move. Under a limit the first that many people are one step. */
function stepsOf(curve: SurvivalCurve, { lastDay, below }: { lastDay: number; below: number }): IncidenceView['steps'] {
  let swelled = 0;
  return Array.from(curve.time, (day, index) => ({ day, index, events: curve.eventsAt[index] ?? 0 }))
    .map((step) => ({ ...step, swelled: (swelled += step.events) }))
    .filter((step) => step.day <= lastDay && step.events > 0 && step.swelled >= below)
    .map(({ day, index }) => ({ day, month: day / monthDays, share: 1 - (curve.survival[index] ?? 1), lower: complement(curve.upper[index]), upper: complement(curve.lower[index]) }));
}

/** The last day of the curve; under a limit, the last on which that many were still followed (DEI-18). */
function lastDayOf(curve: SurvivalCurve, below: number): number {
  const days = Array.from(curve.time).filter((_, index) => (curve.atRisk[index] ?? 0) >= below);
  return days.at(-1) ?? 0;
}

function readAt(curve: SurvivalCurve, followUp: SwellingFollowUp, months: number, { lastDay, below }: { lastDay: number; below: number }): IncidenceAt {
  const day = months * monthDays;
  const events = followUp.time.reduce((sum, time, row) => sum + (time <= day && followUp.event[row] === 1 ? 1 : 0), 0);
  const atRisk = numberAtRisk(followUp, [day])[0] ?? 0;
  const counts = { months, events: showCount(events, below), atRisk: showCount(atRisk, below) };
  const none = { ...counts, share: null, lower: null, upper: null };
  if (lastDay < day) return { ...none, reason: below > 0 && atRisk > 0 ? 'fewer than 5 followed so long' : 'nobody followed so long' };
  if (counts.events === null) return { ...none, reason: 'fewer than 5 people' };
  const { estimate, lower, upper } = survivalAt(curve, day);
  return { ...counts, share: complement(estimate), lower: complement(upper), upper: complement(lower), reason: null };
}

/** The estimate from follow-up that was read already. `below` hides counts under it. */
export function incidenceOf(code: SwellingCode, followUp: SwellingFollowUp, below: number): IncidenceView {
  const curve = kaplanMeier(followUp);
  const lastDay = lastDayOf(curve, below);
  const { name, sentence } = swellingDefinition(code);
  return {
    code,
    name,
    sentence,
    steps: stepsOf(curve, { lastDay, below }),
    lastDay,
    lastMonth: lastDay / monthDays,
    atRisk: numberAtRisk(followUp, riskMonths.map((months) => months * monthDays)).map((count) => showCount(count, below)),
    at: readMonths.map((months) => readAt(curve, followUp, months, { lastDay, below })),
    n: showCount(curve.n, below),
    events: showCount(curve.events, below),
    method: methodOf('kaplanMeier'),
    reference: statistics.find(({ name: statistic }) => statistic === 'kaplanMeier')?.reference ?? '',
    leftOut: foldSmall(followUp.leftOut, below),
    notes: curve.notes,
  };
}

/** One minus Kaplan-Meier with log-log limits, read from the completed assessments of a population in reach. */
export async function viewIncidence(work: Work, code: SwellingCode, { confirmation, population, below }: { confirmation: Confirmation; population: Population; below: number }): Promise<IncidenceView> {
  const { courses, withoutBaseline } = await readSwellingCourses(work, code, population);
  return incidenceOf(code, swellingFollowUp(courses, confirmation, withoutBaseline), below);
}

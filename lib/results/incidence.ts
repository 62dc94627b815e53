import { kaplanMeier, type SurvivalCurve } from '@/stats/survival/kaplan-meier';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { survivalAt } from '@/stats/survival/survival-at';
import { swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import { readSwellingCourses, swellingFollowUp, type Confirmation } from '@/lib/summary/swelling-timelines';
import type { Work } from '@/lib/work/work';

/** Cumulative incidence of one definition: proportions, days from baseline. */
export interface IncidenceView {
  readonly code: SwellingCode;
  readonly name: string;
  readonly sentence: string;
  readonly steps: readonly { readonly day: number; readonly share: number; readonly lower: number | null; readonly upper: number | null }[];
  readonly lastDay: number;
  /** Still followed at each of `riskMonths`. */
  readonly atRisk: readonly number[];
  readonly at: readonly { readonly months: number; readonly share: number | null; readonly lower: number | null; readonly upper: number | null; readonly atRisk: number }[];
  readonly n: number;
  readonly events: number;
  readonly method: string;
  readonly leftOut: readonly { readonly reason: string; readonly count: number }[];
  readonly notes: readonly string[];
}

/** A mean month, for reading a curve in days at months. */
export const monthDays = 30.4375;
export const riskMonths = [0, 6, 12, 18, 24] as const;
const readMonths = [6, 12, 24] as const;

/** One minus a survival limit; null where it does not exist. */
const complement = (limit: number | null | undefined): number | null => (limit == null || Number.isNaN(limit) ? null : 1 - limit);

/** The steps at which somebody swells; where only follow-up ends the curve does not move. */
function stepsOf(curve: SurvivalCurve): IncidenceView['steps'] {
  return Array.from(curve.time, (day, index) => ({ day, index }))
    .filter(({ index }) => (curve.eventsAt[index] ?? 0) > 0)
    .map(({ day, index }) => ({ day, share: 1 - (curve.survival[index] ?? 1), lower: complement(curve.upper[index]), upper: complement(curve.lower[index]) }));
}

/** One minus Kaplan-Meier with log-log limits, read from the completed assessments in reach. */
export async function viewIncidence(work: Work, code: SwellingCode, confirmation: Confirmation): Promise<IncidenceView> {
  const { courses, withoutBaseline } = await readSwellingCourses(work, code);
  const followUp = swellingFollowUp(courses, confirmation, withoutBaseline);
  const curve = kaplanMeier(followUp);
  const lastDay = followUp.time.reduce((most, time) => Math.max(most, time), 0);
  const { name, sentence } = swellingDefinition(code);
  const readAt = (months: number): IncidenceView['at'][number] => {
    const day = months * monthDays;
    const atRisk = numberAtRisk(followUp, [day])[0] ?? 0;
    if (lastDay < day) return { months, share: null, lower: null, upper: null, atRisk };
    const { estimate, lower, upper } = survivalAt(curve, day);
    return { months, share: complement(estimate), lower: complement(upper), upper: complement(lower), atRisk };
  };
  return {
    code,
    name,
    sentence,
    steps: stepsOf(curve),
    lastDay,
    atRisk: numberAtRisk(followUp, riskMonths.map((months) => months * monthDays)),
    at: readMonths.map(readAt),
    n: curve.n,
    events: curve.events,
    method: curve.method,
    leftOut: followUp.leftOut,
    notes: curve.notes,
  };
}

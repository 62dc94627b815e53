import { daysBetween } from '@/instruments/calendar';
import { firstOccurrence, sustained, type JudgedVisit } from '@/instruments/swelling/occurrence';
import type { SwellingCode } from '@/instruments/swelling';
import type { Work } from '@/lib/work/work';
import { inPopulation, type Population } from './population';

/** Which judgement ends follow-up: the first visit that meets the definition, or the first of two consecutive scheduled ones. */
export type Confirmation = 'first visit' | 'confirmed at the next visit';

/** One participant's course under one definition. Days count from the baseline visit. */
export interface SwellingCourse {
  readonly participantId: string;
  readonly visits: readonly JudgedVisit[];
}

interface Row {
  participant_id: string;
  baseline_on: string | null;
  done_on: string | null;
  is_baseline: boolean;
  is_scheduled: boolean;
  verdict: JudgedVisit['verdict'] | null;
}

/** Every participant in reach with the verdicts of one definition, ordered by day. One statement. */
export async function readSwellingCourses(work: Work, code: SwellingCode, population: Population = {}): Promise<{ courses: SwellingCourse[]; withoutBaseline: number }> {
  const { where, values } = inPopulation('p', population);
  const rows = await work.sql<Row>(
    `select p.id as participant_id, b.done_on::text as baseline_on, v.done_on::text as done_on, coalesce(v.key = 'baseline', false) as is_baseline,
       coalesce(v.unscheduled_reason is null, false) as is_scheduled, a.verdicts -> ? ->> 'verdict' as verdict
     from participant p
     left join lateral (select v.done_on from visit v join limb_assessment a on a.visit_id = v.id where v.participant_id = p.id and v.key = 'baseline' and a.state = 'complete' limit 1) b on true
     left join limb_assessment a on a.participant_id = p.id and a.state = 'complete' left join visit v on v.id = a.visit_id
     where ${where}
     order by p.id, v.done_on`,
    [code, ...values],
  );
  const courses = new Map<string, { participantId: string; visits: JudgedVisit[] }>();
  const without = new Set<string>();
  for (const row of rows) {
    if (row.baseline_on === null) {
      without.add(row.participant_id);
      continue;
    }
    const course = courses.get(row.participant_id) ?? { participantId: row.participant_id, visits: [] };
    courses.set(row.participant_id, course);
    if (row.done_on !== null && row.verdict !== null)
      course.visits.push({ day: daysBetween({ from: row.baseline_on, to: row.done_on }), verdict: row.verdict, scheduled: row.is_scheduled });
  }
  return { courses: [...courses.values()], withoutBaseline: without.size };
}

/** Follow-up as survival estimators take it, with what was left out and why. */
export interface SwellingFollowUp {
  /** Days from baseline to onset or to the last assessment. */
  readonly time: Float64Array;
  readonly event: Uint8Array;
  readonly leftOut: readonly { readonly reason: string; readonly count: number }[];
}

/**
 * Time to swelling. Who meets the definition at baseline already is no new case and leaves the denominator; who has no
 * assessment after baseline gives no follow-up; everyone else is followed to onset or to the last judged assessment.
 */
export function swellingFollowUp(courses: readonly SwellingCourse[], confirmation: Confirmation, withoutBaseline = 0): SwellingFollowUp {
  const time: number[] = [];
  const event: number[] = [];
  const left = { prevalent: 0, unfollowed: 0 };
  for (const { visits } of courses) {
    const later = visits.filter(({ day }) => day > 0);
    const lastDay = Math.max(0, ...later.filter(({ verdict }) => verdict !== 'not judged').map(({ day }) => day));
    if (visits.some(({ day, verdict }) => day <= 0 && verdict === 'met')) left.prevalent += 1;
    else if (lastDay === 0) left.unfollowed += 1;
    else {
      const onset = confirmation === 'first visit' ? firstOccurrence(later) : sustained(later);
      time.push(onset?.day ?? lastDay);
      event.push(onset ? 1 : 0);
    }
  }
  const reasons = [
    { reason: 'no complete baseline', count: withoutBaseline },
    { reason: 'swelling at baseline already', count: left.prevalent },
    { reason: 'no judged assessment after baseline', count: left.unfollowed },
  ];
  return { time: Float64Array.from(time), event: Uint8Array.from(event), leftOut: reasons.filter(({ count }) => count > 0) };
}

import { addDays } from '@/instruments/calendar';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { groupOf } from './group-of';
import type { TodaySite, VisitWork } from './work-item';

interface Row extends Omit<VisitWork, 'kind' | 'group' | 'dueOn' | 'today' | 'timeZone' | 'siteName' | 'bookedOn'> {
  siteId: string;
}

/** The day a visit asks for: its appointment, else its target while that is to come, else the last day of its window. */
function dueDay({ state, bookedOn, targetOn, closesOn, today }: { state: string; bookedOn: string | null; targetOn: string; closesOn: string; today: string }): string {
  if (state === 'in progress') return today;
  if (bookedOn !== null && bookedOn >= today) return bookedOn;
  if (closesOn < today) return closesOn;
  // An appointment that passed without the visit having begun is asked about on the day itself.
  if (bookedOn !== null) return today;
  return targetOn >= today ? targetOn : closesOn;
}

/**
 * Visits that have not ended and ask for something up to `days` from now; one statement.
 * Who left the study has no visits due, unless only the training was stopped.
 */
export async function listVisitsDue(work: Work, sites: ReadonlyMap<string, TodaySite>, days: number): Promise<VisitWork[]> {
  const rows = await work.sql<Row>(
    `select v.id, v.site_id as "siteId", p.code, v.name, v.opens_on::text as "opensOn", v.target_on::text as "targetOn", v.closes_on::text as "closesOn", v.booked_at::text as "bookedAt", v.state,
       (select count(*)::int from limb_assessment a where a.visit_id = v.id and a.state = 'complete') + (select count(*)::int from questionnaire_response q where q.visit_id = v.id and q.state = 'submitted') as "formsDone",
       1 + (select count(*)::int from questionnaire_response q where q.visit_id = v.id) as "formsOf"
     from visit v join participant p on p.id = v.participant_id
     where v.state in ('to come', 'in progress') and (p.state = 'enrolled' or p.left_grade = 'stops training')
       and (v.state = 'in progress' or v.target_on <= ?::date + ?::int or v.closes_on <= ?::date + ?::int or v.booked_at <= ?::timestamptz + make_interval(days => ?::int))
     order by v.closes_on, p.code`,
    [localDate(work.now, 'UTC'), days, localDate(work.now, 'UTC'), days, work.now, days],
  );
  return rows.flatMap(({ siteId, ...row }) => {
    const site = sites.get(siteId);
    if (!site) return [];
    const { today, timeZone, name: siteName } = site;
    const bookedAt = row.bookedAt === null ? null : moment(row.bookedAt);
    const bookedOn = bookedAt && localDate(bookedAt, timeZone);
    const dueOn = dueDay({ ...row, bookedOn, today });
    if (dueOn > addDays(today, days)) return [];
    return [{ ...row, kind: 'visit' as const, today, timeZone, siteName, bookedAt: bookedAt?.toISOString() ?? null, bookedOn, dueOn, group: groupOf({ dueOn, today }) }];
  });
}

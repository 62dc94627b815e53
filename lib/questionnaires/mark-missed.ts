import type { Work } from '@/lib/work/work';

/**
 * Questionnaires whose window has closed unsent are missed, by the clock of each site. Answers kept so far stay.
 * Visits are not touched: why one did not take place is for the coordinator to say.
 */
export async function markMissed(work: Work): Promise<{ missed: number }> {
  const rows = await work.sql(
    `update questionnaire_response q set state = 'missed', version = q.version + 1 from site s
     where s.id = q.site_id and q.state in ('due', 'in progress') and q.closes_on < (?::timestamptz at time zone s.time_zone)::date returning q.id`,
    [work.now],
  );
  return { missed: rows.length };
}

import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** A site in reach with its own today. */
export interface TodaySite {
  readonly name: string;
  readonly today: string;
  readonly recruitmentTarget: number;
}

/** A piece of SQL with its values. */
interface Part {
  readonly text: string;
  readonly values: readonly unknown[];
}

/**
 * The sites in reach, each with its own today, the moment of the transaction, and the last day that is shown, so many
 * days ahead: `site_day` for a `with`.
 */
export const siteDay = (work: Work, daysAhead: number): Part => ({
  text: `site_day as materialized (
    select id, name, code, time_zone, recruitment_target, day.now, (day.now at time zone time_zone)::date as today, (day.now at time zone time_zone)::date + ?::int as last_on
    from site, (select ?::timestamptz as now) day where id = any (?::uuid[]))`,
  values: [daysAhead, work.now, `{${work.actor.reach.join(',')}}`],
});

/** The sites in reach by name, and the today of the first: the day in the page's head. */
export async function findSites(work: Work): Promise<{ sites: readonly TodaySite[]; today: string }> {
  const { text, values } = siteDay(work, 0);
  const sites = await work.sql<TodaySite>(`with ${text} select name, today::text as today, recruitment_target as "recruitmentTarget" from site_day order by name`, values);
  return { sites, today: sites[0]?.today ?? localDate(work.now, 'UTC') };
}

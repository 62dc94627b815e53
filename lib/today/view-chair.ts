import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { siteDay } from './site-day';
import { stillFollowed } from './work-kind';

/** The booked visits of one day: how many, and when the first of them starts, by the clock of its site. */
export interface ChairDay {
  readonly on: string;
  readonly visits: number;
  readonly first: string;
  readonly timeZone: string;
}

const daysShown = 8;

/** Booked visits by day, the first eight days that have any, from the site's today on. One statement. */
export async function viewChair(work: Work): Promise<ChairDay[]> {
  const days = siteDay(work, 0);
  const rows = await work.sql<ChairDay>(
    `with ${days.text}
     select booked.day::text as "on", count(*)::int as visits, min(v.booked_at)::text as first, (array_agg(s.time_zone order by v.booked_at, v.id))[1] as "timeZone"
     from site_day s
     cross join lateral (select * from visit v where v.site_id = s.id and v.state in ('to come', 'in progress') and v.booked_at is not null offset 0) v
     join participant p on p.id = v.participant_id
     cross join lateral (select (v.booked_at at time zone s.time_zone)::date as day) booked
     where ${stillFollowed} and booked.day >= s.today
     group by booked.day order by booked.day limit ${daysShown}`,
    days.values,
  );
  return rows.map((row) => ({ ...row, first: moment(row.first).toISOString() }));
}

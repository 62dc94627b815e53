import { daysBetween } from '@/instruments/calendar';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** What the masthead and the footer say on every page. */
export interface ShellView {
  /** Queries that wait on this person. */
  readonly queriesWaiting: number;
  /** Symptom reports that nobody has reviewed yet. */
  readonly reportsWaiting: number;
  readonly month: { readonly gone: number; readonly of: number };
  readonly protocolNumber: string | null;
  readonly seal: { readonly lastEntryId: string; readonly sealedAt: Date } | null;
  readonly timeZone: string;
}

interface Row {
  queries: number;
  reports: number;
  starts_on: string;
  ends_on: string;
  protocol: string | null;
  last_entry_id: string | null;
  sealed_at: string | null;
  zones: string[];
}

const monthsBetween = (from: string, to: string): number => Math.max(0, Math.round(daysBetween({ from, to }) / 30.4375));

/** One query for the whole shell. Sites answer open queries; monitors close answered ones. */
export async function viewShell(work: Work): Promise<ShellView> {
  const waitsOn = ['site-coordinator', 'assessor', 'site-investigator'].includes(work.actor.role) ? 'open' : 'answered';
  const reviews = ['site-coordinator', 'site-investigator'].includes(work.actor.role);
  const [row] = await work.sql<Row>(
    `select (select count(*)::int from data_query where state = ? and site_id = any (?::uuid[])) as queries,
       case when ? then (select count(*)::int from symptom_report where state <> 'reviewed' and due_at is not null and site_id = any (?::uuid[])) else 0 end as reports,
       st.starts_on, st.ends_on, pv.number as protocol, se.last_entry_id::text, se.sealed_at,
       (select array_agg(distinct time_zone) from site where id = any (?::uuid[])) as zones
     from study st
     left join lateral (select number from protocol_version where study_id = st.id and effective_on <= ?::date order by effective_on desc, number desc limit 1) pv on true
     left join lateral (select last_entry_id, sealed_at from seal order by id desc limit 1) se on true
     where st.id = ?`,
    [waitsOn, arrayOf(work), reviews, arrayOf(work), arrayOf(work), localDate(work.now, 'UTC'), work.actor.studyId],
  );
  if (!row) throw new Error('The study of a signed-in person exists.');
  const zones = row.zones ?? [];
  const of = monthsBetween(row.starts_on, row.ends_on);
  return {
    queriesWaiting: row.queries,
    reportsWaiting: row.reports,
    month: { gone: Math.min(of, monthsBetween(row.starts_on, localDate(work.now, 'UTC')) + 1), of },
    protocolNumber: row.protocol,
    seal: row.last_entry_id !== null && row.sealed_at !== null ? { lastEntryId: row.last_entry_id, sealedAt: moment(row.sealed_at) } : null,
    timeZone: zones.length === 1 && zones[0] ? zones[0] : 'UTC',
  };
}

/** The reach as PostgreSQL writes an array. */
const arrayOf = (work: Work): string => `{${work.actor.reach.join(',')}}`;

import type { DataQuery } from '@/entities/data-query';
import { localDate, moment, secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { ListQueriesInput } from './input';

/** One line of the list. */
export interface QueryRow {
  readonly id: string;
  readonly number: number;
  readonly state: DataQuery['state'];
  readonly origin: DataQuery['origin'];
  readonly participantCode: string;
  readonly siteName: string;
  readonly visitId: string | null;
  readonly visitName: string | null;
  readonly fieldLabel: string;
  readonly siteId: string;
  /** What is asked now: the first question, or the one asked again. */
  readonly question: string;
  /** The last turn of the thread, whoever took it. */
  readonly lastKind: string;
  readonly lastText: string;
  readonly lastLabel: string;
  /** Whole days since it was raised. */
  readonly ageDays: number;
  readonly raisedAt: string;
  readonly dueOn: string;
  readonly version: number;
}

/** How old the waiting queries of one site are. */
export interface SiteQueries {
  readonly siteId: string;
  readonly siteName: string;
  readonly open: number;
  readonly answered: number;
  readonly late: number;
  /** Ages in days at which an open query stands, each once, at most 31. */
  readonly openAges: readonly number[];
  readonly answeredAges: readonly number[];
}

export interface QueryPage {
  readonly rows: readonly QueryRow[];
  readonly sites: readonly SiteQueries[];
  readonly rowCount: number;
  readonly counts: Readonly<Record<DataQuery['state'], number>>;
}

const orders = { number: 'q.number', raisedAt: 'q.raised_at', state: 'q.state', participant: 'p.code' } as const;

/** One page of the queries in reach, and how many stand in each state. Four statements, however many rows. */
export async function listQueries(work: Work, input: ListQueriesInput): Promise<QueryPage> {
  const { page, pageSize, states, siteId, olderThanDays, sort, direction } = input;
  const where = 'q.state = any (?::text[]) and (?::uuid is null or q.site_id = ?::uuid) and q.raised_at <= ?';
  const filter = [`{${states.join(',')}}`, siteId ?? null, siteId ?? null, secondsAfter(work.now, -olderThanDays * 86_400)];
  const [total] = await work.sql<{ count: number }>(`select count(*)::int as count from data_query q where ${where}`, filter);
  const rows = await work.sql<Omit<QueryRow, 'raisedAt'> & { raisedAt: string }>(
    `select q.id, q.number::int, q.state, q.origin, p.code as "participantCode", s.name as "siteName", q.visit_id as "visitId", v.name as "visitName",
       q.field_label as "fieldLabel", q.site_id as "siteId", asked.text as question, m.kind as "lastKind", m.text as "lastText", m.author_label as "lastLabel", q.raised_at::text as "raisedAt", q.due_on::text as "dueOn", q.version,
       extract(day from ?::timestamptz - q.raised_at)::int as "ageDays"
     from data_query q join participant p on p.id = q.participant_id join site s on s.id = q.site_id left join visit v on v.id = q.visit_id
     left join lateral (select kind, text, author_label from query_message m where m.query_id = q.id and m.kind <> 'remind' order by at desc, id desc limit 1) m on true
     left join lateral (select text from query_message m where m.query_id = q.id and m.kind in ('question', 'ask again', 'reopen') order by at desc, id desc limit 1) asked on true
     where ${where} order by ${orders[sort]} ${direction === 'desc' ? 'desc' : 'asc'}, q.id limit ? offset ?`,
    [work.now, ...filter, pageSize, page * pageSize],
  );
  const counted = await work.sql<{ state: DataQuery['state']; count: number }>(
    'select state, count(*)::int as count from data_query where (?::uuid is null or site_id = ?::uuid) group by state',
    [siteId ?? null, siteId ?? null],
  );
  const sites = await work.sql<SiteQueries>(
    `select s.id as "siteId", s.name as "siteName", count(*) filter (where q.state = 'open')::int as open, count(*) filter (where q.state = 'answered')::int as answered,
       count(*) filter (where q.state = 'open' and q.due_on < ?::date)::int as late,
       coalesce(array_agg(distinct least(31, extract(day from ?::timestamptz - q.raised_at)::int)) filter (where q.state = 'open'), '{}') as "openAges",
       coalesce(array_agg(distinct least(31, extract(day from ?::timestamptz - q.raised_at)::int)) filter (where q.state = 'answered'), '{}') as "answeredAges"
     from site s left join data_query q on q.site_id = s.id and q.state in ('open', 'answered') where s.id = any (?::uuid[]) group by s.id, s.name order by s.name`,
    [localDate(work.now, 'UTC'), work.now, work.now, `{${work.actor.reach.join(',')}}`],
  );
  const counts = { open: 0, answered: 0, closed: 0, cancelled: 0, ...Object.fromEntries(counted.map(({ state, count }) => [state, count])) };
  return { rows: rows.map((row) => ({ ...row, raisedAt: moment(row.raisedAt).toISOString() })), sites, rowCount: total?.count ?? 0, counts };
}

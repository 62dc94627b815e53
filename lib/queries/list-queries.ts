import type { DataQuery } from '@/entities/data-query';
import { moment, secondsAfter } from '@/lib/work/time';
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
  readonly lastText: string;
  readonly lastLabel: string;
  readonly raisedAt: string;
  readonly dueOn: string;
  readonly version: number;
}

export interface QueryPage {
  readonly rows: readonly QueryRow[];
  readonly rowCount: number;
  readonly counts: Readonly<Record<DataQuery['state'], number>>;
}

const orders = { number: 'q.number', raisedAt: 'q.raised_at', state: 'q.state', participant: 'p.code' } as const;

/** One page of the queries in reach, and how many stand in each state. Three statements, however many rows. */
export async function listQueries(work: Work, input: ListQueriesInput): Promise<QueryPage> {
  const { page, pageSize, states, siteId, olderThanDays, sort, direction } = input;
  const where = 'q.state = any (?::text[]) and (?::uuid is null or q.site_id = ?::uuid) and q.raised_at <= ?';
  const filter = [`{${states.join(',')}}`, siteId ?? null, siteId ?? null, secondsAfter(work.now, -olderThanDays * 86_400)];
  const [total] = await work.sql<{ count: number }>(`select count(*)::int as count from data_query q where ${where}`, filter);
  const rows = await work.sql<Omit<QueryRow, 'raisedAt'> & { raisedAt: string }>(
    `select q.id, q.number::int, q.state, q.origin, p.code as "participantCode", s.name as "siteName", q.visit_id as "visitId", v.name as "visitName",
       q.field_label as "fieldLabel", m.text as "lastText", m.author_label as "lastLabel", q.raised_at::text as "raisedAt", q.due_on::text as "dueOn", q.version
     from data_query q join participant p on p.id = q.participant_id join site s on s.id = q.site_id left join visit v on v.id = q.visit_id
     left join lateral (select text, author_label from query_message m where m.query_id = q.id and m.kind <> 'remind' order by at desc, id desc limit 1) m on true
     where ${where} order by ${orders[sort]} ${direction === 'desc' ? 'desc' : 'asc'}, q.id limit ? offset ?`,
    [...filter, pageSize, page * pageSize],
  );
  const counted = await work.sql<{ state: DataQuery['state']; count: number }>(
    'select state, count(*)::int as count from data_query where (?::uuid is null or site_id = ?::uuid) group by state',
    [siteId ?? null, siteId ?? null],
  );
  const counts = { open: 0, answered: 0, closed: 0, cancelled: 0, ...Object.fromEntries(counted.map(({ state, count }) => [state, count])) };
  return { rows: rows.map((row) => ({ ...row, raisedAt: moment(row.raisedAt).toISOString() })), rowCount: total?.count ?? 0, counts };
}

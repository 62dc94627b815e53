import type { DataQuery } from '@/entities/data-query';
import { Refusal } from '@/lib/work/refusal';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One turn of the thread. */
export interface QueryMessageView {
  readonly kind: string;
  readonly text: string;
  readonly label: string;
  readonly role: string;
  readonly at: string;
}

/** A query with its thread, as the margin shows it. */
export interface QueryView {
  readonly id: string;
  readonly number: number;
  readonly state: DataQuery['state'];
  readonly origin: DataQuery['origin'];
  readonly target: { readonly table: string; readonly id: string; readonly field: string; readonly label: string };
  readonly visitId: string | null;
  readonly participantId: string;
  readonly siteName: string;
  readonly raisedAt: string;
  readonly dueOn: string;
  readonly version: number;
  readonly messages: readonly QueryMessageView[];
}

interface Row {
  id: string;
  number: number;
  state: DataQuery['state'];
  origin: DataQuery['origin'];
  target_table: string;
  target_id: string;
  field: string;
  field_label: string;
  visit_id: string | null;
  participant_id: string;
  site_name: string;
  raised_at: string;
  due_on: string;
  version: number;
  messages: QueryMessageView[] | null;
}

const select = `select q.id, q.number::int, q.state, q.origin, q.target_table, q.target_id, q.field, q.field_label, q.visit_id, q.participant_id, s.name as site_name,
    q.raised_at::text, q.due_on::text, q.version,
    (select jsonb_agg(jsonb_build_object('kind', m.kind, 'text', m.text, 'label', m.author_label, 'role', m.author_role, 'at', m.at) order by m.at, m.id) from query_message m where m.query_id = q.id) as messages
  from data_query q join site s on s.id = q.site_id`;

const toView = (row: Row): QueryView => ({
  id: row.id,
  number: row.number,
  state: row.state,
  origin: row.origin,
  target: { table: row.target_table, id: row.target_id, field: row.field, label: row.field_label },
  visitId: row.visit_id,
  participantId: row.participant_id,
  siteName: row.site_name,
  raisedAt: moment(row.raised_at).toISOString(),
  dueOn: row.due_on,
  version: row.version,
  messages: (row.messages ?? []).map((message) => ({ ...message, at: moment(message.at).toISOString() })),
});

/** One query. @throws Refusal 'not-found' when it is out of reach. */
export async function viewQuery(work: Work, id: string): Promise<QueryView> {
  await work.em.flush();
  const [row] = await work.sql<Row>(`${select} where q.id = ?`, [id]);
  if (!row) throw new Refusal('not-found', 'There is no such query in your reach.');
  return toView(row);
}

/** The queries of one visit, oldest first: what stands in its margin. */
export async function queriesOfVisit(work: Work, visitId: string): Promise<QueryView[]> {
  return (await work.sql<Row>(`${select} where q.visit_id = ? order by q.raised_at, q.number`, [visitId])).map(toView);
}

/** What is asked about the facts of a participant and not yet closed, oldest first. */
export async function queriesOfFacts(work: Work, participantId: string): Promise<QueryView[]> {
  return (await work.sql<Row>(`${select} where q.target_table = 'participant' and q.target_id = ? and q.state in ('open', 'answered') order by q.raised_at, q.number`, [participantId])).map(toView);
}

import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { bareKeysOf, changesOf, type FieldChange } from './changes-of';
import type { ListTrailInput, TrailFilter } from './input';
import { leafHash } from './merkle';
import { leafSql } from './seal-trail';
import { didWords, tableWords } from './words';

/** One entry of the trail in words. Moments are ISO strings. */
export interface TrailEntry {
  readonly id: string;
  readonly at: string;
  readonly who: string;
  readonly role: string;
  readonly act: string;
  readonly did: string;
  readonly op: 'INSERT' | 'UPDATE' | 'DELETE' | 'EVENT';
  readonly table: string;
  /** 'Month 6, limb trial, left, trial 2'. */
  readonly subject: string;
  readonly code: string | null;
  readonly siteName: string | null;
  readonly changes: readonly FieldChange[];
  readonly reason: string | null;
  readonly request: string | null;
  /** Hash of the entry as the seal takes it. */
  readonly hash: string;
  readonly isSealed: boolean;
}

export interface TrailPage {
  readonly entries: readonly TrailEntry[];
  /** Entries found, counted up to the limit; beyond it only 'more than'. */
  readonly found: number;
  readonly foundAtLeast: boolean;
  /** Where the next page begins; null at the end. */
  readonly nextBefore: string | null;
}

const countLimit = 1000;

interface Row {
  id: string;
  at: string;
  who: string | null;
  role: string;
  act: string;
  op: TrailEntry['op'];
  table_name: string;
  code: string | null;
  site_name: string | null;
  visit_name: string | null;
  /** The account a sign-in was tried for: the system acts, because nobody is signed in yet. */
  account: string | null;
  before: Record<string, unknown> | null;
  after: Record<string, unknown> | null;
  reason: string | null;
  request: string | null;
  leaf: string;
  sealed: boolean;
}

/** The filter as conditions with their values. Days are days of UTC, as the table prints them. */
function conditionsOf({ who, code, act, table, field, from, to }: TrailFilter): { text: string; values: readonly unknown[] } {
  const parts: [string, readonly unknown[]][] = [];
  if (who) parts.push(['e.actor_id in (select id from account where upper(label) = upper(?))', [who]]);
  if (code) parts.push(['e.participant_id = (select id from participant where code = upper(?))', [code]]);
  if (act) parts.push(['e.act = ?', [act]]);
  if (table) parts.push(['e.table_name = ?', [table]]);
  if (field) parts.push(['e.before -> ?::text is distinct from e.after -> ?::text', [field, field]]);
  if (from) parts.push([`e.at >= ?::date::timestamp at time zone 'UTC'`, [from]]);
  if (to) parts.push([`e.at < (?::date + 1)::timestamp at time zone 'UTC'`, [to]]);
  return { text: parts.length === 0 ? 'true' : parts.map(([text]) => text).join(' and '), values: parts.flatMap(([, values]) => values) };
}

/** What the entry is about, from the images alone and the visit beside it. */
function subjectOf({ table_name: table, visit_name: visitName, account, before, after, op }: Row): string {
  const image = after ?? before ?? {};
  const name = tableWords[table] ?? table.replaceAll('_', ' ');
  const text = (key: string): string[] => (typeof image[key] === 'string' || typeof image[key] === 'number' ? [String(image[key])] : []);
  const more = table === 'limb_trial' ? [...text('side'), ...text('trial').map((trial) => `trial ${trial}`)] : table === 'data_query' ? text('number').map((number) => `Q-${number.padStart(4, '0')}`) : [];
  const parts = table === 'visit' ? text('name') : [...(visitName ? [visitName] : []), op === 'EVENT' ? name : visitName ? name.toLowerCase() : name, ...more];
  return [...parts, ...(account ? [account] : [])].join(', ') || name;
}

/** What keys in the images name, where it has a code: accounts by their label, screenings by their participant's. */
async function readNames(work: Work, rows: readonly Row[]): Promise<ReadonlyMap<string, string>> {
  const keys = [...new Set(rows.flatMap(({ before, after }) => bareKeysOf(before, after)))];
  if (keys.length === 0) return new Map();
  const list = `{${keys.join(',')}}`;
  const named = await work.sql<{ id: string; name: string }>(
    `select id::text as id, label as name from account where id = any (?::uuid[])
     union all select s.id::text, 'screening of ' || p.code from screening s join participant p on p.id = s.participant_id where s.id = any (?::uuid[])`,
    [list, list],
  );
  return new Map(named.map(({ id, name }) => [id, name]));
}

const toEntry = (row: Row, names: ReadonlyMap<string, string>): TrailEntry => ({
  id: row.id,
  at: moment(row.at).toISOString(),
  who: row.who ?? 'unknown',
  role: row.role,
  act: row.act,
  did: didWords[row.act] ?? row.act,
  op: row.op,
  table: row.table_name,
  subject: subjectOf(row),
  code: row.code,
  siteName: row.site_name,
  changes: changesOf(row.before, row.after, names),
  reason: row.reason,
  request: row.request,
  hash: leafHash(row.leaf).toString('hex'),
  isSealed: row.sealed,
});

/** Entries in reach, the newest first, by keyset. */
export async function readEntries(work: Work, filter: TrailFilter, { before, limit }: { before: string | undefined; limit: number }): Promise<TrailEntry[]> {
  const { text, values } = conditionsOf(filter);
  const rows = await work.sql<Row>(
    `with found as (select e.* from audit_entry e where ${text} ${before ? 'and e.id < ?::bigint' : ''} order by e.id desc limit ?),
       named as (select *, ${leafSql} as leaf, coalesce(after, before) as image from found)
     select n.id::text as id, n.at::text as at, a.label as who, n.role, n.act, n.op, n.table_name, p.code, s.name as site_name, v.name as visit_name, about.label as account, n.before, n.after, n.reason, n.request, n.leaf,
       coalesce(n.txid < (select below_txid from seal order by id desc limit 1), false) as sealed
     from named n left join account a on a.id = n.actor_id left join participant p on p.id = n.participant_id left join site s on s.id = n.site_id
     left join account about on n.table_name in ('sign-in', 'sign-out') and about.id::text = n.row_id
     left join limb_assessment la on n.table_name = 'limb_trial' and la.id = (n.image ->> 'assessment_id')::uuid
     left join visit v on v.id = coalesce((n.image ->> 'visit_id')::uuid, la.visit_id)
     order by n.id desc`,
    [...values, ...(before ? [before] : []), limit],
  );
  const names = await readNames(work, rows);
  return rows.map((row) => toEntry(row, names));
}

/** One page of the trail that the reach allows. Three statements, however long the trail is. */
export async function listTrail(work: Work, { before, limit, ...filter }: ListTrailInput): Promise<TrailPage> {
  const entries = await readEntries(work, filter, { before, limit });
  const { text, values } = conditionsOf(filter);
  const [counted] = await work.sql<{ count: number }>(`select count(*)::int as count from (select 1 from audit_entry e where ${text} limit ${countLimit + 1}) found`, values);
  const found = counted?.count ?? 0;
  return { entries, found: Math.min(found, countLimit), foundAtLeast: found > countLimit, nextBefore: entries.length < limit ? null : (entries.at(-1)?.id ?? null) };
}

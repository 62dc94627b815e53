import type { Participant } from '@/entities/participant';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import type { Work } from '@/lib/work/work';
import type { ListParticipantsInput } from './input';

/** One line of the list: code, never a name. Change is a ratio. */
export interface ParticipantRow {
  readonly id: string;
  readonly code: string;
  readonly siteName: string;
  readonly cohort: string;
  readonly enrolledOn: string;
  readonly state: Participant['state'];
  readonly trainingHeld: boolean;
  readonly lastVisitName: string | null;
  readonly lastVisitOn: string | null;
  readonly change: number | null;
  /** The primary definition's verdict at the last assessment. */
  readonly verdict: 'met' | 'not met' | 'not judged' | null;
  readonly nextVisitName: string | null;
  readonly nextOpens: string | null;
  readonly nextCloses: string | null;
  readonly openQueries: number;
  /** Visits that have ended as planned, of those laid out. */
  readonly visitsDone: number;
  readonly visitsOf: number;
}

export interface ParticipantPage {
  readonly rows: readonly ParticipantRow[];
  readonly rowCount: number;
}

const orders: Record<ListParticipantsInput['sort'], string> = {
  code: 'p.code',
  site: 's.name',
  enrolledOn: 'p.enrolled_on',
  lastVisitOn: 'last.done_on',
  change: 'last.rvc',
  nextCloses: 'next.closes_on',
  openQueries: 'queries.open',
};

/** In a pattern, the signs that would match anything else stand for themselves. */
const literal = (text: string): string => text.replace(/[\\%_]/g, (sign) => `\\${sign}`);

const last = `left join lateral (select v.name, v.done_on, a.rvc::float8 as rvc, a.verdicts -> ? ->> 'verdict' as verdict from limb_assessment a join visit v on v.id = a.visit_id
    where a.participant_id = p.id and a.state = 'complete' order by v.done_on desc limit 1) last on true`;
const next = `left join lateral (select v.name, v.opens_on, v.closes_on from visit v where v.participant_id = p.id and v.state in ('to come', 'in progress') order by v.closes_on limit 1) next on p.state = 'enrolled'`;
const queries = `left join lateral (select count(*)::int as open from data_query q where q.participant_id = p.id and q.state in ('open', 'answered')) queries on true`;

const visits = `left join lateral (select count(*) filter (where v.state = 'complete')::int as done, count(*)::int as laid from visit v where v.participant_id = p.id) visits on true`;

/** The laterals a sort or a filter looks at; the others are joined for the rows of the page only. `last` takes the primary definition. */
function neededFor({ sort, swelling }: ListParticipantsInput): { filter: { last: boolean; text: string }; page: { last: boolean; text: string } } {
  const filters = swelling !== 'any';
  const sorts = filters || sort === 'lastVisitOn' || sort === 'change';
  const other = sort === 'nextCloses' ? next : sort === 'openQueries' ? queries : '';
  return { filter: { last: filters, text: filters ? last : '' }, page: { last: sorts, text: `${sorts ? last : ''} ${other}` } };
}

/**
 * One page of the participants in reach. The page's rows are found first, by the columns that sort and filter need;
 * what else the row shows is read for those rows only. Three statements, however many participants.
 */
export async function listParticipants(work: Work, input: ListParticipantsInput): Promise<ParticipantPage> {
  const { page, pageSize, q, siteId, cohort, state, swelling, sort, direction } = input;
  const { document } = await currentProtocol(work);
  const primary = document.swelling.primary;
  const conditions: [string, readonly unknown[]][] = [];
  if (q) conditions.push([`p.code ilike ?`, [`%${literal(q)}%`]]);
  if (siteId) conditions.push(['p.site_id = ?', [siteId]]);
  if (cohort) conditions.push(['p.cohort = ?', [cohort]]);
  if (state) conditions.push(['p.state = ?', [state]]);
  if (swelling !== 'any') conditions.push(['last.verdict = ?', [swelling]]);
  const where = conditions.length === 0 ? '' : `where ${conditions.map(([text]) => text).join(' and ')}`;
  const needed = neededFor(input);
  const values = conditions.flatMap(([, each]) => each);
  const from = (joined: string): string => `from participant p join site s on s.id = p.site_id ${joined} ${where}`;
  // What only sorts does not change how many there are, and is not read for every participant to count them.
  const [total] = await work.sql<{ count: number }>(`select count(*)::int as count ${from(needed.filter.text)}`, [...(needed.filter.last ? [primary] : []), ...values]);
  const order = `${orders[sort]} ${direction === 'desc' ? 'desc' : 'asc'} nulls last, p.code`;
  const rows = await work.sql<ParticipantRow>(
    `with page as (select p.id, row_number() over (order by ${order}) as place ${from(needed.page.text)} order by ${order} limit ? offset ?)
     select p.id, p.code, s.name as "siteName", p.cohort, p.enrolled_on::text as "enrolledOn", p.state, p.training_held as "trainingHeld",
       last.name as "lastVisitName", last.done_on::text as "lastVisitOn", last.rvc as change, last.verdict,
       next.name as "nextVisitName", next.opens_on::text as "nextOpens", next.closes_on::text as "nextCloses", queries.open as "openQueries", visits.done as "visitsDone", visits.laid as "visitsOf"
     from page join participant p on p.id = page.id join site s on s.id = p.site_id ${last} ${next} ${queries} ${visits} order by page.place`,
    [...(needed.page.last ? [primary] : []), ...values, pageSize, page * pageSize, primary],
  );
  return { rows: rows.map((row) => ({ ...row, cohort: document.cohorts.find(({ key }) => key === row.cohort)?.name ?? row.cohort })), rowCount: total?.count ?? 0 };
}

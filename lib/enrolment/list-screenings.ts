import type { Screening } from '@/entities/screening';
import type { Work } from '@/lib/work/work';
import type { ListScreeningsInput } from './input';

/** One line of the screening log; nothing in it identifies the person. */
export interface ScreeningRow {
  readonly id: string;
  readonly number: number;
  readonly siteName: string;
  readonly siteCode: string;
  readonly screenedOn: string;
  readonly cohort: string;
  readonly state: Screening['state'];
  readonly notEnrolledReason: string | null;
  readonly participantCode: string | null;
  readonly isEligible: boolean;
  readonly consentState: string | null;
}

/** Counts for the participant flow. */
export interface ScreeningCounts {
  readonly screened: number;
  readonly enrolled: number;
  readonly notEnrolled: number;
  readonly open: number;
  readonly reasons: readonly { readonly reason: string; readonly count: number }[];
}

export interface ScreeningPage {
  readonly rows: readonly ScreeningRow[];
  readonly rowCount: number;
  readonly counts: ScreeningCounts;
}

const orders = { number: 's.number', screenedOn: 's.screened_on', state: 's.state' } as const;

async function countScreenings(work: Work, siteId: string | null): Promise<ScreeningCounts> {
  const rows = await work.sql<{ state: Screening['state']; reason: string | null; count: number }>(
    'select state, not_enrolled_reason as reason, count(*)::int as count from screening where (?::uuid is null or site_id = ?::uuid) group by 1, 2 order by 3 desc, 2',
    [siteId, siteId],
  );
  const of = (state: Screening['state']) => rows.filter((row) => row.state === state).reduce((sum, { count }) => sum + count, 0);
  return {
    screened: rows.reduce((sum, { count }) => sum + count, 0),
    enrolled: of('enrolled'),
    notEnrolled: of('not enrolled'),
    open: of('screening'),
    reasons: rows.flatMap(({ reason, count }) => (reason === null ? [] : [{ reason, count }])),
  };
}

/** One page of the screening log, and the counts over all of it. */
export async function listScreenings(work: Work, { page, pageSize, state, siteId, sort, direction }: ListScreeningsInput): Promise<ScreeningPage> {
  const filter = [siteId ?? null, siteId ?? null, state ?? null, state ?? null];
  const where = '(?::uuid is null or s.site_id = ?::uuid) and (?::text is null or s.state = ?::text)';
  const [total] = await work.sql<{ count: number }>(`select count(*)::int as count from screening s where ${where}`, filter);
  const rows = await work.sql<ScreeningRow>(
    `select s.id, s.number, t.name as "siteName", t.code as "siteCode", s.screened_on::text as "screenedOn", s.state,
       (select c ->> 'name' from protocol_version v, jsonb_array_elements(v.document -> 'cohorts') c where v.id = s.protocol_version_id and c ->> 'key' = s.cohort) as cohort,
       s.not_enrolled_reason as "notEnrolledReason", p.code as "participantCode", s.eligibility_confirmed_at is not null as "isEligible",
       (select c.state from consent c where c.screening_id = s.id and c.state <> 'set aside' order by c.created_at desc limit 1) as "consentState"
     from screening s join site t on t.id = s.site_id left join participant p on p.id = s.participant_id
     where ${where} order by ${orders[sort]} ${direction === 'asc' ? 'asc' : 'desc'}, s.number desc, s.id limit ? offset ?`,
    [...filter, pageSize, page * pageSize],
  );
  return { rows, rowCount: total?.count ?? 0, counts: await countScreenings(work, siteId ?? null) };
}

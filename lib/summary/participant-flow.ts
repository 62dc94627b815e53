import type { Work } from '@/lib/work/work';

/** Counts of the participant flow (STROBE): screened, not enrolled and why, enrolled, measured at baseline, followed. */
export interface ParticipantFlow {
  readonly screened: number;
  readonly screening: number;
  readonly notEnrolled: readonly { readonly reason: string; readonly count: number }[];
  readonly enrolled: number;
  readonly withBaseline: number;
  /** People with a complete assessment at or after so many days from enrolment, among those enrolled long enough ago. */
  readonly followed: readonly { readonly months: number; readonly due: number; readonly measured: number }[];
  readonly left: readonly { readonly grade: string; readonly count: number }[];
}

/** Follow-up is counted at these months; a visit may come up to 45 days early and count. */
const milestones = [6, 12, 24] as const;
const earlyDays = 45;

/** Two statements over the rows in reach. */
export async function readParticipantFlow(work: Work): Promise<ParticipantFlow> {
  const screenings = await work.sql<{ state: string; reason: string | null; count: number }>(
    'select state, not_enrolled_reason as reason, count(*)::int as count from screening group by 1, 2 order by 3 desc, 2',
  );
  const [people] = await work.sql<{ enrolled: number; with_baseline: number; left_by: Record<string, number> | null } & Record<string, number>>(
    `select count(*)::int as enrolled, count(*) filter (where m.baseline)::int as with_baseline,
       (select jsonb_object_agg(grade, n) from (select left_grade as grade, count(*)::int as n from participant where left_grade is not null group by 1) g) as left_by,
       ${milestones
         .map(
           (months) =>
             `count(*) filter (where p.enrolled_on + interval '${months} months' <= ?::date)::int as due_${months}, count(*) filter (where p.enrolled_on + interval '${months} months' <= ?::date and m.last_on >= p.enrolled_on + interval '${months} months' - interval '${earlyDays} days')::int as measured_${months}`,
         )
         .join(', ')}
     from participant p left join lateral (select bool_or(v.key = 'baseline') as baseline, max(v.done_on) as last_on from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = p.id and a.state = 'complete') m on true`,
    milestones.flatMap(() => [work.now, work.now]),
  );
  const of = (state: string) => screenings.filter((row) => row.state === state);
  const sum = (rows: readonly { count: number }[]) => rows.reduce((total, { count }) => total + count, 0);
  return {
    screened: sum(screenings),
    screening: sum(of('screening')),
    notEnrolled: of('not enrolled').flatMap(({ reason, count }) => (reason === null ? [] : [{ reason, count }])),
    enrolled: people?.enrolled ?? 0,
    withBaseline: people?.with_baseline ?? 0,
    followed: milestones.map((months) => ({ months, due: people?.[`due_${months}`] ?? 0, measured: people?.[`measured_${months}`] ?? 0 })),
    left: Object.entries(people?.left_by ?? {}).map(([grade, count]) => ({ grade, count })),
  };
}

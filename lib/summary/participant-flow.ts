import type { Work } from '@/lib/work/work';
import { inPopulation, type Population } from './population';

/** Counts of the participant flow (STROBE): screened, not enrolled and why, enrolled, measured at baseline, followed. */
export interface ParticipantFlow {
  readonly screened: number;
  readonly screening: number;
  readonly notEnrolled: readonly { readonly reason: string; readonly count: number }[];
  readonly enrolled: number;
  readonly withBaseline: number;
  /**
   * Each stage counts people of the stage before: `due` were enrolled long enough ago, `measured` of these have a complete
   * assessment at or after so many months from enrolment.
   */
  readonly followed: readonly { readonly months: number; readonly due: number; readonly measured: number }[];
  readonly left: readonly { readonly grade: string; readonly count: number }[];
}

/** Follow-up is counted at these months; a visit may come up to 45 days early and count. Common practice, no source. */
const milestones = [6, 12, 24] as const;
const earlyDays = 45;

/** People of one stage and of those before it, as a condition. */
const reached = (months: readonly number[]): string => ['at_baseline', ...months.flatMap((month) => [`due_${month}`, `seen_${month}`])].join(' and ');

/** Two statements over the rows in reach. */
export async function readParticipantFlow(work: Work, population: Population = {}): Promise<ParticipantFlow> {
  const [considered, people] = [inPopulation('s', population), inPopulation('p', population)];
  const screenings = await work.sql<{ state: string; reason: string | null; count: number }>(
    `select s.state, s.not_enrolled_reason as reason, count(*)::int as count from screening s where ${considered.where} group by 1, 2 order by 3 desc, 2`,
    considered.values,
  );
  const stages = milestones.flatMap((months, index) => {
    const before = milestones.slice(0, index);
    return [
      `count(*) filter (where ${reached(before)} and due_${months})::int as due_${months}`,
      `count(*) filter (where ${reached([...before, months])})::int as seen_${months}`,
    ];
  });
  const [row] = await work.sql<{ enrolled: number; with_baseline: number; left_by: Record<string, number> | null } & Record<string, number>>(
    `with person as (
       select p.left_grade, coalesce(m.has_baseline, false) as at_baseline,
         ${milestones.map((months) => `p.enrolled_on + interval '${months} months' <= ?::date as due_${months}, coalesce(m.last_on >= p.enrolled_on + interval '${months} months' - interval '${earlyDays} days', false) as seen_${months}`).join(', ')}
       from participant p
       left join lateral (select bool_or(v.key = 'baseline') as has_baseline, max(v.done_on) as last_on
         from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = p.id and a.state = 'complete') m on true
       where ${people.where})
     select count(*)::int as enrolled, count(*) filter (where at_baseline)::int as with_baseline, ${stages.join(', ')},
       (select jsonb_object_agg(left_grade, n) from (select left_grade, count(*)::int as n from person where left_grade is not null group by 1) g) as left_by
     from person`,
    [...milestones.map(() => work.now), ...people.values],
  );
  const of = (state: string) => screenings.filter((one) => one.state === state);
  const sum = (rows: readonly { count: number }[]) => rows.reduce((total, { count }) => total + count, 0);
  return {
    screened: sum(screenings),
    screening: sum(of('screening')),
    notEnrolled: of('not enrolled').flatMap(({ reason, count }) => (reason === null ? [] : [{ reason, count }])),
    enrolled: row?.enrolled ?? 0,
    withBaseline: row?.with_baseline ?? 0,
    followed: milestones.map((months) => ({ months, due: row?.[`due_${months}`] ?? 0, measured: row?.[`seen_${months}`] ?? 0 })),
    left: Object.entries(row?.left_by ?? {}).map(([grade, count]) => ({ grade, count })),
  };
}

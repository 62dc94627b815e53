import type { Work } from '@/lib/work/work';

/** One row for each participant and week with a session: 1 where no progression rule was met that week. */
export interface RuleWeeks {
  readonly kept: Uint8Array;
  readonly participant: Float64Array;
}

/** Rules of how the load moves; arm checks and missing baselines are counted elsewhere. */
const progressionRules = ['START_HIGH', 'STEP_OVER', 'STEP_HARD', 'RAISED_WITHIN_WEEK', 'RAISE_WITHOUT_CLEAR_ARM', 'RAISE_ARM_UNKNOWN', 'RESUME_HIGH'];

/** Weeks with training in reach, and whether the rules of progression were kept. One statement. */
export async function readRuleWeeks(work: Work): Promise<RuleWeeks> {
  const rows = await work.sql<{ place: number; kept: number }>(
    `select dense_rank() over (order by s.participant_id)::int as place,
       case when bool_or(f.id is not null) then 0 else 1 end as kept
     from training_session s left join training_flag f on f.session_id = s.id and f.state <> 'withdrawn' and f.rule = any (?::text[])
     group by s.participant_id, date_trunc('week', s.local_on) order by 1`,
    [`{${progressionRules.join(',')}}`],
  );
  return { kept: Uint8Array.from(rows, ({ kept }) => kept), participant: Float64Array.from(rows, ({ place }) => place) };
}

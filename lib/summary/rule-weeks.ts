import type { TrainingRuleCode } from '@/instruments/training/define-training-rule';
import type { Work } from '@/lib/work/work';
import { inPopulation, type Population } from './population';

/** One row for each participant and calendar week with a session. */
export interface RuleWeeks {
  /** 1 where no progression rule was broken that week. */
  readonly kept: Uint8Array;
  /** Running number of the participant. */
  readonly participant: Float64Array;
  /** For each progression rule, 1 in the weeks in which it was broken. */
  readonly broken: ReadonlyMap<TrainingRuleCode, Uint8Array>;
}

/** Rules of how the load moves; arm checks and missing baselines are counted elsewhere. */
export const progressionRules = ['START_HIGH', 'STEP_OVER', 'STEP_HARD', 'RAISED_WITHIN_WEEK', 'RAISE_WITHOUT_CLEAR_ARM', 'RAISE_ARM_UNKNOWN', 'RESUME_HIGH'] as const satisfies readonly TrainingRuleCode[];

/** Weeks with training in reach, and the rules of progression broken in each. A withdrawn flag breaks nothing. One statement. */
export async function readRuleWeeks(work: Work, population: Population = {}): Promise<RuleWeeks> {
  const { where, values } = inPopulation('p', population);
  const rows = await work.sql<{ place: number; rules: string[] }>(
    `select dense_rank() over (order by s.participant_id)::int as place,
       coalesce(array_agg(distinct f.rule) filter (where f.rule is not null), '{}') as rules
     from training_session s join participant p on p.id = s.participant_id
     left join training_flag f on f.session_id = s.id and f.state <> 'withdrawn' and f.rule = any (?::text[])
     where ${where} group by s.participant_id, date_trunc('week', s.local_on) order by 1, date_trunc('week', s.local_on)`,
    [`{${progressionRules.join(',')}}`, ...values],
  );
  return {
    kept: Uint8Array.from(rows, ({ rules }) => (rules.length === 0 ? 1 : 0)),
    participant: Float64Array.from(rows, ({ place }) => place),
    broken: new Map(progressionRules.map((rule) => [rule, Uint8Array.from(rows, ({ rules }) => (rules.includes(rule) ? 1 : 0))])),
  };
}

import type { Work } from '@/lib/work/work';

/** Heaviest working load per participant and week of one exercise, as columns. */
export interface WeeklyLoads {
  /** Kilograms. */
  readonly loadKg: Float64Array;
  /** Whole weeks since the participant's own first session, from 0. */
  readonly week: Float64Array;
  /** Running number of the participant. */
  readonly participant: Float64Array;
}

/** Loads in reach by exercise. One statement. */
export async function readWeeklyLoads(work: Work): Promise<ReadonlyMap<string, WeeklyLoads>> {
  const rows = await work.sql<{ exercise: string; weeks: number[]; loads: number[]; people: number[] }>(
    `with began as (select participant_id, min(local_on) as on_day, row_number() over (order by participant_id) as place from training_session group by participant_id),
       heaviest as (select t.exercise, ((s.local_on - b.on_day) / 7)::int as week, b.place, max(t.load_g) / 1000.0 as kg
         from training_session s join training_set t on t.session_id = s.id join began b on b.participant_id = s.participant_id group by 1, 2, 3)
     select exercise, array_agg(week order by place, week) as weeks, array_agg(kg::float8 order by place, week) as loads, array_agg(place::int order by place, week) as people
     from heaviest group by exercise`,
  );
  return new Map(rows.map(({ exercise, weeks, loads, people }) => [exercise, { loadKg: Float64Array.from(loads), week: Float64Array.from(weeks), participant: Float64Array.from(people) }]));
}

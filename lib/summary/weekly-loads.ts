import type { Equipment, LoadBasis } from '@/instruments/training/exercises';
import type { Work } from '@/lib/work/work';
import { inPopulation, type Population } from './population';

/**
 * Heaviest load per participant and week of one exercise with one kind of equipment, as columns. Kilograms compare only
 * within one kind of equipment and one meaning of the number (LOAD facts of the training instrument).
 */
export interface WeeklyLoads {
  readonly exercise: string;
  readonly equipment: Equipment;
  readonly basis: LoadBasis;
  /** Kilograms. */
  readonly loadKg: Float64Array;
  /** Whole weeks since the participant's own first session, from 0. */
  readonly week: Float64Array;
  /** Running number of the participant. */
  readonly participant: Float64Array;
}

/** Loads in reach, most logged first. Bands and body weight have no kilograms and are left out. One statement. */
export async function readWeeklyLoads(work: Work, population: Population = {}): Promise<WeeklyLoads[]> {
  const { where, values } = inPopulation('p', population);
  const rows = await work.sql<{ exercise: string; equipment: Equipment; basis: LoadBasis; weeks: number[]; loads: number[]; people: number[] }>(
    `with began as (select s.participant_id, min(s.local_on) as on_day, row_number() over (order by s.participant_id) as place
         from training_session s join participant p on p.id = s.participant_id where ${where} group by s.participant_id),
       heaviest as (select t.exercise, t.equipment, t.basis, ((s.local_on - b.on_day) / 7)::int as week, b.place, max(t.load_g) / 1000.0 as kg
         from training_session s join training_set t on t.session_id = s.id join began b on b.participant_id = s.participant_id
         where t.equipment not in ('band', 'body weight') group by 1, 2, 3, 4, 5)
     select exercise, equipment, basis, array_agg(week order by place, week) as weeks, array_agg(kg::float8 order by place, week) as loads, array_agg(place::int order by place, week) as people
     from heaviest group by 1, 2, 3 order by count(*) desc, exercise, equipment, basis`,
    values,
  );
  return rows.map(({ weeks, loads, people, ...what }) => ({ ...what, loadKg: Float64Array.from(loads), week: Float64Array.from(weeks), participant: Float64Array.from(people) }));
}

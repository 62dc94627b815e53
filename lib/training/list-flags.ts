import { TrainingFlagSchema } from '@/entities/training-flag';
import type { TrainingFlag } from '@/entities/training-flag';
import { trainingRule } from '@/instruments/training';
import type { TrainingRuleCode } from '@/instruments/training/define-training-rule';
import { findExercise } from '@/instruments/training/exercises';
import { Refusal } from '@/lib/work/refusal';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { FlagDetail } from './judge-record';

/** A training flag as the site reads it. */
export interface FlagRow {
  readonly id: string;
  readonly participantId: string;
  readonly participantCode: string;
  readonly siteName: string;
  readonly rule: string;
  readonly title: string;
  readonly exercise: string | null;
  readonly detail: FlagDetail;
  readonly state: TrainingFlag['state'];
  readonly raisedAt: string;
  readonly version: number;
}

const select = `select f.id, f.participant_id as "participantId", p.code as "participantCode", s.name as "siteName", f.rule, f.exercise, f.detail, f.state, f.raised_at::text as "raisedAt", f.version
  from training_flag f join participant p on p.id = f.participant_id join site s on s.id = f.site_id`;

type Row = Omit<FlagRow, 'title'>;
const toRow = (row: Row): FlagRow => ({
  ...row,
  title: trainingRule(row.rule as TrainingRuleCode).title,
  exercise: row.exercise === null ? null : (findExercise(row.exercise)?.name ?? row.exercise),
  raisedAt: moment(row.raisedAt).toISOString(),
});

/** Flags of a safety or deviation rule that nobody at the site has seen, safety first, then the newest. */
export async function listFlags(work: Work, limit = 100): Promise<FlagRow[]> {
  const rows = await work.sql<Row>(
    `${select} where f.state = 'raised' and f.detail ->> 'severity' in ('safety', 'deviation') order by f.detail ->> 'severity' = 'safety' desc, f.raised_at desc, f.id limit ?`,
    [limit],
  );
  return rows.map(toRow);
}

/** Somebody at the site has seen the flag. @throws Refusal 'not-found', 'conflict' when it was withdrawn meanwhile. */
export async function seeFlag(work: Work, { id }: { id: string }): Promise<FlagRow> {
  const flag = await work.em.findOne(TrainingFlagSchema, { id });
  if (!flag) throw new Refusal('not-found', 'There is no such flag in your reach.');
  if (flag.state === 'withdrawn') throw new Refusal('conflict', 'This flag no longer stands: a later entry changed what it was raised for.');
  flag.state = 'seen';
  await work.em.flush();
  const [row] = await work.sql<Row>(`${select} where f.id = ?`, [id]);
  if (!row) throw new Error('A flag that was just saved exists.');
  return toRow(row);
}

import type { TrainingSession } from '@/instruments/training/session';
import type { Equipment, LoadBasis, Side } from '@/instruments/training/exercises';
import type { TrainingSettings } from '@/instruments/training/settings';
import { armChangedBy } from '@/instruments/training/arm-check';
import type { MassUnit } from '@/instruments/units';
import { findProtocol, type Protocol } from '@/lib/protocol/find-protocol';
import { localDate, moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { armCheckCode, type ArmCheckWords } from './arm-check-words';
import { toExerciseEntry } from './input';

/** One exercise of a kept session, as typed. */
export interface KeptSet {
  readonly exercise: string;
  readonly equipment: Equipment;
  readonly basis: LoadBasis;
  readonly side: Side;
  readonly typed: number;
  readonly unit: MassUnit;
  readonly repetitions: number;
  readonly setCount: number;
  readonly effort: number | null;
}

/** A session as it is kept, oldest first in every list. */
export interface KeptSession {
  readonly id: string;
  readonly on: string;
  readonly late: boolean;
  readonly armCheck: ArmCheckWords;
  readonly soreness: 'no' | 'a little' | 'a lot';
  readonly note: string | null;
  readonly sets: readonly KeptSet[];
}

/** All that the training rules judge by. */
export interface TrainingRecord {
  readonly sessions: readonly KeptSession[];
  /** Local dates on which both arms were measured. */
  readonly assessmentsOn: readonly string[];
  readonly baselineOn: string | null;
  readonly settings: TrainingSettings;
  readonly protocol: Protocol;
}

/** A kept session in the rules' own shape. */
export const toTrainingSession = ({ id, on, armCheck, sets }: Pick<KeptSession, 'id' | 'on' | 'armCheck' | 'sets'>): TrainingSession => ({
  id,
  on,
  armChanged: armChangedBy(armCheckCode(armCheck)),
  entries: sets.map(toExerciseEntry),
});

/** The whole training record of one participant. Three statements, however long the log. */
export async function loadTrainingRecord(work: Work, of: { id: string; protocolVersionId: string; timeZone: string }): Promise<TrainingRecord> {
  const sessions = await work.sql<KeptSession>(
    `select s.id, s.local_on::text as "on", s.late, s.arm_check as "armCheck", s.soreness, s.note,
       coalesce((select jsonb_agg(jsonb_build_object('exercise', t.exercise, 'equipment', t.equipment, 'basis', t.basis, 'side', t.side, 'typed', t.load_typed, 'unit', t.unit,
         'repetitions', t.repetitions, 'setCount', t.set_count, 'effort', t.effort) order by t.sequence) from training_set t where t.session_id = s.id), '[]') as sets
     from training_session s where s.participant_id = ? order by s.local_on, s.entered_at, s.id`,
    [of.id],
  );
  const measured = await work.sql<{ measured_at: string; key: string }>(
    `select a.measured_at::text, v.key from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = ? and a.state = 'complete' order by a.measured_at`,
    [of.id],
  );
  const dates = measured.map(({ measured_at, key }) => ({ key, on: localDate(moment(measured_at), of.timeZone) }));
  const protocol = await findProtocol(work, of.protocolVersionId);
  return {
    sessions,
    assessmentsOn: dates.map(({ on }) => on),
    baselineOn: dates.find(({ key }) => key === 'baseline')?.on ?? null,
    settings: protocol.document.training,
    protocol,
  };
}

import { equipmentKinds, exercises, loadBases, sides } from '@/instruments/training/exercises';
import { code, day, defineExtractFile, integer, number, yesOrNo, type ExtractColumn } from '../define-extract-file';

/** Sessions are numbered by day within a person. */
const sessionPlace = '(select id, row_number() over (partition by participant_id order by local_on, entered_at, id)::int as number from training_session)';
const ofSession: ExtractColumn = { name: 'session_number', label: 'Number of the session within the person', from: ['training_session.local_on'], kind: 'integer', sql: 'place.number' };

export const trainingSessions = defineExtractFile({
  name: 'training_sessions',
  about: 'One row for each training session logged',
  table: 'training_session',
  joins: `join ${sessionPlace} place on place.id = r.id`,
  on: 'r.local_on',
  order: 'place.number',
  columns: [
    ofSession,
    day('session_day', { label: 'Day of the session', from: 'training_session.local_on' }),
    yesOrNo('late', { label: 'Entered after the time allowed', from: 'training_session.late' }),
    code('arm_check', ['the same', 'a little fuller', 'clearly fuller', 'not sure'], { label: 'Arm check before loads', from: 'training_session.arm_check' }),
    code('soreness', ['no', 'a little', 'a lot'], { label: 'Sore since last time', from: 'training_session.soreness' }),
    integer('effort', { label: 'Effort of the session, 0 to 10', from: 'training_session.effort' }),
  ],
});

export const trainingSets = defineExtractFile({
  name: 'training_sets',
  about: 'One row for each exercise of a session',
  table: 'training_set',
  joins: `join training_session s on s.id = r.session_id join ${sessionPlace} place on place.id = r.session_id`,
  on: 's.local_on',
  order: 'place.number, r.sequence',
  columns: [
    { ...ofSession, label: 'Session, as numbered in training_sessions' },
    integer('sequence', { label: 'Order in the session', from: 'training_set.sequence' }),
    code('exercise', exercises.map(({ code: name }) => name), { label: 'Exercise', from: 'training_set.exercise' }),
    code('equipment', equipmentKinds, { label: 'Equipment', from: 'training_set.equipment' }),
    code('load_basis', loadBases, { label: 'What the load means', from: 'training_set.basis' }),
    code('side', sides, { label: 'Side trained', from: 'training_set.side' }),
    number('load_kg', { label: 'Load', from: 'training_set.load_g', unit: 'kg', sql: 'r.load_g / 1000.0' }),
    number('load_typed', { label: 'Load as the participant typed it', from: 'training_set.load_typed' }),
    code('unit_typed', ['kg', 'lb'], { label: 'Unit the participant typed', from: 'training_set.unit' }),
    integer('repetitions', { label: 'Repetitions', from: 'training_set.repetitions' }),
    integer('sets', { label: 'Sets', from: 'training_set.set_count' }),
    integer('effort', { label: 'Effort, 0 to 10', from: 'training_set.effort' }),
    yesOrNo('already_lifted', { label: 'Lifted before the advice was read', from: 'training_set.already_lifted' }),
  ],
});

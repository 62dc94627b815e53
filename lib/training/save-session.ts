import { TrainingSessionSchema } from '@/entities/training-session';
import { TrainingSetSchema } from '@/entities/training-set';
import { addDays } from '@/instruments/calendar';
import { adviceFor, byUrgency, type TrainingAdvice } from '@/instruments/training/advice';
import type { TrainingRuleCode } from '@/instruments/training/define-training-rule';
import { findExercise } from '@/instruments/training/exercises';
import { massToKg } from '@/instruments/units';
import type { OwnRecord } from '@/lib/people/find-own-record';
import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';
import { momentAt, secondsAfter } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { LoggedSetInput, LogSessionInput } from './input';
import { judgeRecord } from './judge-record';
import { loadTrainingRecord, type KeptSession, type TrainingRecord } from './training-record';

/** A session once it is in, with what the rules say of it in plain words, the gravest first. */
export interface SessionSaved {
  readonly id: string;
  readonly on: string;
  readonly late: boolean;
  readonly advice: readonly (Pick<TrainingAdvice, 'title' | 'text' | 'contactSite'> & { readonly rule: TrainingRuleCode })[];
}

const loadLimitKg = 150;

/** A session is kept once. @throws Refusal 'conflict' when its key was used for other figures. */
async function findSaved(work: Work, own: OwnRecord, input: LogSessionInput): Promise<string | null> {
  const [saved] = await work.sql<{ id: string; same: boolean }>(
    `select s.id, jsonb_build_array(s.local_on, s.arm_check, s.soreness, s.effort, coalesce(s.note, ''), (
         select coalesce(jsonb_agg(jsonb_build_array(t.exercise, t.equipment, t.basis, t.side, t.load_typed::float8, t.unit, t.repetitions, t.set_count, t.effort) order by t.sequence), '[]')
         from training_set t where t.session_id = s.id)) = ?::jsonb as same
     from training_session s where s.participant_id = ? and s.client_key = ?`,
    [JSON.stringify([input.on, input.armCheck, input.soreness, input.effort, input.note ?? '', input.sets.map(({ exercise, equipment, basis, side, typed, unit, repetitions, setCount, effort }) => [exercise, equipment, basis, side, typed, unit, repetitions, setCount, effort])]), own.participant.id, input.clientKey],
  );
  if (saved && !saved.same) throw new Refusal('conflict', 'This session was already saved with other figures. The first figures stand; if they are wrong, tell your site, or log another session.');
  return saved?.id ?? null;
}

function refuseDay({ participant, today }: OwnRecord, on: string): void {
  if (on > today) throw new Refusal('invalid', `${plainDate(on)} has not come yet. A session is logged once it was done.`, 'on');
  if (on < participant.enrolledOn) throw new Refusal('invalid', `${plainDate(on)} is before you joined the study on ${plainDate(participant.enrolledOn)}.`, 'on');
}

function refuseSet({ exercise, equipment, typed, unit }: LoggedSetInput, index: number): void {
  const known = findExercise(exercise);
  if (!known) throw new Refusal('invalid', `‘${exercise}’ is not an exercise of this study.`, `sets.${index}.exercise`);
  if (!known.equipment.includes(equipment)) throw new Refusal('invalid', `${known.name} is not done with ${equipment} here.`, `sets.${index}.equipment`);
  if (equipment === 'band' ? typed > 10 : massToKg(typed, unit) > loadLimitKg)
    throw new Refusal('invalid', `${typed} ${equipment === 'band' ? 'is no band level' : unit} is over the limit of ${equipment === 'band' ? 10 : `${loadLimitKg} kg`}.`, `sets.${index}.typed`);
}

/** Grams of one hand, bar or machine setting; bands and body weight have none. */
const gramsOf = ({ equipment, typed, unit }: LoggedSetInput): number =>
  equipment === 'band' || equipment === 'body weight' ? 0 : Math.round(massToKg(typed, unit) * 1000);

async function insertSession(work: Work, { participant, site }: OwnRecord, { on, sets, ...said }: LogSessionInput, record: TrainingRecord): Promise<KeptSession> {
  const inTimeUntil = secondsAfter(momentAt(addDays(on, 1), '00:00', site.timeZone), record.protocol.document.lateAfterHours * 3600);
  const about = { siteId: participant.siteId, participantId: participant.id };
  const session = work.em.create(TrainingSessionSchema, { ...about, ...said, note: said.note || null, localOn: on, timeZone: site.timeZone, enteredAt: work.now, late: work.now > inTimeUntil });
  await work.em.flush();
  for (const [index, { typed, ...set }] of sets.entries())
    work.em.create(TrainingSetSchema, { ...about, sessionId: session.id, sequence: index + 1, loadTyped: typed, loadG: gramsOf({ typed, ...set }), ...set });
  await work.em.flush();
  return { id: session.id, on, late: session.late, armCheck: session.armCheck, soreness: session.soreness, note: session.note ?? null, sets: sets.map(({ alreadyLifted: _said, ...set }) => set) };
}

/**
 * Keeps one session as it was lifted, whatever the rules say of it, and judges the record again.
 * @throws Refusal 'invalid' for a day to come, a day before joining, an unknown exercise or a load over the limit.
 */
export async function saveSession(work: Work, own: OwnRecord, input: LogSessionInput): Promise<SessionSaved> {
  const savedId = await findSaved(work, own, input);
  if (savedId === null) {
    refuseDay(own, input.on);
    input.sets.forEach(refuseSet);
  }
  const of = { id: own.participant.id, protocolVersionId: own.participant.protocolVersionId, timeZone: own.site.timeZone };
  const before = await loadTrainingRecord(work, of);
  const session = before.sessions.find(({ id }) => id === savedId) ?? (await insertSession(work, own, input, before));
  const flags = await judgeRecord(work, own, savedId === null ? await loadTrainingRecord(work, of) : before);
  const advice = byUrgency(flags.filter(({ sessionId }) => sessionId === session.id)).map((flag) => {
    const { title, text, contactSite } = adviceFor(flag, before.settings);
    return { rule: flag.rule, title, text, contactSite };
  });
  return { id: session.id, on: session.on, late: session.late, advice };
}

import { LimbAssessmentSchema } from '@/entities/limb-assessment';
import { LimbTrialSchema } from '@/entities/limb-trial';
import { ParticipantSchema } from '@/entities/participant';
import { VisitSchema } from '@/entities/visit';
import { answerByCorrection } from '@/lib/queries/answer-by-correction';
import { findTarget } from '@/lib/queries/targets';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { timeZoneOf } from '@/lib/schedule/view-visit';
import { z } from 'zod';
import { calendarDay } from '@/lib/work/calendar-day';
import { findAssessment } from './find-assessment';
import { findDoubts } from './find-doubts';
import { settleLevel, type OtherReadings } from './correct-level';
import { correctedGirth, saveCircumstancesInput, type CorrectValueInput } from './input';
import { recompute } from './recompute';
import { settleDoubts } from './settle-doubts';

const circumstance = saveCircumstancesInput.shape;
/** Columns of a saved assessment that may be corrected, with the entity's property and the rule for its value. */
const correctable: Readonly<Record<string, { property: keyof typeof circumstance; rule: z.ZodType }>> = {
  body_weight_g: { property: 'bodyWeightG', rule: circumstance.bodyWeightG },
  impedance_ratio: { property: 'impedanceRatio', rule: circumstance.impedanceRatio },
  impedance_rest_min: { property: 'impedanceRestMin', rule: circumstance.impedanceRestMin },
  hours_since_training: { property: 'hoursSinceTraining', rule: circumstance.hoursSinceTraining },
  position: { property: 'position', rule: circumstance.position.unwrap() },
  sleeve_worn: { property: 'sleeveWorn', rule: circumstance.sleeveWorn.unwrap() },
  remarks: { property: 'remarks', rule: circumstance.remarks },
};

const notHere = () => new Refusal('invalid', 'This value is not corrected here.', 'value');

/** Only what was saved is corrected; an open form is simply typed again. */
async function requireSaved(work: Work, id: string): Promise<string> {
  const { state } = await findAssessment(work, id);
  if (state !== 'complete') throw new Refusal('conflict', 'This assessment is still being taken. Type the value in its form.', 'value');
  return id;
}

/** Each answers with the assessment whose doubts change, where there is one. */
async function correctTrial(work: Work, id: string, field: string, value: unknown, also: OtherReadings = {}): Promise<string | null> {
  const row = await work.em.findOneOrFail(LimbTrialSchema, { id });
  work.expect(row);
  const level = Number(/^circumferences_mm\.(\d+)$/.exec(field)?.[1]);
  if (!(level < row.circumferencesMm.length)) throw notHere();
  row.circumferencesMm = row.circumferencesMm.with(level, correctedGirth.parse(value));
  await settleLevel(work, row, level, also);
  return requireSaved(work, row.assessmentId);
}

async function correctAssessment(work: Work, id: string, field: string, value: unknown): Promise<string | null> {
  const row = await work.em.findOneOrFail(LimbAssessmentSchema, { id });
  work.expect(row);
  const column = Object.hasOwn(correctable, field) ? correctable[field] : undefined;
  if (!column) throw notHere();
  Object.assign(row, { [column.property]: column.rule.parse(value) });
  return requireSaved(work, id);
}

async function correctVisit(work: Work, id: string, field: string, value: unknown): Promise<string | null> {
  const row = await work.em.findOneOrFail(VisitSchema, { id });
  work.expect(row);
  if (field !== 'done_on') throw notHere();
  const on = calendarDay('Give the day as in 2027-03-03.').parse(value);
  const { enrolledOn } = await work.em.findOneOrFail(ParticipantSchema, { id: row.participantId });
  const today = localDate(work.now, await timeZoneOf(work, row.siteId));
  if (row.state !== 'in progress' && row.state !== 'complete') throw new Refusal('conflict', `${row.name} has not taken place, so it has no day to correct.`, 'value');
  if (on > today) throw new Refusal('invalid', `${on} is in the future; today is ${today}. Give the day it took place.`, 'value');
  if (on < enrolledOn) throw new Refusal('invalid', `${on} is before the enrolment on ${enrolledOn}. Give the day it took place.`, 'value');
  row.doneOn = on;
  return (await work.em.findOne(LimbAssessmentSchema, { visitId: id, state: 'complete' }))?.id ?? null;
}

/**
 * Corrects a saved value with a reason: the old one stays in the trail, the mark on it falls, the edit checks run anew, results
 * are computed anew, and the query that asked may be answered in the same breath. If-Match names the version of the row.
 * @throws Refusal 'invalid' for a value that cannot be right, or with the doubts that need a reason.
 */
export async function correctValue(work: Work, { target, value, reason, also, kept = [], query }: CorrectValueInput): Promise<{ corrected: true }> {
  const found = await findTarget(work, target);
  if (JSON.stringify(found.value) === JSON.stringify(value)) throw new Refusal('invalid', 'That is the value already there.', 'value');
  const { participantId } = found;
  const before = await findDoubts(work, participantId);
  const correct = { visit: correctVisit, limb_assessment: correctAssessment, limb_trial: correctTrial, questionnaire_response: null, participant: null }[target.table];
  if (!correct) throw notHere();
  const correctedId = await correct(work, target.id, target.field, value, also);
  await settleDoubts(work, correctedId, { participantId, before, kept });
  await recompute(work, participantId);
  await work.em.flush();
  if (query) await answerByCorrection(work, target, query, reason);
  return { corrected: true };
}

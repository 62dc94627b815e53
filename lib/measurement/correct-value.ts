import { LimbAssessmentSchema } from '@/entities/limb-assessment';
import { LimbTrialSchema } from '@/entities/limb-trial';
import { VisitSchema } from '@/entities/visit';
import { answerQuery } from '@/lib/queries/answer-query';
import { findTarget } from '@/lib/queries/targets';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { timeZoneOf } from '@/lib/schedule/view-visit';
import { z } from 'zod';
import type { CorrectValueInput } from './input';
import { saveCircumstancesInput } from './input';
import { recompute } from './recompute';

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

const girth = z.int('A girth is given in whole millimetres.').min(100, 'A girth under 10 cm cannot be right.').max(700, 'A girth over 70 cm cannot be right.');

const notHere = () => new Refusal('invalid', 'This value is not corrected here.', 'value');

async function correctTrial(work: Work, id: string, field: string, value: unknown): Promise<void> {
  const row = await work.em.findOneOrFail(LimbTrialSchema, { id });
  work.expect(row);
  const level = Number(/^circumferences_mm\.(\d+)$/.exec(field)?.[1]);
  if (!(level < row.circumferencesMm.length)) throw notHere();
  row.circumferencesMm = row.circumferencesMm.with(level, girth.parse(value));
}

async function correctAssessment(work: Work, id: string, field: string, value: unknown): Promise<void> {
  const row = await work.em.findOneOrFail(LimbAssessmentSchema, { id });
  work.expect(row);
  const column = correctable[field];
  if (!column) throw notHere();
  Object.assign(row, { [column.property]: column.rule.parse(value) });
}

async function correctVisit(work: Work, id: string, field: string, value: unknown): Promise<void> {
  const row = await work.em.findOneOrFail(VisitSchema, { id });
  work.expect(row);
  if (field !== 'done_on') throw notHere();
  const on = z.iso.date('Give the day as in 2027-03-03.').parse(value);
  const today = localDate(work.now, await timeZoneOf(work, row.siteId));
  if (on > today) throw new Refusal('invalid', `${on} is in the future; today is ${today}.`, 'value');
  row.doneOn = on;
}

/**
 * Corrects a saved value with a reason: the old one stays in the trail, the mark on it falls, results are computed
 * anew, and the query that asked may be answered in the same breath. If-Match names the version of the row.
 */
export async function correctValue(work: Work, { target, value, reason, queryId }: CorrectValueInput): Promise<{ corrected: true }> {
  const found = await findTarget(work, target);
  if (JSON.stringify(found.value) === JSON.stringify(value)) throw new Refusal('invalid', 'That is the value already there.', 'value');
  if (target.table === 'limb_trial') await correctTrial(work, target.id, target.field, value);
  else if (target.table === 'limb_assessment') await correctAssessment(work, target.id, target.field, value);
  else if (target.table === 'visit') await correctVisit(work, target.id, target.field, value);
  else throw notHere();
  await recompute(work, found.participantId);
  await work.em.flush();
  if (queryId !== undefined) await answerQuery({ ...work, expect: () => undefined }, { id: queryId, answer: `Corrected: ${reason}` });
  return { corrected: true };
}

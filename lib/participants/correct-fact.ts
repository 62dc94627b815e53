import { ParticipantSchema } from '@/entities/participant';
import { findDoubts } from '@/lib/measurement/find-doubts';
import { recompute } from '@/lib/measurement/recompute';
import { settleDoubts } from '@/lib/measurement/settle-doubts';
import { answerByCorrection } from '@/lib/queries/answer-by-correction';
import { findTarget } from '@/lib/queries/targets';
import { timeZoneOf } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { CorrectFactInput } from './input';

const propertyOf = {
  affected_side: 'affectedSide',
  dominant_side: 'dominantSide',
  surgery_on: 'surgeryOn',
  surgery: 'surgery',
  axillary_procedure: 'axillaryProcedure',
  nodes_removed: 'nodesRemoved',
  radiotherapy: 'radiotherapy',
  systemic_therapy: 'systemicTherapy',
  height_mm: 'heightMm',
  age_years: 'ageYears',
} as const satisfies Record<CorrectFactInput['field'], string>;

/**
 * Corrects a fact of a participant with a reason. Affected side, dominant hand and date of surgery decide change and
 * verdicts, so every result of the participant is computed anew; what that makes doubtful becomes a query at its visit.
 * @throws Refusal 'not-found' out of reach, 'stale' when somebody saved first, 'invalid' for a value that cannot be.
 */
export async function correctFact(work: Work, { code, field, value, reason, query }: CorrectFactInput): Promise<{ corrected: true }> {
  const participant = await work.em.findOne(ParticipantSchema, { code });
  if (!participant) throw new Refusal('not-found', 'There is no such participant in your reach.');
  work.expect(participant);
  const target = { table: 'participant', id: participant.id, field } as const;
  if ((await findTarget(work, target)).value === value) throw new Refusal('invalid', 'That is the value already there.', 'value');
  const today = localDate(work.now, await timeZoneOf(work, participant.siteId));
  if (field === 'surgery_on' && value > today) throw new Refusal('invalid', `${value} is in the future; today is ${today}. Give the day of surgery.`, 'value');
  const before = await findDoubts(work, participant.id);
  Object.assign(participant, { [propertyOf[field]]: value });
  await settleDoubts(work, null, { participantId: participant.id, before, kept: [] });
  await recompute(work, participant.id);
  await work.em.flush();
  if (query) await answerByCorrection(work, target, query, reason);
  return { corrected: true };
}

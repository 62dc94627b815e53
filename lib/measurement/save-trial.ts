import { LimbTrialSchema } from '@/entities/limb-trial';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findOpenAssessment, trialsOf } from './find-assessment';
import type { SaveTrialInput } from './input';
import { viewOpen, type OpenAssessmentView } from './view-open';

/** Saves one pass over one arm, complete or not yet: a level not read stays empty. */
export async function saveTrial(work: Work, { id, side, trial, circumferencesMm }: SaveTrialInput): Promise<OpenAssessmentView> {
  const assessment = await findOpenAssessment(work, id);
  if (circumferencesMm.length !== assessment.levelCount)
    throw new Refusal('invalid', `This map has ${assessment.levelCount} levels; ${circumferencesMm.length} girths were sent.`, 'circumferencesMm');
  const row = await work.em.findOne(LimbTrialSchema, { assessmentId: id, side, trial });
  if (row) {
    row.circumferencesMm = [...circumferencesMm];
    row.savedAt = work.now;
  } else {
    const { siteId, participantId } = assessment;
    work.em.create(LimbTrialSchema, { siteId, participantId, assessmentId: id, side, trial, circumferencesMm: [...circumferencesMm], savedAt: work.now });
  }
  // The whole form has one version: two people who measure at once notice.
  assessment.measuredAt = work.now;
  await work.em.flush();
  return viewOpen(assessment, await trialsOf(work, id));
}

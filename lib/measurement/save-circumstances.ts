import type { Work } from '@/lib/work/work';
import { findOpenAssessment, trialsOf } from './find-assessment';
import type { SaveCircumstancesInput } from './input';
import { viewOpen, type OpenAssessmentView } from './view-open';

/** Saves what stands round the tape: position, sleeve, weight, ratio. */
export async function saveCircumstances(work: Work, { id, ...circumstances }: SaveCircumstancesInput): Promise<OpenAssessmentView> {
  const assessment = await findOpenAssessment(work, id);
  Object.assign(assessment, circumstances);
  assessment.measuredAt = work.now;
  await work.em.flush();
  return viewOpen(assessment, await trialsOf(work, id));
}

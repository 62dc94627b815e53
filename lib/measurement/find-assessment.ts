import { LimbAssessmentSchema, type LimbAssessment } from '@/entities/limb-assessment';
import { LimbTrialSchema, type LimbTrial } from '@/entities/limb-trial';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** An assessment within reach. @throws Refusal 'not-found'. */
export async function findAssessment(work: Work, id: string): Promise<LimbAssessment> {
  const assessment = await work.em.findOne(LimbAssessmentSchema, { id });
  if (!assessment) throw new Refusal('not-found', 'There is no such assessment in your reach.');
  return assessment;
}

/** An assessment that is still being taken, in the version the caller saw. @throws Refusal 'not-found', 'stale', 'locked'. */
export async function findOpenAssessment(work: Work, id: string): Promise<LimbAssessment> {
  const assessment = await findAssessment(work, id);
  work.expect(assessment);
  if (assessment.state !== 'open') throw new Refusal('locked', 'This assessment is saved. Correct a value with a reason instead.');
  return assessment;
}

/** The passes of the tape so far. */
export const trialsOf = (work: Work, assessmentId: string): Promise<LimbTrial[]> =>
  work.em.find(LimbTrialSchema, { assessmentId }, { orderBy: { trial: 'asc', side: 'asc' } });

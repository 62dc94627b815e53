import { LimbAssessmentSchema } from '@/entities/limb-assessment';
import { may } from '@/lib/auth/policy';
import { findVisit } from '@/lib/schedule/view-visit';
import type { Work } from '@/lib/work/work';
import { trialsOf } from './find-assessment';
import { viewComplete, type CompleteAssessmentView } from './view-complete';
import { viewOpen, type OpenAssessmentView } from './view-open';

/** The limb assessment of a visit: bare while it is being taken, with results once it is saved, null before it began. */
export async function viewAssessment(work: Work, { visitId }: { visitId: string }): Promise<OpenAssessmentView | CompleteAssessmentView | null> {
  const visit = await findVisit(work, visitId);
  const assessment = await work.em.findOne(LimbAssessmentSchema, { visitId });
  // A visit begun by mistake is to come again; its empty form waits with it.
  if (!assessment || visit.state === 'to come') return null;
  // What is still being taken is the site's alone; the others see what was saved.
  if (assessment.state === 'open' && !may(work.actor.role, 'query.answer')) return null;
  return assessment.state === 'complete' ? viewComplete(work, assessment) : viewOpen(assessment, await trialsOf(work, assessment.id));
}

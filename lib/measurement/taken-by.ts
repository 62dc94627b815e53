import { LimbAssessmentSchema, type LimbAssessment } from '@/entities/limb-assessment';
import { LimbTrialSchema, type LimbTrial } from '@/entities/limb-trial';
import { VisitSchema, type Visit } from '@/entities/visit';
import type { Work } from '@/lib/work/work';
import type { MeasuredSitting } from './compute-assessment';
import { measuredSitting } from './sitting';

/** One assessment with its rows, as the formulas and the checks take them. */
export interface Taken {
  readonly assessment: LimbAssessment;
  readonly visit: Visit;
  readonly trials: readonly LimbTrial[];
  readonly sitting: MeasuredSitting;
}

/** The complete assessments of a participant by date, and the one that is about to be completed. */
export async function takenBy(work: Work, participantId: string, completingId?: string): Promise<Taken[]> {
  await work.em.flush();
  const [assessments, trials, visits] = [
    await work.em.find(LimbAssessmentSchema, { participantId }),
    await work.em.find(LimbTrialSchema, { participantId }),
    await work.em.find(VisitSchema, { participantId }),
  ];
  return assessments
    .filter(({ id, state }) => state === 'complete' || id === completingId)
    .flatMap((assessment) => {
      const visit = visits.find(({ id }) => id === assessment.visitId);
      const passes = trials.filter(({ assessmentId }) => assessmentId === assessment.id);
      return visit?.doneOn ? [{ assessment, visit, trials: passes, sitting: measuredSitting(assessment, passes, visit.doneOn) }] : [];
    })
    .sort((a, b) => (a.sitting.on < b.sitting.on ? -1 : 1));
}

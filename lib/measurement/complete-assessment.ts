import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';
import { completeVisit } from '@/entities/visit';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { findVisit } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findOpenAssessment, trialsOf } from './find-assessment';
import { findDoubts } from './find-doubts';
import type { CompleteAssessmentInput } from './input';
import { recompute } from './recompute';
import { requireReasons } from './require-reasons';
import { settleHold } from './settle-hold';
import { viewComplete, type CompleteAssessmentView } from './view-complete';

/** Both trials of both arms, and a third where the two differ beyond the tolerance. */
function requireReadings(assessment: LimbAssessment, trials: readonly LimbTrial[]): void {
  for (const side of ['left', 'right'] as const)
    for (let level = 0; level < assessment.levelCount; level += 1) {
      const reading = (trial: number) => trials.find((row) => row.side === side && row.trial === trial)?.circumferencesMm[level] ?? null;
      const at = `${side} arm at ${(assessment.startOffsetMm + level * assessment.stepMm) / 10} cm`;
      const [first, second, third] = [reading(1), reading(2), reading(3)];
      if (first === null || second === null)
        throw new Refusal('invalid', `The ${at} has no reading in trial ${first === null ? 1 : 2}. Measure it, then save.`, `${side} ${first === null ? 1 : 2} ${level}`);
      if (combineTrials({ first, second, third }, assessment.toleranceMm).girthMm === null)
        throw new Refusal('invalid', `The two trials of the ${at} differ by ${Math.abs(first - second) / 10} cm. Take a third reading.`, `${side} 3 ${level}`);
    }
}

/**
 * Saves a sitting as complete: only now is it held against earlier visits, and only now are volumes, change and verdicts
 * computed and shown. What the earlier visits make doubtful is asked about in words that name no earlier figure.
 * @throws Refusal 'invalid' with the place of the first missing or impossible reading, or with the doubts that need a reason.
 */
export async function completeAssessment(work: Work, { id, kept }: CompleteAssessmentInput): Promise<CompleteAssessmentView> {
  const assessment = await findOpenAssessment(work, id);
  const trials = await trialsOf(work, id);
  if (!assessment.position) throw new Refusal('invalid', 'Choose the position in which the arms were measured.', 'position');
  if (assessment.sleeveWorn == null) throw new Refusal('invalid', 'Say whether a sleeve was worn in the last 12 hours.', 'sleeveWorn');
  requireReadings(assessment, trials);
  const doubts = await findDoubts(work, assessment.participantId, id);
  assessment.findings = requireReasons(doubts.find((one) => one.assessment.id === id)?.found ?? [], kept);
  assessment.completedAt = work.now;
  await recompute(work, assessment.participantId, assessment.id);
  assessment.state = 'complete';
  completeVisit(await findVisit(work, assessment.visitId));
  await work.em.flush();
  await settleHold(work, assessment.participantId);
  return viewComplete(work, assessment);
}

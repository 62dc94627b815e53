import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';
import { completeVisit } from '@/entities/visit';
import { combineTrials } from '@/instruments/measurement/combine-trials';
import { openQuery } from '@/lib/queries/raise-query';
import { findTarget } from '@/lib/queries/targets';
import { findVisit } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findOpenAssessment, trialsOf } from './find-assessment';
import { findingsOf, type KeptFinding } from './findings';
import type { CompleteAssessmentInput } from './input';
import { recompute } from './recompute';
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

/** Doubtful values keep the reason they were kept for; what cannot be right is not saved without one. */
function explained(found: readonly Omit<KeptFinding, 'reason'>[], kept: CompleteAssessmentInput['kept']): KeptFinding[] {
  return found.map((finding) => {
    const reason = kept.find(({ check, place }) => check === finding.check && place === finding.place)?.reason ?? null;
    if (finding.severity === 'hard' && reason === null) throw new Refusal('invalid', finding.message, finding.place);
    return { ...finding, reason };
  });
}

/** What was left unexplained becomes a query, beside its value. */
async function queryUnexplained(work: Work, assessment: LimbAssessment, trials: readonly LimbTrial[], findings: readonly KeptFinding[]): Promise<void> {
  for (const { place, reason, message, check } of findings) {
    // Trials that differ were measured a third time: that is the answer already.
    if (reason !== null || check === 'trials.differ') continue;
    const [side, trial, level] = place.split(' ');
    const row = trials.find((candidate) => candidate.side === side && candidate.trial === Number(trial));
    const target =
      row && level !== undefined
        ? ({ table: 'limb_trial', id: row.id, field: `circumferences_mm.${level}` } as const)
        : ({ table: 'limb_assessment', id: assessment.id, field: place === 'weight' ? 'body_weight_g' : place === 'ratio' ? 'impedance_ratio' : 'measured_at' } as const);
    await openQuery(work, await findTarget(work, target), message, { kind: 'check', checkId: check });
  }
}

/**
 * Saves a sitting as complete: only now are volumes, change and verdicts computed and shown.
 * @throws Refusal 'invalid' with the place of the first missing or impossible reading.
 */
export async function completeAssessment(work: Work, { id, kept }: CompleteAssessmentInput): Promise<CompleteAssessmentView> {
  const assessment = await findOpenAssessment(work, id);
  const trials = await trialsOf(work, id);
  if (!assessment.position) throw new Refusal('invalid', 'Choose the position in which the arms were measured.', 'position');
  if (assessment.sleeveWorn == null) throw new Refusal('invalid', 'Say whether a sleeve was worn in the last 12 hours.', 'sleeveWorn');
  requireReadings(assessment, trials);
  const findings = explained(findingsOf(assessment, trials), kept);
  assessment.findings = findings;
  assessment.completedAt = work.now;
  await recompute(work, assessment.participantId, assessment.id);
  assessment.state = 'complete';
  completeVisit(await findVisit(work, assessment.visitId));
  await work.em.flush();
  await queryUnexplained(work, assessment, trials, findings);
  await settleHold(work, assessment.participantId);
  return viewComplete(work, assessment);
}

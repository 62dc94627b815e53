import { ParticipantSchema } from '@/entities/participant';
import { daysBetween } from '@/instruments/calendar';
import type { Finding } from '@/instruments/checks/define-edit-check';
import { checkLimbHistory, type SavedAssessment } from '@/instruments/checks/limb-history';
import { FORMULA_VERSION } from '@/instruments/measurement/formula-version';
import { limbVolume } from '@/instruments/measurement/limb-volume';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { settledGirthsMm } from './compute-assessment';
import { findingsOf, type Found } from './findings';
import { takenBy, type Taken } from './taken-by';

/** One sitting with everything that is doubtful about it, by itself and against the visits before it. */
export interface Doubted extends Taken {
  readonly found: readonly Found[];
}

function asSaved({ sitting }: Taken): SavedAssessment {
  const { method, map, bodyWeightG } = sitting;
  const [leftMm, rightMm] = [settledGirthsMm(sitting, 'left'), settledGirthsMm(sitting, 'right')];
  const volumeMl = (girthsMm: (number | null)[]) => limbVolume({ method, girthsMm, map }).volumeMl;
  return {
    // Every stored volume is kept at the present version of the formula, so only method and map can differ.
    identity: { method, map, deviceId: null, formulaVersion: FORMULA_VERSION },
    leftMm,
    rightMm,
    leftMl: volumeMl(leftMm),
    rightMl: volumeMl(rightMm),
    weightKg: bodyWeightG === null ? null : bodyWeightG / 1000,
  };
}

/** Where a finding about earlier visits stands: the weight, one arm, or both. */
function placeOf({ check }: Finding, atRiskSide: 'left' | 'right'): string {
  if (check.startsWith('weight-change.')) return 'weight';
  if (check.startsWith('at-risk-change.')) return atRiskSide;
  if (check.startsWith('unaffected-change.')) return atRiskSide === 'left' ? 'right' : 'left';
  return 'whole';
}

function againstEarlier(taken: readonly Taken[], one: Taken, atRiskSide: 'left' | 'right'): Found[] {
  const before = taken.filter(({ sitting }) => sitting.on < one.sitting.on);
  const previous = before.at(-1) ?? null;
  const baseline = before.find(({ visit }) => visit.key === 'baseline') ?? null;
  const findings = checkLimbHistory({
    now: asSaved(one),
    previous: previous && asSaved(previous),
    baseline: baseline && asSaved(baseline),
    atRiskSide,
    daysSincePrevious: previous && daysBetween({ from: previous.sitting.on, to: one.sitting.on }),
  });
  return findings.map((finding) => ({ check: finding.check, version: finding.version, severity: finding.severity, message: finding.message, place: placeOf(finding, atRiskSide) }));
}

/**
 * The doubts about every complete assessment of a participant, and about the one to be completed. Only to be asked once
 * both trials of it are in: what earlier visits say would guide the hand before.
 */
export async function findDoubts(work: Work, participantId: string, completingId?: string): Promise<Doubted[]> {
  const participant = await work.em.findOne(ParticipantSchema, { id: participantId });
  if (!participant) throw new Refusal('not-found', 'There is no such participant in your reach.');
  const taken = await takenBy(work, participantId, completingId);
  return taken.map((one) => ({ ...one, found: [...findingsOf(one.assessment, one.trials), ...againstEarlier(taken, one, participant.affectedSide)] }));
}

import type { LimbAssessment } from '@/entities/limb-assessment';
import { ParticipantSchema } from '@/entities/participant';
import { interLimbDifference } from '@/instruments/measurement/inter-limb-difference';
import { rvcMeasurementError } from '@/instruments/measurement/rvc-measurement-error';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { findVisit } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import type { SwellingVerdict } from '@/instruments/swelling/define-swelling';
import { highWater, swellingDefinition, type SwellingCode } from '@/instruments/swelling';
import { settledGirthsMm } from './compute-assessment';
import { trialsOf } from './find-assessment';
import type { KeptFinding } from './findings';
import { measuredSitting } from './sitting';
import { viewOpen, type OpenAssessmentView } from './view-open';

/** One definition's verdict, in words. */
export interface VerdictView extends SwellingVerdict {
  readonly code: string;
  readonly name: string;
  readonly sentence: string;
  readonly isPrimary: boolean;
}

/** Another sitting of the same person, for comparison. */
export interface EarlierSitting {
  readonly visitName: string;
  readonly on: string;
  readonly leftVolumeMl: number;
  readonly rightVolumeMl: number;
  readonly rvc: number | null;
  readonly leftGirthsMm: readonly (number | null)[];
  readonly rightGirthsMm: readonly (number | null)[];
  readonly isBaseline: boolean;
}

/** A saved assessment with everything that may be known once both trials are in. */
export interface CompleteAssessmentView extends Omit<OpenAssessmentView, 'state'> {
  readonly state: 'complete';
  readonly affectedSide: 'left' | 'right';
  readonly trialIds: readonly { readonly id: string; readonly side: 'left' | 'right'; readonly trial: number; readonly version: number }[];
  readonly leftGirthsMm: readonly (number | null)[];
  readonly rightGirthsMm: readonly (number | null)[];
  readonly leftVolumeMl: number;
  readonly rightVolumeMl: number;
  /** At-risk minus unaffected, in mL and percent of the unaffected. */
  readonly interLimb: { readonly differenceMl: number | null; readonly differencePct: number | null };
  readonly rvc: number | null;
  /** 95 % measurement error of the change, in percentage points. */
  readonly errorPoints: number;
  /** The case threshold on the scale of the change, in percent. */
  readonly highWaterPct: number;
  readonly verdicts: readonly VerdictView[];
  readonly findings: readonly KeptFinding[];
  readonly earlier: readonly EarlierSitting[];
  readonly formulaVersion: string;
}

interface EarlierRow {
  visit_name: string;
  key: string;
  done_on: string;
  left_volume_ml: number;
  right_volume_ml: number;
  rvc: number | null;
  trials: { side: 'left' | 'right'; trial: number; circumferencesMm: (number | null)[] }[];
  tolerance_mm: number;
  level_count: number;
  step_mm: number;
  start_offset_mm: number;
}

async function earlierThan(work: Work, participantId: string, on: string): Promise<EarlierSitting[]> {
  const rows = await work.sql<EarlierRow>(
    `select v.name as visit_name, v.key, v.done_on::text, a.left_volume_ml::float8, a.right_volume_ml::float8, a.rvc::float8, a.tolerance_mm, a.level_count, a.step_mm, a.start_offset_mm,
       (select jsonb_agg(jsonb_build_object('side', t.side, 'trial', t.trial, 'circumferencesMm', t.circumferences_mm)) from limb_trial t where t.assessment_id = a.id) as trials
     from limb_assessment a join visit v on v.id = a.visit_id where a.participant_id = ? and a.state = 'complete' and v.done_on < ? order by v.done_on`,
    [participantId, on],
  );
  return rows.map((row) => {
    const sitting = { trials: row.trials, map: { startOffsetMm: row.start_offset_mm, stepMm: row.step_mm, levels: row.level_count }, toleranceMm: row.tolerance_mm };
    return {
      visitName: row.visit_name,
      on: row.done_on,
      leftVolumeMl: row.left_volume_ml,
      rightVolumeMl: row.right_volume_ml,
      rvc: row.rvc,
      leftGirthsMm: settledGirthsMm(sitting, 'left'),
      rightGirthsMm: settledGirthsMm(sitting, 'right'),
      isBaseline: row.key === 'baseline',
    };
  });
}

/** A complete assessment as it may be seen. @throws Refusal 'conflict' while it is open. */
export async function viewComplete(work: Work, assessment: LimbAssessment): Promise<CompleteAssessmentView> {
  const visit = await findVisit(work, assessment.visitId);
  const participant = await work.em.findOneOrFail(ParticipantSchema, { id: assessment.participantId });
  const { leftVolumeMl, rightVolumeMl, formulaVersion } = assessment;
  if (assessment.state !== 'complete' || leftVolumeMl == null || rightVolumeMl == null || !visit.doneOn || !formulaVersion)
    throw new Refusal('conflict', 'Results are shown once both trials are saved.');
  const { swelling, measurement } = (await findProtocol(work, visit.protocolVersionId)).document;
  const trials = await trialsOf(work, assessment.id);
  const sitting = measuredSitting(assessment, trials, visit.doneOn);
  const leftGirthsMm = settledGirthsMm(sitting, 'left');
  const rightGirthsMm = settledGirthsMm(sitting, 'right');
  const arms = { left: { girthsMm: leftGirthsMm, volumeMl: leftVolumeMl }, right: { girthsMm: rightGirthsMm, volumeMl: rightVolumeMl } };
  const isLeft = participant.affectedSide === 'left';
  const { differenceMl, differencePct } = interLimbDifference({ atRisk: isLeft ? arms.left : arms.right, unaffected: isLeft ? arms.right : arms.left });
  const shown = [swelling.primary, ...swelling.alternatives.filter((code) => code !== swelling.primary)];
  return {
    ...viewOpen(assessment, trials),
    state: 'complete',
    affectedSide: participant.affectedSide,
    trialIds: trials.map(({ id, side, trial, version }) => ({ id, side, trial, version })),
    leftGirthsMm,
    rightGirthsMm,
    leftVolumeMl,
    rightVolumeMl,
    interLimb: { differenceMl, differencePct },
    rvc: assessment.rvc ?? null,
    errorPoints: rvcMeasurementError(measurement.semPct),
    highWaterPct: highWater(swelling.primary).percent,
    verdicts: shown.flatMap((code) => verdictView(code, assessment, code === swelling.primary)),
    findings: assessment.findings as KeptFinding[],
    earlier: await earlierThan(work, assessment.participantId, visit.doneOn),
    formulaVersion,
  };
}

function verdictView(code: SwellingCode, assessment: LimbAssessment, isPrimary: boolean): VerdictView[] {
  const verdict = (assessment.verdicts as Partial<Record<SwellingCode, SwellingVerdict>>)[code];
  const { name, sentence } = swellingDefinition(code);
  return verdict ? [{ ...verdict, code, name, sentence, isPrimary }] : [];
}

import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';
import type { ArmTrials, LimbSitting } from '@/instruments/checks/limb-sitting';
import type { MeasurementMap } from '@/instruments/measurement/map';
import type { MeasuredSitting } from './compute-assessment';

/** How an assessment laid its tape. */
export const mapOf = (assessment: LimbAssessment): MeasurementMap => ({
  startOffsetMm: assessment.startOffsetMm,
  stepMm: assessment.stepMm,
  levels: assessment.levelCount,
});

const methodOf = (assessment: LimbAssessment): 'frustum' | 'disk' => (assessment.method === 'disk' ? 'disk' : 'frustum');

/** The record's rows as the formulas take them. */
export const measuredSitting = (assessment: LimbAssessment, trials: readonly LimbTrial[], on: string): MeasuredSitting => ({
  on,
  method: methodOf(assessment),
  map: mapOf(assessment),
  toleranceMm: assessment.toleranceMm,
  trials: trials.map(({ side, trial, circumferencesMm }) => ({ side, trial, circumferencesMm })),
  bodyWeightG: assessment.bodyWeightG ?? null,
  impedanceRatio: assessment.impedanceRatio ?? null,
});

const arm = (assessment: LimbAssessment, trials: readonly LimbTrial[], side: 'left' | 'right'): ArmTrials => {
  const pass = (trial: number): readonly (number | null)[] =>
    trials.find((row) => row.side === side && row.trial === trial)?.circumferencesMm ?? Array.from({ length: assessment.levelCount }, () => null);
  return { first: pass(1), second: pass(2), third: pass(3) };
};

/** The record's rows as the edit checks take them. */
export const checkedSitting = (assessment: LimbAssessment, trials: readonly LimbTrial[]): LimbSitting => ({
  map: mapOf(assessment),
  method: methodOf(assessment),
  toleranceMm: assessment.toleranceMm,
  left: arm(assessment, trials, 'left'),
  right: arm(assessment, trials, 'right'),
});

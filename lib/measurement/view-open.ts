import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';

/**
 * An assessment while it is being taken: what this sitting has read and nothing else. No earlier value, no baseline,
 * no change and no volume is in it, so that none can reach the assessor's eye before both trials are saved.
 */
export interface OpenAssessmentView {
  readonly id: string;
  readonly state: 'open';
  readonly visitId: string;
  readonly map: { readonly startOffsetMm: number; readonly stepMm: number; readonly levelCount: number };
  readonly method: string;
  readonly toleranceMm: number;
  readonly circumstances: {
    readonly position: string | null;
    readonly sleeveWorn: boolean | null;
    readonly hoursSinceTraining: number | null;
    readonly bodyWeightG: number | null;
    readonly impedanceRatio: number | null;
    readonly impedanceRestMin: number | null;
    readonly remarks: string | null;
  };
  readonly trials: readonly { readonly side: 'left' | 'right'; readonly trial: number; readonly circumferencesMm: readonly (number | null)[]; readonly savedAt: string }[];
  readonly version: number;
}

export const viewOpen = (assessment: LimbAssessment, trials: readonly LimbTrial[]): OpenAssessmentView => ({
  id: assessment.id,
  state: 'open',
  visitId: assessment.visitId,
  map: { startOffsetMm: assessment.startOffsetMm, stepMm: assessment.stepMm, levelCount: assessment.levelCount },
  method: assessment.method,
  toleranceMm: assessment.toleranceMm,
  circumstances: {
    position: assessment.position ?? null,
    sleeveWorn: assessment.sleeveWorn ?? null,
    hoursSinceTraining: assessment.hoursSinceTraining ?? null,
    bodyWeightG: assessment.bodyWeightG ?? null,
    impedanceRatio: assessment.impedanceRatio ?? null,
    impedanceRestMin: assessment.impedanceRestMin ?? null,
    remarks: assessment.remarks ?? null,
  },
  trials: trials.map(({ side, trial, circumferencesMm, savedAt }) => ({ side, trial, circumferencesMm, savedAt: savedAt.toISOString() })),
  version: assessment.version,
});

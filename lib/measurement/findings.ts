import type { LimbAssessment } from '@/entities/limb-assessment';
import type { LimbTrial } from '@/entities/limb-trial';
import { checkLimbSitting, type SittingFinding } from '@/instruments/checks/limb-sitting';
import { impedanceRatioRange, weight } from '@/instruments/checks/measured-ranges';
import type { Finding } from '@/instruments/checks/define-edit-check';
import { checkedSitting } from './sitting';

/** A finding as the record keeps it: what was doubtful, where, and why it was kept. */
export interface KeptFinding {
  readonly check: string;
  readonly version: number;
  readonly severity: Finding['severity'];
  readonly message: string;
  /** 'left 2 5' is left arm, trial 2, level 5; 'weight', 'ratio' and 'whole' are the rest. */
  readonly place: string;
  readonly reason: string | null;
}

/** A finding before anybody has said why it stands. */
export type Found = Omit<KeptFinding, 'reason'>;

const trialNumbers = { first: 1, second: 2, third: 3 } as const;

/** Names a place on the grid in the words that both screen and record use. */
export const placeName = ({ side, trial, level }: SittingFinding['at']): string =>
  [side, trial && trialNumbers[trial], level].filter((part) => part !== undefined).join(' ') || 'whole';

/** Everything doubtful about a sitting by itself, with its place. */
export function findingsOf(assessment: LimbAssessment, trials: readonly LimbTrial[]): Found[] {
  const kg = assessment.bodyWeightG == null ? null : assessment.bodyWeightG / 1000;
  const ratio = assessment.impedanceRatio ?? null;
  const beside = [
    { place: 'weight', finding: kg === null ? null : (weight.limit.run(kg) ?? weight.range.run(kg)) },
    { place: 'ratio', finding: ratio === null ? null : (impedanceRatioRange.limit.run(ratio) ?? impedanceRatioRange.range.run(ratio)) },
  ];
  const sitting = checkLimbSitting(checkedSitting(assessment, trials)).map((finding) => ({ place: placeName(finding.at), finding }));
  return [...sitting, ...beside].flatMap(({ place, finding }) =>
    finding && finding.severity !== 'hint' ? [{ check: finding.check, version: finding.version, severity: finding.severity, message: finding.message, place }] : [],
  );
}

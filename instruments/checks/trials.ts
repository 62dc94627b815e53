import { DEFAULT_TOLERANCE_MM } from '../measurement/combine-trials';
import { printGirthCm } from '../numbers';
import { defineEditCheck } from './define-edit-check';

/** Two readings of one level in one sitting. `isThirdTaken` quiets the call for a third. */
export interface TrialPair {
  readonly firstMm: number;
  readonly secondMm: number;
  readonly toleranceMm?: number;
  readonly isThirdTaken?: boolean;
}

const APART_MM = 20;
const SOURCE = 'common practice, no source';

function overOrUnder({ firstMm, secondMm }: TrialPair): string {
  return `${printGirthCm(secondMm)} is ${printGirthCm(Math.abs(secondMm - firstMm))} cm ${secondMm < firstMm ? 'under' : 'over'} trial 1.`;
}

export const trialsDiffer = defineEditCheck<TrialPair>({
  id: 'trials.differ',
  version: 1,
  severity: 'hint',
  uses: 'this-sitting',
  title: 'Two trials beyond tolerance: a third is needed',
  source: SOURCE,
  run(pair) {
    const apartMm = Math.abs(pair.secondMm - pair.firstMm);
    if (pair.isThirdTaken || apartMm <= (pair.toleranceMm ?? DEFAULT_TOLERANCE_MM) || apartMm > APART_MM) return null;
    return { message: `${overOrUnder(pair)} Take a third reading of this level.`, value: pair.secondMm };
  },
  examplePass: { firstMm: 251, secondMm: 256 },
  exampleFires: { firstMm: 251, secondMm: 257 },
});

export const trialsFarApart = defineEditCheck<TrialPair>({
  id: 'trials.far-apart',
  version: 2,
  severity: 'soft',
  uses: 'this-sitting',
  title: 'Two trials more than 2.0 cm apart',
  source: SOURCE,
  run(pair) {
    if (Math.abs(pair.secondMm - pair.firstMm) <= APART_MM) return null;
    return { message: `${overOrUnder(pair)} Measure it again, or keep it and say why.`, value: pair.secondMm };
  },
  examplePass: { firstMm: 258, secondMm: 238 },
  exampleFires: { firstMm: 258, secondMm: 236 },
});

import { isAbove } from '../threshold';

/**
 * Impedance ratio R0 unaffected / R0 at-risk, whole arm: impedance falls as fluid rises, so above 1 is more fluid on
 * the at-risk side. Throws RangeError unless both are above zero.
 */
export function impedanceRatio({ atRiskOhm, unaffectedOhm }: { atRiskOhm: number; unaffectedOhm: number }): number {
  if (!(atRiskOhm > 0) || !(unaffectedOhm > 0)) throw new RangeError('Both impedances must be above zero.');
  return unaffectedOhm / atRiskOhm;
}

/** Published cut-offs the ratio must exceed; which set applies is a protocol setting stored with the result. */
export const impedanceCutoffs = {
  '2001-3sd': { dominant: 1.139, nonDominant: 1.066, source: 'Cornish 2001, mean + 3 SD, as given by Ward 2011' },
  '2011-2sd': { dominant: 1.094, nonDominant: 1.066, source: 'computed from the means and SD of Ward 2011 (from memory), mean + 2 SD' },
  '2011-3sd': { dominant: 1.134, nonDominant: 1.106, source: 'Ward 2011, Lymphat Res Biol 9:47, mean + 3 SD' },
  '2018-2sd': { dominant: 1.121, nonDominant: 1.121, source: 'computed from Steele 2018, mean 0.987, SD 0.067, + 2 SD' },
  '2018-3sd': { dominant: 1.188, nonDominant: 1.188, source: 'computed from Steele 2018, mean 0.987, SD 0.067, + 3 SD' },
} as const;

export type ImpedanceCutoffSet = keyof typeof impedanceCutoffs;

/**
 * The cut-off for this arm. Unknown or no dominance takes the non-dominant one, which is the lower and the more
 * sensitive (common practice, no source); such a result has no validated cut-off and should be labelled so.
 */
export function impedanceCutoff(set: ImpedanceCutoffSet, atRiskIsDominant: boolean | null): number {
  return atRiskIsDominant ? impedanceCutoffs[set].dominant : impedanceCutoffs[set].nonDominant;
}

/** Mean and SD of a healthy sample to the ratio that `k` SDs above it mark. */
export function cutoffFromNorm({ mean, sd, k }: { mean: number; sd: number; k: number }): number {
  return mean + k * sd;
}

export function isAboveCutoff(ratio: number, set: ImpedanceCutoffSet, atRiskIsDominant: boolean | null): boolean {
  return isAbove(ratio, impedanceCutoff(set, atRiskIsDominant));
}

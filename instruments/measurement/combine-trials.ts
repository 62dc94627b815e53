/** What the trials at one level come to. `girthMm` may end in .5 (mean of two integers). */
export interface CombinedTrials {
  readonly girthMm: number | null;
  readonly thirdNeeded: boolean;
  /** Largest disagreement between the first two trials, null until both are there. */
  readonly differenceMm: number | null;
  readonly rule: 'none yet' | 'one trial' | 'mean of two' | 'third needed' | 'mean of the closest two' | 'median of three';
}

export const DEFAULT_TOLERANCE_MM = 5;

/**
 * Combines the trials at one level, all in integer millimetres.
 *
 * Two trials within the tolerance: their mean. Beyond it a third is needed; then the mean of the two closest,
 * or the median when both pairs are equally close. One trial alone stands provisionally.
 * Common practice, no source; checks DQ-11 to DQ-15.
 */
export function combineTrials(
  { first, second, third = null }: { first: number | null; second: number | null; third?: number | null },
  toleranceMm: number = DEFAULT_TOLERANCE_MM,
): CombinedTrials {
  const [a, b] = first === null ? [second, null] : [first, second];
  if (a === null) return { girthMm: null, thirdNeeded: false, differenceMm: null, rule: 'none yet' };
  if (b === null) return { girthMm: a, thirdNeeded: false, differenceMm: null, rule: 'one trial' };
  const differenceMm = Math.abs(a - b);
  if (differenceMm <= toleranceMm) return { girthMm: (a + b) / 2, thirdNeeded: false, differenceMm, rule: 'mean of two' };
  if (third === null) return { girthMm: null, thirdNeeded: true, differenceMm, rule: 'third needed' };
  return { ...ofThree([a, b, third]), thirdNeeded: true, differenceMm };
}

function ofThree(trials: [number, number, number]): Pick<CombinedTrials, 'girthMm' | 'rule'> {
  const [low, middle, high] = trials.toSorted((x, y) => x - y) as [number, number, number];
  const below = middle - low;
  const above = high - middle;
  if (below === above) return { girthMm: middle, rule: 'median of three' };
  return { girthMm: below < above ? (low + middle) / 2 : (middle + high) / 2, rule: 'mean of the closest two' };
}

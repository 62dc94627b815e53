/**
 * Weight-adjusted change (A2·W1)/(W2·A1) − 1 of one arm, as a ratio; for surgery on both sides, each arm by itself.
 * The form is given from memory of Miller 2013 and not re-read. Losing weight alone raises it: show the weights beside it.
 * Throws RangeError unless all four are above zero.
 */
export function weightAdjustedChange(values: { baselineMl: number; baselineWeightKg: number; volumeMl: number; weightKg: number }): number {
  const { baselineMl, baselineWeightKg, volumeMl, weightKg } = values;
  if (![baselineMl, baselineWeightKg, volumeMl, weightKg].every((value) => value > 0 && Number.isFinite(value))) {
    throw new RangeError('Weight-adjusted change needs two volumes and two weights above zero.');
  }
  return (volumeMl * baselineWeightKg) / (weightKg * baselineMl) - 1;
}

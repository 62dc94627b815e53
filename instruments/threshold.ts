/**
 * Readings are taken to a millimetre, so 2.0 cm, 5 % and 10 % are hit exactly in real data.
 * A ratio of exactly 5 % may compute as 0.04999…; these two comparisons forgive that and no more.
 */
const EPSILON = 1e-9;

function slack(threshold: number): number {
  return EPSILON * Math.max(1, Math.abs(threshold));
}

/** value ≥ threshold, with equality reached even when it was computed in floating point. */
export function isAtLeast(value: number, threshold: number): boolean {
  return value >= threshold - slack(threshold);
}

/** value > threshold; a value equal but for floating-point dust is not above. */
export function isAbove(value: number, threshold: number): boolean {
  return value > threshold + slack(threshold);
}

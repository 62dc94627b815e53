import { requireRange } from '../result';

export interface IntervalSymmetry {
  readonly estimateInside: boolean;
  /** Distance to the upper limit less distance to the lower, in log odds; near 0 for a pooled proportion. */
  readonly asymmetry: number;
  /** The lower limit that symmetry in log odds would give. */
  readonly impliedLower: number;
}

/**
 * Looks for misprints in a published pooled proportion: pooled on the log-odds
 * scale, its limits lie evenly about it there. All three lie inside (0, 1),
 * else RangeError.
 */
export function intervalSymmetry({ estimate, lower, upper }: { readonly estimate: number; readonly lower: number; readonly upper: number }): IntervalSymmetry {
  requireRange([estimate, lower, upper].every((p) => p > 0 && p < 1), 'A proportion and its limits lie between 0 and 1.');
  const logit = (p: number) => Math.log(p / (1 - p));
  const centre = logit(estimate);
  const reflected = 2 * centre - logit(upper);
  return {
    estimateInside: lower <= estimate && estimate <= upper,
    asymmetry: logit(upper) - centre - (centre - logit(lower)),
    impliedLower: 1 / (1 + Math.exp(-reflected)),
  };
}

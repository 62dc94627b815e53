import { clusteredProportion, type ClusteredProportion } from './clustered-proportion';
import { quantile } from './quantile';
import { weeklySteps } from './weekly-steps';
import { methodOf } from '../registry';
import { requireRange } from '../result';

/** How many weekly steps kept to a rule of progression, pooled over participants. */
export interface RuleAdherence extends ClusteredProportion {
  readonly maxRatio: number;
  readonly increases: number;
  readonly unchanged: number;
  readonly decreases: number;
  readonly medianRatio: number | null;
}

/** 11 kg after 10 kg is a ratio of 1.1 on paper and a little more in binary: a step this near the bound keeps to it. */
const SLACK = 1e-9;

/**
 * Share of steps between logs one week apart with load(t + 1)/load(t) <= maxRatio.
 * A smaller load keeps to the rule; a gap in the weeks is no step. `n` counts
 * steps, `events` those that keep to the rule.
 *
 * @throws RangeError as `weeklySteps`, and for a bound that is not above zero.
 * @see Cochran, Sampling Techniques 1977, ch. 6 and 9
 */
export function ruleAdherence(
  participants: ArrayLike<number>,
  weeks: ArrayLike<number>,
  loads: ArrayLike<number>,
  { maxRatio = 1.1, level = 0.95 }: { maxRatio?: number; level?: number } = {},
): RuleAdherence {
  requireRange(maxRatio > 0, `The largest ratio allowed is above zero, not ${maxRatio}.`);
  const steps = weeklySteps(participants, weeks, loads);
  const kept = steps.ratio.map((ratio) => (ratio <= maxRatio * (1 + SLACK) ? 1 : 0));
  const proportion = clusteredProportion(kept, steps.participants, level);
  const count = (sign: number): number => steps.change.reduce((sum, change) => sum + (Math.sign(change) === sign ? 1 : 0), 0);
  return {
    ...proportion,
    method: methodOf('ruleAdherence'),
    leftOut: steps.leftOut,
    maxRatio,
    increases: count(1),
    unchanged: count(0),
    decreases: count(-1),
    medianRatio: quantile(steps.ratio, [0.5])[0] ?? null,
  };
}

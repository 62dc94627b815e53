/**
 * The shape every estimator answers in. Plain objects, so that they cross a
 * worker boundary and print as JSON without loss.
 */

/** A number with its limits. `null` is 'does not exist'; `reason` then says why. */
export interface Interval {
  /** Point estimate in the estimand's own unit. */
  readonly estimate: number | null;
  readonly lower: number | null;
  readonly upper: number | null;
  /** Confidence level as a proportion, 0.95 unless asked otherwise. */
  readonly level: number;
  /** Why estimate or a limit is null. */
  readonly reason?: string;
}

/** What every result says about how it came to be. */
export interface Provenance {
  /** The method as a reader would cite it: 'Kaplan-Meier, log-log 95% limits'. */
  readonly method: string;
  /** Records used. */
  readonly n: number;
  /** Events among them, where the estimand counts events. */
  readonly events?: number;
  /** Records not used and why; empty when all were used. */
  readonly leftOut: readonly { readonly reason: string; readonly count: number }[];
}

/** One-number results: an interval that carries its provenance. */
export type Estimate = Interval & Provenance;

/** Refuses misuse early: a statistic asked of nonsense throws RangeError, never returns a wild number. */
export function requireRange(ok: boolean, sentence: string): asserts ok {
  if (!ok) throw new RangeError(sentence);
}

/** Confidence levels are proportions strictly inside (0, 1). Throws RangeError otherwise. */
export function requireLevel(level: number): void {
  requireRange(level > 0 && level < 1, `A confidence level lies between 0 and 1, not ${level}.`);
}

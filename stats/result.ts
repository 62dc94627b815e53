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

/** Squares and products of measurements up to here are still numbers. */
const LARGEST = 1e150;

/** Can a value be squared, and one over it, without passing the largest double? 0 can. */
export function isMeasure(value: number): boolean {
  const size = Math.abs(value);
  return size === 0 || (size <= LARGEST && size >= 1 / LARGEST);
}

/** An interval whose overflowed ends are null and say so: exp(800) is no number, and JSON would drop it without a word. */
export function representable<T extends Interval>(interval: T): T {
  const own = (value: number | null): number | null => (value === null || Number.isFinite(value) ? value : null);
  const kept = { estimate: own(interval.estimate), lower: own(interval.lower), upper: own(interval.upper) };
  if (kept.estimate === interval.estimate && kept.lower === interval.lower && kept.upper === interval.upper) return interval;
  return { ...interval, ...kept, reason: interval.reason ?? 'Beyond the largest number that can be written.' };
}

/** Confidence levels are proportions strictly inside (0, 1). Throws RangeError otherwise. */
export function requireLevel(level: number): void {
  requireRange(level > 0 && level < 1, `A confidence level lies between 0 and 1, not ${level}.`);
}

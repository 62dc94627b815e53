import { usableRows } from '../missing/usable-rows';
import { methodOf } from '../registry';
import { requireRange, type Provenance } from '../result';

/** When each participant's logs first reached a load; one row a participant, ascending by participant. */
export interface LoadOnset extends Provenance {
  readonly participants: Float64Array;
  /** First week at or above the target, or the last week logged. */
  readonly time: Float64Array;
  /** 1 = reached, 0 = censored at the last log. */
  readonly event: Uint8Array;
  /** Last week below the target before it was reached; 0 where the first log already qualifies. */
  readonly left: Float64Array;
  /** First week at or above the target; Infinity where never seen. The load was reached in (left, right]. */
  readonly right: Float64Array;
}

/** 8.8 kg asked and 8.799999999999999 logged are one load: whole grams are finer than any scale. */
const SLACK = 1e-9;

/**
 * First log at or above a target load, both as a right-censored time and as the
 * interval since the last log below it. A log says what was lifted that week,
 * so the truth lies between two logs; the right-censored view dates it late.
 *
 * @param weeks at or above 0; several logs in a week are allowed, the largest counts.
 * @throws RangeError for a week below 0 or a target that is not above zero.
 * @see Kalbfleisch & Prentice 2002 (first passage, right censoring)
 */
export function loadOnset(
  participants: ArrayLike<number>,
  weeks: ArrayLike<number>,
  loads: ArrayLike<number>,
  target: number,
): LoadOnset {
  requireRange(target > 0, `A target load is above zero, not ${target}.`);
  const usable = usableRows({ participant: participants, week: weeks, load: loads });
  const seen = new Map<number, { reached: number; last: number; below: number }>();
  // Two passes: the last week below can only be told once the first week reached is known.
  for (const row of usable.rows) {
    const week = weeks[row]!;
    if (!(week >= 0)) throw new RangeError(`A week is at or above 0, not ${week} (row ${row}).`);
    const entry = seen.get(participants[row]!) ?? { reached: Infinity, last: -Infinity, below: 0 };
    if (loads[row]! >= target * (1 - SLACK)) entry.reached = Math.min(entry.reached, week);
    entry.last = Math.max(entry.last, week);
    seen.set(participants[row]!, entry);
  }
  for (const row of usable.rows) {
    const entry = seen.get(participants[row]!)!;
    if (weeks[row]! < entry.reached) entry.below = Math.max(entry.below, weeks[row]!);
  }
  const rows = [...seen].sort(([a], [b]) => a - b);
  const event = Uint8Array.from(rows, ([, entry]) => (entry.reached < Infinity ? 1 : 0));
  return {
    participants: Float64Array.from(rows, ([participant]) => participant),
    time: Float64Array.from(rows, ([, entry]) => Math.min(entry.reached, entry.last)),
    event,
    left: Float64Array.from(rows, ([, entry]) => entry.below),
    right: Float64Array.from(rows, ([, entry]) => entry.reached),
    method: methodOf('loadOnset'),
    n: rows.length,
    events: event.reduce((sum, one) => sum + one, 0),
    leftOut: usable.leftOut,
  };
}

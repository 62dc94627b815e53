import { pickRows, usableRows } from '../missing/usable-rows';
import type { Provenance } from '../result';
import { orderByTwo } from './order-by-two';

/** One row for each pair of logs of a participant exactly one week apart. */
export interface WeeklySteps extends Provenance {
  readonly participants: Float64Array;
  /** The later week of each pair. */
  readonly weekTo: Float64Array;
  /** load(t + 1) / load(t). */
  readonly ratio: Float64Array;
  /** load(t + 1) - load(t), in the unit of the loads. */
  readonly change: Float64Array;
}

/**
 * Steps between consecutive weeks. A gap in the weeks is not a step: after a
 * break the next log starts anew. Rows may come in any order.
 *
 * @param participants whole numbers that name the participant of each log.
 * @param weeks whole weeks; one log a participant and week.
 * @param loads above zero, in any one unit.
 * @throws RangeError for a load that is not above zero, a fractional week, or two logs of one participant in one week.
 */
export function weeklySteps(participants: ArrayLike<number>, weeks: ArrayLike<number>, loads: ArrayLike<number>): WeeklySteps {
  const usable = usableRows({ participant: participants, week: weeks, load: loads });
  const order = orderByTwo(pickRows(participants, usable.rows), pickRows(weeks, usable.rows));
  for (let k = 0; k < order.length; k++) order[k] = usable.rows[order[k]!]!;
  const from: number[] = [];
  for (let k = 0; k < order.length; k++) {
    const row = order[k]!;
    if (!(loads[row]! > 0)) throw new RangeError(`A load is above zero, not ${loads[row]} (row ${row}).`);
    if (!Number.isInteger(weeks[row])) throw new RangeError(`A week is a whole number, not ${weeks[row]} (row ${row}).`);
    const next = order[k + 1];
    if (next === undefined || participants[next] !== participants[row]) continue;
    const gap = weeks[next]! - weeks[row]!;
    if (gap === 0) throw new RangeError(`Participant ${participants[row]} has two logs in week ${weeks[row]}.`);
    if (gap === 1) from.push(k);
  }
  const column = (value: (row: number, next: number) => number): Float64Array =>
    Float64Array.from(from, (k) => value(order[k]!, order[k + 1]!));
  return {
    participants: column((row) => participants[row]!),
    weekTo: column((_, next) => weeks[next]!),
    ratio: column((row, next) => loads[next]! / loads[row]!),
    change: column((row, next) => loads[next]! - loads[row]!),
    method: 'Steps between logs exactly one week apart',
    n: from.length,
    leftOut: usable.leftOut,
  };
}

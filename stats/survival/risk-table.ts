import type { FollowUp } from './follow-up';
import { orderOf } from './sort';
import { isBefore, orderTimes, type TimeOrder } from './times';

/** Who was at risk, had the event, or was censored, at each distinct time of leaving. */
export interface RiskTable {
  readonly time: Float64Array;
  /** Rows with entry < t <= time: an event counts before a censoring at the same time. */
  readonly atRisk: Uint32Array;
  readonly eventsAt: Uint32Array;
  readonly censoredAt: Uint32Array;
}

/** Counts the risk set at each distinct time in one pass after the sort. `data` has been checked. */
export function riskTable(data: FollowUp, sorted: TimeOrder = orderTimes(data.time)): RiskTable {
  const { order, starts, time } = sorted;
  const groups = time.length;
  const eventsAt = new Uint32Array(groups);
  const censoredAt = new Uint32Array(groups);
  for (let g = 0; g < groups; g++) {
    let events = 0;
    for (let i = starts[g]!; i < starts[g + 1]!; i++) events += data.event[order[i]!]!;
    eventsAt[g] = events;
    censoredAt[g] = starts[g + 1]! - starts[g]! - events;
  }
  return { time, atRisk: atRiskAt(data.entry, sorted), eventsAt, censoredAt };
}

/** Number at risk at each distinct time: those who have entered less those who have left. */
export function atRiskAt(entry: Float64Array | undefined, { starts, time, order }: TimeOrder): Uint32Array {
  const atRisk = new Uint32Array(time.length);
  if (entry === undefined) {
    for (let g = 0; g < time.length; g++) atRisk[g] = order.length - starts[g]!;
    return atRisk;
  }
  const entered = orderOf(entry);
  let inside = 0;
  for (let g = 0; g < time.length; g++) {
    while (inside < entered.length && isBefore(entry[entered[inside]!]!, time[g]!)) inside++;
    atRisk[g] = inside - starts[g]!;
  }
  return atRisk;
}

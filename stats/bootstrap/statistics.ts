import { requireRange } from '../result';
import { orderOf } from '../survival/sort';
import type { ResampledStatistic } from './resample';

/**
 * Mean of the drawn values.
 * @param values one a row, in any unit
 * @throws RangeError on values that are not finite
 */
export function resampledMean(values: ArrayLike<number>): ResampledStatistic {
  const column = finite(values);
  return (counts) => {
    let sum = 0;
    let drawn = 0;
    for (let row = 0; row < column.length; row++) {
      sum += counts[row]! * column[row]!;
      drawn += counts[row]!;
    }
    return drawn === 0 ? NaN : sum / drawn;
  };
}

/**
 * Median of the drawn values (the mean of the middle two for an even number); one sort for all resamples.
 * @param values one a row, in any unit
 * @throws RangeError on values that are not finite
 */
export function resampledMedian(values: ArrayLike<number>): ResampledStatistic {
  const column = finite(values);
  const order = orderOf(column);
  return (counts) => {
    let drawn = 0;
    for (let row = 0; row < counts.length; row++) drawn += counts[row]!;
    if (drawn === 0) return NaN;
    const [first, second] = [Math.floor((drawn + 1) / 2), Math.ceil((drawn + 1) / 2)];
    let seen = 0;
    let low = NaN;
    for (const row of order) {
      seen += counts[row]!;
      if (Number.isNaN(low) && seen >= first) low = column[row]!;
      if (seen >= second) return low === column[row] ? low : (low + column[row]!) / 2;
    }
    return NaN;
  };
}

/**
 * Restricted mean survival time to tau of the drawn rows: one sort, then one
 * pass a resample. NaN where the resample's follow-up ends before tau with
 * people still free of the event, as `rmst` has it.
 *
 * @param time at or above 0; @param event 1 = event, 0 = censored; @param tau above 0.
 * @throws RangeError on tau not above 0, columns of different length, or negative times
 */
export function resampledRmst(time: ArrayLike<number>, event: ArrayLike<number>, tau: number): ResampledStatistic {
  requireRange(tau > 0 && tau < Infinity, `A restricted mean needs a finite time above 0, not ${tau}.`);
  requireRange(time.length === event.length, `There are ${time.length} times but ${event.length} event codes.`);
  const column = finite(time);
  const order = orderOf(column);
  const times = new Float64Array(order.length);
  const events = new Uint8Array(order.length);
  for (let k = 0; k < order.length; k++) {
    times[k] = column[order[k]!]!;
    events[k] = event[order[k]!]!;
  }
  requireRange(times.length === 0 || times[0]! >= 0, 'Times are not negative.');
  return (counts) => areaTo(tau, times, events, order, counts);
}

function areaTo(tau: number, times: Float64Array, events: Uint8Array, order: Uint32Array, counts: Int32Array): number {
  let atRisk = 0;
  for (let row = 0; row < counts.length; row++) atRisk += counts[row]!;
  if (atRisk === 0) return NaN;
  let survival = 1;
  let area = 0;
  let from = 0;
  let k = 0;
  while (k < times.length && times[k]! <= tau && atRisk > 0) {
    const at = times[k]!;
    let dead = 0;
    let gone = 0;
    for (; k < times.length && times[k] === at; k++) {
      const count = counts[order[k]!]!;
      gone += count;
      dead += count * events[k]!;
    }
    if (dead > 0) {
      area += survival * (at - from);
      survival *= (atRisk - dead) / atRisk;
      from = at;
    }
    atRisk -= gone;
    if (atRisk === 0 && survival > 0 && at < tau) return NaN;
  }
  return area + survival * (tau - from);
}

function finite(values: ArrayLike<number>): Float64Array {
  const column = values instanceof Float64Array ? values : Float64Array.from(values);
  requireRange(column.every(Number.isFinite), 'A bootstrap works on finite values; leave missing ones out first.');
  return column;
}

import { gammaDist } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel } from '../result';
import { requireOneRate, type OneRate, type RateResult } from './counts';

/** A rate with its person-time. */
export interface RateEstimate extends RateResult {
  /** In the unit it was given in. */
  readonly personTime: number;
  /** Person-time the rate is told by. */
  readonly per: number;
}

/**
 * Events per person-time with exact Poisson limits (Garwood 1936), by gamma
 * quantiles. The lower limit is exactly 0 without events.
 * @throws RangeError where events are no count, or person-time or `per` is not positive
 */
export function exactRate(rate: OneRate): RateEstimate {
  const { events, personTime, people = null, per = 1, level = 0.95 } = rate;
  requireOneRate(rate);
  requireLevel(level);
  const tail = (1 - level) / 2;
  const scale = per / personTime;
  return {
    estimate: (events / personTime) * per,
    lower: events === 0 ? 0 : gammaDist.quantile(tail, events) * scale,
    upper: gammaDist.isf(tail, events + 1) * scale,
    level,
    method: methodOf('exactRate'),
    n: people,
    events,
    leftOut: [],
    personTime,
    per,
  };
}

import { gammaDist } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel, type Estimate } from '../result';
import { requireOneRate, type OneRate } from './counts';

/** A rate, with `n` the events it rests on and its person-time. */
export interface RateEstimate extends Estimate {
  readonly personTime: number;
  readonly per: number;
}

/**
 * Events per person-time with exact Poisson limits (Garwood 1936), by gamma
 * quantiles. The lower limit is exactly 0 without events.
 * `n` counts events: a rate has no other records.
 */
export function exactRate(rate: OneRate): RateEstimate {
  const { events, personTime, per = 1, level = 0.95 } = rate;
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
    n: events,
    events,
    leftOut: [],
    personTime,
    per,
  };
}

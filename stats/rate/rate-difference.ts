import { criticalValue } from '../critical-value';
import { methodOf } from '../registry';
import { peopleOf, requireTwoRates, type RateResult, type TwoRates } from './counts';

export interface RateDifference extends RateResult {
  readonly standardError: number;
}

/**
 * Rate 1 less rate 2, per unit of person-time, with Wald limits (Rothman,
 * Greenland & Lash 2008, ch. 14).
 * @throws RangeError where events are no count or person-time is not positive
 */
export function rateDifference(rates: TwoRates): RateDifference {
  const { events1, personTime1, events2, personTime2, level = 0.95 } = rates;
  requireTwoRates(rates);
  const z = criticalValue(level);
  const estimate = events1 / personTime1 - events2 / personTime2;
  const standardError = Math.sqrt(events1 / personTime1 / personTime1 + events2 / personTime2 / personTime2);
  const total = events1 + events2;
  return {
    estimate,
    lower: estimate - z * standardError,
    upper: estimate + z * standardError,
    standardError,
    level,
    method: methodOf('rateDifference'),
    n: peopleOf(rates),
    events: total,
    leftOut: [],
  };
}

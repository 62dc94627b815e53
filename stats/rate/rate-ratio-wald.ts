import { criticalValue } from '../critical-value';
import { normal } from '../distributions';
import { ratioOf } from '../proportion/katz-risk-ratio';
import { methodOf } from '../registry';
import { peopleOf, requireTwoRates, type RateRatioEstimate, type TwoRates } from './counts';

export interface RateRatioWald extends RateRatioEstimate {
  readonly p: number | null;
}

/**
 * Rate 1 over rate 2 with Wald limits on the log (Rothman, Greenland & Lash
 * 2008, ch. 14). Without events in either group the log does not exist:
 * limits and p are null.
 * @throws RangeError where events are no count or person-time is not positive
 */
export function rateRatioWald(rates: TwoRates): RateRatioWald {
  const { events1, personTime1, events2, personTime2, level = 0.95 } = rates;
  requireTwoRates(rates);
  const z = criticalValue(level);
  const total = events1 + events2;
  const about = { level, method: methodOf('rateRatioWald'), n: peopleOf(rates), events: total, leftOut: [] };
  const estimate = ratioOf(events1 / personTime1, events2 / personTime2);
  if (events1 === 0 || events2 === 0) {
    return { estimate, lower: null, upper: null, standardErrorLog: null, p: null, reason: 'A group without events has no log rate.', ...about };
  }
  const ratio = events1 / personTime1 / (events2 / personTime2);
  const standardErrorLog = Math.sqrt(1 / events1 + 1 / events2);
  const reach = Math.exp(z * standardErrorLog);
  const p = 2 * normal.sf(Math.abs(Math.log(ratio)) / standardErrorLog);
  return { estimate, lower: ratio / reach, upper: ratio * reach, standardErrorLog, p, ...about };
}

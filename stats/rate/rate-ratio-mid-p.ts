import { binomial, fisherF } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel } from '../result';
import { findRoot } from '../special/find-root';
import { NO_EVENTS, peopleOf, requireTwoRates, type RateResult, type TwoRates } from './counts';

export interface RateRatioMidP extends RateResult {
  /** Twice the smaller mid-P tail, at most 1. */
  readonly p: number;
}

/**
 * Rate 1 over rate 2 given the total of events, with mid-P limits and p: the
 * observed split is counted half (Berry & Armitage 1995). Exactly 0 or infinite at the ends.
 * @throws RangeError where events are no count or person-time is not positive
 */
export function rateRatioMidP(rates: TwoRates): RateRatioMidP {
  const { events1, personTime1, events2, personTime2, level = 0.95 } = rates;
  requireTwoRates(rates);
  requireLevel(level);
  const total = events1 + events2;
  const about = { level, method: methodOf('rateRatioMidP'), n: peopleOf(rates), events: total, leftOut: [] };
  if (total === 0) return { estimate: null, lower: null, upper: null, reason: NO_EVENTS, p: 1, ...about };
  const tail = (1 - level) / 2;
  const times = personTime2 / personTime1;
  const log = Math.log(personTime1 / personTime2);
  return {
    estimate: (events1 / personTime1) / (events2 / personTime2),
    lower: events1 === 0 ? 0 : times * lowerOdds(events1, events2, tail),
    upper: events2 === 0 ? Number.POSITIVE_INFINITY : times / lowerOdds(events2, events1, tail),
    p: Math.min(1, 2 * Math.min(midTail(events1, total, log), midTail(events2, total, -log))),
    ...about,
  };
}

/** P(X > x) + P(X = x) / 2 for a binomial whose log odds are given; by failures where those are the rarer. */
function midTail(x: number, total: number, logOdds: number): number {
  if (logOdds > 0) {
    const chance = 1 / (1 + Math.exp(logOdds));
    return binomial.cdf(total - x - 1, total, chance) + binomial.pmf(total - x, total, chance) / 2;
  }
  const chance = 1 / (1 + Math.exp(-logOdds));
  return binomial.sf(x, total, chance) + binomial.pmf(x, total, chance) / 2;
}

/** Odds at which the upper mid-P tail of x is `tail`; the exact limits of x and x + 1 hold it between them. */
function lowerOdds(x: number, other: number, tail: number): number {
  const goal = Math.log(tail);
  const miss = (logOdds: number) => Math.log(midTail(x, x + other, logOdds)) - goal;
  const from = Math.log((x / (other + 1)) * fisherF.quantile(tail, 2 * x, 2 * (other + 1)));
  const to = other === 0 ? from + Math.LN2 : Math.log(((x + 1) / other) * fisherF.quantile(tail, 2 * (x + 1), 2 * other));
  return Math.exp(findRoot(miss, from, widen(miss, to), 1e-15));
}

function widen(miss: (u: number) => number, to: number): number {
  let end = to;
  for (let width = 1; miss(end) < 0; width *= 2) end += width;
  return end;
}

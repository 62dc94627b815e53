import { binomial, fisherF } from '../distributions';
import { methodOf } from '../registry';
import { requireLevel } from '../result';
import { NO_EVENTS, peopleOf, requireTwoRates, type RateResult, type TwoRates } from './counts';

export interface RateRatioExact extends RateResult {
  /** Twice the smaller exact tail, at most 1: agrees with the limits. */
  readonly pCentral: number;
  /** Sum of all splits no more probable than the observed; differs from `pCentral` in general. */
  readonly pMinimumLikelihood: number;
}

/**
 * Rate 1 over rate 2 given the total of events, which makes events 1 a
 * binomial count (Przyborowski & Wilenski 1940). Limits are Clopper-Pearson's
 * on the odds, exactly 0 or infinite at the ends. No events at all: null.
 * @throws RangeError where events are no count or person-time is not positive
 */
export function rateRatioExact(rates: TwoRates): RateRatioExact {
  const { events1, personTime1, events2, personTime2, level = 0.95 } = rates;
  requireTwoRates(rates);
  requireLevel(level);
  const total = events1 + events2;
  const about = { level, method: methodOf('rateRatioExact'), n: peopleOf(rates), events: total, leftOut: [] };
  if (total === 0) return { estimate: null, lower: null, upper: null, reason: NO_EVENTS, pCentral: 1, pMinimumLikelihood: 1, ...about };
  const tail = (1 - level) / 2;
  const times = personTime2 / personTime1;
  return {
    estimate: (events1 / personTime1) / (events2 / personTime2),
    lower: events1 === 0 ? 0 : times * (events1 / (events2 + 1)) * fisherF.quantile(tail, 2 * events1, 2 * (events2 + 1)),
    upper:
      events2 === 0
        ? Number.POSITIVE_INFINITY
        : times * ((events1 + 1) / events2) * fisherF.isf(tail, 2 * (events1 + 1), 2 * events2),
    ...exactPs(events1, total, personTime1 / (personTime1 + personTime2)),
    ...about,
  };
}

/** Relative slack within which two probabilities are a tie in exact arithmetic. */
const TIE_SLACK = 1 + 1e-7;

function exactPs(events1: number, total: number, share: number): Pick<RateRatioExact, 'pCentral' | 'pMinimumLikelihood'> {
  const less = binomial.cdf(events1, total, share);
  const more = binomial.sf(events1 - 1, total, share);
  return { pCentral: Math.min(1, 2 * Math.min(less, more)), pMinimumLikelihood: Math.min(1, rareSplits(events1, total, share)) };
}

/** The observed tail and, beyond the mode, the splits no more probable than the observed, found by halving. */
function rareSplits(events1: number, total: number, share: number): number {
  const bar = binomial.pmf(events1, total, share) * TIE_SLACK;
  const mode = Math.min(total, Math.floor((total + 1) * share));
  if (events1 === mode) return 1;
  if (events1 < mode) {
    const from = firstWhere((k) => binomial.pmf(k, total, share) <= bar, mode, total + 1);
    return binomial.cdf(events1, total, share) + binomial.sf(from - 1, total, share);
  }
  const to = firstWhere((k) => binomial.pmf(mode - k, total, share) <= bar, 0, mode + 1);
  return binomial.sf(events1 - 1, total, share) + (to > mode ? 0 : binomial.cdf(mode - to, total, share));
}

/** First whole number in [low, high) where a test holds that stays true; high when none. */
function firstWhere(test: (k: number) => boolean, low: number, high: number): number {
  while (low < high) {
    const middle = low + Math.floor((high - low) / 2);
    if (test(middle)) high = middle;
    else low = middle + 1;
  }
  return high;
}

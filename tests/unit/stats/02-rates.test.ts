import { directStandardisedRate } from '@/stats/rate/direct-standardised-rate';
import { exactRate } from '@/stats/rate/exact-rate';
import { mantelHaenszelRateRatio } from '@/stats/rate/mantel-haenszel-rate-ratio';
import { midPRate } from '@/stats/rate/mid-p-rate';
import { rateDifference } from '@/stats/rate/rate-difference';
import { rateRatioExact } from '@/stats/rate/rate-ratio-exact';
import { rateRatioMidP } from '@/stats/rate/rate-ratio-mid-p';
import { rateRatioWald } from '@/stats/rate/rate-ratio-wald';
import { inlineOf, runTopic, tableOf, type Adapter, type ReferenceCase } from './reference';

const levelOf = ({ params }: ReferenceCase) => Number(params?.conf ?? 0.95);

const oneRate: Adapter = (reference) => {
  const { events, person_time, person_years } = inlineOf(reference);
  const personTime = (person_time ?? person_years) as number;
  const rate = { events: events as number, personTime, per: Number(reference.params?.per ?? 1), level: levelOf(reference) };
  const exact = exactRate(rate);
  return { exact: { ...exact, rate: exact.estimate }, midp: midPRate(rate) };
};

const twoRates: Adapter = (reference) => {
  const { events1, person_time1, events2, person_time2 } = inlineOf(reference) as Record<string, number>;
  const rates = {
    events1: events1 as number,
    personTime1: person_time1 as number,
    events2: events2 as number,
    personTime2: person_time2 as number,
    level: levelOf(reference),
  };
  const exact = rateRatioExact(rates);
  const mid = rateRatioMidP(rates);
  const wald = rateRatioWald(rates);
  const difference = rateDifference(rates);
  return {
    ratio: exact.estimate,
    exact_lower: exact.lower,
    exact_upper: exact.upper,
    midp_lower: mid.lower,
    midp_upper: mid.upper,
    p_exact_central: exact.pCentral,
    p_exact_minlike: exact.pMinimumLikelihood,
    p_midp: mid.p,
    // Infinite in the reference where a group has no events; here it does not exist.
    se_log: wald.standardErrorLog ?? Number.POSITIVE_INFINITY,
    wald_lower: wald.lower,
    wald_upper: wald.upper,
    p_wald: wald.p,
    diff: difference.estimate,
    diff_se: difference.standardError,
    diff_lower: difference.lower,
    diff_upper: difference.upper,
  };
};

function doctors(reference: ReferenceCase) {
  const table = tableOf(reference);
  const smokers = table.filter('smoke = 1');
  const others = table.filter('smoke = 0');
  return {
    smokers: { events: smokers.numbers('deaths'), personTime: smokers.numbers('person_years') },
    others: { events: others.numbers('deaths'), personTime: others.numbers('person_years') },
  };
}

runTopic('02-rates', {
  'garwood-': oneRate,
  'rate-': oneRate,
  'rateratio-': twoRates,
  'mh-rate-ratio-doctors': (reference) => {
    const { smokers, others } = doctors(reference);
    const result = mantelHaenszelRateRatio({
      events1: smokers.events,
      personTime1: smokers.personTime,
      events2: others.events,
      personTime2: others.personTime,
    });
    return { ...result, rate_ratio_mh: result.estimate, se_log: result.standardErrorLog };
  },
  'direct-standardised-doctors': (reference) => {
    const { smokers, others } = doctors(reference);
    const weights = smokers.personTime.map((years, age) => years + (others.personTime[age] as number));
    const standardised = (group: typeof smokers) => directStandardisedRate({ ...group, weights }, { per: 1000 });
    return {
      smokers: standardised(smokers).estimate,
      smokers_var: standardised(smokers).variance,
      nonsmokers: standardised(others).estimate,
      nonsmokers_var: standardised(others).variance,
    };
  },
});

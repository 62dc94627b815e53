/** Rates computed a second time, slowly, with their units, ends and misuse. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { digitPreference } from '@/stats/quality/digit-preference';
import { intervalSymmetry } from '@/stats/quality/interval-symmetry';
import { pFromInterval } from '@/stats/quality/p-from-interval';
import type { TwoRates } from '@/stats/rate/counts';
import { directStandardisedRate } from '@/stats/rate/direct-standardised-rate';
import { exactRate } from '@/stats/rate/exact-rate';
import { mantelHaenszelRateRatio } from '@/stats/rate/mantel-haenszel-rate-ratio';
import { midPRate } from '@/stats/rate/mid-p-rate';
import { personTime } from '@/stats/rate/person-time';
import { rateDifference } from '@/stats/rate/rate-difference';
import { rateRatioExact } from '@/stats/rate/rate-ratio-exact';
import { rateRatioMidP } from '@/stats/rate/rate-ratio-mid-p';
import { rateRatioWald } from '@/stats/rate/rate-ratio-wald';

const close = (got: number | null, want: number, rel = 1e-10) => expect(Math.abs((got as number) - want)).toBeLessThanOrEqual(rel * Math.abs(want));
const events = fc.integer({ min: 0, max: 80 });
const time = fc.double({ min: 0.5, max: 5000, noNaN: true });
const rates = fc.record({ events1: events, personTime1: time, events2: events, personTime2: time });
const runs = { numRuns: 200, seed: 5 };

/** P(X = k) by the definition, in logs. */
function poissonMass(k: number, mean: number): number {
  let log = -mean;
  for (let i = 1; i <= k; i++) log += Math.log(mean / i);
  return Math.exp(log);
}

const sum = (from: number, to: number, of: (k: number) => number) => {
  let total = 0;
  for (let k = from; k <= to; k++) total += of(k);
  return total;
};

describe('one rate', () => {
  test('exact and mid-P limits put half of the rest in each Poisson tail, summed term by term', () => {
    fc.assert(fc.property(events, (x) => {
      const exact = exactRate({ events: x, personTime: 1 }) as { lower: number; upper: number };
      const mid = midPRate({ events: x, personTime: 1 }) as { lower: number; upper: number };
      if (x > 0) {
        close(1 - sum(0, x - 1, (k) => poissonMass(k, exact.lower)), 0.025, 1e-9);
        close(1 - sum(0, x, (k) => poissonMass(k, mid.lower)) + poissonMass(x, mid.lower) / 2, 0.025, 1e-9);
      } else {
        expect([exact.lower, mid.lower]).toEqual([0, 0]);
      }
      close(sum(0, x, (k) => poissonMass(k, exact.upper)), 0.025, 1e-9);
      close(sum(0, x, (k) => poissonMass(k, mid.upper)) - poissonMass(x, mid.upper) / 2, 0.025, 1e-9);
      expect(mid.lower).toBeGreaterThanOrEqual(exact.lower);
      expect(mid.upper).toBeLessThan(exact.upper);
    }), runs);
  });

  test('units carry through: days or years, per one or per hundred', () => {
    fc.assert(fc.property(events, time, (x, years) => {
      const plain = exactRate({ events: x, personTime: years });
      const scaled = exactRate({ events: x, personTime: years * 365.25, per: 365.25 * 100 });
      close(scaled.upper, 100 * (plain.upper as number), 1e-12);
      close(scaled.estimate, 100 * (plain.estimate as number), 1e-12);
    }), runs);
  });

  test('a million events stay exact', () => {
    const { lower, upper } = exactRate({ events: 1e6, personTime: 1 }) as { lower: number; upper: number };
    // The cube root expansion of Wilson & Hilferty is good to 1e-9 here.
    const cube = (x: number, z: number) => x * (1 - 1 / (9 * x) + z / (3 * Math.sqrt(x))) ** 3;
    close(lower, cube(1e6, -1.959963984540054), 1e-8);
    close(upper, cube(1e6 + 1, 1.959963984540054), 1e-8);
  });
});

describe('two rates', () => {
  test('limits and p of the exact ratio, term by term', () => {
    fc.assert(fc.property(rates, (two) => {
      const n = two.events1 + two.events2;
      if (n === 0) return;
      const chanceAt = (ratio: number) => (ratio * two.personTime1) / (ratio * two.personTime1 + two.personTime2);
      const masses = (ratio: number) => {
        const p = chanceAt(ratio);
        const list = [Math.exp(n * Math.log1p(-p))];
        for (let k = 1; k <= n; k++) list.push(((list[k - 1] as number) * (n - k + 1) * p) / (k * (1 - p)));
        return list;
      };
      const exact = rateRatioExact(two);
      const mid = rateRatioMidP(two);
      const at = two.events1;
      const from = (list: number[], low: number, high: number) => sum(low, high, (k) => list[k] as number);
      if (at > 0) {
        close(from(masses(exact.lower as number), at, n), 0.025, 1e-8);
        const list = masses(mid.lower as number);
        close(from(list, at + 1, n) + (list[at] as number) / 2, 0.025, 1e-8);
      }
      if (at < n) {
        close(from(masses(exact.upper as number), 0, at), 0.025, 1e-8);
        const list = masses(mid.upper as number);
        close(from(list, 0, at - 1) + (list[at] as number) / 2, 0.025, 1e-8);
      }
      const null_ = masses(1);
      const own = null_[at] as number;
      if (own > 1e-250) {
        close(exact.pMinimumLikelihood, Math.min(1, sum(0, n, (k) => ((null_[k] as number) <= own * (1 + 1e-7) ? (null_[k] as number) : 0))), 1e-8);
        close(exact.pCentral, Math.min(1, 2 * Math.min(from(null_, 0, at), from(null_, at, n))), 1e-8);
        close(mid.p, Math.min(1, 2 * Math.min(from(null_, 0, at - 1), from(null_, at + 1, n)) + own), 1e-8);
      }
    }), runs);
  });

  test('exchanging the groups inverts ratios and turns the difference', () => {
    fc.assert(fc.property(rates, (two) => {
      const turned: TwoRates = { events1: two.events2, personTime1: two.personTime2, events2: two.events1, personTime2: two.personTime1 };
      close(rateDifference(two).lower, -(rateDifference(turned).upper as number), 1e-9);
      for (const method of [rateRatioExact, rateRatioMidP, rateRatioWald]) {
        const { lower } = method(two);
        if (lower !== null && lower > 0) close(lower, 1 / (method(turned).upper as number), 1e-9);
      }
    }), runs);
  });

  test('ends: no events in one group, in the other, in neither', () => {
    expect(rateRatioExact({ events1: 0, personTime1: 5, events2: 3, personTime2: 5 })).toMatchObject({ estimate: 0, lower: 0 });
    expect(rateRatioMidP({ events1: 3, personTime1: 5, events2: 0, personTime2: 5 })).toMatchObject({ estimate: Infinity, upper: Infinity });
    expect(rateRatioWald({ events1: 0, personTime1: 5, events2: 3, personTime2: 5 })).toMatchObject({ estimate: 0, lower: null, p: null });
    for (const method of [rateRatioExact, rateRatioMidP, rateRatioWald]) {
      expect(method({ events1: 0, personTime1: 5, events2: 0, personTime2: 5 }).estimate).toBeNull();
    }
    // All of the three events fell in half of the time: 2 x (1/2)^3 = 1/4, by either rule.
    expect(rateRatioExact({ events1: 3, personTime1: 1, events2: 0, personTime2: 1 })).toMatchObject({ pCentral: expect.closeTo(0.25, 14), pMinimumLikelihood: expect.closeTo(0.25, 14) });
  });
});

describe('strata of rates', () => {
  test('one stratum gives the crude ratio with its Wald standard error', () => {
    fc.assert(fc.property(rates, ({ events1, personTime1, events2, personTime2 }) => {
      const got = mantelHaenszelRateRatio({ events1: [events1], personTime1: [personTime1], events2: [events2], personTime2: [personTime2] });
      const wald = rateRatioWald({ events1, personTime1, events2, personTime2 });
      if (wald.standardErrorLog === null) return;
      close(got.estimate, wald.estimate as number, 1e-12);
      close(got.standardErrorLog, wald.standardErrorLog, 1e-12);
    }), runs);
  });

  test('a standardised rate of one stratum is the rate with Garwood limits, and weights by person-time give the crude rate', () => {
    fc.assert(fc.property(rates, ({ events1, personTime1, events2, personTime2 }) => {
      const one = directStandardisedRate({ events: [events1], personTime: [personTime1], weights: [7] });
      const exact = exactRate({ events: events1, personTime: personTime1 });
      close(one.lower, exact.lower as number, 1e-9);
      close(one.upper, exact.upper as number, 1e-9);
      const both = directStandardisedRate({ events: [events1, events2], personTime: [personTime1, personTime2], weights: [personTime1, personTime2] });
      close(both.estimate, (events1 + events2) / (personTime1 + personTime2), 1e-12);
    }), runs);
  });

  test('strata without person-time in a group are left out and said', () => {
    const got = mantelHaenszelRateRatio({ events1: [4, 1], personTime1: [10, 3], events2: [2, 0], personTime2: [12, 0] });
    expect(got.leftOut).toEqual([{ reason: 'Strata without person-time in both groups', count: 1 }]);
    close(got.estimate, 4 / 10 / (2 / 12), 1e-14);
    expect(mantelHaenszelRateRatio({ events1: [], personTime1: [], events2: [], personTime2: [] }).estimate).toBeNull();
  });
});

describe('n counts people, events events', () => {
  test('people are named where told, and null where not', () => {
    const two = { events1: 4, personTime1: 10, events2: 2, personTime2: 12 };
    expect(exactRate({ events: 3, personTime: 8, people: 2 })).toMatchObject({ n: 2, events: 3 });
    expect(midPRate({ events: 3, personTime: 8 })).toMatchObject({ n: null, events: 3 });
    for (const method of [rateRatioExact, rateRatioMidP, rateRatioWald, rateDifference]) {
      expect(method({ ...two, people1: 5, people2: 7 })).toMatchObject({ n: 12, events: 6 });
      expect(method({ ...two, people1: 5 })).toMatchObject({ n: null, events: 6 });
      expect(() => method({ ...two, people1: 0.5 })).toThrow(RangeError);
    }
    const strata = { events1: [4, 1], personTime1: [10, 3], events2: [2, 0], personTime2: [12, 0] };
    expect(mantelHaenszelRateRatio(strata)).toMatchObject({ n: null, events: 6 });
    // The second stratum is left out, and its people with it.
    expect(mantelHaenszelRateRatio({ ...strata, people1: [5, 1], people2: [6, 2] })).toMatchObject({ n: 11, events: 6 });
    const standard = { events: [2, 5], personTime: [10, 20], weights: [1, 1] };
    expect(directStandardisedRate(standard)).toMatchObject({ n: null, events: 7 });
    expect(directStandardisedRate({ ...standard, people: [3, 4] })).toMatchObject({ n: 7, events: 7 });
    expect(() => directStandardisedRate({ ...standard, people: [3] })).toThrow(RangeError);
    expect(() => directStandardisedRate({ ...standard, people: [3, -1] })).toThrow(RangeError);
  });
});

describe('checks of what is given', () => {
  test('person-time is summed in days and divided once', () => {
    expect(personTime(Float64Array.of(365.25, 730.5))).toEqual({ days: 1095.75, years: 3, n: 2 });
    expect(personTime([]).years).toBe(0);
  });

  test('digits: even counts have statistic 0, a small sample is never flagged, nothing gives null', () => {
    expect(digitPreference(new Array(10).fill(6))).toMatchObject({ statistic: 0, p: 1, flag: false });
    expect(digitPreference([20, 0, 0, 0, 0, 20, 0, 0, 0, 0])).toMatchObject({ n: 40, flag: false });
    expect(digitPreference(new Array(10).fill(0))).toMatchObject({ statistic: null, p: null, flag: false });
  });

  test('misuse is refused', () => {
    for (const value of [Number.NaN, -1, Infinity]) {
      expect(() => exactRate({ events: value, personTime: 1 })).toThrow(RangeError);
      expect(() => midPRate({ events: 1, personTime: value })).toThrow(RangeError);
      expect(() => exactRate({ events: 1, personTime: 1, per: value })).toThrow(RangeError);
      for (const method of [rateRatioExact, rateRatioMidP, rateRatioWald, rateDifference]) {
        expect(() => method({ events1: 1, personTime1: 1, events2: value, personTime2: 1 })).toThrow(RangeError);
        expect(() => method({ events1: 1, personTime1: value, events2: 1, personTime2: 1 })).toThrow(RangeError);
      }
      expect(() => personTime([value])).toThrow(RangeError);
      expect(() => directStandardisedRate({ events: [1], personTime: [value], weights: [1] })).toThrow(RangeError);
      expect(() => directStandardisedRate({ events: [1], personTime: [1], weights: [value] })).toThrow(RangeError);
    }
    expect(() => exactRate({ events: 1.5, personTime: 1 })).toThrow(RangeError);
    expect(() => exactRate({ events: 1, personTime: 0 })).toThrow(RangeError);
    expect(() => mantelHaenszelRateRatio({ events1: [1], personTime1: [0], events2: [1], personTime2: [2] })).toThrow('Events need person-time.');
    expect(() => mantelHaenszelRateRatio({ events1: [1], personTime1: [1], events2: [1], personTime2: [] })).toThrow(RangeError);
    expect(() => directStandardisedRate({ events: [1], personTime: [1], weights: [0] })).toThrow(RangeError);
    expect(() => digitPreference([1, 2])).toThrow(RangeError);
    expect(() => pFromInterval({ estimate: 1, lower: 2, upper: 1, scale: 'linear' })).toThrow(RangeError);
    expect(() => pFromInterval({ estimate: 1, lower: 0, upper: 2, scale: 'log' })).toThrow(RangeError);
    expect(() => intervalSymmetry({ estimate: 0, lower: 0.1, upper: 0.2 })).toThrow(RangeError);
  });
});

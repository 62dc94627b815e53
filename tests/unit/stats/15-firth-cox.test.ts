import { describe, expect, test } from 'vitest';
import { Pcg32 } from '@/stats/random/pcg32';
import { nextDouble } from '@/stats/random/source';
import { cox } from '@/stats/survival/cox';
import type { CoxData } from '@/stats/survival/cox-design';
import { firthCox } from '@/stats/survival/firth-cox';
import { columnOf, followUpOf, levelsOf, tableOf } from './follow-up-columns';
import { runTopic, type ReferenceCase } from './reference';

const CODED: Record<string, readonly [column: string, level: string]> = {
  g6: ['treat', 'control'],
  ct_smallcell: ['celltype', 'smallcell'],
  ct_adeno: ['celltype', 'adeno'],
  ct_large: ['celltype', 'large'],
  trt2: ['trt', '2'],
};

function dataOf(reference: ReferenceCase) {
  const table = tableOf(reference);
  const names = Object.keys((reference.expected as { coef: Record<string, number> }).coef);
  const stratum = columnOf(reference, 'strata', []);
  const x = names.map((name) => {
    const coded = CODED[name];
    return coded ? Float64Array.from(table.text(coded[0]), (cell) => (cell === coded[1] ? 1 : 0)) : table.numbers(name === 'tx' ? 'transplant' : name);
  });
  return { names, data: { ...followUpOf(table), x, ...(stratum && { stratum: levelsOf(table.text(stratum)).codes }) } };
}

function fitted(reference: ReferenceCase) {
  const { names, data } = dataOf(reference);
  const fit = firthCox(data, { names, ties: reference.params?.ties === 'breslow' ? 'breslow' : 'efron' });
  const named = (read: (at: (typeof fit.coefficients)[number]) => unknown) => Object.fromEntries(fit.coefficients.map((one) => [one.name, read(one)]));
  return {
    n: fit.n,
    n_event: fit.events,
    coef: named(({ estimate }) => estimate),
    se: named(({ se }) => se),
    vcov: fit.covariance,
    hr: named(({ hazardRatio }) => hazardRatio.estimate),
    log_lower: named(({ lower }) => lower),
    log_upper: named(({ upper }) => upper),
    hr_lower: named(({ hazardRatio }) => hazardRatio.lower),
    hr_upper: named(({ hazardRatio }) => hazardRatio.upper),
    chisq: named(({ chiSquare }) => chiSquare),
    p: named(({ p }) => p),
    penalised_loglik_null: fit.penalisedLogLikelihoodNull,
    penalised_loglik: fit.penalisedLogLikelihood,
    lrt: { chisq: fit.likelihoodRatio.chiSquare, df: fit.likelihoodRatio.df, p: fit.likelihoodRatio.p },
  };
}

runTopic('15-firth-cox', {
  'firth-': (reference) => {
    // Where the likelihood is monotone the ordinary fit must say so, or the case shows nothing.
    if (reference.id.startsWith('firth-monotone')) {
      const { data } = dataOf(reference);
      expect(cox(data).coefficients[0]).toMatchObject({ estimate: null, reason: expect.stringContaining('firthCox') });
    }
    return fitted(reference);
  },
});

const f = (...values: number[]) => Float64Array.from(values);
const u = (...values: number[]) => Uint8Array.from(values);

describe('the penalised Cox fit', () => {
  test('of k pairs with the exposed one always first is 2k + 1, its limits where the closed profile says', () => {
    for (const k of [1, 3, 20]) {
      const rows = Array.from({ length: 2 * k }, (_, i) => i);
      const column = (of: (i: number) => number) => Float64Array.from(rows, of);
      const fit = firthCox({ time: column((i) => 1 + (i % 2)), event: Uint8Array.from(rows, (i) => 1 - (i % 2)), x: [column((i) => 1 - (i % 2))], stratum: Int32Array.from(rows, (i) => i >> 1) });
      const [one] = fit.coefficients;
      expect(Math.exp(one!.estimate!)).toBeCloseTo(2 * k + 1, 9);
      // log of p^(k + 1/2) (1 - p)^(1/2), p = e^b / (1 + e^b)
      const profile = (b: number) => -(k + 0.5) * Math.log1p(Math.exp(-b)) - 0.5 * Math.log1p(Math.exp(b));
      for (const limit of [one!.lower!, one!.upper!]) expect(2 * (profile(Math.log(2 * k + 1)) - profile(limit))).toBeCloseTo(3.841458820694124, 9);
      expect(one!.chiSquare).toBeCloseTo(2 * (profile(Math.log(2 * k + 1)) - profile(0)), 10);
    }
  });

  const small = {
    time: f(1, 2, 2, 3, 4, 5, 5, 6, 7, 8, 9, 10),
    event: u(1, 1, 1, 0, 1, 1, 0, 0, 1, 0, 0, 0),
    x: [f(1, 1, 1, 1, 1, 1, 0, 0, 1, 0, 0, 0), f(2.1, 3.4, 1.2, 2.2, 4.1, 2.8, 1.9, 3.3, 0.7, 2.5, 1.1, 3)],
  };
  const figures = (data: CoxData) =>
    firthCox(data).coefficients.flatMap(({ estimate, se, lower, upper, chiSquare, p }) => [estimate, se, lower, upper, chiSquare, p].map(Number));
  const close = (got: number[], want: number[], rel: number) => got.forEach((value, i) => expect(Math.abs(value - want[i]!)).toBeLessThanOrEqual(rel * (1 + Math.abs(want[i]!))));

  test('does not depend on the order of rows', () => {
    const order = [7, 3, 11, 0, 5, 9, 1, 10, 2, 8, 4, 6];
    const turned = { time: Float64Array.from(order, (i) => small.time[i]!), event: Uint8Array.from(order, (i) => small.event[i]!), x: small.x.map((column) => Float64Array.from(order, (i) => column[i]!)) };
    close(figures(turned), figures(small), 1e-10);
  });

  test('follows the unit of a covariate and of time, and forgets its origin', () => {
    const scaled = { ...small, time: small.time.map((t) => t * 365.25), x: [small.x[0]!, small.x[1]!.map((value) => 1000 * value - 7e5)] };
    const want = figures(small);
    for (const at of [6, 7, 8, 9]) want[at]! /= 1000;
    close(figures(scaled), want, 1e-8);
    expect(firthCox(scaled).likelihoodRatio.chiSquare).toBeCloseTo(firthCox(small).likelihoodRatio.chiSquare!, 8);
  });

  test('wider limits at a higher level, each lost by its own chi-square', () => {
    const [narrow, wide] = [0.9, 0.99].map((level) => firthCox(small, { level }).coefficients[0]!);
    expect(wide!.lower!).toBeLessThan(narrow!.lower!);
    expect(wide!.upper!).toBeGreaterThan(narrow!.upper!);
    expect(wide!.hazardRatio.level).toBe(0.99);
  });

  test('gives null with the reason: nobody, one row, all censored, a constant, a copy', () => {
    const nothing = { estimate: null, se: null, lower: null, upper: null, chiSquare: null, p: null };
    expect(firthCox({ time: f(), event: u(), x: [f()] })).toMatchObject({ n: 0, coefficients: [{ ...nothing, reason: 'no events' }], penalisedLogLikelihood: null });
    expect(firthCox({ time: f(3), event: u(1), x: [f(1)] }).coefficients[0]).toMatchObject({ ...nothing, reason: expect.stringContaining('constant') });
    const censored = firthCox({ ...small, event: new Uint8Array(12) });
    expect(censored).toMatchObject({ n: 12, events: 0, likelihoodRatio: { chiSquare: null, reason: 'no events' } });
    for (const one of censored.coefficients) expect(one).toMatchObject({ ...nothing, reason: 'no events' });
    const copied = firthCox({ ...small, x: [small.x[1]!, small.x[1]!.map((value) => 2 * value + 1), new Float64Array(12).fill(4)] });
    expect(copied.coefficients.map(({ estimate }) => estimate === null)).toEqual([false, true, true]);
    expect(copied.coefficients[0]!.estimate).toBeCloseTo(firthCox({ ...small, x: [small.x[1]!] }).coefficients[0]!.estimate!, 12);
  });

  test('counts rows without a covariate and refuses clusters', () => {
    const x = [small.x[0]!, small.x[1]!.with(3, Number.NaN)];
    expect(firthCox({ ...small, x })).toMatchObject({ n: 11, leftOut: [{ reason: 'covariate missing', count: 1 }] });
    expect(() => firthCox({ ...small, cluster: new Int32Array(12) })).toThrow(RangeError);
    expect(() => firthCox(small, { names: ['one'] })).toThrow(RangeError);
    expect(() => firthCox(small, { level: 1 })).toThrow(RangeError);
  });

  test('comes to the ordinary fit as events grow, with limits that come to Wald’s', () => {
    const source = new Pcg32(7, 1);
    const next = () => nextDouble(source);
    const n = 10_000;
    const x = Array.from({ length: 5 }, () => Float64Array.from({ length: n }, () => next() - 0.5));
    const time = Float64Array.from({ length: n }, (_, i) => Math.ceil((-Math.log(next()) * 300) / Math.exp(0.5 * x[0]![i]! - 0.3 * x[1]![i]!)));
    const event = Uint8Array.from(time, (t) => (t < 500 ? 1 : 0));
    const ordinary = cox({ time, event, x });
    const firth = firthCox({ time, event, x });
    firth.coefficients.forEach(({ estimate, se, lower }, j) => {
      expect(Math.abs(estimate! - ordinary.coefficients[j]!.estimate!)).toBeLessThan(0.01 * se!);
      expect(Math.abs(lower! - (estimate! - 1.959963984540054 * se!))).toBeLessThan(0.01 * se!);
    });
  });
});

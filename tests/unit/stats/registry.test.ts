import { describe, expect, test } from 'vitest';
import * as stats from '@/stats';
import { methodOf, statistics, type Statistic } from '@/stats/registry';

const all: readonly Statistic[] = statistics;
const names = all.map(({ name }) => name);

/** Functions that compute nothing citable by themselves. */
const tools = [
  ...['criticalValue', 'intervalSymmetry', 'methodOf', 'moments', 'percentChange', 'quantile'],
  ...['jackknife', 'observed', 'resampledMean', 'resampledMedian', 'resampledRmst', 'runShared'],
  ...['nextBelow', 'nextDouble', 'splitMix64', 'xoshiro256', 'Mt19937', 'Pcg32', 'Xoshiro128'],
];

describe('the register of methods', () => {
  test('is alphabetical and names nothing twice', () => {
    expect(names).toEqual([...new Set(names)].sort((a, b) => (a.toLowerCase() < b.toLowerCase() ? -1 : 1)));
  });

  test.each(all)('$name says how and where from', ({ method, reference }) => {
    expect(method.length).toBeGreaterThan(10);
    expect(reference).toMatch(/\d{4}|Householder/);
  });

  test('names functions that the module exports, and every function it exports', () => {
    const exported = Object.entries(stats).flatMap(([name, value]) => (typeof value === 'function' ? [name] : []));
    expect(exported.filter((name) => !tools.includes(name)).sort()).toEqual([...names].sort());
  });

  test('is where results take their method sentence from', () => {
    expect(stats.wilsonInterval({ events: 1, n: 2 }).method).toBe(methodOf('wilsonInterval'));
    expect(stats.exactRate({ events: 1, personTime: 2 }).method).toBe(methodOf('exactRate'));
    expect(stats.riskRatio({ events1: 0, n1: 5, events2: 2, n2: 5 }).method).toBe(methodOf('koopmanRiskRatio'));
    expect(stats.riskRatio({ events1: 1, n1: 5, events2: 2, n2: 5 }).method).toBe(methodOf('katzRiskRatio'));
  });
});

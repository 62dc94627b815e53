import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { bootstrapLimits } from '@/stats/bootstrap/bootstrap-limits';
import { exactMedian } from '@/stats/bootstrap/exact-median';
import { inWorkerThread } from '@/stats/bootstrap/in-worker-thread';
import { bootstrapReplicates, jackknife, observed } from '@/stats/bootstrap/resample';
import { runShared } from '@/stats/bootstrap/run-shared';
import { resampledMean, resampledMedian, resampledRmst } from '@/stats/bootstrap/statistics';
import { runRange } from '@/stats/bootstrap/task';
import { missingByVisit } from '@/stats/missing/missing-by-visit';
import { missingPatterns } from '@/stats/missing/missing-patterns';
import { moments } from '@/stats/progression/moments';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { rmst } from '@/stats/survival/rmst';
import { loadTable, runTopic, tableOf, type ReferenceCase } from './reference';

const inlineX = (reference: ReferenceCase): number[] => (reference.dataset!.inline_rows as { x: number[] }).x;
const SEED = 20_240_117;

runTopic(
  '11-missing-bootstrap-rng',
  {
    'missing-airquality': (reference) => {
      const table = tableOf(reference);
      const r = missingPatterns(Object.fromEntries(table.names.map((name) => [name, table.numbers(name)])));
      return { n: r.n, missing: r.missing, complete_rows: r.completeRows, patterns: Object.fromEntries(r.patterns.map(({ pattern, count }) => [pattern, count])) };
    },
    'missing-visits': (reference) => {
      const table = tableOf(reference);
      const r = missingByVisit(table.numbers('subject'), table.numbers('visit_month'), table.numbers('volume'));
      return {
        by_visit: {
          month: r.visits.map(({ visit }) => visit),
          observed: r.visits.map((v) => v.observed),
          missing: r.visits.map(({ missing }) => missing),
          percent_missing: r.visits.map(({ percentMissing }) => percentMissing),
        },
        subjects_monotone: r.monotone,
        subjects_intermittent: r.intermittent,
        subjects_complete: r.complete,
      };
    },
    'bootstrap-given-replicates': (reference) => {
      const x = inlineX(reference);
      const statistic = resampledMean(x);
      const drawing = { rows: x.length };
      const replicates = loadTable(reference.dataset!.file!).numbers('replicate');
      const estimate = observed(statistic, drawing);
      const left = jackknife(statistic, drawing);
      const of = (kind: 'percentile' | 'basic' | 'normal' | 'bca', quantile: 'order' | 'type-7') => {
        const r = bootstrapLimits(estimate, replicates, { kind, quantile, jackknife: left, n: x.length });
        return { ...r, pair: [r.lower, r.upper] };
      };
      const bca = of('bca', 'order');
      return {
        estimate,
        se: bca.se,
        bias: bca.bias,
        normal: of('normal', 'order').pair,
        percentile_bootci: of('percentile', 'order').pair,
        basic_bootci: of('basic', 'order').pair,
        percentile_type7: of('percentile', 'type-7').pair,
        z0: bca.z0,
        acceleration: bca.acceleration,
        bca_levels: bca.levels,
        bca_normal_interp: bca.pair,
        bca_type7: of('bca', 'type-7').pair,
      };
    },
    'bootstrap-exact-variance-of-mean': (reference) => {
      const x = inlineX(reference);
      const replicates = bootstrapReplicates(resampledMean(x), { rows: x.length }, { seed: SEED, from: 0, to: 20_000 });
      return { ideal_se: moments(replicates).sd };
    },
    'bootstrap-exact-median': (reference) => {
      const r = exactMedian(inlineX(reference));
      return { prob: r.probabilities, mean: r.mean, se: r.se };
    },
  },
  ({ id }) => !id.startsWith('rng-'),
);

describe('resampling', () => {
  test('a seeded run of medians agrees with the exact distribution within five standard errors', () => {
    const x = [1, 1.5, 2.6, 3, 4, 5, 9];
    const { values, probabilities } = exactMedian(x);
    const b = 20_000;
    const replicates = bootstrapReplicates(resampledMedian(x), { rows: x.length }, { seed: SEED, from: 0, to: b });
    values.forEach((value, k) => {
      const share = replicates.filter((one) => one === value).length / b;
      expect(Math.abs(share - probabilities[k]!)).toBeLessThan(5 * Math.sqrt((probabilities[k]! * (1 - probabilities[k]!)) / b));
    });
  });

  test('the exact distribution of a median of three by counting all 27 resamples', () => {
    // Median of three draws from 1 < 2 < 3: 7, 13 and 7 of 27.
    const { probabilities } = exactMedian([3, 1, 2]);
    [7, 13, 7].forEach((count, k) => expect(probabilities[k]).toBeCloseTo(count / 27, 14));
    expect(exactMedian([5])).toMatchObject({ probabilities: [1], mean: 5, se: 0 });
    expect(() => exactMedian([1, 2])).toThrow(RangeError);
  });

  test('ranges put together are the run in one piece, however it is cut', async () => {
    const task = { statistic: 'mean', values: Float64Array.of(3, 1, 4, 1, 5, 9, 2, 6) } as const;
    const whole = runRange(task, { seed: 7, from: 0, to: 101 });
    for (const parts of [1, 2, 3, 7, 101, 150]) {
      expect(await runShared(task, { seed: 7, replicates: 101 }, parts)).toEqual(whole);
    }
    expect(runRange(task, { seed: 8, from: 0, to: 101 })).not.toEqual(whole);
  });

  test('worker threads give the same numbers as this thread', async () => {
    const task = { statistic: 'rmst', time: Float64Array.of(5, 8, 12, 20, 21, 30), event: Uint8Array.of(1, 0, 1, 1, 0, 0), tau: 15 } as const;
    const shared = await runShared(task, { seed: 11, replicates: 60 }, 2, inWorkerThread);
    expect(shared).toEqual(runRange(task, { seed: 11, from: 0, to: 60 }));
    await expect(inWorkerThread({ ...task, tau: -1 }, { seed: 1, from: 0, to: 1 })).rejects.toThrow(/above 0/);
  }, 60_000);

  test('clusters are drawn whole', () => {
    const clusters = Int32Array.of(0, 0, 0, 1, 1, 2);
    const seen: number[][] = [];
    bootstrapReplicates((counts) => seen.push(Array.from(counts)), { rows: 6, clusters }, { seed: 3, from: 0, to: 50 });
    for (const counts of seen) {
      expect(new Set(counts.slice(0, 3)).size).toBe(1);
      expect(counts[3]).toBe(counts[4]);
      expect(counts[0]! + counts[3]! + counts[5]!).toBe(3);
    }
    expect(jackknife(resampledMean([1, 2, 3, 4, 5, 6]), { rows: 6, clusters })).toEqual(Float64Array.of(5, 3, 3));
    expect(() => bootstrapReplicates(resampledMean([1, 2]), { rows: 2, clusters: Int32Array.of(0, 2) }, { seed: 1, from: 0, to: 1 })).toThrow(RangeError);
  });

  test('statistics of counts are the statistics of the rows written out', () => {
    const row = fc.record({ time: fc.integer({ min: 0, max: 12 }), event: fc.constantFrom(0, 1), count: fc.integer({ min: 0, max: 3 }) });
    fc.assert(
      fc.property(fc.array(row, { minLength: 1, maxLength: 12 }), fc.integer({ min: 1, max: 12 }), (rows, tau) => {
        const counts = Int32Array.from(rows, ({ count }) => count);
        const drawn = rows.flatMap(({ time, event, count }) => Array.from({ length: count }, () => ({ time, event })));
        fc.pre(drawn.length > 0);
        const times = rows.map(({ time }) => time);
        const written = drawn.map(({ time }) => time).sort((a, b) => a - b);
        expect(resampledMean(times)(counts)).toBeCloseTo(written.reduce((a, b) => a + b, 0) / written.length, 12);
        expect(resampledMedian(times)(counts)).toBe((written[Math.floor((written.length - 1) / 2)]! + written[Math.ceil((written.length - 1) / 2)]!) / 2);
        const curve = kaplanMeier({ time: Float64Array.from(drawn, ({ time }) => time), event: Uint8Array.from(drawn, ({ event }) => event) });
        const area = resampledRmst(times, rows.map(({ event }) => event), tau)(counts);
        const { estimate } = rmst(curve, tau);
        if (estimate === null) expect(area).toBeNaN();
        else expect(area).toBeCloseTo(estimate, 10);
      }),
    );
  });

  test('misuse is refused', () => {
    expect(() => bootstrapReplicates(resampledMean([]), { rows: 0 }, { seed: 1, from: 0, to: 1 })).toThrow(RangeError);
    expect(() => bootstrapReplicates(resampledMean([1]), { rows: 1 }, { seed: 1, from: 5, to: 1 })).toThrow(RangeError);
    expect(() => bootstrapReplicates(resampledMean([1]), { rows: 1 }, { seed: 1.5, from: 0, to: 1 })).toThrow(RangeError);
    expect(() => resampledMean([1, Number.NaN])).toThrow(RangeError);
    expect(() => resampledRmst([1], [1], 0)).toThrow(RangeError);
  });
});

describe('limits from replicates', () => {
  const of = (estimate: number, replicates: number[], kind: 'percentile' | 'bca', left = [1, 2, 3]) =>
    bootstrapLimits(estimate, Float64Array.from(replicates), { kind, jackknife: Float64Array.from(left), n: 3 });

  test('without bias and acceleration BCa is the percentile interval', () => {
    const replicates = Array.from({ length: 200 }, (_, k) => k + 0.5);
    const bca = of(100, replicates, 'bca');
    const plain = of(100, replicates, 'percentile');
    expect(bca.z0).toBeCloseTo(0, 12);
    expect(bca.acceleration).toBeCloseTo(0, 12);
    expect(bca.lower).toBeCloseTo(plain.lower!, 8);
    expect(bca.upper).toBeCloseTo(plain.upper!, 8);
  });

  test('all replicates on one side: percentile limits with a note', () => {
    expect(of(0, [1, 2, 3, 4], 'bca')).toMatchObject({ note: expect.stringContaining('one side') });
    expect(of(9, [1, 2, 3, 4], 'bca').lower).toBe(of(9, [1, 2, 3, 4], 'percentile').lower);
  });

  test('resamples without the statistic are counted; too few leave no limits', () => {
    const r = of(2, [1, 2, 3, Number.NaN, 4], 'percentile');
    expect(r).toMatchObject({ replicates: 4, leftOut: [{ reason: 'resample without the statistic', count: 1 }] });
    expect(of(2, [Number.NaN, 1], 'percentile')).toMatchObject({ lower: null, upper: null, reason: expect.stringContaining('two replicates') });
    expect(of(2, [2, 2, 2], 'bca', [2, 2])).toMatchObject({ lower: 2, upper: 2 });
    expect(() => bootstrapLimits(1, Float64Array.of(1, 2), { kind: 'bca', n: 2 })).toThrow(RangeError);
    expect(() => bootstrapLimits(1, Float64Array.of(1, 2), { kind: 'percentile', level: 95, n: 2 })).toThrow(RangeError);
  });
});

describe('missing values', () => {
  test('patterns add up to the rows, and none is missing in none', () => {
    expect(missingPatterns({ a: [1, Number.NaN, 3], b: [Number.NaN, Number.NaN, 3] })).toMatchObject({
      n: 3,
      missing: { a: 1, b: 2 },
      completeRows: 1,
      patterns: [{ pattern: '00', count: 1 }, { pattern: '01', count: 1 }, { pattern: '11', count: 1 }],
    });
    expect(missingPatterns({ a: [] })).toMatchObject({ n: 0, completeRows: 0, patterns: [] });
    expect(() => missingPatterns({})).toThrow(RangeError);
    expect(() => missingPatterns({ a: [1], b: [] })).toThrow(RangeError);
  });

  test('a visit without a row is as missing as a row without a value', () => {
    const r = missingByVisit([1, 1, 1, 2, 2, 3], [0, 3, 6, 0, 6, 0], [5, 5, 5, 5, 5, 5]);
    expect(r).toMatchObject({ n: 3, complete: 1, monotone: 2, intermittent: 1 });
    expect(r.visits.map(({ missing }) => missing)).toEqual([0, 2, 1]);
    expect(() => missingByVisit([1, 1], [0, 0], [5, 5])).toThrow(RangeError);
    expect(missingByVisit([], [], [])).toMatchObject({ n: 0, visits: [] });
  });
});

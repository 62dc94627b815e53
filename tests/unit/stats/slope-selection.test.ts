import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { allSlopes } from '@/stats/progression/pairwise-slopes';
import { inversions } from '@/stats/progression/inversions';
import { selectSlopes } from '@/stats/progression/slope-selection';
import { theilSen } from '@/stats/progression/theil-sen';
import { doubleAt, placeOf, stepsFrom } from '@/stats/special/double-steps';
import { criticalValue } from '@/stats/critical-value';

const whole = fc.integer({ min: -6, max: 6 });
const wide = fc.integer({ min: -(2 ** 30), max: 2 ** 30 });
const tenths = fc.integer({ min: 0, max: 300 }).map((value) => value / 10);
const shifted = fc.integer({ min: 0, max: 20 }).map((value) => 1e9 + value / 10);
const any = fc.double({ noNaN: true, min: -1e6, max: 1e6 }).map((value) => (Math.abs(value) < 1e-60 ? 0 : value));
const huge = fc.double({ noNaN: true, min: -1e140, max: 1e140 }).map((value) => (Math.abs(value) < 1e70 ? 0 : value));

function rowsOf(x: fc.Arbitrary<number>, y: fc.Arbitrary<number>): fc.Arbitrary<[number, number][]> {
  return fc.array(fc.tuple(x, y), { minLength: 2, maxLength: 40 });
}

/** All slopes sorted beside the selection of some ranks; a small limit makes it narrow windows even of few rows. */
function beside(rows: readonly (readonly [number, number])[], limit: number, seed: number, check: (selected: number, sorted: number) => void): void {
  const x = Float64Array.from(rows, ([value]) => value);
  const y = Float64Array.from(rows, ([, value]) => value);
  const sorted = allSlopes(x, y).sort();
  const n = sorted.length;
  const ranks = [1, 2, Math.ceil(n / 4), Math.ceil(n / 2), Math.floor(n / 2) + 1, n].filter((rank) => rank >= 1 && rank <= n);
  if (n === 0) return;
  const selected = selectSlopes(x, y, ranks, { limit, seed });
  for (const rank of ranks) check(selected.get(rank)!, sorted[rank - 1]!);
}

const limits = fc.integer({ min: 1, max: 60 });
const seeds = fc.integer();

describe('slopes at ranks, without making all of them', () => {
  test('whole numbers, ties everywhere: the very doubles of the sorted list, whatever the seed', () => {
    const rows = fc.oneof(rowsOf(whole, whole), rowsOf(whole, wide), rowsOf(wide, whole), rowsOf(wide, wide));
    fc.assert(fc.property(rows, limits, seeds, (list, limit, seed) => beside(list, limit, seed, (a, b) => expect(a).toBe(b))), { numRuns: 600 });
  });

  test('any numbers: the very doubles again where the limit lets the slopes be looked at', () => {
    const rows = fc.oneof(rowsOf(any, any), rowsOf(huge, any), rowsOf(any, huge), rowsOf(tenths, tenths), rowsOf(shifted, tenths));
    fc.assert(fc.property(rows, seeds, (list, seed) => beside(list, 800, seed, (a, b) => expect(a).toBe(b))), { numRuns: 300 });
  });

  test('any numbers, counted only: within three neighbours of the sorted list', () => {
    const rows = fc.oneof(rowsOf(any, any), rowsOf(huge, any), rowsOf(any, huge), rowsOf(tenths, tenths), rowsOf(shifted, tenths));
    const near = (a: number, b: number): void => expect(Number(placeOf(a) - placeOf(b))).toBeOneOf([-3, -2, -1, 0, 1, 2, 3]);
    fc.assert(fc.property(rows, limits, seeds, (list, limit, seed) => beside(list, limit, seed, near)), { numRuns: 600 });
  });

  test('fifty thousand rows in two groups: median and limits of all differences, counted on paper', () => {
    // Group 0 holds 0..m-1, group 1 holds c..c+m-1: a difference of c + d occurs m - |d| times.
    const m = 25_000;
    const c = 7;
    const x = Float64Array.from({ length: 2 * m }, (_, i) => (i < m ? 0 : 1));
    const y = Float64Array.from({ length: 2 * m }, (_, i) => (i < m ? (i * 7919) % m : c + ((i * 104_729) % m)));
    const r = theilSen(x, y);
    expect(r.slopes).toBe(m * m);
    expect(r.estimate).toBe(c);
    // Differences up to c + d, d < 0: the sum of 1..m+d.
    const atRank = (rank: number): number => {
      let d = -m;
      while (((m + d) * (m + d + 1)) / 2 < rank) d++;
      return c + d;
    };
    const below = Math.floor(r.rankLower);
    const share = r.rankLower - below;
    const lower = (1 - share) * atRank(below) + share * atRank(below + 1);
    expect(r.spread).toBeCloseTo(criticalValue(0.95) * Math.sqrt(r.varianceS), 6);
    expect(r.lower).toBeCloseTo(lower, 9);
    expect(r.upper).toBeCloseTo(2 * c - lower, 9);
  });

  test('fifty thousand rows on a line with a fifth of them far off: the line', () => {
    const n = 50_000;
    const off = (i: number): number => (i % 5 === 0 ? ((i * 7919) % 1_000) * 1e6 : 0);
    const x = Float64Array.from({ length: n }, (_, i) => 3 * i);
    expect(theilSen(x, x.map((value, i) => value / 3 + off(i)))).toMatchObject({ estimate: 1 / 3, lower: 1 / 3, upper: 1 / 3 });
    expect(theilSen(x, x.map((_, i) => 5 + off(i)))).toMatchObject({ estimate: 0 });
    // Not exact in binary: 64% of the slopes are 0.1 but for their rounding.
    const tenth = theilSen(x, x.map((value, i) => 0.1 * value + off(i))).estimate!;
    expect(Math.abs(tenth - 0.1)).toBeLessThanOrEqual(3 * 2 ** -56);
  });

  test('all loads equal: slopes of 0, not of the smallest double', () => {
    const x = Float64Array.from({ length: 3_000 }, (_, i) => i % 52);
    const { estimate } = theilSen(x, x.map(() => 8.8));
    expect(estimate).toBe(0);
    expect(Object.is(estimate, 0)).toBe(true);
  });

  test('a column over three hundred powers of two is refused and not miscounted', () => {
    const x = Float64Array.from({ length: 3_000 }, (_, i) => i);
    expect(() => theilSen(x, x.map((value) => (value === 7 ? 1e-200 : 1)))).toThrow(RangeError);
  });
});

test('inversions are those of every pair looked at', () => {
  fc.assert(
    fc.property(fc.array(fc.nat(20), { maxLength: 50 }), (values) => {
      let count = 0;
      for (let i = 0; i < values.length; i++) for (let j = i + 1; j < values.length; j++) if (values[i]! > values[j]!) count++;
      const shown: [number, number][] = [];
      const told = inversions(Uint32Array.from(values), [new Uint32Array(values.length), new Uint32Array(values.length)], (from, start, end, value) => {
        for (let k = start; k < end; k++) shown.push([from[k]!, value]);
      });
      expect([told, shown.length]).toEqual([count, count]);
      expect(shown.every(([above, below]) => above > below)).toBe(true);
    }),
  );
});

test('steps from double to double', () => {
  expect(stepsFrom(1, 1)).toBe(1 + Number.EPSILON);
  expect(stepsFrom(0, 1)).toBe(Number.MIN_VALUE);
  expect(stepsFrom(Number.MIN_VALUE, -2)).toBe(-Number.MIN_VALUE);
  expect(stepsFrom(Number.MAX_VALUE, 5)).toBe(Infinity);
  expect(placeOf(-0)).toBe(0n);
  fc.assert(fc.property(fc.double({ noNaN: true }), (value) => {
    expect(doubleAt(placeOf(value))).toBe(value === 0 ? 0 : value);
  }));
});

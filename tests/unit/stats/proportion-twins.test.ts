/**
 * Proportions computed a second time, slowly: exact fractions where the
 * arithmetic is rational, plain search where a limit is defined by a test.
 */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { breslowDayTest } from '@/stats/proportion/breslow-day-test';
import { chiSquareTest } from '@/stats/proportion/chi-square-test';
import { clopperPearson } from '@/stats/proportion/clopper-pearson';
import { conditionalOddsRatio } from '@/stats/proportion/conditional-odds-ratio';
import type { FourfoldTable, TwoGroups } from '@/stats/proportion/counts';
import { fisherExact } from '@/stats/proportion/fisher-exact';
import { fisherExactTable } from '@/stats/proportion/fisher-exact-table';
import { katzRiskRatio } from '@/stats/proportion/katz-risk-ratio';
import { koopmanRiskRatio } from '@/stats/proportion/koopman-risk-ratio';
import { mantelHaenszel } from '@/stats/proportion/mantel-haenszel';
import { miettinenNurminenDifference } from '@/stats/proportion/miettinen-nurminen-difference';
import { newcombeDifference } from '@/stats/proportion/newcombe-difference';
import { oddsRatio } from '@/stats/proportion/odds-ratio';
import { riskRatio } from '@/stats/proportion/risk-ratio';
import { waldDifference } from '@/stats/proportion/wald-difference';
import { waldProportion } from '@/stats/proportion/wald-proportion';
import { wilsonInterval } from '@/stats/proportion/wilson-interval';

const z = 1.959963984540054;
const close = (got: number | null | undefined, want: number, slack = 1e-10) =>
  expect(Math.abs((got as number) - want)).toBeLessThanOrEqual(slack * Math.max(1e-3, Math.abs(want)));
const count = fc.integer({ min: 0, max: 25 });
const table = fc.record({ a: count, b: count, c: count, d: count });
const group = fc.integer({ min: 1, max: 60 }).chain((n) => fc.record({ n: fc.constant(n), events: fc.integer({ min: 0, max: n }) }));
const groups = fc.tuple(group, group).map(([one, two]): TwoGroups => ({ events1: one.events, n1: one.n, events2: two.events, n2: two.n }));
const runs = { numRuns: 200, seed: 11 };

function choose(n: number, k: number): bigint {
  if (k < 0 || k > n) return 0n;
  let value = 1n;
  for (let i = 1n; i <= BigInt(k); i++) value = (value * (BigInt(n) - i + 1n)) / i;
  return value;
}

/** A ratio of large whole numbers as a double. */
function fraction(top: bigint, bottom: bigint): number {
  return Number((top * 10n ** 30n) / bottom) / 1e30;
}

describe('one proportion', () => {
  test('Wilson limits solve the score equation', () => {
    fc.assert(fc.property(group, ({ events, n }) => {
      const { estimate, lower, upper } = wilsonInterval({ events, n }) as { estimate: number; lower: number; upper: number };
      for (const p of [lower, upper]) close((estimate - p) ** 2, (z * z * p * (1 - p)) / n, 1e-9);
      if (events === 0) expect(lower).toBe(0);
      if (events === n) expect(upper).toBe(1);
    }), runs);
  });

  test('Clopper-Pearson limits put half of the rest in each binomial tail, summed term by term', () => {
    const tail = (from: number, to: number, n: number, p: number) => {
      let sum = 0;
      for (let k = from; k <= to; k++) sum += Number(choose(n, k)) * p ** k * (1 - p) ** (n - k);
      return sum;
    };
    fc.assert(fc.property(group, ({ events, n }) => {
      const { lower, upper } = clopperPearson({ events, n }) as { lower: number; upper: number };
      if (events > 0) close(tail(events, n, n, lower), 0.025);
      if (events < n) close(tail(0, events, n, upper), 0.025);
    }), runs);
  });

  test('events and their absence are mirror images', () => {
    fc.assert(fc.property(group, ({ events, n }) => {
      for (const method of [wilsonInterval, clopperPearson, waldProportion]) {
        const own = method({ events, n });
        const mirror = method({ events: n - events, n });
        close(own.lower, 1 - (mirror.upper as number), 1e-11);
      }
    }), runs);
  });

  test('one person, and no one', () => {
    expect(clopperPearson({ events: 1, n: 1 })).toMatchObject({ estimate: 1, lower: expect.closeTo(0.025, 14), upper: 1 });
    for (const method of [wilsonInterval, clopperPearson, waldProportion]) {
      expect(method({ events: 0, n: 0 })).toMatchObject({ estimate: null, lower: null, upper: null, reason: 'No one was observed.' });
    }
  });
});

/** Score statistic with the constrained likelihood found by golden section. */
function scoreBySearch({ events1, n1, events2, n2 }: TwoGroups, link: (p2: number) => number, low: number, high: number) {
  const term = (x: number, p: number) => (x === 0 ? 0 : x * Math.log(p));
  const likelihood = (p2: number) =>
    term(events1, link(p2)) + term(n1 - events1, 1 - link(p2)) + term(events2, p2) + term(n2 - events2, 1 - p2);
  let from = low;
  let to = high;
  const golden = (Math.sqrt(5) - 1) / 2;
  for (let round = 0; round < 100; round++) {
    const a = to - golden * (to - from);
    const b = from + golden * (to - from);
    if (likelihood(a) >= likelihood(b)) to = b;
    else from = a;
  }
  const p2 = (from + to) / 2;
  return { p1: link(p2), p2 };
}

describe('two proportions', () => {
  test('Miettinen-Nurminen limits are where the score test turns', () => {
    fc.assert(fc.property(groups, (two) => {
      const { estimate, lower, upper } = miettinenNurminenDifference(two) as { estimate: number; lower: number; upper: number };
      const { n1, n2 } = two;
      for (const delta of [lower, upper]) {
        if (Math.abs(delta) > 1 - 1e-6) continue;
        const { p1, p2 } = scoreBySearch(two, (p) => p + delta, Math.max(0, -delta), Math.min(1, 1 - delta));
        const variance = ((p1 * (1 - p1)) / n1 + (p2 * (1 - p2)) / n2) * ((n1 + n2) / (n1 + n2 - 1));
        close((estimate - delta) ** 2 / variance, z * z, 1e-5);
      }
      expect(lower).toBeLessThanOrEqual(estimate);
      expect(upper).toBeGreaterThanOrEqual(estimate);
    }), runs);
  });

  test('Koopman limits are where the score test turns', () => {
    fc.assert(fc.property(groups, (two) => {
      const { lower, upper } = koopmanRiskRatio(two);
      const { events1, n1, events2, n2 } = two;
      for (const ratio of [lower, upper] as number[]) {
        if (ratio === 0 || ratio === Infinity) continue;
        const { p1, p2 } = scoreBySearch(two, (p) => ratio * p, 0, Math.min(1, 1 / ratio));
        const variance = (p1 * (1 - p1)) / n1 + (ratio ** 2 * p2 * (1 - p2)) / n2;
        close((events1 / n1 - (ratio * events2) / n2) ** 2 / variance, z * z, 1e-5);
      }
    }), runs);
  });

  test('Newcombe limits are put together from Wilson limits', () => {
    fc.assert(fc.property(groups, (two) => {
      const one = wilsonInterval({ events: two.events1, n: two.n1 }) as Record<'estimate' | 'lower' | 'upper', number>;
      const other = wilsonInterval({ events: two.events2, n: two.n2 }) as typeof one;
      const { lower, upper } = newcombeDifference(two);
      const gap = one.estimate - other.estimate;
      close(lower, gap - Math.sqrt((one.estimate - one.lower) ** 2 + (other.upper - other.estimate) ** 2), 1e-9);
      close(upper, gap + Math.sqrt((one.upper - one.estimate) ** 2 + (other.estimate - other.lower) ** 2), 1e-9);
    }), runs);
  });

  test('exchanging the groups turns differences about 0 and ratios about 1', () => {
    fc.assert(fc.property(groups, (two) => {
      const turned = { events1: two.events2, n1: two.n2, events2: two.events1, n2: two.n1 };
      for (const method of [newcombeDifference, miettinenNurminenDifference, waldDifference]) {
        close(method(two).lower, -(method(turned).upper as number), 1e-8);
      }
      const own = riskRatio(two);
      const other = riskRatio(turned);
      if (own.lower !== null && own.lower > 0) close(own.lower, 1 / (other.upper as number), 1e-8);
      else if (own.lower === 0) expect(other.upper).toBe(Infinity);
    }), runs);
  });

  test('a zero cell has score limits, no half added, and the method is named', () => {
    const none = { events1: 0, n1: 20, events2: 6, n2: 20 };
    expect(katzRiskRatio(none)).toMatchObject({ estimate: 0, lower: null, upper: null, standardErrorLog: null });
    const fallback = riskRatio(none);
    expect(fallback).toMatchObject({ estimate: 0, lower: 0, method: 'Risk ratio with Koopman score limits' });
    expect(fallback.upper).toBeLessThan(1);
    expect(riskRatio({ events1: 6, n1: 20, events2: 0, n2: 20 })).toMatchObject({ estimate: Infinity, upper: Infinity });
    expect(riskRatio({ events1: 0, n1: 20, events2: 0, n2: 20 })).toMatchObject({ estimate: null, lower: 0, upper: Infinity, reason: 'Neither group has an event.' });
    expect(riskRatio({ events1: 0, n1: 0, events2: 0, n2: 20 })).toMatchObject({ estimate: null, lower: null });
  });
});

describe('2 by 2 tables', () => {
  test('Fisher’s p-values are exact fractions', () => {
    fc.assert(fc.property(table, ({ a, b, c, d }) => {
      const mass = (k: number) => choose(a + b, k) * choose(c + d, a + c - k);
      const all = choose(a + b + c + d, a + c);
      let [rare, tie, less, more] = [0n, 0n, 0n, 0n];
      for (let k = 0; k <= a + c; k++) {
        if (mass(k) < mass(a)) rare += mass(k);
        if (mass(k) === mass(a)) tie += mass(k);
        if (k <= a) less += mass(k);
        if (k >= a) more += mass(k);
      }
      const got = fisherExact({ a, b, c, d });
      close(got.p, fraction(rare + tie, all), 1e-11);
      close(got.pLess, fraction(less, all), 1e-11);
      close(got.pGreater, fraction(more, all), 1e-11);
      close(got.pMid, fraction(2n * rare + tie, 2n * all), 1e-11);
      const smaller = less < more ? less : more;
      close(got.pMidCentral, Math.min(1, fraction(2n * smaller - mass(a), all)), 1e-11);
    }), runs);
  });

  test('the conditional odds ratio and its limits solve their polynomials', () => {
    fc.assert(fc.property(table, ({ a, b, c, d }) => {
      const got = conditionalOddsRatio({ a, b, c, d });
      const weights = Array.from({ length: a + c + 1 }, (_, k) => Number(choose(a + b, k) * choose(c + d, a + c - k)));
      const sum = (psi: number, of: (k: number) => number) => weights.reduce((total, weight, k) => total + weight * psi ** k * of(k), 0) / weights.reduce((total, weight, k) => total + weight * psi ** k, 0);
      const inside = (psi: number | null) => psi !== null && psi > 1e-6 && psi < 1e6;
      if (inside(got.estimate)) close(sum(got.estimate as number, (k) => k), a, 1e-9);
      if (inside(got.lower)) close(sum(got.lower as number, (k) => Number(k >= a)), 0.025, 1e-9);
      if (inside(got.upper)) close(sum(got.upper as number, (k) => Number(k <= a)), 0.025, 1e-9);
      if (inside(got.midPLower)) close(sum(got.midPLower as number, (k) => (k === a ? 0.5 : Number(k > a))), 0.025, 1e-9);
      if (inside(got.midPUpper)) close(sum(got.midPUpper as number, (k) => (k === a ? 0.5 : Number(k < a))), 0.025, 1e-9);
    }), runs);
  });

  test('ends are exact: no event among the exposed, every event among them, margins that allow one table', () => {
    expect(conditionalOddsRatio({ a: 0, b: 5, c: 3, d: 2 })).toMatchObject({ estimate: 0, lower: 0, midPLower: 0 });
    expect(conditionalOddsRatio({ a: 3, b: 2, c: 0, d: 5 })).toMatchObject({ estimate: Infinity, upper: Infinity, midPUpper: Infinity });
    expect(conditionalOddsRatio({ a: 0, b: 5, c: 0, d: 5 })).toMatchObject({ estimate: null, lower: null, upper: null });
    expect(fisherExact({ a: 0, b: 5, c: 0, d: 5 }).p).toBe(1);
    expect(fisherExact({ a: 0, b: 0, c: 0, d: 0 }).p).toBe(1);
    expect(oddsRatio({ a: 0, b: 5, c: 3, d: 2 })).toMatchObject({ estimate: 0, lower: null, upper: null });
    expect(oddsRatio({ a: 0, b: 5, c: 0, d: 2 }).estimate).toBeNull();
    expect(chiSquareTest({ a: 0, b: 5, c: 0, d: 5 })).toMatchObject({ pearson: { statistic: null, p: null }, reason: 'A margin of the table is empty.' });
  });

  test('a large table keeps the digits of its small p', () => {
    // 300 of 1000 v 200 of 1000 in whole numbers; 1e7 keeps the digits of the fraction.
    let more = 0n;
    for (let k = 300; k <= 500; k++) more += choose(1000, k) * choose(1000, 500 - k);
    close(fisherExact({ a: 300, b: 700, c: 200, d: 800 }).pGreater / fraction(more * 10n ** 7n, choose(2000, 500)), 1e-7, 1e-9);
  });

  test('chi-square is the sum of (observed - expected)^2 / expected, whichever way the table is turned', () => {
    fc.assert(fc.property(table, ({ a, b, c, d }) => {
      const n = a + b + c + d;
      const got = chiSquareTest({ a, b, c, d });
      if (got.pearson.statistic === null) return;
      const sum = [[a, a + b, a + c], [b, a + b, b + d], [c, c + d, a + c], [d, c + d, b + d]].reduce(
        (total, [cell = 0, row = 0, column = 0]) => total + (cell - (row * column) / n) ** 2 / ((row * column) / n), 0);
      close(got.pearson.statistic, sum, 1e-9);
      const turned = chiSquareTest({ a: a, b: c, c: b, d: d });
      for (const kind of ['pearson', 'yates', 'likelihoodRatio'] as const) close(turned[kind].statistic, got[kind].statistic as number, 1e-8);
    }), runs);
  });
});

describe('r by c tables', () => {
  test('agree with the 2 by 2 test', () => {
    fc.assert(fc.property(table, ({ a, b, c, d }) => {
      const whole = fisherExactTable([[a, b], [c, d]]).p;
      if (whole !== null) close(whole, fisherExact({ a, b, c, d }).p, 1e-9);
    }), { numRuns: 60, seed: 2 });
  });

  test('agree with every table written out, in whole numbers, for 3 by 3', () => {
    const cell = fc.integer({ min: 0, max: 4 });
    fc.assert(fc.property(fc.array(fc.array(cell, { minLength: 3, maxLength: 3 }), { minLength: 3, maxLength: 3 }), (rows) => {
      const got = fisherExactTable(rows).p;
      if (got !== null) close(got, enumerate(rows), 1e-9);
    }), { numRuns: 40, seed: 2 });
  });

  test('do not depend on the order of rows, of columns, or on turning the table', () => {
    const rows = [[3, 1, 4], [1, 5, 9], [2, 6, 5], [3, 5, 8]];
    const p = fisherExactTable(rows).p as number;
    close(fisherExactTable([...rows].reverse()).p, p, 1e-10);
    close(fisherExactTable(rows.map((row) => [...row].reverse())).p, p, 1e-10);
    close(fisherExactTable([0, 1, 2].map((j) => rows.map((row) => row[j] as number))).p, p, 1e-10);
    expect(fisherExactTable([[1, 2], [0, 0]])).toMatchObject({ p: null });
  });
});

/** Two-sided p by walking all tables, each with weight n! / product of cells!, a whole number. */
function enumerate(rows: number[][]): number {
  const factorial = (k: number): bigint => (k < 2 ? 1n : BigInt(k) * factorial(k - 1));
  const rowTotals = rows.map((row) => row.reduce((sum, cell) => sum + cell, 0));
  const columnTotals = [0, 1, 2].map((j) => rows.reduce((sum, row) => sum + (row[j] as number), 0));
  const n = factorial(rowTotals.reduce((sum, total) => sum + total, 0));
  const weight = (cells: number[]) => n / cells.reduce((product, cell) => product * factorial(cell), 1n);
  const own = weight(rows.flat());
  let [rare, all] = [0n, 0n];
  const walk = (cells: number[]): void => {
    if (cells.length < 9) {
      for (let k = 0; k <= (rowTotals[Math.floor(cells.length / 3)] as number); k++) walk([...cells, k]);
      return;
    }
    all += weight(cells);
    if (weight(cells) <= own) rare += weight(cells);
  };
  // Only the upper left four cells are free.
  for (let a = 0; a <= (rowTotals[0] as number); a++)
    for (let b = 0; a + b <= (rowTotals[0] as number); b++)
      for (let d = 0; d <= (rowTotals[1] as number); d++)
        for (let e = 0; d + e <= (rowTotals[1] as number); e++) {
          const [r0 = 0, r1 = 0] = rowTotals;
          const [c0 = 0, c1 = 0, c2 = 0] = columnTotals;
          const cells = [a, b, r0 - a - b, d, e, r1 - d - e, c0 - a - d, c1 - b - e, c2 - (r0 - a - b) - (r1 - d - e)];
          if (cells.every((cell) => cell >= 0)) walk(cells);
        }
  return fraction(rare, all);
}

describe('strata', () => {
  const strata = fc.array(table, { minLength: 1, maxLength: 6 });
  const columns = (tables: readonly FourfoldTable[]) => ({
    a: tables.map(({ a }) => a),
    b: tables.map(({ b }) => b),
    c: tables.map(({ c }) => c),
    d: tables.map(({ d }) => d),
  });

  test('one stratum gives the crude ratios and difference', () => {
    fc.assert(fc.property(table, (own) => {
      const { a, b, c, d } = own;
      if (a + b === 0 || c + d === 0) return;
      const got = mantelHaenszel(columns([own]));
      const crude = oddsRatio(own).estimate;
      if (crude !== null && Number.isFinite(crude)) close(got.oddsRatio.estimate, crude);
      close(got.riskDifference.estimate, a / (a + b) - c / (c + d));
      if (a * b * c * d > 0) close(got.oddsRatio.standardErrorLog, oddsRatio(own).standardErrorLog as number, 1e-9);
      if (a > 0 && c > 0) close(got.riskRatio.standardErrorLog, katzRiskRatio({ events1: a, n1: a + b, events2: c, n2: c + d }).standardErrorLog as number, 1e-9);
    }), runs);
  });

  test('the order of strata does not matter, and exchanging exposure turns every measure', () => {
    fc.assert(fc.property(strata, (tables) => {
      const got = mantelHaenszel(columns(tables));
      const back = mantelHaenszel(columns([...tables].reverse()));
      const turned = mantelHaenszel(columns(tables.map(({ a, b, c, d }) => ({ a: c, b: d, c: a, d: b }))));
      if (got.oddsRatio.lower === null) return;
      close(back.oddsRatio.lower, got.oddsRatio.lower, 1e-9);
      close(turned.oddsRatio.upper, 1 / got.oddsRatio.lower, 1e-9);
      if (got.riskRatio.lower !== null) close(turned.riskRatio.upper, 1 / got.riskRatio.lower, 1e-9);
      close(turned.riskDifference.lower, -(got.riskDifference.upper as number), 1e-9);
      if (got.test.statistic !== null) close(turned.test.statistic, got.test.statistic, 1e-8);
    }), runs);
  });

  test('equal strata are homogeneous, and the fitted cell is stable at an odds ratio of 1', () => {
    const equal = breslowDayTest(columns([{ a: 5, b: 10, c: 7, d: 14 }, { a: 10, b: 20, c: 14, d: 28 }]));
    expect(equal.breslowDay.statistic).toBeCloseTo(0, 12);
    expect(equal).toMatchObject({ degreesOfFreedom: 1 });
    const different = breslowDayTest(columns([{ a: 20, b: 5, c: 5, d: 20 }, { a: 5, b: 20, c: 20, d: 5 }]));
    // By hand: the common odds ratio is 1, every fitted cell 12.5, its variance 12.5 / 4, so 2 x 7.5^2 / 3.125 = 36.
    expect(different.breslowDay.statistic).toBeCloseTo(36, 10);
    expect(breslowDayTest(columns([{ a: 1, b: 1, c: 1, d: 1 }]))).toMatchObject({ breslowDay: { statistic: null } });
    expect(breslowDayTest(columns([{ a: 1, b: 1, c: 0, d: 1 }, { a: 1, b: 3, c: 0, d: 2 }])).reason).toBe('The common odds ratio is 0 or infinite.');
  });

  test('strata that compare nothing are left out and said', () => {
    const one = { a: 4, b: 6, c: 3, d: 9 };
    const padded = mantelHaenszel(columns([one, { a: 0, b: 0, c: 3, d: 2 }]));
    expect(padded).toMatchObject({ ...mantelHaenszel(columns([one])), leftOut: [{ reason: 'Strata without both groups', count: 1 }] });
    const none = mantelHaenszel(columns([]));
    expect(none).toMatchObject({ oddsRatio: { estimate: null }, riskDifference: { estimate: null }, test: { statistic: null } });
  });
});

describe('misuse is refused', () => {
  const bad = [Number.NaN, -1, 1.5, Infinity];
  test.each(bad)('a count of %s', (value) => {
    expect(() => wilsonInterval({ events: value, n: 10 })).toThrow(RangeError);
    expect(() => clopperPearson({ events: 1, n: value })).toThrow(RangeError);
    expect(() => waldProportion({ events: value, n: 10 })).toThrow(RangeError);
    const two = { events1: 1, n1: 5, events2: value, n2: 10 };
    for (const method of [newcombeDifference, waldDifference, miettinenNurminenDifference, katzRiskRatio, koopmanRiskRatio, riskRatio]) {
      expect(() => method(two)).toThrow(RangeError);
    }
    const four = { a: 1, b: value, c: 1, d: 1 };
    for (const method of [oddsRatio, fisherExact, conditionalOddsRatio, chiSquareTest]) expect(() => method(four)).toThrow(RangeError);
    expect(() => fisherExactTable([[1, value], [1, 1]])).toThrow(RangeError);
    expect(() => mantelHaenszel({ a: [value], b: [1], c: [1], d: [1] })).toThrow(RangeError);
    expect(() => breslowDayTest({ a: [1], b: [1], c: [1], d: [value] })).toThrow(RangeError);
  });

  test('more events than people, columns of unequal length, levels that are none', () => {
    expect(() => wilsonInterval({ events: 6, n: 5 })).toThrow('There cannot be 6 events among 5.');
    expect(() => mantelHaenszel({ a: [1], b: [1, 2], c: [1], d: [1] })).toThrow(RangeError);
    expect(() => fisherExactTable([[1, 2], [3]])).toThrow(RangeError);
    for (const level of [0, 1, -0.5, 95, Number.NaN]) {
      expect(() => wilsonInterval({ events: 1, n: 5, level })).toThrow(RangeError);
      expect(() => conditionalOddsRatio({ a: 1, b: 1, c: 1, d: 1, level })).toThrow(RangeError);
      expect(() => mantelHaenszel({ a: [1], b: [1], c: [1], d: [1] }, { level })).toThrow(RangeError);
    }
  });
});

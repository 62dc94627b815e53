import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { percentChange } from '@/stats/model/coefficient';
import { mixedModel, type MixedModel, type MixedModelInput } from '@/stats/model/mixed-model';
import { slopeVarianceTest } from '@/stats/model/slope-variance-test';
import { runTopic, tableOf, type ReferenceCase, type Table } from './reference';

function numbered(column: readonly string[]): { codes: Float64Array; names: string[] } {
  const names = [...new Set(column)];
  return { codes: Float64Array.from(column, (name) => names.indexOf(name)), names };
}

function fit(input: MixedModelInput): MixedModel {
  const r = mixedModel(input);
  if (!r.fitted) throw new Error(r.reason);
  return r;
}

const shown = (r: MixedModel, names: readonly string[]) => ({
  reml: r.reml,
  loglik: r.logLikelihood,
  deviance_minus2loglik: r.deviance,
  fixed: Object.fromEntries(r.fixed.map((c) => [c.name, c.estimate])),
  se: Object.fromEntries(r.fixed.map((c) => [c.name, c.se])),
  vcov_fixed: r.covarianceFixed,
  wald_lower: Object.fromEntries(r.fixed.map((c) => [c.name, c.lower])),
  wald_upper: Object.fromEntries(r.fixed.map((c) => [c.name, c.upper])),
  G: r.covarianceRandom,
  residual_variance: r.residualVariance,
  correlation: r.correlation,
  blup: { id: r.effects.map(({ person }) => names[person]), intercept: r.effects.map((e) => e.intercept), slope: r.effects.map((e) => e.slope) },
  satterthwaite_df: Object.fromEntries(r.satterthwaite.map((c) => [c.name, c.df])),
});

const sleep = (table: Table, reml: boolean, withSlope: boolean) => {
  const { codes, names } = numbered(table.text('Subject'));
  const days = table.numbers('Days');
  const r = fit({ y: table.numbers('Reaction'), fixed: [{ name: 'Days', values: days }], person: codes, reml, ...(withSlope && { slope: days }) });
  return { r, names };
};

const loads = (reference: ReferenceCase, log: boolean) => {
  const table = tableOf(reference);
  const { codes, names } = numbered(table.text('participant'));
  const week = table.numbers('week');
  const kg = table.numbers('load_kg');
  const r = fit({ y: log ? kg.map(Math.log) : kg, fixed: [{ name: 'week', values: week }], person: codes, slope: week });
  return { ...shown(r, names), weekly_percent_change: percentChange(r.fixed[1]!) };
};

runTopic('07-mixed-model', {
  'lmm-sleep-': (reference) => {
    const { r, names } = sleep(tableOf(reference), !reference.id.endsWith('-ml'), !reference.id.endsWith('-intercept'));
    return shown(r, names);
  },
  'lmm-sleep-slope-test': (reference) => {
    const table = tableOf(reference);
    const r = slopeVarianceTest(sleep(table, false, false).r, sleep(table, false, true).r);
    return { lrt: r.statistic, p_chi2_2: r.pNaive, p_mixture: r.pMixture };
  },
  'lmm-orthodont-': (reference) => {
    const table = tableOf(reference);
    const { codes, names } = numbered(table.text('Subject'));
    const age11 = table.numbers('age11');
    const male = table.numbers('male');
    const fixed = [
      { name: 'age11', values: age11 },
      { name: 'male', values: male },
      { name: 'age11:male', values: age11.map((age, row) => age * male[row]!) },
    ];
    return shown(fit({ y: table.numbers('distance'), fixed, person: codes, slope: age11 }), names);
  },
  'lmm-loads-log': (reference) => loads(reference, true),
  'lmm-loads-raw': (reference) => loads(reference, false),
  'lmm-dyestuff': (reference) => {
    const table = tableOf(reference);
    const { codes, names } = numbered(table.text('Batch'));
    return shown(fit({ y: table.numbers('Yield'), fixed: [], person: codes }), names);
  },
});

/** -2 log restricted likelihood from the whole n x n covariance matrix, as the textbooks write it. */
function denseDeviance(y: number[], x: number[][], z: number[][], person: number[], g: readonly (readonly number[])[], sigma2: number, reml: boolean): number {
  const n = y.length;
  const v = y.map((_, i) => y.map((__, j) => {
    let sum = i === j ? sigma2 : 0;
    if (person[i] === person[j]) z[i]!.forEach((a, r) => z[j]!.forEach((b, s) => { sum += a * g[r]![s]! * b; }));
    return sum;
  }));
  // Gaussian elimination of [V | X y] gives log|V| and V^-1 [X y].
  const right = y.map((value, i) => [...x[i]!, value]);
  let logDet = eliminate(v, right);
  const p = x[0]!.length;
  const inner = (a: (row: number) => number, column: number): number => y.reduce((sum, _, i) => sum + a(i) * right[i]![column]!, 0);
  const xvx = Array.from({ length: p }, (_, a) => Array.from({ length: p }, (__, b) => inner((i) => x[i]![a]!, b)));
  const beta = Array.from({ length: p }, (_, a) => [inner((i) => x[i]![a]!, p)]);
  const quadratic = inner((i) => y[i]!, p) - beta.reduce((sum, [value], a) => {
    const solved = beta.map(([b]) => [b!]);
    eliminate(xvx.map((row) => row.slice()), solved);
    return sum + value! * solved[a]![0]!;
  }, 0);
  if (reml) logDet += eliminate(xvx.map((row) => row.slice()), beta.map(([b]) => [b!]));
  return logDet + quadratic + (n - (reml ? p : 0)) * Math.log(2 * Math.PI);
}

/** Solves in place with row exchanges; answers log |det|. */
function eliminate(a: number[][], right: number[][]): number {
  const n = a.length;
  let logDet = 0;
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k; i < n; i++) if (Math.abs(a[i]![k]!) > Math.abs(a[pivot]![k]!)) pivot = i;
    [a[k], a[pivot]] = [a[pivot]!, a[k]!];
    [right[k], right[pivot]] = [right[pivot]!, right[k]!];
    const head = a[k]![k]!;
    logDet += Math.log(Math.abs(head));
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const share = a[i]![k]! / head;
      a[i]!.forEach((_, j) => { a[i]![j]! -= share * a[k]![j]!; });
      right[i]!.forEach((_, j) => { right[i]![j]! -= share * right[k]![j]!; });
    }
    a[k] = a[k]!.map((value) => value / head);
    right[k] = right[k]!.map((value) => value / head);
  }
  return logDet;
}

/** Five people at four times, some missed; people differ in level and slope by more or less than chance. */
const rowsOf = fc
  .record({
    noise: fc.array(fc.integer({ min: -60, max: 60 }), { minLength: 20, maxLength: 20 }),
    missed: fc.uniqueArray(fc.integer({ min: 0, max: 19 }), { maxLength: 5 }),
    spread: fc.constantFrom(0, 0.2, 1),
  })
  .filter(({ noise }) => new Set(noise).size > 12)
  .map(({ noise, missed, spread }) =>
    noise
      .map((jitter, row) => ({ person: row % 5, t: Math.floor(row / 5) * 2 + (row % 2), jitter, row }))
      .filter(({ row }) => !missed.includes(row))
      .map(({ person, t, jitter }) => ({ person, t, y: 5 + 0.5 * t + spread * (((person * 7) % 5) * 0.4 + (person % 3) * 0.1 * t) + jitter / 60 })),
  );

describe('the mixed model by hand', () => {
  test('the deviance is that of the whole covariance matrix, and no nearby covariance is better', () => {
    fc.assert(
      fc.property(rowsOf, fc.boolean(), (rows, reml) => {
        const r = mixedModel({ y: rows.map(({ y }) => y), fixed: [{ name: 't', values: rows.map(({ t }) => t) }], person: rows.map(({ person }) => person), slope: rows.map(({ t }) => t), reml });
        fc.pre(r.fitted);
        if (!r.fitted) return;
        expect(r.converged).toBe(true);
        const dense = (g: readonly (readonly number[])[], sigma2: number): number =>
          denseDeviance(rows.map(({ y }) => y), rows.map(({ t }) => [1, t]), rows.map(({ t }) => [1, t]), rows.map(({ person }) => person), g, sigma2, reml);
        const best = dense(r.covarianceRandom, r.residualVariance);
        expect(Math.abs(best - r.deviance)).toBeLessThan(1e-7 * (1 + Math.abs(best)));
        const [[g11, g12], [, g22]] = r.covarianceRandom as [[number, number], [number, number]];
        const l = [Math.sqrt(g11), g11 > 0 ? g12 / Math.sqrt(g11) : 0, Math.sqrt(Math.max(0, g11 > 0 ? g22 - g12 ** 2 / g11 : g22))];
        for (const step of [0.02, -0.02]) {
          for (let entry = 0; entry < 3; entry++) {
            const [a, b, c] = l.map((value, at) => (at === entry ? value + step : value)) as [number, number, number];
            expect(dense([[a * a, a * b], [a * b, b * b + c * c]], r.residualVariance)).toBeGreaterThan(best - 1e-8);
          }
          expect(dense(r.covarianceRandom, r.residualVariance * (1 + step))).toBeGreaterThan(best - 1e-8);
        }
      }),
      { numRuns: 60 },
    );
  });

  test('row order, the origin and unit of time, and an offset of y change nothing but their own figures', () => {
    fc.assert(
      fc.property(rowsOf, (rows) => {
        const of = (list: typeof rows, week: (t: number) => number, shift: number) =>
          mixedModel({ y: list.map(({ y }) => y + shift), fixed: [{ name: 't', values: list.map(({ t }) => week(t)) }], person: list.map(({ person }) => person), slope: list.map(({ t }) => week(t)) });
        const plain = of(rows, (t) => t, 0);
        const other = of(rows.toReversed(), (t) => 7 * t + 1875, 1000);
        fc.pre(plain.fitted && other.fitted);
        if (!plain.fitted || !other.fitted) return;
        expect(other.residualVariance).toBeCloseTo(plain.residualVariance, 6);
        expect(7 * other.fixed[1]!.estimate!).toBeCloseTo(plain.fixed[1]!.estimate!, 6);
        expect(49 * other.covarianceRandom[1]![1]!).toBeCloseTo(plain.covarianceRandom[1]![1]!, 5);
        expect(other.singular).toBe(plain.singular);
      }),
      { numRuns: 40 },
    );
  });

  test('a balanced one-way layout gives the analysis-of-variance estimates (exact fractions)', () => {
    // Three people, readings 1,3 / 4,6 / 8,8: means 2, 5, 8; MSB = 2 x 18/2 = 18; MSW = (2 + 2 + 0)/3 = 4/3; G = (18 - 4/3)/2 = 25/3.
    const r = fit({ y: [1, 3, 4, 6, 8, 8], fixed: [], person: [0, 0, 1, 1, 2, 2] });
    expect(r.residualVariance).toBeCloseTo(4 / 3, 9);
    expect(r.covarianceRandom[0]![0]).toBeCloseTo(25 / 3, 7);
    expect(r.fixed[0]!.estimate).toBeCloseTo(5, 12);
    expect(r.satterthwaite[0]!.df).toBeCloseTo(2, 4);
  });

  test('people who differ less than chance: the variance is 0, the fit says singular and gives least squares', () => {
    const r = fit({ y: [1, 3, 1, 3, 1, 3], fixed: [], person: [0, 0, 1, 1, 2, 2] });
    expect(r).toMatchObject({ singular: true, converged: true, covarianceRandom: [[0]] });
    expect(r.residualVariance).toBeCloseTo(6 / 5, 9);
    expect(r.effects.every(({ intercept }) => intercept === 0)).toBe(true);
    expect(r.notes[0]).toContain('Singular');
  });
});

describe('where the mixed model has no answer it says why', () => {
  const y = [1, 2, 4, 3, 5, 9];
  test('one person, one time, no rows to spare, nothing left to explain, no rows', () => {
    expect(mixedModel({ y, fixed: [], person: y.map(() => 1) })).toMatchObject({ fitted: false, reason: expect.stringContaining('two people') });
    expect(mixedModel({ y, fixed: [], person: [1, 1, 1, 2, 2, 2], slope: y.map(() => 3) })).toMatchObject({ fitted: false, reason: expect.stringContaining('one time') });
    expect(mixedModel({ y, fixed: [], person: [1, 2, 3, 4, 5, 6] })).toMatchObject({ fitted: false, reason: expect.stringContaining('random effects') });
    expect(mixedModel({ y: y.map(() => 7), fixed: [], person: [1, 1, 1, 2, 2, 2] })).toMatchObject({ fitted: false, reason: expect.stringContaining('exactly') });
    expect(mixedModel({ y: [], fixed: [], person: [] })).toMatchObject({ fitted: false, n: 0 });
  });

  test('every person on an own straight line: no residual variation', () => {
    const t = [0, 1, 2, 0, 1, 2, 0, 1, 2];
    const person = [0, 0, 0, 1, 1, 1, 2, 2, 2];
    expect(mixedModel({ y: t.map((time, row) => person[row]! + time * (1 + person[row]!)), fixed: [{ name: 't', values: t }], person, slope: t })).toMatchObject({ fitted: false });
  });

  test('misuse is refused', () => {
    expect(() => mixedModel({ y, fixed: [{ name: 'a', values: [1, 2, 3, 4, 5, 6] }, { name: 'b', values: [2, 4, 6, 8, 10, 12] }], person: [1, 1, 1, 2, 2, 2] })).toThrow(RangeError);
    expect(() => mixedModel({ y, fixed: [], person: [1] })).toThrow(RangeError);
    expect(() => mixedModel({ y: [1, Infinity], fixed: [], person: [1, 2] })).toThrow(RangeError);
  });
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { Coefficient } from '@/stats/model/coefficient';
import type { Term } from '@/stats/model/design';
import type { Refusal } from '@/stats/model/fit';
import { gee } from '@/stats/model/gee';
import type { Glm, GlmInput } from '@/stats/model/glm';
import { logisticRegression } from '@/stats/model/logistic-regression';
import { negativeBinomial, type NegativeBinomial } from '@/stats/model/negative-binomial';
import { poissonRegression } from '@/stats/model/poisson-regression';
import { profileLimits } from '@/stats/model/profile-limits';
import { runTopic, tableOf, type ReferenceCase, type Table } from './reference';

/** One column of 0 and 1 for each level but the first. */
function contrasts(prefix: string, column: readonly string[], levels: readonly string[]): Term[] {
  return levels.slice(1).map((level) => ({ name: `${prefix}${level}`, values: column.map((cell) => (cell === level ? 1 : 0)) }));
}

const plain = (table: Table, ...names: string[]): Term[] => names.map((name) => ({ name, values: table.numbers(name) }));

function must<T extends { fitted: true }>(r: T | Refusal): T {
  if (!r.fitted) throw new Error(r.reason);
  return r;
}

const by = (list: readonly Coefficient[], key: 'estimate' | 'se' | 'lower' | 'upper') => Object.fromEntries(list.map((c) => [c.name, c[key]]));

const shown = (r: Glm) => ({
  coef: by(r.coefficients, 'estimate'),
  se: by(r.coefficients, 'se'),
  vcov: r.covariance,
  exp_coef: by(r.ratios, 'estimate'),
  exp_lower: by(r.ratios, 'lower'),
  exp_upper: by(r.ratios, 'upper'),
  loglik: r.logLikelihood,
  deviance: r.deviance,
  null_deviance: r.nullDeviance,
  df_residual: r.dfResidual,
  aic: r.aic,
  pearson_chisq: r.pearson,
  hc0_se: by(r.robust, 'se'),
  ...(r.clustered && {
    cluster_se_uncorrected: by(r.clustered.uncorrected, 'se'),
    cluster_se_G_over_Gminus1: by(r.clustered.corrected!, 'se'),
    n_clusters: r.clustered.clusters,
  }),
});

const negative = (r: NegativeBinomial) => ({ ...shown(r), theta: r.theta, theta_se: r.thetaSeEarly });

const ohio = (reference: ReferenceCase) => {
  const table = tableOf(reference);
  const [age, smoke] = [table.numbers('age'), table.numbers('smoke')];
  const terms = [...plain(table, 'age', 'smoke'), { name: 'age:smoke', values: age.map((value, row) => value * smoke[row]!) }];
  const correlation = reference.id.endsWith('exchangeable') ? 'exchangeable' : 'independence';
  const r = must(gee({ y: table.numbers('resp'), terms, cluster: table.numbers('id'), kind: 'logistic', correlation }));
  return { coef: by(r.coefficients, 'estimate'), robust_se: by(r.coefficients, 'se'), alpha: r.alpha };
};

runTopic('09-glm', {
  'poisson-doctors': (reference) => {
    const table = tableOf(reference);
    const terms = [...plain(table, 'smoke'), ...contrasts('age', table.text('age'), ['40', '50', '60', '70', '80'])];
    return shown(must(poissonRegression({ y: table.numbers('deaths'), terms, exposure: table.numbers('person_years') })));
  },
  'negbin-quine': (reference) => {
    const table = tableOf(reference);
    const factors: [string, string[]][] = [['Eth', ['A', 'N']], ['Sex', ['F', 'M']], ['Age', ['F0', 'F1', 'F2', 'F3']], ['Lrn', ['AL', 'SL']]];
    const terms = factors.flatMap(([name, levels]) => contrasts(name, table.text(name), levels));
    return negative(must(negativeBinomial({ y: table.numbers('Days'), terms })));
  },
  'negbin-offset': (reference) => {
    const table = tableOf(reference);
    return negative(must(negativeBinomial({ y: table.numbers('events'), terms: plain(table, 'arm'), exposure: table.numbers('py') })));
  },
  'poisson-cluster-site': (reference) => {
    const table = tableOf(reference);
    return shown(must(poissonRegression({ y: table.numbers('events'), terms: plain(table, 'arm'), exposure: table.numbers('py'), cluster: table.numbers('site') })));
  },
  'logistic-birthwt': (reference) => {
    const table = tableOf(reference);
    const terms = [...plain(table, 'age', 'lwt'), ...contrasts('race', table.text('race'), ['1', '2', '3']), ...plain(table, 'smoke', 'ptl', 'ht', 'ui')];
    const input: GlmInput = { y: table.numbers('low'), terms };
    const limits = profileLimits(input, { kind: 'logistic', interpolated: true });
    return {
      ...shown(must(logisticRegression(input))),
      profile_lower: Object.fromEntries(limits.map(({ name, lower }) => [name, lower])),
      profile_upper: Object.fromEntries(limits.map(({ name, upper }) => [name, upper])),
    };
  },
  'logistic-grouped-esoph': (reference) => {
    const table = tableOf(reference);
    const cases = table.numbers('ncases');
    const terms = [...contrasts('agegp', table.text('agegp'), ['25-34', '35-44', '45-54', '55-64', '65-74', '75+']), ...plain(table, 'tob', 'alc')];
    return shown(must(logisticRegression({ y: cases, trials: table.numbers('ncontrols').map((value, row) => value + cases[row]!), terms })));
  },
  'gee-ohio-': ohio,
});

const count = fc.integer({ min: 0, max: 9 });
const years = fc.integer({ min: 1, max: 40 }).map((quarters) => quarters / 4);

describe('regressions by hand', () => {
  test('Poisson on one group column gives the crude rates and their Wald errors (exact)', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(count, years, fc.boolean()), { minLength: 4, maxLength: 20 }), (rows) => {
        const sum = (of: boolean, at: 0 | 1): number => rows.filter((row) => row[2] === of).reduce((total, row) => total + row[at], 0);
        fc.pre(sum(true, 0) > 0 && sum(false, 0) > 0);
        const r = must(poissonRegression({ y: rows.map((row) => row[0]), exposure: rows.map((row) => row[1]), terms: [{ name: 'group', values: rows.map((row) => (row[2] ? 1 : 0)) }] }));
        const [a, b] = [sum(true, 0), sum(false, 0)];
        expect(r.coefficients[1]!.estimate).toBeCloseTo(Math.log(a / sum(true, 1)) - Math.log(b / sum(false, 1)), 9);
        expect(r.coefficients[1]!.se).toBeCloseTo(Math.sqrt(1 / a + 1 / b), 7);
        expect(r.events).toBe(a + b);
      }),
    );
  });

  test('logistic on a 2 x 2 table gives the odds ratio ad/bc with standard error sqrt(1/a + 1/b + 1/c + 1/d)', () => {
    fc.assert(
      fc.property(fc.tuple(...Array.from({ length: 4 }, () => fc.integer({ min: 1, max: 40 }))) as fc.Arbitrary<number[]>, ([a, b, c, d]) => {
        const r = must(logisticRegression({ y: [a!, c!], trials: [a! + b!, c! + d!], terms: [{ name: 'x', values: [1, 0] }] }));
        expect(r.ratios[1]!.estimate).toBeCloseTo((a! * d!) / (b! * c!), 8);
        expect(r.coefficients[1]!.se).toBeCloseTo(Math.sqrt(1 / a! + 1 / b! + 1 / c! + 1 / d!), 7);
        expect(Math.abs(r.deviance)).toBeLessThan(1e-10);
      }),
    );
  });

  test('row order and the origin and unit of a covariate change nothing but its own coefficient', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(count, fc.integer({ min: 0, max: 30 })), { minLength: 6, maxLength: 20 }), (rows) => {
        fc.pre(rows.filter(([y]) => y > 0).length > 2 && new Set(rows.filter(([y]) => y > 0).map(([, x]) => x)).size > 2);
        const of = (list: typeof rows, week: (x: number) => number): Glm => must(poissonRegression({ y: list.map(([y]) => y), terms: [{ name: 'x', values: list.map(([, x]) => week(x)) }] }));
        const here = of(rows, (x) => x);
        const there = of(rows.toReversed(), (x) => 7 * x + 1e6);
        expect(there.deviance).toBeCloseTo(here.deviance, 7);
        expect(7 * there.coefficients[1]!.estimate!).toBeCloseTo(here.coefficients[1]!.estimate!, 7);
        expect(7 * there.robust[1]!.se).toBeCloseTo(here.robust[1]!.se, 7);
      }),
    );
  });

  test('every row its own cluster is the robust error without clusters', () => {
    const y = [2, 0, 5, 1, 3, 0, 2];
    const terms = [{ name: 'x', values: [1, 2, 3, 4, 5, 6, 7] }];
    const r = must(poissonRegression({ y, terms, cluster: [7, 6, 5, 4, 3, 2, 1] }));
    expect(by(r.clustered!.uncorrected, 'se')).toEqual(by(r.robust, 'se'));
    expect(must(poissonRegression({ y, terms, cluster: y.map(() => 1) })).clustered).toMatchObject({ clusters: 1, corrected: null });
  });

  test('the exact profile limits are where the deviance has risen by the chi-square quantile, near the printed ones', () => {
    const table = tableOf({ dataset: { file: 'datasets/birthwt.csv' } } as ReferenceCase);
    const input = { y: table.numbers('low'), terms: plain(table, 'smoke', 'ht') };
    const exact = profileLimits(input, { kind: 'logistic' });
    const printed = profileLimits(input, { kind: 'logistic', interpolated: true });
    const full = must(logisticRegression(input)).logLikelihood;
    exact.forEach(({ lower, upper }, k) => {
      expect(Math.abs(lower! - printed[k]!.lower!)).toBeLessThan(1e-3);
      expect(Math.abs(upper! - printed[k]!.upper!)).toBeLessThan(1e-3);
    });
    // Hold smoke at its upper limit by an offset that no other column can undo: two cells, fitted by hand.
    const held = exact[1]!.upper!;
    const best = Array.from({ length: 4001 }, (_, i) => -4 + i / 1000).reduce((most, base) => {
      const ht = innerBest(table, base, held);
      return Math.max(most, ht);
    }, -Infinity);
    expect(2 * (full - best)).toBeCloseTo(1.959963984540054 ** 2, 4);
  });
});

/** Largest log likelihood over the coefficient of ht, intercept and smoke held; by bisection of its score. */
function innerBest(table: Table, base: number, smoke: number): number {
  const [y, s, h] = [table.numbers('low'), table.numbers('smoke'), table.numbers('ht')];
  const at = (ht: number) => y.reduce(([value, score], yi, i) => {
    const eta = base + smoke * s[i]! + ht * h[i]!;
    const p = 1 / (1 + Math.exp(-eta));
    return [value + (yi === 1 ? Math.log(p) : Math.log(1 - p)), score + h[i]! * (yi - p)] as [number, number];
  }, [0, 0] as [number, number]);
  let [low, high] = [-10, 10];
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2;
    if (at(middle)[1] > 0) low = middle;
    else high = middle;
  }
  return at((low + high) / 2)[0];
}

describe('separation is found and said', () => {
  const x = [1, 2, 3, 4, 5, 6, 7, 8];
  const named = (values: number[]): Term[] => [{ name: 'dose', values }];

  test('complete: no overlap at all', () => {
    expect(logisticRegression({ y: [0, 0, 0, 0, 1, 1, 1, 1], terms: named(x) })).toMatchObject({ fitted: false, reason: expect.stringContaining('Separation: dose') });
  });

  test('quasi-complete: overlap at one value only, and one more column that does not separate', () => {
    const terms = [...named([1, 2, 3, 4, 4, 5, 6, 7]), { name: 'age', values: [3, 1, 4, 1, 5, 9, 2, 6] }];
    const r = logisticRegression({ y: [0, 0, 0, 0, 1, 1, 1, 1], terms: terms.slice(0, 1) });
    expect(r).toMatchObject({ fitted: false, reason: expect.stringContaining('dose') });
    expect(logisticRegression({ y: [0, 0, 0, 0, 1, 1, 1, 1], terms })).toMatchObject({ fitted: false });
  });

  test('a group without events is named, in a logistic and in a Poisson model', () => {
    const group = [{ name: 'drain', values: [0, 0, 0, 0, 0, 1, 1, 1] }, { name: 'x', values: [1, 4, 2, 5, 3, 2, 4, 1] }];
    const y = [0, 1, 1, 0, 1, 0, 0, 0];
    for (const r of [logisticRegression({ y, terms: group }), poissonRegression({ y, terms: group })]) {
      expect(r).toMatchObject({ fitted: false, reason: expect.stringContaining('Separation: drain tells') });
    }
  });

  test('overlapping outcomes are never refused (the likelihood has a finite maximum)', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.integer({ min: 0, max: 5 }), fc.boolean()), { minLength: 1, maxLength: 30 }), (rows) => {
        // One event and one non-event at both ends: no line parts them.
        const all = [...rows, [0, true], [0, false], [5, true], [5, false]] as [number, boolean][];
        const r = must(logisticRegression({ y: all.map(([, y]) => (y ? 1 : 0)), terms: named(all.map(([value]) => value)) }));
        expect(r.converged).toBe(true);
        expect(Math.abs(r.coefficients[1]!.estimate!)).toBeLessThan(10);
      }),
    );
  });

  test('separated outcomes are always refused, wherever the gap lies', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -50, max: 50 }), { minLength: 4, maxLength: 25 }), fc.integer({ min: -30, max: 30 }), (values, cut) => {
        const y = values.map((value) => (value > cut ? 1 : 0));
        fc.pre(new Set(y).size === 2);
        expect(logisticRegression({ y, terms: named(values) })).toMatchObject({ fitted: false, reason: expect.stringContaining('Separation') });
      }),
    );
  });

  test('no events, all events, no rows', () => {
    expect(poissonRegression({ y: [0, 0, 0], terms: [] })).toMatchObject({ fitted: false, reason: expect.stringContaining('same in every row') });
    expect(logisticRegression({ y: [1, 1, 1], terms: [] })).toMatchObject({ fitted: false });
    expect(poissonRegression({ y: [], terms: [] })).toMatchObject({ fitted: false, n: 0 });
    expect(negativeBinomial({ y: [0, 0], terms: [] })).toMatchObject({ fitted: false });
  });
});

describe('negative binomial at its edges', () => {
  test('counts less spread than Poisson: the dispersion is 0, the fit is Poisson and says so', () => {
    const y = [2, 2, 3, 2, 2, 3, 2, 2];
    const terms = [{ name: 'x', values: [1, 2, 3, 4, 5, 6, 7, 8] }];
    const r = must(negativeBinomial({ y, terms }));
    expect(r).toMatchObject({ theta: null, alpha: 0, notes: [expect.stringContaining('Poisson')] });
    expect(r.coefficients[1]!.estimate).toBe(must(poissonRegression({ y, terms })).coefficients[1]!.estimate);
  });

  test('one mean: the score of theta is zero at the answer, term by term', () => {
    const y = [0, 0, 1, 4, 9, 0, 2, 14, 0, 3];
    const r = must(negativeBinomial({ y, terms: [] }));
    const mu = y.reduce((a, b) => a + b, 0) / y.length;
    expect(r.ratios[0]!.estimate).toBeCloseTo(mu, 9);
    const theta = r.theta!;
    const score = y.reduce((sum, count) => {
      let rise = 0;
      for (let k = 0; k < count; k++) rise += 1 / (theta + k);
      return sum + rise + Math.log(theta / (theta + mu)) + (mu - count) / (theta + mu);
    }, 0);
    expect(Math.abs(score)).toBeLessThan(1e-9);
    expect(Math.abs(r.thetaSe! / r.thetaSeEarly! - 1)).toBeLessThan(1e-3);
  });
});

describe('estimating equations at their edges', () => {
  test('independence is the logistic fit; a correlation without pairs is refused', () => {
    const y = [0, 1, 1, 0, 1, 0, 0, 1];
    const terms = [{ name: 'x', values: [1, 2, 3, 4, 5, 6, 7, 9] }];
    const cluster = [1, 1, 2, 2, 3, 3, 4, 4];
    const logistic = must(logisticRegression({ y, terms, cluster }));
    const r = must(gee({ y, terms, cluster, kind: 'logistic', correlation: 'independence' }));
    expect(r.coefficients[1]!.estimate).toBeCloseTo(logistic.coefficients[1]!.estimate!, 10);
    expect(r.coefficients[1]!.se).toBeCloseTo(logistic.clustered!.uncorrected[1]!.se, 8);
    expect(gee({ y, terms, cluster: [1, 2, 3, 4, 5, 6, 7, 8], kind: 'logistic', correlation: 'exchangeable' })).toMatchObject({ fitted: false });
  });

  test('misuse is refused', () => {
    expect(() => logisticRegression({ y: [0, 2], terms: [] })).toThrow(RangeError);
    expect(() => poissonRegression({ y: [0.5, 2], terms: [] })).toThrow(RangeError);
    expect(() => poissonRegression({ y: [1, 2], terms: [], exposure: [0, 1] })).toThrow(RangeError);
    expect(() => logisticRegression({ y: [3, 1], trials: [2, 2], terms: [] })).toThrow(RangeError);
    expect(() => poissonRegression({ y: [1, 2, 3], terms: [{ name: 'a', values: [1, 1, 1] }] })).toThrow(RangeError);
    expect(() => poissonRegression({ y: [1, 2, 3], terms: [{ name: 'a', values: [1, 2, 3] }, { name: 'a', values: [3, 2, 5] }] })).toThrow(RangeError);
  });
});

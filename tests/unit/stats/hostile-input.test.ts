import { describe, expect, test } from 'vitest';
import * as stats from '@/stats/index';
import { Xoshiro128 } from '@/stats/random/xoshiro128';

/** Paths of numbers in an answer that are NaN or infinite; `undefined` counts too, since JSON drops it. */
function nonNumbers(value: unknown, path = ''): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [`${path} = ${value}`];
  if (value === undefined) return [`${path} = undefined`];
  if (ArrayBuffer.isView(value)) return [...(value as Float64Array)].every(Number.isFinite) ? [] : [`${path}[]`];
  if (Array.isArray(value)) return value.flatMap((entry) => nonNumbers(entry, `${path}[]`));
  if (value === null || typeof value !== 'object') return [];
  return Object.entries(value).flatMap(([key, entry]) => nonNumbers(entry, `${path}.${key}`));
}

/** An answer without NaN or Infinity, or a RangeError: nothing else, and the input is as it was. */
function answersOrRefuses(what: string, input: readonly ArrayLike<number>[], run: () => unknown, documented = /^$/): void {
  const before = input.map((column) => Array.from(column, String).join());
  try {
    const bad = nonNumbers(run()).filter((path) => !documented.test(path));
    expect(bad, `${what} of ${before.join(' | ')}`).toEqual([]);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    expect(error.message, what).not.toMatch(/Maximum call stack|allocation|array length/);
  }
  expect(input.map((column) => Array.from(column, String).join()), `${what} changed its input`).toEqual(before);
}

const source = Xoshiro128.fromSeed(7);
const chance = (): number => stats.nextDouble(source);

type Column = (n: number) => number[];
const fill = (of: (i: number) => number): Column => (n) => Array.from({ length: n }, (_, i) => of(i));
const lastIs = (odd: number): Column => (n) => Array.from({ length: n }, (_, i) => (i === n - 1 ? odd : Math.floor(4 * chance())));

const columns: Readonly<Record<string, Column>> = {
  'all tied': fill(() => 5),
  zeros: fill(() => 0),
  'a few values': fill(() => Math.floor(3 * chance())),
  continuous: fill(() => 10 * chance()),
  'in order': fill((i) => i),
  'a thousand million and little': fill(() => 1e9 + Math.floor(5 * chance())),
  'sums that are not what they say': fill((i) => [0.1 + 0.2, 0.3, 0.7 + 0.1, 0.8][i % 4]!),
  'nothing but gaps': fill(() => NaN),
  'around 1e300': fill(() => (chance() - 0.5) * 1e300),
  'around 1e-300': fill(() => chance() * 1e-300),
  ...Object.fromEntries([NaN, Infinity, -Infinity, -1, 0.5, -0, 3e9, 1e16, 1e300].map((odd) => [`one ${odd}`, lastIs(odd)])),
};
const sizes = [0, 1, 2, 7];

describe('no column makes an estimator answer NaN or Infinity, throw anything but a RangeError, or change its input', () => {
  test('of one column', () => {
    for (const n of sizes) for (const [name, make] of Object.entries(columns)) {
      const a = Object.freeze(make(n));
      const run = (what: string, of: () => unknown): void => answersOrRefuses(`${what}, ${n} rows, ${name}`, [a], of);
      run('moments', () => stats.moments(a));
      run('meanAndDeviation', () => stats.meanAndDeviation(a));
      run('exactMedian', () => stats.exactMedian(a));
      run('medianLimits', () => stats.medianLimits(a));
      run('quantile', () => stats.quantile(a, [0, 0.1, 0.5, 1]));
      run('weeklyProgression', () => stats.weeklyProgression(a));
      run('digitPreference', () => stats.digitPreference(a));
      run('personTime', () => stats.personTime(a));
      run('missingPatterns', () => stats.missingPatterns({ a }));
    }
  });

  test('of two or three columns', () => {
    const names = Object.keys(columns);
    for (const n of sizes) for (const first of names) for (const second of names) {
      const third = names[Math.floor(chance() * names.length)]!;
      const [a, b, c] = [first, second, third].map((name) => Object.freeze(columns[name]!(n))) as [number[], number[], number[]];
      const terms = [{ name: 'b', values: b }];
      const outcome = a.map((value) => (value > 1 ? 1 : 0));
      const run = (what: string, of: () => unknown): void => answersOrRefuses(`${what}, ${n} rows, ${first}, ${second}, ${third}`, [a, b, c], of);
      run('theilSen', () => stats.theilSen(a, b));
      run('oneWayAnova', () => stats.oneWayAnova(a, b));
      run('leastSquares', () => stats.leastSquares(a, [b]));
      run('quantileBands', () => stats.quantileBands(a, b, [0.1, 0.5]));
      run('blandAltman', () => stats.blandAltman(a, b));
      run('technicalError', () => stats.technicalError(a, b));
      run('icc', () => stats.icc([a, b]));
      run('icc', () => stats.icc([a, b, c]));
      run('measurementError', () => stats.measurementError([a, b]));
      run('clusteredProportion', () => stats.clusteredProportion(outcome, b));
      run('ruleAdherence', () => stats.ruleAdherence(a, b, c));
      run('missingByVisit', () => stats.missingByVisit(a, b, c));
      run('poissonRegression', () => stats.poissonRegression({ y: a, terms, exposure: c, cluster: a }));
      run('negativeBinomial', () => stats.negativeBinomial({ y: a, terms, exposure: c }));
      run('logisticRegression', () => stats.logisticRegression({ y: outcome, terms, cluster: c }));
      run('gee', () => stats.gee({ y: outcome, terms, cluster: c, kind: 'logistic', correlation: 'exchangeable' }));
      run('mixedModel', () => stats.mixedModel({ y: a, fixed: terms, person: c, slope: b }));
    }
  }, 60_000);

  test('of follow-up: ties, delayed and unsorted entry, all or none with the event, empty groups', () => {
    // Arrays of a curve say NaN where a limit does not exist (survival 0), as their types tell.
    const curve = /\.(se|lower|upper)\[\]/;
    for (const n of [0, 1, 2, 3, 6, 25]) for (let round = 0; round < 60; round++) {
      const time = Float64Array.from({ length: n }, () => (round % 3 === 0 ? 9 * chance() : round % 3 === 1 ? Math.ceil(5 * chance()) : 0.1 + 0.2 * Math.ceil(3 * chance())));
      const event = Uint8Array.from({ length: n }, () => (round % 5 === 0 ? 0 : round % 5 === 1 ? 1 : chance() < 0.6 ? 1 : 0));
      const entry = Float64Array.from(time, (t) => t * chance() * 0.95);
      const x = [Float64Array.from({ length: n }, () => Math.floor(3 * chance())), Float64Array.from(time, (t) => (round % 2 === 0 ? t : chance()))];
      const group = Uint8Array.from({ length: n }, () => 2 * Math.floor(2 * chance()));
      const cause = Uint8Array.from({ length: n }, () => Math.floor(3 * chance()));
      const data = round % 4 < 2 ? { time, event } : { time, event, entry };
      const run = (what: string, of: () => unknown): void => answersOrRefuses(`${what}, ${n} rows`, [time, event, entry, ...x, group], of, curve);
      run('kaplanMeier', () => stats.kaplanMeier(data));
      run('rmst', () => stats.rmst(stats.kaplanMeier(data), 3));
      run('quantileOf', () => stats.quantileOf(stats.kaplanMeier(data), 0.5));
      for (const rho of [0, 1, -1]) run(`logRank ${rho}`, () => stats.logRank({ ...data, group }, { rho, groups: 4 }));
      run('cumulativeIncidence', () => stats.cumulativeIncidence({ time, cause }));
      run('grayTest', () => stats.grayTest({ time, cause, group }));
      run('cox', () => stats.cox({ ...data, x }, { robust: true }));
      run('cox, strata and one cluster', () => stats.cox({ ...data, x, stratum: group, cluster: new Uint8Array(n) }));
      run('firthCox', () => stats.firthCox({ ...data, x, stratum: group }));
      const right = time.map((t, i) => (event[i] === 1 ? t + (i % 3) : Infinity));
      run('intervalRegression', () => stats.intervalRegression({ left: time, right, x: [x[0]!] }));
      answersOrRefuses('intervalOnset', [time, right], () => stats.intervalOnset({ left: time, right }), /right\[\]/);
    }
  });
});

describe('what was once a wild answer', () => {
  test('the ratio of an intercept a thousand million units away is no number, and says so', () => {
    const year = [1e9, 1e9 + 1, 1e9 + 2, 1e9 + 3, 1e9, 1e9 + 2];
    const fit = stats.poissonRegression({ y: [5, 3, 2, 1, 4, 3], terms: [{ name: 'year', values: year }] });
    expect(fit).toMatchObject({ fitted: true, ratios: [{ estimate: null, reason: expect.stringContaining('largest number') }, { estimate: expect.any(Number) }] });
  });

  test('a working correlation that runs out of range is refused', () => {
    const fit = stats.gee({ y: [0, 1, 1, 0, 1, 0, 0], terms: [{ name: 'b', values: [0, 2, 0, 3, 2, 1, 0] }], cluster: [3, 2, 0, 0, 2, 2, 0], kind: 'logistic', correlation: 'exchangeable' });
    if (fit.fitted) expect(Math.abs(fit.alpha!)).toBeLessThan(1);
    else expect(fit.reason).toMatch(/working correlation/);
  });

  test('when one Cox coefficient runs away, one that loses its information with it has no estimate either', () => {
    // R 4.2.2, survival 3.5-3: does not converge; -380 (standard error 5.5e6) and 29 (6.1e4).
    const fit = stats.cox({
      time: Float64Array.of(2, 1, 2, 1, 5, 1),
      event: Uint8Array.of(0, 1, 0, 1, 1, 0),
      x: [Float64Array.of(0.946, 0.953, 0.779, 0.924, 0.035, 0.963), Float64Array.of(0.141, 0.991, 0.518, 0.954, 0.24, 0.353)],
      stratum: Uint8Array.of(1, 1, 0, 2, 0, 1),
    });
    for (const { estimate, se, reason } of fit.coefficients) expect([estimate, se, reason]).toEqual([null, null, expect.stringContaining('monotone')]);
    expect(fit.logLikelihood).toBeLessThanOrEqual(0);
  });

  test("Gray's test without a variance says why (cmprsk 2.2-11 stops with an error on these rows)", () => {
    const time = Float64Array.of(2.7, 6.02, 3.08, 2.52, 8.8, 8.47);
    const answer = stats.grayTest({ time, cause: Uint8Array.of(0, 1, 1, 0, 1, 1), group: Uint8Array.of(0, 2, 2, 2, 1, 0) });
    expect(answer).toMatchObject({ chiSquare: null, p: null, variance: null, reason: expect.stringContaining('reaches 1') });
  });

  test('a negative weight of a curve that has fallen to 0', () => {
    const data = { time: Float64Array.of(1, 5, 6), event: Uint8Array.of(1, 1, 1), entry: Float64Array.of(0, 2, 2), group: Uint8Array.of(0, 1, 0) };
    expect(stats.logRank(data, { rho: -1 })).toMatchObject({ chiSquare: null, p: null, reason: expect.stringContaining('infinite') });
    expect(stats.logRank(data, { rho: 0 }).chiSquare).not.toBeNull();
  });

  test('fourfold tables beyond reach are refused in words', () => {
    expect(() => stats.fisherExact({ a: 2e9, b: 2e9, c: 2e9, d: 2e9 })).toThrow(/share these margins/);
  });

  test('a million subjects with a visit each cost a sort, not a table of subjects by visits', () => {
    const n = 200_000;
    const own = Float64Array.from({ length: n }, (_, i) => i);
    const answer = stats.missingByVisit(own, own, own.map((value) => (value === 3 ? NaN : value)));
    expect([answer.n, answer.visits.length, answer.complete, answer.monotone]).toEqual([n, n, 0, 2]); // never seen, and seen at the first visit
  });
});

describe('the same numbers in other clothes', () => {
  const time = [0.1 + 0.2, 0.3, 5, 2, 7, 7];
  const event = [1, 0, 1, 1, 0, 1];
  const padded = new Float64Array(9);
  padded.set(time, 3);

  test('a view into a larger buffer, and -0 for 0', () => {
    const plain = { time: Float64Array.from(time), event: Uint8Array.from(event) };
    const view = { time: padded.subarray(3), event: Uint8Array.from(event) };
    expect(stats.kaplanMeier(view)).toEqual(stats.kaplanMeier(plain));
    expect(stats.cox({ ...view, x: [padded.subarray(3)] })).toEqual(stats.cox({ ...plain, x: [plain.time] }));
    const zeros = (zero: number) => stats.kaplanMeier({ time: Float64Array.of(zero, 3, zero, 1.5), event: Uint8Array.of(1, 1, 0, 1) });
    expect([...zeros(-0).survival]).toEqual([...zeros(0).survival]);
  });

  test('entry at the exit is refused: such a row is at risk for no time', () => {
    expect(() => stats.kaplanMeier({ time: Float64Array.of(1, 2), event: Uint8Array.of(1, 1), entry: Float64Array.of(1, 0) })).toThrow(RangeError);
    expect(() => stats.kaplanMeier({ time: Float64Array.of(0.3), event: Uint8Array.of(1), entry: Float64Array.of(0.1 + 0.2) })).toThrow(RangeError);
  });
});

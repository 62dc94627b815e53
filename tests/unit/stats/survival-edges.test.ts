/** What a hostile reader would feed the survival estimators: empty, single, all tied, all censored, separated. */
import { describe, expect, test } from 'vitest';
import { cox } from '@/stats/survival/cox';
import { cumulativeHazard, predictSurvival } from '@/stats/survival/cox-baseline';
import { proportionalHazardsTest } from '@/stats/survival/cox-ph-test';
import { cumulativeIncidence, incidenceAt } from '@/stats/survival/cumulative-incidence';
import { grayTest } from '@/stats/survival/gray';
import { intervalOnset, onsetFreeAt } from '@/stats/survival/interval-onset';
import { intervalRegression } from '@/stats/survival/interval-regression';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { logRank } from '@/stats/survival/log-rank';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { quantileOf } from '@/stats/survival/quantile-of';
import { rmst, rmstDifference } from '@/stats/survival/rmst';
import { survivalAt } from '@/stats/survival/survival-at';

const f = (...values: number[]) => Float64Array.from(values);
const u = (...values: number[]) => Uint8Array.from(values);
const follow = (times: number[], events: number[]) => ({ time: f(...times), event: u(...events) });

describe('a survival curve', () => {
  test('of nobody says so and invents nothing', () => {
    const curve = kaplanMeier(follow([], []));
    expect(curve).toMatchObject({ n: 0, events: 0, leftOut: [] });
    expect(survivalAt(curve, 5)).toMatchObject({ estimate: null, reason: 'no follow-up' });
    expect(quantileOf(curve, 0.5).estimate).toBeNull();
    expect(rmst(curve, 10).estimate).toBeNull();
    expect(numberAtRisk(follow([], []), [0])).toEqual([0]);
  });

  test('of one person with the event falls to 0, where limits do not exist', () => {
    const curve = kaplanMeier(follow([4], [1]));
    expect([...curve.survival]).toEqual([0]);
    expect(survivalAt(curve, 4)).toMatchObject({ estimate: 0, se: null, lower: null, upper: null });
    expect(survivalAt(curve, 3.999)).toMatchObject({ estimate: 1, se: 0, lower: 1, upper: 1 });
    expect(quantileOf(curve, 0.5)).toMatchObject({ estimate: 4, lower: null, upper: null });
    expect(rmst(curve, 10)).toMatchObject({ estimate: 4, se: 0 });
  });

  test('of people all censored stays at 1', () => {
    const curve = kaplanMeier(follow([3, 5, 5], [0, 0, 0]));
    expect([...curve.survival]).toEqual([1, 1]);
    expect([...curve.upper]).toEqual([1, 1]);
    expect(quantileOf(curve, 0.1)).toMatchObject({ estimate: null, reason: 'the curve does not fall to 0.9' });
    expect(survivalAt(curve, 9)).toMatchObject({ estimate: 1, beyond: true });
    expect(rmst(curve, 5)).toMatchObject({ estimate: 5, se: 0 });
    expect(rmst(curve, 6)).toMatchObject({ estimate: null, reason: 'follow-up ends before 6' });
  });

  test('takes 0.1 + 0.2 and 0.3 as one time, and an event there before a censoring', () => {
    const curve = kaplanMeier(follow([0.1 + 0.2, 0.3, 0.3, 0.4], [1, 0, 1, 0]));
    expect(curve.time.length).toBe(2);
    expect([...curve.atRisk]).toEqual([4, 1]);
    expect(curve.survival[0]).toBe(0.5);
    expect(survivalAt(curve, 0.3).estimate).toBe(0.5);
    expect(survivalAt(curve, 0.1 + 0.2).estimate).toBe(0.5);
    expect(numberAtRisk(follow([0.1 + 0.2, 0.3], [1, 1]), [0.3])).toEqual([2]);
  });

  test('lets nobody in at the very time of entry, rounding or not', () => {
    const data = { ...follow([0.3, 0.5, 0.6], [1, 1, 0]), entry: f(0, 0.1 + 0.2, 0.2) };
    expect(kaplanMeier(data).atRisk[0]).toBe(2);
    expect(() => kaplanMeier({ ...follow([0.3], [1]), entry: f(0.1 + 0.2) })).toThrow(RangeError);
  });

  test('that falls to 0 among early entrants says so, and can be asked for from later on', () => {
    const data = { ...follow([2, 5, 6, 7, 8], [1, 1, 0, 1, 0]), entry: f(0, 3, 3, 3, 4) };
    const curve = kaplanMeier(data);
    expect([...curve.survival]).toEqual([0, 0, 0, 0, 0]);
    expect(curve.notes).toHaveLength(1);
    const later = kaplanMeier(data, { given: 3 });
    expect(later.notes).toEqual([]);
    expect(later.leftOut).toEqual([{ reason: 'follow-up ended by 3', count: 1 }]);
    expect(later.survival[0]).toBe(0.75);
    expect(later.survival[2]).toBe(0.375);
  });

  test('leaves out missing times and counts them', () => {
    const curve = kaplanMeier(follow([3, NaN, 5], [1, 1, 0]));
    expect(curve).toMatchObject({ n: 2, events: 1, leftOut: [{ reason: 'time missing', count: 1 }] });
  });

  test('refuses misuse', () => {
    expect(() => kaplanMeier(follow([1, 2], [1]))).toThrow(RangeError);
    expect(() => kaplanMeier(follow([-1], [1]))).toThrow(RangeError);
    expect(() => kaplanMeier(follow([Infinity], [0]))).toThrow(RangeError);
    expect(() => kaplanMeier(follow([1], [2]))).toThrow(RangeError);
    expect(() => kaplanMeier(follow([1], [1]), { level: 95 })).toThrow(RangeError);
    expect(() => quantileOf(kaplanMeier(follow([1], [1])), 1)).toThrow(RangeError);
    expect(() => rmst(kaplanMeier(follow([1], [1])), 0)).toThrow(RangeError);
  });

  test('two restricted means differ by a tested amount, or by none that can be tested', () => {
    const a = rmst(kaplanMeier(follow([2, 4, 6, 8, 10], [1, 1, 0, 1, 0])), 8);
    const b = rmst(kaplanMeier(follow([1, 2, 3, 9, 10], [1, 1, 1, 0, 0])), 8);
    const difference = rmstDifference(a, b);
    expect(difference.estimate).toBeCloseTo(a.estimate! - b.estimate!, 12);
    expect(difference.p).toBeGreaterThan(0.05);
    const still = rmst(kaplanMeier(follow([9], [0])), 8);
    expect(rmstDifference(still, still)).toMatchObject({ estimate: 0, p: null });
  });
});

describe('tests between groups', () => {
  const rows = { time: f(1, 2, 3, 4, 5, 6), event: u(1, 1, 1, 1, 0, 1) };

  test('an empty group costs no degree of freedom', () => {
    const two = logRank({ ...rows, group: u(0, 1, 0, 1, 0, 1) });
    const three = logRank({ ...rows, group: u(0, 2, 0, 2, 0, 2) });
    expect(three.df).toBe(two.df);
    expect(three.chiSquare).toBeCloseTo(two.chiSquare!, 12);
    expect(three.groups[1]).toEqual({ n: 0, observed: 0, expected: 0 });
    const incidence = (group: Uint8Array) => grayTest({ time: rows.time, cause: rows.event, group });
    expect(incidence(u(0, 2, 0, 2, 0, 2)).chiSquare).toBeCloseTo(incidence(u(0, 1, 0, 1, 0, 1)).chiSquare!, 12);
  });

  test('no events, one group, or nobody: no test, and why', () => {
    const why = 'no event at a time when two groups were at risk';
    expect(logRank({ ...rows, event: u(0, 0, 0, 0, 0, 0), group: u(0, 1, 0, 1, 0, 1) })).toMatchObject({ chiSquare: null, p: null, reason: why });
    expect(logRank({ ...rows, group: u(0, 0, 0, 0, 0, 0) })).toMatchObject({ chiSquare: null, reason: why });
    expect(logRank({ time: f(), event: u(), group: u() })).toMatchObject({ n: 0, chiSquare: null });
    expect(grayTest({ time: rows.time, cause: u(2, 2, 0, 2, 0, 2), group: u(0, 1, 0, 1, 0, 1) }).p).toBeNull();
  });

  test('everyone at one time: all die together, nothing to compare', () => {
    expect(logRank({ time: f(5, 5, 5, 5), event: u(1, 1, 1, 1), group: u(0, 1, 0, 1) }).chiSquare).toBeNull();
  });

  test('groups that never meet in a risk set are not compared', () => {
    const result = logRank({ time: f(1, 2, 6, 7), event: u(1, 1, 1, 1), entry: f(0, 0, 5, 5), group: u(0, 0, 1, 1) });
    expect(result).toMatchObject({ chiSquare: null, df: 0 });
  });

  test('refuses negative codes and the wrong number of scores', () => {
    expect(() => logRank({ ...rows, group: Int32Array.of(0, 1, 0, -1, 0, 1) })).toThrow(RangeError);
    expect(() => logRank({ ...rows, group: u(0, 1, 0, 1, 0, 1) }, { scores: [1] })).toThrow(RangeError);
    expect(() => grayTest({ time: rows.time, cause: rows.event, group: u(0, 1) })).toThrow(RangeError);
  });
});

describe('competing causes', () => {
  test('an incidence that reaches 1 has no limits; a cause that never came has 0', () => {
    const curves = cumulativeIncidence({ time: f(1, 2, 3), cause: u(1, 1, 1) }, { causes: [1, 2] });
    expect(incidenceAt(curves, 1, 3)).toMatchObject({ lower: null, upper: null });
    expect(incidenceAt(curves, 1, 3).estimate).toBeCloseTo(1, 14);
    expect(incidenceAt(curves, 2, 3)).toMatchObject({ estimate: 0, se: 0, lower: 0, upper: 0 });
    expect(incidenceAt(cumulativeIncidence({ time: f(), cause: u() }), 1, 3).estimate).toBeNull();
  });

  test('all at one time, and all censored', () => {
    const tied = cumulativeIncidence({ time: f(2, 2, 2, 2), cause: u(1, 1, 2, 2) });
    expect(incidenceAt(tied, 1, 2).estimate).toBe(0.5);
    expect(incidenceAt(tied, 1, 2).se).toBeCloseTo(0.25, 14); // binomial: sqrt(.5 * .5 / 4)
    expect(cumulativeIncidence({ time: f(2, 3), cause: u(0, 0) }).causes).toEqual([]);
  });
});

describe('onset between visits', () => {
  test('intervals that touch do not overlap; an exact day lies in the interval it ends', () => {
    const touching = intervalOnset({ left: f(3, 6), right: f(6, 9) });
    expect(touching).toMatchObject({ left: [3, 6], right: [6, 9], mass: [0.5, 0.5] });
    const exact = intervalOnset({ left: f(6, 3, 6), right: f(6, 6, 9) });
    expect(exact).toMatchObject({ left: [6, 6], right: [6, 9], exact: [true, false] });
    exact.mass.forEach((mass, j) => expect(mass).toBeCloseTo([2 / 3, 1 / 3][j]!, 12));
    const rounded = intervalOnset({ left: f(0.1, 0.1 + 0.2), right: f(0.3, 0.4) });
    expect(rounded.mass).toEqual([0.5, 0.5]);
  });

  test('all right-censored: all mass beyond the last visit', () => {
    const fit = intervalOnset({ left: f(3, 5, 5), right: f(Infinity, Infinity, Infinity) });
    expect(fit).toMatchObject({ left: [5], right: [Infinity], mass: [1], logLikelihood: 0 });
    expect(onsetFreeAt(fit, 5)).toEqual({ lower: 1, upper: 1 });
    expect(onsetFreeAt(fit, 8)).toEqual({ lower: 0, upper: 1 });
  });

  test('rows without information or without an end are left out; ends out of order are refused', () => {
    const fit = intervalOnset({ left: f(0, 2, NaN), right: f(Infinity, 4, 3) });
    expect(fit.n).toBe(1);
    expect(fit.leftOut).toEqual([
      { reason: 'an end missing', count: 1 },
      { reason: 'no information on onset', count: 1 },
    ]);
    expect(() => intervalOnset({ left: f(4), right: f(3) })).toThrow(RangeError);
    expect(() => intervalOnset({ left: f(-1), right: f(3) })).toThrow(RangeError);
    expect(intervalOnset({ left: f(), right: f() })).toMatchObject({ n: 0, mass: [] });
  });

  test('weights stand for repeated rows', () => {
    const repeated = intervalOnset({ left: f(0, 0, 2, 1), right: f(3, 3, 4, 5) });
    const weighted = intervalOnset({ left: f(0, 2, 1), right: f(3, 4, 5), weight: f(2, 1, 1) });
    weighted.mass.forEach((mass, j) => expect(mass).toBeCloseTo(repeated.mass[j]!, 10));
    expect(weighted.logLikelihood).toBeCloseTo(repeated.logLikelihood, 10);
  });

  test('a Weibull fit without any onset has no maximum, and says so; so has a covariate that separates', () => {
    expect(intervalRegression({ left: f(3, 5), right: f(Infinity, Infinity) })).toMatchObject({ intercept: null, reason: 'no onset was seen: the rate is 0 and its scale infinite' });
    const separated = intervalRegression({ left: f(1, 2, 3, 9, 9, 9), right: f(2, 3, 5, Infinity, Infinity, Infinity), x: [f(0, 0, 0, 1, 1, 1)] }, { distribution: 'exponential' });
    expect(separated.coefficients).toEqual([null]);
    expect(separated.reason).toMatch(/separates/);
    const constant = intervalRegression({ left: f(1, 2, 3, 9), right: f(2, 3, 5, Infinity), x: [f(7, 7, 7, 7)] });
    expect(constant.reason).toMatch(/constant/);
  });

  test('an exponential fit to exact days is events over time; narrow intervals come to the same', () => {
    const times = [1.5, 2.25, 4, 8];
    const exact = intervalRegression({ left: f(...times), right: f(...times) }, { distribution: 'exponential' });
    expect(exact.scale).toBeCloseTo(times.reduce((a, b) => a + b) / 4, 10);
    const narrow = intervalRegression({ left: f(...times), right: f(...times.map((t) => t * (1 + 1e-9))) });
    const day = intervalRegression({ left: f(...times), right: f(...times) });
    expect(narrow.sigma).toBeCloseTo(day.sigma!, 7);
    expect(narrow.intercept).toBeCloseTo(day.intercept!, 7);
  });
});

describe('Cox regression', () => {
  const time = f(1, 2, 3, 4, 5, 6, 7, 8);
  const event = u(1, 1, 1, 1, 0, 1, 0, 1);

  test('a covariate that separates is flagged; the others keep their estimate', () => {
    const fit = cox({ time, event, x: [f(1, 1, 1, 1, 0, 0, 0, 0), f(1, 0, 2, 1, 0, 3, 1, 2)] }, { names: ['group', 'dose'] });
    expect(fit.coefficients[0]).toMatchObject({ name: 'group', estimate: null, se: null });
    expect(fit.coefficients[0]!.reason).toMatch(/monotone/);
    expect(fit.coefficients[1]!.estimate).not.toBeNull();
    expect(fit.wald.chiSquare).toBeNull();
    expect(fit.likelihoodRatio.p).toBeLessThan(0.05);
  });

  test('constants and combinations are stepped over with a reason', () => {
    const dose = f(1, 0, 2, 1, 0, 3, 1, 2);
    const alone = cox({ time, event, x: [dose] });
    const crowded = cox({ time, event, x: [dose, f(4, 4, 4, 4, 4, 4, 4, 4), dose.map((d) => 3 - 2 * d)] });
    expect(crowded.coefficients[0]!.estimate).toBeCloseTo(alone.coefficients[0]!.estimate!, 10);
    expect(crowded.coefficients[1]!.reason).toMatch(/constant/);
    expect(crowded.coefficients[2]!.estimate).toBeNull();
    expect(crowded.likelihoodRatio.df).toBe(1);
    const between = cox({ time, event, x: [dose, f(0, 1, 0, 1, 0, 1, 0, 1)], stratum: u(0, 1, 0, 1, 0, 1, 0, 1) });
    expect(between.coefficients[1]!.reason).toMatch(/constant/);
  });

  test('a covariate of a thousand million, and one of a thousand-millionth, cost no digits', () => {
    const dose = f(1, 0, 2, 1, 0, 3, 1, 2);
    const plain = cox({ time, event, x: [dose], cluster: u(0, 0, 1, 1, 2, 2, 3, 3) });
    const far = cox({ time, event, x: [dose.map((d) => 1e9 + d)], cluster: u(0, 0, 1, 1, 2, 2, 3, 3) });
    const tiny = cox({ time, event, x: [dose.map((d) => d * 1e-9)] });
    expect(far.coefficients[0]!.estimate).toBeCloseTo(plain.coefficients[0]!.estimate!, 9);
    expect(far.coefficients[0]!.robustSe).toBeCloseTo(plain.coefficients[0]!.robustSe!, 9);
    expect(tiny.coefficients[0]!.estimate! * 1e-9).toBeCloseTo(plain.coefficients[0]!.estimate!, 9);
    const huge = predictSurvival({ time, event, x: [dose.map((d) => 1e9 + d)] }, far, [1e9 + 1], [4])[0]!;
    const near = predictSurvival({ time, event, x: [dose] }, plain, [1], [4])[0]!;
    expect(huge.estimate).toBeCloseTo(near.estimate!, 8);
  });

  test('no events, no covariates, nobody', () => {
    const none = cox({ time, event: new Uint8Array(8), x: [f(1, 0, 2, 1, 0, 3, 1, 2)] });
    expect(none.coefficients[0]!.estimate).toBeNull();
    expect(none.likelihoodRatio).toMatchObject({ chiSquare: null, reason: 'no events' });
    const bare = cox({ time, event, x: [] });
    expect(bare.logLikelihood).toBe(bare.logLikelihoodNull);
    expect(bare.logLikelihood).toBeCloseTo(-Math.log(8 * 7 * 6 * 5 * 3 * 1), 12);
    const empty = cox({ time: f(), event: u(), x: [f()] });
    expect(empty).toMatchObject({ n: 0, events: 0 });
    expect(empty.coefficients[0]!.estimate).toBeNull();
    expect(proportionalHazardsTest({ time, event: new Uint8Array(8), x: [f(1, 0, 2, 1, 0, 3, 1, 2)] }, none).global.chiSquare).toBeNull();
  });

  test('without covariates the baseline is Nelson-Aalen', () => {
    const fit = cox({ time, event, x: [] }, { ties: 'breslow' });
    const [curve] = cumulativeHazard({ time, event, x: [] }, fit, []);
    expect(curve!.hazard[1]).toBeCloseTo(1 / 8 + 1 / 7, 14);
    expect(curve!.se[1]).toBeCloseTo(Math.sqrt(1 / 64 + 1 / 49), 14);
  });

  test('a hazard beyond the largest number is NaN, never infinite, and survival there is 0', () => {
    const data = { time, event, x: [f(1, 0, 2, 1, 0, 3, 1, 2)] };
    const fit = cox(data);
    const away = Math.sign(fit.coefficients[0]!.estimate!) * 1e6;
    const [curve] = cumulativeHazard(data, fit, [away]);
    expect([...curve!.hazard, ...curve!.se].every(Number.isNaN)).toBe(true);
    expect(predictSurvival(data, fit, [away], [8])[0]).toMatchObject({ estimate: 0, se: null, lower: null, upper: null, reason: 'predicted survival has reached 0' });
    // On the other side the hazard is 0 to the last digit, which is a number.
    const [calm] = cumulativeHazard(data, fit, [-away]);
    expect([...calm!.hazard]).toEqual([...calm!.hazard].map(() => 0));
  });

  test('everyone tied at one time has no information', () => {
    const fit = cox({ time: f(3, 3, 3), event: u(1, 1, 1), x: [f(1, 2, 3)] }, { ties: 'breslow' });
    expect(fit.coefficients[0]!.estimate).toBeCloseTo(0, 12);
  });

  test('rows that miss a covariate are left out; infinite ones, and odd columns, are refused', () => {
    const fit = cox({ time, event, x: [f(1, 0, 2, NaN, 0, 3, 1, 2)] });
    expect(fit).toMatchObject({ n: 7, leftOut: [{ reason: 'covariate missing', count: 1 }] });
    expect(() => cox({ time, event, x: [f(1, 0, 2, Infinity, 0, 3, 1, 2)] })).toThrow(RangeError);
    expect(() => cox({ time, event, x: [f(1)] })).toThrow(RangeError);
    expect(() => cox({ time, event, x: [time], cluster: u(1) })).toThrow(RangeError);
    expect(() => cox({ time, event, x: [time] }, { names: [] })).toThrow(RangeError);
    expect(() => predictSurvival({ time, event, x: [time] }, cox({ time, event, x: [time] }), [1, 2], [4])).toThrow(RangeError);
  });

  test('a late row of enormous weight leaves no trace in the earlier risk sets', () => {
    // Early rows tell of dose; one late entrant with a dose far outside takes off again before them.
    const data = { time: f(1, 2, 3, 4, 9), event: u(1, 1, 0, 1, 0), entry: f(0, 0, 0, 0, 5), x: [f(1, 0, 1, 0.5, 60)] };
    const with60 = cox(data);
    const without = cox({ time: f(1, 2, 3, 4), event: u(1, 1, 0, 1), x: [f(1, 0, 1, 0.5)] });
    expect(with60.coefficients[0]!.estimate).toBeCloseTo(without.coefficients[0]!.estimate!, 9);
    expect(with60.coefficients[0]!.se).toBeCloseTo(without.coefficients[0]!.se!, 9);
  });
});

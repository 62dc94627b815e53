import { describe, expect, test } from 'vitest';
import { leastSquares, type LeastSquares } from '@/stats/linear/least-squares';
import { meanAndDeviation } from '@/stats/linear/mean-and-deviation';
import { oneWayAnova } from '@/stats/linear/one-way-anova';
import { runTopic, tableOf, type Adapter, type ReferenceCase } from './reference';

const named = ({ coefficients, residualDeviation, rSquared, f }: LeastSquares) => ({
  b0: coefficients[0]?.estimate,
  b1: coefficients[1]?.estimate,
  se_b0: coefficients[0]?.standardError,
  se_b1: coefficients[1]?.standardError,
  coef: coefficients.map(({ estimate }) => estimate),
  residual_sd: residualDeviation,
  r_squared: rSquared,
  F: f,
});

const polynomial: Adapter = (reference) => {
  const table = tableOf(reference);
  const x = table.numbers('x');
  return named(leastSquares(table.numbers('y'), [1, 2, 3, 4, 5].map((power) => x.map((value) => value ** power))));
};

const throughOrigin: Adapter = (reference) => {
  const table = tableOf(reference);
  const fit = leastSquares(table.numbers('y'), [table.numbers('x')], { intercept: false });
  return { ...named(fit), b1: fit.coefficients[0]?.estimate, se_b1: fit.coefficients[0]?.standardError };
};

/** 'x1=10000001,x2=...' or '1.2 then 1.1,1.3 repeated 500 times' */
function valuesOf({ dataset }: ReferenceCase): number[] {
  const rule = dataset?.rule ?? '';
  if (rule.startsWith('x1=')) return rule.split(',').map((part) => Number(part.split('=')[1]));
  const [first = '', then = ''] = rule.split(' then ');
  const [low, high] = (/^[\d.,]+/.exec(then)?.[0] ?? '').split(',').map(Number) as [number, number];
  return [Number(first), ...Array.from({ length: 500 }, () => [low, high]).flat()];
}

runTopic('13-nist', {
  norris: (reference) => {
    const table = tableOf(reference);
    return named(leastSquares(table.numbers('y'), [table.numbers('x')]));
  },
  longley: (reference) => {
    const table = tableOf(reference);
    return named(leastSquares(table.numbers('y'), [1, 2, 3, 4, 5, 6].map((at) => table.numbers(`x${at}`))));
  },
  wampler: polynomial,
  noint: throughOrigin,
  'anova-': (reference) => {
    const table = tableOf(reference);
    const fit = oneWayAnova(table.numbers('y'), table.numbers('treatment'));
    return {
      n: fit.n,
      df_between: fit.degreesOfFreedomBetween,
      df_within: fit.degreesOfFreedomWithin,
      ss_between: fit.sumOfSquaresBetween,
      ss_within: fit.sumOfSquaresWithin,
      F: fit.f,
      r_squared: fit.rSquared,
      residual_sd: fit.residualDeviation,
    };
  },
  numacc: (reference) => {
    const { n, mean, standardDeviation } = meanAndDeviation(valuesOf(reference));
    return { n, mean, sd: standardDeviation };
  },
});

describe('linear regression at its edges', () => {
  test('a column that repeats another gets no coefficient, and the fit is that without it', () => {
    const y = [1, 3, 2, 5, 4];
    const x = [1, 2, 3, 4, 5];
    const twice = leastSquares(y, [x, x.map((value) => 3 * value + 1)]);
    expect(twice.coefficients[2]).toMatchObject({ estimate: null, standardError: null });
    expect(twice.coefficients[2]?.reason).toBeTruthy();
    const once = leastSquares(y, [x]);
    expect(twice.coefficients[1]?.estimate).toBeCloseTo(once.coefficients[1]?.estimate as number, 12);
    expect(twice.degreesOfFreedom).toBe(once.degreesOfFreedom);
  });

  test('a fit by hand: y = 1, 2, 4 at x = 0, 1, 2 has slope 3/2 and intercept 5/6', () => {
    const { coefficients, residualDeviation } = leastSquares([1, 2, 4], [[0, 1, 2]]);
    expect(coefficients[0]?.estimate).toBeCloseTo(5 / 6, 14);
    expect(coefficients[1]?.estimate).toBeCloseTo(3 / 2, 14);
    expect(residualDeviation).toBeCloseTo(Math.sqrt(1 / 6), 14);
  });

  test('misuse is refused, and what does not exist is null with a reason', () => {
    expect(() => leastSquares([1], [[1]])).toThrow(RangeError);
    expect(() => leastSquares([1, 2, Number.NaN], [[1, 2, 3]])).toThrow(RangeError);
    expect(() => leastSquares([1, 2, 3], [[1, 2]])).toThrow(RangeError);
    expect(leastSquares([1, 2], [[0, 1]]).coefficients[1]).toMatchObject({ estimate: 1, lower: null, standardError: null });
    expect(leastSquares([2, 2, 2], [[0, 1, 3]]).rSquared).toBeNull();
    expect(oneWayAnova([1, 1, 2, 2], [0, 0, 1, 1])).toMatchObject({ f: null, rSquared: 1 });
    expect(oneWayAnova([1, 2], [0, 0]).reason).toBe('There is one group only.');
    expect(() => oneWayAnova([1, 2], [0])).toThrow(RangeError);
    expect(() => oneWayAnova([], [])).toThrow(RangeError);
    expect(meanAndDeviation([])).toMatchObject({ mean: null, standardDeviation: null });
    expect(meanAndDeviation([4])).toMatchObject({ mean: 4, standardDeviation: null });
    expect(() => meanAndDeviation([1, Number.NaN])).toThrow(RangeError);
  });

  test('the order of rows does not matter', () => {
    const y = [3.1, 1.2, 5.5, 4.4, 2.9, 8.1];
    const x = [1, 0, 3, 2, 2, 5];
    const order = [4, 2, 0, 5, 1, 3];
    const shuffled = leastSquares(order.map((at) => y[at] as number), [order.map((at) => x[at] as number)]);
    const plain = leastSquares(y, [x]);
    shuffled.coefficients.forEach((own, j) => expect(own.estimate).toBeCloseTo(plain.coefficients[j]?.estimate as number, 13));
  });
});

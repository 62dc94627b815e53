import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  betaDist, binomial, chiSquare, fisherF, gammaDist, hypergeometric, noncentralT, normal, poisson, studentT,
} from '@/stats/distributions';
import { logNormalSf } from '@/stats/distribution/normal';
import { deviancePart } from '@/stats/special/deviance-part';
import { digamma } from '@/stats/special/digamma';
import { erf, erfc, erfcx } from '@/stats/special/erfc';
import { findRoot } from '@/stats/special/find-root';
import { logGamma, logGamma1p } from '@/stats/special/log-gamma';
import { trigamma } from '@/stats/special/trigamma';
import { differences, readReference, type Tolerance } from './reference';

const close = (got: number, want: number, rel = 1e-12) => expect(Math.abs(got - want)).toBeLessThanOrEqual(rel * Math.abs(want));
const chance = fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true });
const shape = fc.double({ min: -3, max: 4, noNaN: true }).map((power) => 10 ** power);
const runs = { numRuns: 300, seed: 3 };

test('noncentral t against 40-digit quadrature', () => {
  const { cases, tolerance, count } = readReference('noncentral-t.json') as {
    cases: { fn: 'cdf' | 'sf'; params: [number, number]; x: number; expected: number }[];
    tolerance: Tolerance;
    count: number;
  };
  expect(cases).toHaveLength(count);
  const got = cases.map(({ fn, params, x }) => noncentralT[fn](x, ...params));
  expect(differences(got, cases.map(({ expected }) => expected), tolerance)).toEqual([]);
});

describe('quantiles undo tails', () => {
  test('gamma and chi-square', () => {
    fc.assert(fc.property(chance, shape, (p, a) => {
      const x = gammaDist.quantile(p, a);
      if (x > 1e-290) close(gammaDist.cdf(x, a), p, 1e-10);
      close(gammaDist.sf(gammaDist.isf(p, a), a), p, 1e-10 * Math.max(1, a));
      close(chiSquare.quantile(p, 2 * a), 2 * x);
    }), runs);
  });

  test('beta and F', () => {
    fc.assert(fc.property(chance, shape, shape, (p, a, b) => {
      const x = betaDist.quantile(p, a, b);
      // Near 1 a double cannot hold the quantile; F holds it as odds.
      if (x > 1e-290 && x < 0.99) close(betaDist.cdf(x, a, b), p, 1e-9 * Math.max(1, a, b));
      const f = fisherF.isf(p, 2 * a, 2 * b);
      if (f > 1e-290 && f < 1e290) close(fisherF.sf(f, 2 * a, 2 * b), p, 1e-9 * Math.max(1, a, b));
    }), runs);
  });

  test('normal and t, symmetric about 0', () => {
    fc.assert(fc.property(chance, shape, (p, df) => {
      const t = studentT.isf(p, df);
      if (Math.abs(t) < 1e290) close(studentT.sf(t, df), p, 1e-9 * Math.max(1, df));
      expect(studentT.quantile(p, df)).toBe(-t);
      close(normal.sf(normal.isf(p)), p, 1e-11);
    }), runs);
  });

  test('noncentral t', () => {
    fc.assert(fc.property(fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }), fc.double({ min: 0.5, max: 200, noNaN: true }), fc.double({ min: -10, max: 10, noNaN: true }), (p, df, shift) => {
      close(noncentralT.cdf(noncentralT.quantile(p, df, shift), df, shift), p, 1e-9);
      close(noncentralT.isf(p, df, shift), -noncentralT.quantile(p, df, -shift), 1e-9);
    }), { numRuns: 60, seed: 3 });
  });

  test('counts: the quantile of a cdf is its count, in both tails', () => {
    fc.assert(fc.property(fc.integer({ min: 0, max: 60 }), fc.double({ min: 0.05, max: 40, noNaN: true }), (k, mean) => {
      if (poisson.pmf(k, mean) < 1e-10) return;
      expect(poisson.quantile(poisson.cdf(k, mean), mean)).toBe(k);
      expect(poisson.isf(poisson.sf(k, mean), mean)).toBe(k);
    }), runs);
    fc.assert(fc.property(fc.integer({ min: 1, max: 80 }), fc.double({ min: 0.02, max: 0.98, noNaN: true }), fc.nat(80), (n, p, at) => {
      const k = at % (n + 1);
      if (binomial.pmf(k, n, p) < 1e-10 || k === n) return;
      expect(binomial.quantile(binomial.cdf(k, n, p), n, p)).toBe(k);
      expect(binomial.isf(binomial.sf(k, n, p), n, p)).toBe(k);
    }), runs);
    expect(hypergeometric.quantile(hypergeometric.cdf(4, 50, 20, 10), 50, 20, 10)).toBe(4);
    expect(hypergeometric.isf(hypergeometric.sf(4, 50, 20, 10), 50, 20, 10)).toBe(4);
  });
});

describe('counts against exact fractions', () => {
  test('binomial tails with chance 1/2 are sums of binomial coefficients over a power of two', () => {
    for (const n of [1, 7, 30, 52]) {
      let sum = 0;
      for (let k = 0; k <= n; k++) {
        sum += choose(n, k);
        close(binomial.cdf(k, n, 0.5), sum / 2 ** n, 1e-13);
        close(binomial.pmf(k, n, 0.5), choose(n, k) / 2 ** n, 1e-13);
        if (k < n) close(binomial.sf(k, n, 0.5), 1 - sum / 2 ** n, 1e-12 / (1 - sum / 2 ** n));
      }
    }
  });

  test('hypergeometric masses and tails are ratios of binomial coefficients', () => {
    const [population, marked, drawn] = [20, 8, 11];
    let sum = 0;
    for (let k = 0; k <= 8; k++) {
      const mass = (choose(marked, k) * choose(population - marked, drawn - k)) / choose(population, drawn);
      sum += mass;
      close(hypergeometric.pmf(k, population, marked, drawn), mass, 1e-13);
      close(hypergeometric.cdf(k, population, marked, drawn), sum, 1e-13);
    }
  });

  test('both tails of a count add to one, also far beyond the support', () => {
    for (const x of [-5, -0.5, 0, 3.7, 8, 100, Infinity, -Infinity]) {
      close(poisson.cdf(x, 3) + poisson.sf(x, 3), 1);
      close(binomial.cdf(x, 8, 0.3) + binomial.sf(x, 8, 0.3), 1);
      close(hypergeometric.cdf(x, 20, 8, 11) + hypergeometric.sf(x, 20, 8, 11), 1);
    }
    expect(poisson.pmf(2.5, 3)).toBe(0);
    expect(poisson.cdf(0, 0)).toBe(1);
    expect(binomial.pmf(0, 0, 0.3)).toBe(1);
    expect(binomial.pmf(5, 5, 1)).toBe(1);
    expect(hypergeometric.pmf(3, 5, 3, 5)).toBe(1);
  });
});

describe('special functions', () => {
  test('log-gamma is the log of factorials and keeps its zeros', () => {
    let factorial = 1;
    for (let n = 1; n <= 20; n++) {
      factorial *= n;
      expect(Math.abs(logGamma(n + 1) - Math.log(factorial))).toBeLessThan(1e-14 * Math.max(1, Math.log(factorial)));
    }
    expect([logGamma(1), logGamma(2)]).toEqual([0, 0]);
    close(logGamma(0.5), Math.log(Math.PI) / 2, 1e-15);
    // Near 1 the function is -gamma z: a difference of large parts would lose it.
    close(logGamma1p(1e-12), -0.5772156649015329e-12, 1e-11);
  });

  test('digamma and trigamma at known points and by recurrence', () => {
    close(digamma(1), -0.57721566490153286, 1e-14);
    close(digamma(0.5), -0.57721566490153286 - 2 * Math.LN2, 1e-14);
    close(trigamma(1), Math.PI ** 2 / 6, 1e-14);
    close(trigamma(0.5), Math.PI ** 2 / 2, 1e-14);
    fc.assert(fc.property(shape, (x) => {
      expect(Math.abs(digamma(x + 1) - digamma(x) - 1 / x)).toBeLessThan(1e-13 * Math.max(1, 1 / x));
      close(trigamma(x + 1) + 1 / (x * x), trigamma(x), 1e-12);
    }), runs);
  });

  test('erf at Abramowitz & Stegun table 7.1 and its companions', () => {
    close(erf(0.5), 0.5204998778, 1e-10);
    close(erf(1), 0.8427007929, 1e-10);
    close(erf(2), 0.995322265, 1e-9);
    for (const x of [-3, -0.7, -0.2, 0, 0.3, 0.46875, 0.47, 2, 3.99, 4.01]) {
      close(erf(x) + erfc(x), 1, 1e-15);
      close(erfcx(x), Math.exp(x * x) * erfc(x), 1e-14);
      expect(erf(-x)).toBe(-erf(x));
    }
    close(logNormalSf(40), -0.5 * 1600 - Math.log(40 * Math.sqrt(2 * Math.PI)) + Math.log1p(-1 / 1600 + 3 / 1600 ** 2), 1e-11);
    close(logNormalSf(1), Math.log(normal.sf(1)), 1e-15);
  });

  test('the deviance part agrees with its formula where that is safe, and is smooth at its joints', () => {
    close(deviancePart(10, 3), 10 * Math.log(10 / 3) - 7, 1e-15);
    close(deviancePart(1e6, 1e6 + 1), 0.5e-6 - 1 / 3e12, 1e-6);
    expect(deviancePart(0, 2)).toBe(2);
    const joint = (1.3 / 0.7) * 5;
    close(deviancePart(joint * (1 - 1e-12), 5), deviancePart(joint * (1 + 1e-12), 5), 1e-11);
  });

  test('a root is found to the last digit, and refused without a change of sign', () => {
    expect(findRoot((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(findRoot((x) => Math.atan(x - 1e3), -1e6, 1e6)).toBeCloseTo(1e3, 9);
    expect(findRoot((x) => x, 0, 1)).toBe(0);
    expect(() => findRoot((x) => x * x + 1, -1, 1)).toThrow(RangeError);
  });
});

describe('ends and misuse', () => {
  test('ends are exact', () => {
    expect([normal.quantile(0), normal.isf(0), normal.quantile(0.5)]).toEqual([-Infinity, Infinity, -0].map((end) => expect.closeTo(end)));
    expect([gammaDist.quantile(0, 2), gammaDist.isf(0, 2), gammaDist.quantile(1, 2)]).toEqual([0, Infinity, Infinity]);
    expect([betaDist.quantile(0, 2, 3), betaDist.quantile(1, 2, 3), betaDist.isf(0, 2, 3)]).toEqual([0, 1, 1]);
    expect([fisherF.quantile(0, 2, 3), fisherF.isf(0, 2, 3)]).toEqual([0, Infinity]);
    expect([studentT.quantile(0, 3), studentT.isf(0, 3)]).toEqual([-Infinity, Infinity]);
    expect([poisson.quantile(0, 3), poisson.quantile(1, 3), binomial.quantile(1, 5, 0.5)]).toEqual([0, Infinity, 5]);
    expect([gammaDist.cdf(-1, 2), gammaDist.sf(Infinity, 2), betaDist.cdf(2, 1, 1), fisherF.sf(-1, 2, 2)]).toEqual([0, 0, 1, 1]);
    expect([noncentralT.quantile(0, 3, 1), noncentralT.isf(0, 3, 1), noncentralT.cdf(Infinity, 3, 1)]).toEqual([-Infinity, Infinity, 1]);
    close(studentT.isf(0.025, Infinity), 1.959963984540054, 1e-15);
  });

  test('densities are slopes of the cdf', () => {
    const slope = (cdf: (x: number) => number, x: number) => (cdf(x + 1e-5) - cdf(x - 1e-5)) / 2e-5;
    close(normal.pdf(0.7), slope((x) => normal.cdf(x), 0.7), 1e-8);
    close(studentT.pdf(0.7, 4), slope((x) => studentT.cdf(x, 4), 0.7), 1e-8);
    close(studentT.pdf(0, 1), 1 / Math.PI, 1e-14);
    close(chiSquare.pdf(3, 4), slope((x) => chiSquare.cdf(x, 4), 3), 1e-8);
    close(fisherF.pdf(1.4, 3, 9), slope((x) => fisherF.cdf(x, 3, 9), 1.4), 1e-8);
    close(betaDist.pdf(0.3, 2, 5), slope((x) => betaDist.cdf(x, 2, 5), 0.3), 1e-8);
    close(gammaDist.pdf(2, 3, 1.5), slope((x) => gammaDist.cdf(x, 3, 1.5), 2), 1e-8);
    expect([gammaDist.pdf(0, 1, 2), chiSquare.pdf(0, 2), fisherF.pdf(0, 2, 5), betaDist.pdf(0, 1, 3), betaDist.pdf(1, 4, 1)]).toEqual([0.5, 0.5, 1, 3, 4]);
  });

  test.each([
    ['NaN as argument', () => normal.cdf(Number.NaN)],
    ['a probability above 1', () => studentT.quantile(1.2, 3)],
    ['a negative probability', () => chiSquare.isf(-0.1, 3)],
    ['NaN as probability', () => betaDist.quantile(Number.NaN, 1, 1)],
    ['no degrees of freedom', () => chiSquare.sf(1, 0)],
    ['negative degrees of freedom', () => fisherF.cdf(1, -1, 2)],
    ['infinite degrees of freedom of F', () => fisherF.cdf(1, 2, Infinity)],
    ['a negative scale', () => gammaDist.cdf(1, 2, -1)],
    ['a negative mean', () => poisson.cdf(1, -1)],
    ['half a trial', () => binomial.cdf(1, 2.5, 0.5)],
    ['more marked than there are', () => hypergeometric.cdf(1, 5, 6, 2)],
    ['an infinite shift', () => noncentralT.cdf(1, 5, Infinity)],
    ['log-gamma of 0', () => logGamma(0)],
    ['digamma of a negative number', () => digamma(-1)],
    ['trigamma of NaN', () => trigamma(Number.NaN)],
  ])('%s is refused', (_, call) => {
    expect(call).toThrow(RangeError);
  });
});

function choose(n: number, k: number): number {
  if (k < 0 || k > n) return 0;
  let value = 1n;
  for (let i = 1n; i <= BigInt(k); i++) value = (value * (BigInt(n) - i + 1n)) / i;
  return Number(value);
}

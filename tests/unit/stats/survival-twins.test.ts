/** The estimators against slow ones written from the definitions, on small random data. */
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { cox } from '@/stats/survival/cox';
import { cumulativeIncidence, incidenceAt } from '@/stats/survival/cumulative-incidence';
import { grayTest } from '@/stats/survival/gray';
import { intervalOnset, onsetFreeAt } from '@/stats/survival/interval-onset';
import { kaplanMeier } from '@/stats/survival/kaplan-meier';
import { logRank } from '@/stats/survival/log-rank';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { quantileOf } from '@/stats/survival/quantile-of';
import { rmst } from '@/stats/survival/rmst';
import { orderOf } from '@/stats/survival/sort';

interface Row {
  readonly entry: number;
  readonly time: number;
  readonly cause: number;
  readonly group: number;
  readonly stratum: number;
  readonly x: readonly [number, number];
}

const row: fc.Arbitrary<Row> = fc
  .record({
    entry: fc.integer({ min: 0, max: 6 }),
    stay: fc.integer({ min: 1, max: 8 }),
    cause: fc.integer({ min: 0, max: 2 }),
    group: fc.integer({ min: 0, max: 2 }),
    stratum: fc.integer({ min: 0, max: 1 }),
    x: fc.tuple(fc.integer({ min: -3, max: 3 }), fc.integer({ min: 0, max: 1 })),
  })
  .map(({ entry, stay, ...rest }) => ({ entry, time: entry + stay, ...rest }));
const rows = fc.array(row, { minLength: 1, maxLength: 25 });
const permuted = rows.chain((list) => fc.tuple(fc.constant(list), fc.shuffledSubarray(list, { minLength: list.length })));

const columns = (list: readonly Row[], delayed = true) => ({
  time: Float64Array.from(list, ({ time }) => time),
  event: Uint8Array.from(list, ({ cause }) => (cause === 1 ? 1 : 0)),
  cause: Uint8Array.from(list, ({ cause }) => cause),
  group: Uint8Array.from(list, ({ group }) => group),
  stratum: Uint8Array.from(list, ({ stratum }) => stratum),
  cluster: Uint8Array.from(list, ({ group, stratum }) => 2 * group + stratum),
  x: [0, 1].map((j) => Float64Array.from(list, ({ x }) => x[j as 0 | 1])),
  ...(delayed && { entry: Float64Array.from(list, ({ entry }) => entry) }),
});

const atRisk = (list: readonly Row[], t: number, delayed = true) => list.filter((one) => one.time >= t && (!delayed || one.entry < t));
const eventTimes = (list: readonly Row[], causes: readonly number[] = [1]) => [...new Set(list.filter(({ cause }) => causes.includes(cause)).map(({ time }) => time))].sort((a, b) => a - b);
const near = (got: number, want: number, relative = 1e-10) => expect(Math.abs(got - want), `${got} for ${want}`).toBeLessThanOrEqual(relative * (1 + Math.abs(want)));

describe('sorting', () => {
  test('the index sort is the stable sort, whatever the keys', () => {
    const key = fc.oneof(fc.double({ noNaN: true, noDefaultInfinity: true }), fc.integer({ min: -3, max: 3 }), fc.constantFrom(-0, 0, 5e-324, -5e-324));
    fc.assert(
      fc.property(fc.array(key, { minLength: 0, maxLength: 600 }), (keys) => {
        const want = keys.map((_, i) => i).sort((a, b) => keys[a]! - keys[b]! || a - b);
        expect([...orderOf(Float64Array.from(keys))]).toEqual(want);
      }),
    );
  });

  test('long columns of fractions, of negative numbers and of days come out in order', () => {
    for (const make of [(i: number) => ((i * 7919) % 5003) / 7, (i: number) => 100 - ((i * 7919) % 5003) / 7, (i: number) => (i * 7919) % 1821]) {
      const keys = Float64Array.from({ length: 5000 }, (_, i) => make(i));
      const want = [...keys.keys()].sort((a, b) => keys[a]! - keys[b]! || a - b);
      expect([...orderOf(keys)]).toEqual(want);
    }
  });
});

describe('Kaplan-Meier', () => {
  test('S is the exact fraction, and Greenwood the textbook sum, with and without delayed entry', () => {
    fc.assert(
      fc.property(rows, fc.boolean(), (list, delayed) => {
        const curve = kaplanMeier(columns(list, delayed));
        let [top, bottom] = [1n, 1n];
        let greenwood = 0;
        for (const t of eventTimes(list)) {
          const n = atRisk(list, t, delayed).length;
          const d = list.filter(({ time, cause }) => time === t && cause === 1).length;
          [top, bottom] = [top * BigInt(n - d), bottom * BigInt(n)];
          greenwood += d / (n * (n - d));
          const g = curve.time.indexOf(t);
          expect(curve.atRisk[g]).toBe(n);
          expect(curve.eventsAt[g]).toBe(d);
          near(curve.survival[g]!, Number((top * 10n ** 30n) / bottom) / 1e30);
          if (top > 0n) near(curve.se[g]!, curve.survival[g]! * Math.sqrt(greenwood));
          else expect(curve.se[g]).toBeNaN();
        }
      }),
    );
  });

  test('without censoring S is the empirical share, and its variance binomial', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 1, maxLength: 30 }), (times) => {
        const n = times.length;
        const curve = kaplanMeier({ time: Float64Array.from(times), event: new Uint8Array(n).fill(1) });
        curve.time.forEach((t, g) => {
          const s = times.filter((time) => time > t).length / n;
          near(curve.survival[g]!, s);
          if (s > 0) near(curve.se[g]!, Math.sqrt((s * (1 - s)) / n));
        });
        near(rmst(curve, Math.max(...times)).estimate!, times.reduce((sum, t) => sum + t, 0) / n);
      }),
    );
  });

  test('neither the order of rows nor the unit of time changes what is said', () => {
    fc.assert(
      fc.property(permuted, fc.constantFrom(1 / 365.25, 0.1, 7), ([list, shuffled], unit) => {
        const curve = kaplanMeier(columns(list));
        expect(kaplanMeier(columns(shuffled))).toEqual(curve);
        const data = columns(list);
        const scaled = kaplanMeier({ ...data, time: data.time.map((t) => t * unit), entry: data.entry!.map((t) => t * unit) });
        expect(scaled.survival).toEqual(curve.survival);
        expect(scaled.upper).toEqual(curve.upper);
        const [median, scaledMedian] = [quantileOf(curve, 0.5), quantileOf(scaled, 0.5)];
        if (median.estimate === null) expect(scaledMedian.estimate).toBeNull();
        else near(scaledMedian.estimate!, median.estimate * unit);
      }),
    );
  });

  test('the number at risk is a count', () => {
    fc.assert(
      fc.property(rows, fc.integer({ min: 0, max: 16 }), (list, t) => {
        expect(numberAtRisk(columns(list), [t])).toEqual([atRisk(list, t).length]);
      }),
    );
  });
});

describe('log-rank', () => {
  test('observed, expected and covariance are the sums over the tables, within strata', () => {
    fc.assert(
      fc.property(rows, fc.constantFrom(0, 1, 0.5), (list, rho) => {
        const result = logRank(columns(list), { groups: 3, rho });
        const [observed, expected] = [[0, 0, 0], [0, 0, 0]];
        const variance = [0, 1, 2].map(() => [0, 0, 0]);
        for (const stratum of [0, 1]) {
          const own = list.filter((one) => one.stratum === stratum);
          let s = 1;
          for (const t of eventTimes(own)) {
            const risk = atRisk(own, t);
            const d = own.filter(({ time, cause }) => time === t && cause === 1);
            const n = risk.length;
            const w = s ** rho;
            const share = [0, 1, 2].map((g) => risk.filter(({ group }) => group === g).length / n);
            share.forEach((a, g) => {
              observed[g]! += w * d.filter(({ group }) => group === g).length;
              expected[g]! += w * d.length * a;
              share.forEach((b, h) => {
                if (n > 1) variance[g]![h]! += (w * w * d.length * (n - d.length) * ((g === h ? a : 0) - a * b)) / (n - 1);
              });
            });
            s *= (n - d.length) / n;
          }
        }
        result.groups.forEach((group, g) => {
          near(group.observed, observed[g]!);
          near(group.expected, expected[g]!);
          result.variance[g]!.forEach((value, h) => near(value, variance[g]![h]!));
        });
      }),
    );
  });

  test('the order of rows and the unit of time change nothing', () => {
    fc.assert(
      fc.property(permuted, ([list, shuffled]) => {
        const result = logRank(columns(list));
        const again = logRank({ ...columns(shuffled), time: columns(shuffled).time.map((t) => t * 0.1), entry: columns(shuffled).entry!.map((t) => t * 0.1) });
        expect(again.df).toBe(result.df);
        if (result.chiSquare !== null) near(again.chiSquare!, result.chiSquare, 1e-8);
      }),
    );
  });
});

describe('competing causes', () => {
  test('incidences add up with survival to 1, and the variance is the double sum', () => {
    fc.assert(
      fc.property(rows, fc.boolean(), (list, delayed) => {
        const curves = cumulativeIncidence(columns(list, delayed), { causes: [1, 2] });
        let s = 1;
        let f = 0;
        const terms: { f: number; g: number; own: number; shared: number }[] = [];
        for (const t of eventTimes(list, [1, 2])) {
          const n = atRisk(list, t, delayed).length;
          const [d1, d2] = [1, 2].map((code) => list.filter(({ time, cause }) => time === t && cause === code).length) as [number, number];
          f += (s * d1) / n;
          const d = d1 + d2;
          terms.push({ f, g: n > d ? d / (n * (n - d)) : 0, own: (s * s * d1 * (n - d1)) / n ** 3, shared: (s * d1) / n ** 2 });
          s *= (n - d) / n;
          const variance = terms.reduce((sum, term) => sum + (f - term.f) ** 2 * term.g + term.own - 2 * (f - term.f) * term.shared, 0);
          const at = incidenceAt(curves, 1, t);
          near(at.estimate!, f);
          near(at.se! ** 2, Math.max(0, variance), 1e-12);
          near(s + f + incidenceAt(curves, 2, t).estimate!, 1);
        }
      }),
    );
  });

  test('with one cause incidence is one minus Kaplan-Meier and its variance is Greenwood’s', () => {
    fc.assert(
      fc.property(rows, (list) => {
        const data = columns(list, false);
        const curve = kaplanMeier(data);
        const curves = cumulativeIncidence({ time: data.time, cause: data.event }, { causes: [1] });
        curve.time.forEach((_, g) => {
          near(curves.causes[0]!.incidence[g]!, 1 - curve.survival[g]!);
          if (curve.survival[g]! > 0) near(curves.causes[0]!.se[g]!, curve.se[g]!, 1e-7);
        });
      }),
    );
  });

  test('Gray’s test does not depend on the order of rows, the unit of time or the numbering of groups', () => {
    fc.assert(
      fc.property(permuted, ([list, shuffled]) => {
        const result = grayTest(columns(list, false));
        const other = columns(shuffled, false);
        const again = grayTest({ ...other, time: other.time.map((t) => t / 365.25), group: other.group.map((g) => 2 - g) }, { groups: 3 });
        expect(again.df).toBe(result.df);
        if (result.chiSquare !== null && result.chiSquare < 1e6) near(again.chiSquare!, result.chiSquare, 1e-6);
      }),
    );
  });
});

describe('onset between visits', () => {
  const interval = fc.record({ left: fc.integer({ min: 0, max: 6 }), width: fc.constantFrom(0, 1, 2, 4, Infinity) }).filter(({ left, width }) => left > 0 || (width > 0 && width < Infinity));

  test('no long EM run finds a higher likelihood, and the gap is closed', () => {
    fc.assert(
      fc.property(fc.array(interval, { minLength: 1, maxLength: 14 }), (list) => {
        const fit = intervalOnset({ left: Float64Array.from(list, ({ left }) => left), right: Float64Array.from(list, ({ left, width }) => left + width) });
        expect(fit.kktGap).toBeLessThan(1e-9);
        expect(fit.unique).toBe(true); // each set ends some row, so on one line the rows always pin the masses down
        near(fit.mass.reduce((sum, mass) => sum + mass, 0), 1);
        near(fit.logLikelihood, slowEm(list, fit.logLikelihood), 1e-5);
        for (const t of [1, 3, 5]) expect(onsetFreeAt(fit, t).lower).toBeLessThanOrEqual(onsetFreeAt(fit, t).upper + 1e-12);
      }),
      { numRuns: 60 },
    );
  });

  /** EM on every elementary piece of the line, (k, k+1) and the day k: far more places than Turnbull's sets. */
  function slowEm(list: readonly { left: number; width: number }[], stop: number): number {
    const pieces = Array.from({ length: 26 }, (_, k) => k / 2); // whole = a day, half = between days
    const covers = list.map(({ left, width }) => pieces.map((at) => (width === 0 ? at === left : at > left && at <= left + width)));
    let mass = pieces.map(() => 1 / pieces.length);
    let value = -Infinity;
    for (let k = 0; k < 3000; k++) {
      const shares = covers.map((cover) => cover.reduce((sum, on, j) => sum + (on ? mass[j]! : 0), 0));
      value = shares.reduce((sum, share) => sum + Math.log(share), 0);
      if (value > stop - 1e-7) break;
      mass = mass.map((m, j) => (m * covers.reduce((sum, cover, i) => sum + (cover[j] ? 1 / shares[i]! : 0), 0)) / list.length);
    }
    return value;
  }

  test('days seen exactly or censored give Kaplan-Meier', () => {
    fc.assert(
      fc.property(rows, (list) => {
        const data = columns(list, false);
        const curve = kaplanMeier(data);
        const fit = intervalOnset({ left: data.time, right: data.time.map((t, i) => (data.event[i] === 1 ? t : Infinity)) });
        curve.time.forEach((t, g) => {
          if (curve.eventsAt[g]! > 0) near(onsetFreeAt(fit, t).upper, curve.survival[g]!, 1e-8);
        });
      }),
    );
  });
});

describe('Cox', () => {
  type Ties = 'efron' | 'breslow';
  /** Steps of the partial likelihood, from the definition: at each event time, for k = 0 … d-1. */
  function steps(list: readonly Row[], ties: Ties) {
    return [0, 1].flatMap((stratum) => {
      const own = list.filter((one) => one.stratum === stratum);
      return eventTimes(own).flatMap((t) => {
        const dying = own.filter(({ time, cause }) => time === t && cause === 1);
        return dying.map((_, k) => ({ t, stratum, risk: atRisk(own, t), dying, off: ties === 'efron' ? k / dying.length : 0 }));
      });
    });
  }
  const weightIn = (one: Row, { dying, off }: ReturnType<typeof steps>[number]) => (dying.includes(one) ? 1 - off : 1);
  const etaOf = (beta: readonly number[], { x }: Row) => beta[0]! * x[0] + beta[1]! * x[1];

  function logLikelihood(list: readonly Row[], ties: Ties, beta: readonly number[]): number {
    const own = list.filter(({ cause }) => cause === 1).reduce((sum, one) => sum + etaOf(beta, one), 0);
    return own - steps(list, ties).reduce((sum, step) => sum + Math.log(step.risk.reduce((s, one) => s + weightIn(one, step) * Math.exp(etaOf(beta, one)), 0)), 0);
  }

  /** Score residuals row by row from the definition, every row against every step. */
  function clusterMeat(list: readonly Row[], ties: Ties, beta: readonly number[]): number[][] {
    const sums = new Map<number, number[]>();
    for (const one of list) {
      const key = 2 * one.group + one.stratum;
      const sum = sums.get(key) ?? [0, 0];
      for (const step of steps(list, ties)) {
        if (!step.risk.includes(one)) continue;
        const weights = step.risk.map((other) => weightIn(other, step) * Math.exp(etaOf(beta, other)));
        const total = weights.reduce((a, b) => a + b, 0);
        for (const j of [0, 1] as const) {
          const mean = step.risk.reduce((s, other, i) => s + weights[i]! * other.x[j], 0) / total;
          const share = (weightIn(one, step) * Math.exp(etaOf(beta, one))) / total;
          sum[j]! += (one.x[j] - mean) * ((step.dying.includes(one) ? 1 / step.dying.length : 0) - share);
        }
      }
      sums.set(key, sum);
    }
    return [0, 1].map((j) => [0, 1].map((l) => [...sums.values()].reduce((total, sum) => total + sum[j]! * sum[l]!, 0)));
  }

  test('the likelihood is the definition’s, flat at the estimate; robust errors are the slow sandwich', () => {
    let regular = 0;
    fc.assert(
      fc.property(fc.array(row, { minLength: 12, maxLength: 30 }), fc.constantFrom<Ties>('efron', 'breslow'), (list, ties) => {
        const fit = cox(columns(list), { ties });
        near(fit.logLikelihoodNull, logLikelihood(list, ties, [0, 0]));
        const beta = fit.coefficients.map(({ estimate }) => estimate);
        if (beta.includes(null)) return;
        regular++;
        const [a, b] = beta as [number, number];
        near(fit.logLikelihood, logLikelihood(list, ties, [a, b]));
        for (const [da, db] of [[1e-3, 0], [-1e-3, 0], [0, 1e-3], [0, -1e-3]] as const) expect(logLikelihood(list, ties, [a + da, b + db])).toBeLessThan(fit.logLikelihood + 1e-10);
        const meat = clusterMeat(list, ties, [a, b]);
        const v = fit.covariance;
        for (const j of [0, 1]) {
          const want = [0, 1].reduce((sum, k) => sum + [0, 1].reduce((inner, l) => inner + v[j]![k]! * meat[k]![l]! * v[l]![j]!, 0), 0);
          near(fit.coefficients[j]!.robustSe! ** 2, want, 1e-7);
        }
      }),
      { numRuns: 60 },
    );
    expect(regular).toBeGreaterThan(20);
  });

  test('neither the order of rows, the unit of time nor the scale of a covariate changes what is said', () => {
    fc.assert(
      fc.property(fc.array(row, { minLength: 12, maxLength: 30 }), fc.infiniteStream(fc.nat()), (list, order) => {
        const shuffled = list.map((one) => ({ one, at: order.next().value as number })).sort((p, q) => p.at - q.at).map(({ one }) => one);
        const fit = cox(columns(list));
        const data = columns(shuffled);
        const again = cox({ ...data, time: data.time.map((t) => t * 0.1), entry: data.entry!.map((t) => t * 0.1), x: [data.x[0]!.map((x) => 1e9 + 4 * x), data.x[1]!] });
        near(again.logLikelihood, fit.logLikelihood, 1e-8);
        fit.coefficients.forEach(({ estimate, se }, j) => {
          if (estimate === null || se! > 5) return; // near a monotone likelihood digits are lost for good
          near(again.coefficients[j]!.estimate! * (j === 0 ? 4 : 1), estimate, 1e-6);
          near(again.coefficients[j]!.se! * (j === 0 ? 4 : 1), se!, 1e-6);
        });
      }),
      { numRuns: 60 },
    );
  });
});

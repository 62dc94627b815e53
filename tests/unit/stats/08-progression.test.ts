import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { clusteredProportion } from '@/stats/progression/clustered-proportion';
import { loadOnset } from '@/stats/progression/load-onset';
import { medianLimits } from '@/stats/progression/median-limits';
import { quantile } from '@/stats/progression/quantile';
import { quantileBands } from '@/stats/progression/quantile-bands';
import { ruleAdherence } from '@/stats/progression/rule-adherence';
import { theilSen } from '@/stats/progression/theil-sen';
import { loadIntervals, timeToLoad } from '@/stats/progression/time-to-load';
import { wilsonInterval } from '@/stats/proportion/wilson-interval';
import type { Interval } from '@/stats/result';
import type { LimitKind } from '@/stats/survival/limits';
import { intervalOnset, onsetFreeAt } from '@/stats/survival/interval-onset';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { quantileOf } from '@/stats/survival/quantile-of';
import { survivalAt } from '@/stats/survival/survival-at';
import { runTopic, tableOf, type ReferenceCase, type Table } from './reference';

/** Participants as whole numbers, in the order of first appearance; `names` turns them back. */
function logsOf(table: Table): { participants: Float64Array; weeks: Float64Array; loads: Float64Array; names: string[] } {
  const names = [...new Set(table.text('participant'))];
  const participants = Float64Array.from(table.text('participant'), (name) => names.indexOf(name));
  return { participants, weeks: table.numbers('week'), loads: table.numbers('load_kg'), names };
}

const theilSenOf = (reference: ReferenceCase): unknown => {
  const table = tableOf(reference);
  const r = theilSen(table.numbers(reference.dataset!.x!), table.numbers(reference.dataset!.y!));
  return {
    slope: r.estimate,
    n_slopes: r.slopes,
    intercept_median_residual: r.interceptMedianResidual,
    intercept_median_medians: r.interceptMedians,
    kendall_S: r.kendallS,
    var_S_tie_corrected: r.varianceS,
    C_alpha: r.spread,
    rank_lower: r.rankLower,
    rank_upper: r.rankUpper,
    lower_interpolated: r.lower,
    upper_interpolated: r.upper,
    mk_z: r.z,
    mk_p: r.p,
  };
};

const KINDS: readonly LimitKind[] = ['log-log', 'log', 'plain'];

/** Limits by kind under the names of the cases: loglog_lower and so on. */
const limitsBy = (read: (kind: LimitKind) => readonly Pick<Interval, 'lower' | 'upper'>[]): Record<string, (number | null)[]> =>
  Object.fromEntries(
    KINDS.flatMap((kind) => {
      const name = kind.replace('-', '');
      const values = read(kind);
      return [[`${name}_lower`, values.map(({ lower }) => lower)], [`${name}_upper`, values.map(({ upper }) => upper)]];
    }),
  );

const timeTo8 = (reference: ReferenceCase): unknown => {
  const { participants, weeks, loads, names } = logsOf(tableOf(reference));
  const by = (limits: LimitKind) => timeToLoad(participants, weeks, loads, 8, { limits });
  const { onset, curve, events } = by('log-log');
  const at = (reference.expected as { km: { time: number[] } }).km.time;
  return {
    participant: Array.from(onset.participants, (number) => names[number]),
    time: onset.time,
    event: onset.event,
    n_events: events,
    km: {
      time: at,
      n_risk: numberAtRisk({ time: onset.time, event: onset.event }, at),
      surv: at.map((t) => survivalAt(curve, t).estimate),
      se_greenwood: at.map((t) => survivalAt(curve, t).se),
      ...limitsBy((kind) => at.map((t) => survivalAt(by(kind).curve, t))),
    },
    quantiles: {
      p: [0.25, 0.5, 0.75],
      time: [0.25, 0.5, 0.75].map((p) => quantileOf(curve, p).estimate),
      ...limitsBy((kind) => Object.values(by(kind).quartiles)),
    },
  };
};

runTopic('08-progression', {
  'theilsen-': theilSenOf,
  'theilsen-loads-all': (reference) => {
    const { participants, weeks, loads, names } = logsOf(tableOf(reference));
    const slopes = names.map((_, number) => {
      const rows = [...participants.keys()].filter((row) => participants[row] === number);
      return theilSen(rows.map((row) => weeks[row]!), rows.map((row) => loads[row]!)).estimate!;
    });
    const [q25, median, q75] = quantile(slopes, [0.25, 0.5, 0.75]);
    return { n: slopes.length, median, q25, q75 };
  },
  'quantile-bands-': (reference) => {
    const { weeks, loads } = logsOf(tableOf(reference));
    const probs = reference.params!.p as number[];
    const [seven, six, eight] = ([7, 6, 8] as const).map((type) => quantileBands(loads, weeks, probs, type).bands);
    return Object.fromEntries(
      seven!.map(({ week, n, mean, sd, quantiles }, at) => [
        `week${week}`,
        { n, mean, sd, type7: quantiles, type6: six![at]!.quantiles, type8: eight![at]!.quantiles },
      ]),
    );
  },
  'median-ci-': (reference) => {
    const r = medianLimits(tableOf(reference).numbers('load_kg'));
    return { ...r, rank_lower: r.rankLower, rank_upper: r.rankUpper };
  },
  'time-to-load-8kg': timeTo8,
  'time-to-load-8kg-interval': (reference) => {
    const { participants, weeks, loads } = logsOf(tableOf(reference));
    const at = (reference.expected as { survival_at: { time: number[] } }).survival_at.time;
    const fit = intervalOnset(loadIntervals(loadOnset(participants, weeks, loads, 8)));
    return {
      n: fit.n,
      left: fit.left,
      right: fit.right,
      exact_point: fit.exact,
      mass: fit.mass,
      n_candidate_sets: fit.candidateSets,
      loglik: fit.logLikelihood,
      kkt_gap: fit.kktGap,
      unique: fit.unique,
      survival_at: { time: at, lower: at.map((t) => onsetFreeAt(fit, t).lower), upper: at.map((t) => onsetFreeAt(fit, t).upper) },
    };
  },
  'rule-adherence-': (reference) => {
    const { participants, weeks, loads } = logsOf(tableOf(reference));
    const r = ruleAdherence(participants, weeks, loads, { maxRatio: reference.params!.max_ratio as number });
    return {
      n_steps: r.n,
      n_ok: r.events,
      n_participants: r.clusters,
      pooled: r.estimate,
      wilson: wilsonInterval({ events: r.events!, n: r.n }),
      cluster_se: r.se,
      cluster_lower: r.lower,
      cluster_upper: r.upper,
      mean_of_participant_proportions: r.meanOfClusters,
      n_increase: r.increases,
      n_same: r.unchanged,
      n_decrease: r.decreases,
      median_ratio: r.medianRatio,
    };
  },
});

const load = fc.integer({ min: 2, max: 60 }).map((halves) => halves / 2);
const week = fc.integer({ min: 0, max: 20 });

describe('Theil-Sen by hand', () => {
  test('the slope is the median of all pairs and S the sum of their signs', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(week, load), { minLength: 2, maxLength: 14 }), (rows) => {
        const slopes: number[] = [];
        let s = 0;
        rows.forEach(([x1, y1], i) => rows.slice(i + 1).forEach(([x2, y2]) => {
          s += Math.sign(x2 - x1) * Math.sign(y2 - y1);
          if (x1 !== x2) slopes.push((y2 - y1) / (x2 - x1));
        }));
        slopes.sort((a, b) => a - b);
        const half = slopes.length / 2;
        const median = slopes.length % 2 === 1 ? slopes[Math.floor(half)] : (slopes[half - 1]! + slopes[half]!) / 2;
        const r = theilSen(rows.map(([x]) => x), rows.map(([, y]) => y));
        expect(r.kendallS).toBe(s);
        expect(r.slopes).toBe(slopes.length);
        if (slopes.length === 0) expect(r.estimate).toBeNull();
        else expect(r.estimate).toBeCloseTo(median!, 12);
      }),
    );
  });

  test('the variance of S is the one over all orders of y (exact permutation of five rows with ties)', () => {
    const x = [1, 2, 2, 3, 4];
    const y = [3, 3, 5, 5, 8];
    const orders = (values: number[]): number[][] =>
      values.length < 2 ? [values] : values.flatMap((value, i) => orders(values.toSpliced(i, 1)).map((rest) => [value, ...rest]));
    const all = orders(y).map((order) => theilSen(x, order).kendallS);
    const variance = all.reduce((sum, s) => sum + s * s, 0) / all.length;
    expect(theilSen(x, y).varianceS).toBeCloseTo(variance, 10);
  });

  test('rows in another order, weeks from another origin and grams for kilograms tell the same story', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(week, load), { minLength: 3, maxLength: 12 }), (rows) => {
        const plain = theilSen(rows.map(([x]) => x), rows.map(([, y]) => y));
        fc.pre(plain.lower !== null);
        const other = rows.toReversed();
        const r = theilSen(other.map(([x]) => x + 1000), other.map(([, y]) => 1000 * y));
        expect(r.estimate).toBeCloseTo(1000 * plain.estimate!, 8);
        expect(r.lower).toBeCloseTo(1000 * plain.lower!, 8);
        expect(r.upper).toBeCloseTo(1000 * plain.upper!, 8);
        expect(r.z).toBe(plain.z);
      }),
    );
  });

  test('a long record is answered by the same rule', () => {
    // y = x/4 in exact binary, one row far off: every other slope is exactly 1/4.
    const x = Float64Array.from({ length: 2_400 }, (_, i) => i);
    const y = x.map((value, i) => (i === 7 ? 1e6 : value / 4));
    expect(theilSen(x, y)).toMatchObject({ estimate: 0.25, lower: 0.25, upper: 0.25 });
  });

  test('no rows, one row, one week, all loads equal', () => {
    expect(theilSen([], [])).toMatchObject({ estimate: null, n: 0, reason: 'A slope needs two rows.' });
    expect(theilSen([1], [2])).toMatchObject({ estimate: null, n: 1 });
    expect(theilSen([3, 3, 3], [1, 2, 3])).toMatchObject({ estimate: null, slopes: 0 });
    expect(theilSen([1, 2, 3], [5, 5, 5])).toMatchObject({ estimate: 0, lower: null, upper: null });
    expect(theilSen([1, 2], [5, 6])).toMatchObject({ estimate: 1, lower: 1, upper: 1, note: expect.stringContaining('Too few') });
    expect(theilSen([1, 2, Number.NaN], [5, 6, 7])).toMatchObject({ n: 2, leftOut: [{ reason: 'value missing', count: 1 }] });
    expect(() => theilSen([1, 2], [1])).toThrow(RangeError);
    expect(() => theilSen([1, Infinity], [1, 2])).toThrow(RangeError);
    expect(() => theilSen([1, 2], [1, 2], 95)).toThrow(RangeError);
  });
});

describe('quantiles by hand', () => {
  test('type 7 at exact fractions: of 1, 2, 4, 8 the median is 3 and the quartiles are 7/4 and 5', () => {
    expect(quantile([8, 1, 4, 2], [0, 0.25, 0.5, 0.75, 1])).toEqual([1, 1.75, 3, 5, 8]);
    expect(quantile([], [0.5])).toEqual([null]);
    expect(quantile([7], [0.1, 0.9])).toEqual([7, 7]);
    expect(() => quantile([1, Number.NaN], [0.5])).toThrow(RangeError);
    expect(() => quantile([1], [1.5])).toThrow(RangeError);
  });

  test('bands hold every row once, ascend by week, and do not care for the order of rows', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(week, load), { maxLength: 30 }), (rows) => {
        const bands = (list: readonly (readonly [number, number])[]) =>
          quantileBands(list.map(([, y]) => y), list.map(([x]) => x), [0, 0.5, 1]);
        const r = bands(rows);
        expect(r.bands.reduce((sum, band) => sum + band.n, 0)).toBe(rows.length);
        expect(r.bands.map((band) => band.week)).toEqual([...new Set(rows.map(([x]) => x))].sort((a, b) => a - b));
        expect(bands(rows.toReversed()).bands.map((band) => band.quantiles)).toEqual(r.bands.map((band) => band.quantiles));
        for (const band of r.bands) {
          const own = rows.filter(([x]) => x === band.week).map(([, y]) => y);
          expect([band.quantiles[0], band.quantiles[2]]).toEqual([Math.min(...own), Math.max(...own)]);
        }
      }),
    );
  });

  test('order-statistic limits: five values cannot carry 95%', () => {
    expect(medianLimits([1, 2, 3, 4, 5])).toMatchObject({ estimate: 3, lower: null, upper: null, rankLower: 0, rankUpper: 6 });
    // Six values: P(min < median < max) = 1 - 2/64.
    expect(medianLimits([1, 2, 3, 4, 5, 6])).toMatchObject({ lower: 1, upper: 6 });
    expect(medianLimits([1, 2, 3, 4, 5, 6]).coverage).toBeCloseTo(62 / 64, 14);
    expect(medianLimits([])).toMatchObject({ estimate: null, n: 0 });
  });
});

describe('keeping to the rule', () => {
  test('11 kg after 10 kg, and 9.68 after 8.8, are within ten per cent', () => {
    expect(ruleAdherence([1, 1, 2, 2], [0, 1, 0, 1], [10, 11, 8.8, 9.68])).toMatchObject({ n: 2, events: 2, estimate: 1 });
    expect(ruleAdherence([1, 1, 2, 2], [0, 1, 0, 1], [10, 11.001, 8.8, 9.69])).toMatchObject({ n: 2, events: 0, estimate: 0 });
  });

  test('a gap in the weeks is no step, and another participant is no next week', () => {
    expect(ruleAdherence([1, 1, 2], [0, 2, 1], [10, 20, 30])).toMatchObject({ n: 0, estimate: null, reason: 'No rows.', medianRatio: null });
  });

  test('with one step a participant the clustered variance is p(1 - p)/(n - 1)', () => {
    // Two of five: 0.4 x 0.6 / 4 = 0.06.
    const r = clusteredProportion([1, 0, 0, 1, 0], [1, 2, 3, 4, 5]);
    expect(r.se! ** 2).toBeCloseTo(0.06, 15);
    expect(clusteredProportion([1, 0], [1, 1])).toMatchObject({ estimate: 0.5, se: null, lower: null });
    expect(clusteredProportion([], [])).toMatchObject({ estimate: null });
    expect(() => clusteredProportion([2], [1])).toThrow(RangeError);
  });

  test('two logs in one week, a load of nothing and half a week are refused', () => {
    expect(() => ruleAdherence([1, 1], [0, 0], [10, 11])).toThrow(RangeError);
    expect(() => ruleAdherence([1, 1], [0, 1], [0, 11])).toThrow(RangeError);
    expect(() => ruleAdherence([1, 1], [0, 0.5], [10, 11])).toThrow(RangeError);
  });
});

describe('reaching a load', () => {
  test('the interval ends at the first log that qualifies and begins at the last one below it', () => {
    const onset = loadOnset([1, 1, 1, 1, 2, 2, 3], [0, 2, 5, 6, 0, 3, 0], [6, 7.5, 8, 7, 6, 7, 9], 8);
    expect(Array.from(onset.left)).toEqual([2, 3, 0]);
    expect(Array.from(onset.right)).toEqual([5, Infinity, 0]);
    expect(Array.from(onset.time)).toEqual([5, 3, 0]);
    expect(loadIntervals(onset)).toMatchObject({ n: 2, events: 1, leftOut: [{ reason: 'at the load from week 0', count: 1 }] });
  });

  test('0.1 + 0.2 kg reaches 0.3 kg and 0.3 reaches 0.1 + 0.2', () => {
    expect(loadOnset([1], [0], [0.3], 0.1 + 0.2).events).toBe(1);
    expect(() => loadOnset([1], [-1], [8], 8)).toThrow(RangeError);
    expect(() => loadOnset([1], [0], [8], 0)).toThrow(RangeError);
  });

  test('nobody reaches it: the median does not exist and says so', () => {
    const r = timeToLoad([1, 2], [4, 6], [5, 5], 50);
    expect(r).toMatchObject({ events: 0, quartiles: { median: { estimate: null } } });
    expect(r.quartiles.median.reason).toBeTruthy();
  });
});

import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { blandAltman } from '@/stats/reliability/bland-altman';
import { icc } from '@/stats/reliability/icc';
import { measurementError } from '@/stats/reliability/measurement-error';
import { technicalError } from '@/stats/reliability/technical-error';
import { runTopic, tableOf, type ReferenceCase } from './reference';

const columnsOf = (reference: ReferenceCase): Float64Array[] => {
  const table = tableOf(reference);
  const names = reference.dataset?.columns ?? table.names.filter((name) => name.startsWith('j'));
  return names.map((name) => table.numbers(name));
};

runTopic('10-reliability', {
  'bland-altman-': (reference) => {
    const table = tableOf(reference);
    const r = blandAltman(table.numbers('wright1'), table.numbers('mini1'));
    return {
      n: r.n,
      bias: r.estimate,
      sd_diff: r.sdOfDifferences,
      bias_se: r.biasSe,
      bias_lower: r.lower,
      bias_upper: r.upper,
      loa_lower: r.lowerLimit.estimate,
      loa_upper: r.upperLimit.estimate,
      loa_se: r.limitSe,
      loa_lower_ci_lo: r.lowerLimit.lower,
      loa_lower_ci_hi: r.lowerLimit.upper,
      loa_upper_ci_lo: r.upperLimit.lower,
      loa_upper_ci_hi: r.upperLimit.upper,
      loa_se_1986_approx: r.limitSeRough,
      exact_loa_lower_ci_lo: r.lowerLimitExact.lower,
      exact_loa_lower_ci_hi: r.lowerLimitExact.upper,
      exact_loa_upper_ci_lo: r.upperLimitExact.lower,
      exact_loa_upper_ci_hi: r.upperLimitExact.upper,
      prop_bias_slope: r.proportionalBias,
      corr_diff_mean: r.correlation,
    };
  },
  'tem-': (reference) => {
    const table = tableOf(reference);
    const meter = reference.id.slice('tem-'.length);
    const r = technicalError(table.numbers(`${meter}1`), table.numbers(`${meter}2`));
    return { n: r.n, tem_dahlberg: r.estimate, tem_relative_percent: r.relativePercent, tem_bias_free: r.biasFree, reliability_R: r.reliability };
  },
  'icc-': (reference) => {
    const columns = columnsOf(reference);
    const r = icc(columns);
    const error = measurementError(columns);
    return {
      anova: {
        n: r.anova.n,
        k: r.anova.k,
        ms_rows: r.anova.meanSquareRows,
        ms_cols: r.anova.meanSquareColumns,
        ms_error: r.anova.meanSquareError,
        ms_within: r.anova.meanSquareWithin,
      },
      icc_1_1: r.oneWaySingle,
      icc_2_1_A1: { ...r.agreementSingle, satterthwaite_v: r.agreementDf },
      icc_3_1_C1: r.consistencySingle,
      icc_1_k: r.oneWayAverage,
      icc_2_k_Ak: r.agreementAverage,
      icc_3_k_Ck: r.consistencyAverage,
      f_test_rows: { ...r.rowsTest, F: r.rowsTest.f },
      f_test_cols: { ...r.columnsTest, F: r.columnsTest.f },
      sem_consistency: error.estimate,
      sem_agreement: error.semAgreement,
      sdc95_consistency: error.sdcConsistency,
      sdc95_agreement: error.sdcAgreement,
      sem_consistency_ci: { lower: error.lower, upper: error.upper },
      variance_between_columns: error.varianceBetweenColumns,
      variance_between_rows: error.varianceBetweenRows,
    };
  },
});

const reading = fc.double({ min: 100, max: 400, noNaN: true });
const pairs = fc.array(fc.tuple(reading, reading), { minLength: 3, maxLength: 12 });

describe('agreement by hand', () => {
  test('the mean squares equal sums over all cells written out', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(reading, reading, reading), { minLength: 3, maxLength: 8 }), (rows) => {
        const n = rows.length;
        const mean = (values: number[]): number => values.reduce((a, b) => a + b, 0) / values.length;
        const grand = mean(rows.flat());
        const columns = [0, 1, 2].map((c) => rows.map((row) => row[c]!));
        let error = 0;
        rows.forEach((row) => row.forEach((value, c) => { error += (value - mean(row) - mean(columns[c]!) + grand) ** 2; }));
        const { anova } = icc(columns);
        expect(anova.meanSquareError).toBeCloseTo(error / (2 * (n - 1)), 6);
        expect(anova.meanSquareRows).toBeCloseTo((3 * rows.reduce((sum, row) => sum + (mean(row) - grand) ** 2, 0)) / (n - 1), 6);
        // Total = rows + columns + error, and within = columns + error.
        const within = anova.meanSquareWithin! * 2 * n;
        expect(within).toBeCloseTo(anova.meanSquareColumns! * 2 + anova.meanSquareError! * 2 * (n - 1), 5);
      }),
    );
  });

  test('exact fractions: two readings of three subjects', () => {
    // Rows (1,2) (3,3) (5,4): row means 3/2, 3, 9/2, so MSR = 2 (9/4 + 9/4)/2 = 9/2; columns mean 3 and 3, so MSC = 0;
    // MSW = (1/2 + 0 + 1/2)/3 = 1/3; MSE = 1/2. ICC(1,1) = (9/2 - 1/3)/(9/2 + 1/3) = 25/29; ICC(3,1) = 4/5;
    // ICC(2,1) = 4/(5 - 1/3) = 6/7.
    const r = icc([[1, 3, 5], [2, 3, 4]]);
    expect(r.oneWaySingle.estimate).toBeCloseTo(25 / 29, 14);
    expect(r.consistencySingle.estimate).toBeCloseTo(4 / 5, 14);
    expect(r.agreementSingle.estimate).toBeCloseTo(6 / 7, 14);
    expect(technicalError([1, 3, 5], [2, 3, 4]).estimate).toBeCloseTo(Math.sqrt(1 / 3), 15);
    expect(blandAltman([1, 3, 5], [2, 3, 4]).estimate).toBe(0);
  });

  test('row order, a common shift of 1e9 and a change of unit leave the correlations alone', () => {
    fc.assert(
      fc.property(pairs, (rows) => {
        const a = rows.map(([value]) => Math.round(value));
        const b = rows.map(([, value]) => Math.round(value));
        fc.pre(new Set(a).size > 1 && a.some((value, row) => value !== b[row]));
        const plain = icc([a, b]).agreementSingle.estimate!;
        expect(icc([a.toReversed(), b.toReversed()]).agreementSingle.estimate).toBeCloseTo(plain, 10);
        expect(icc([a.map((v) => v + 1e9), b.map((v) => v + 1e9)]).agreementSingle.estimate).toBeCloseTo(plain, 10);
        expect(icc([a.map((v) => v / 10), b.map((v) => v / 10)]).agreementSingle.estimate).toBeCloseTo(plain, 10);
        const agreement = blandAltman(a, b);
        const shifted = blandAltman(a.map((v) => v + 1e9), b.map((v) => v + 1e9));
        expect(shifted.sdOfDifferences).toBeCloseTo(agreement.sdOfDifferences!, 8);
        // Swapping the methods mirrors the limits.
        const mirrored = blandAltman(b, a);
        expect(mirrored.upperLimitExact.upper).toBeCloseTo(-agreement.lowerLimitExact.lower!, 8);
      }),
    );
  });

  test('a negative correlation is not cut to zero', () => {
    expect(icc([[1, 2, 3], [3, 2, 1]]).consistencySingle.estimate).toBeCloseTo(-1, 14);
  });
});

describe('where a number does not exist it says why', () => {
  test('no pairs, one pair', () => {
    expect(blandAltman([], [])).toMatchObject({ estimate: null, n: 0, reason: 'No pairs of readings.' });
    expect(blandAltman([3], [1])).toMatchObject({ estimate: 2, lower: null, sdOfDifferences: null });
    expect(technicalError([], [])).toMatchObject({ estimate: null, n: 0 });
    expect(icc([[1], [2]]).oneWaySingle).toMatchObject({ estimate: null, reason: 'A correlation needs two or more subjects.' });
    expect(measurementError([[1], [2]])).toMatchObject({ estimate: null });
  });

  test('all readings equal, and readings without any disagreement', () => {
    expect(icc([[2, 2, 2], [2, 2, 2]]).agreementSingle).toMatchObject({ estimate: null });
    expect(icc([[1, 2, 4], [1, 2, 4]]).agreementSingle).toMatchObject({ estimate: 1, lower: null });
    expect(technicalError([2, 2], [2, 2])).toMatchObject({ estimate: 0, reliability: null });
    expect(blandAltman([1, 2, 3], [1, 2, 3])).toMatchObject({ estimate: 0, lower: 0, upper: 0, correlation: null });
  });

  test('a steady shift between methods is consistency without agreement', () => {
    const r = icc([[1, 2, 4], [3, 4, 6]]);
    expect(r.consistencySingle.estimate).toBe(1);
    expect(r.agreementSingle.estimate).toBeLessThan(1);
    expect(Number.isFinite(r.agreementSingle.lower!)).toBe(true);
    expect(r.columnsTest).toMatchObject({ f: null, p: 0 });
  });

  test('a missing reading leaves its subject out and is counted', () => {
    const r = technicalError([1, 3, 5, 9], [2, 3, 4, Number.NaN]);
    expect(r).toMatchObject({ n: 3, leftOut: [{ reason: 'value missing', count: 1 }] });
    expect(r.estimate).toBeCloseTo(Math.sqrt(1 / 3), 15);
  });

  test('misuse is refused', () => {
    expect(() => icc([[1, 2]])).toThrow(RangeError);
    expect(() => blandAltman([1, 2], [1])).toThrow(RangeError);
    expect(() => blandAltman([1, Infinity], [1, 2])).toThrow(RangeError);
    expect(() => technicalError([1, 2], [1, 2], 1)).toThrow(RangeError);
  });
});

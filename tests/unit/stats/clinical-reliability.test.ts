import { describe, expect, test } from 'vitest';
import { weeklyProgression } from '@/stats/progression/weekly-progression';
import { blandAltman } from '@/stats/reliability/bland-altman';
import { falseChange, maxSemForThreshold } from '@/stats/reliability/false-change';
import { icc } from '@/stats/reliability/icc';
import { sdcFromSem } from '@/stats/reliability/sdc-from-sem';
import { semFromIcc } from '@/stats/reliability/sem-from-icc';
import { technicalError } from '@/stats/reliability/technical-error';
import { readReference } from './reference';

/** The inputs of all kinds together; each case carries those of its own kind. */
interface Inputs {
  readonly ratings: number[][];
  readonly method_a_ml: number[];
  readonly method_b_ml: number[];
  readonly pairs_cm: number[][];
  readonly sd_ml: number;
  readonly icc: number;
  readonly sem_pct: number;
  readonly thresholds_pct: number[];
  readonly sem_pct_per_arm: number;
  readonly threshold_pct: number;
  readonly true_change: number;
  readonly week_loads_kg: number[];
}

interface Check {
  readonly id: string;
  readonly kind: string;
  readonly inputs: Inputs;
  readonly expected: Readonly<Record<string, unknown>>;
  readonly tolerance: number;
}

/** The published figures use 1.96 and 1.645, not the exact normal quantiles; the cases ask for theirs. */
const PRINTED = 1.96;
const PRINTED_90 = 1.645;

const answers: Readonly<Record<string, (inputs: Inputs) => Readonly<Record<string, unknown>>>> = {
  icc: ({ ratings }) => {
    const r = icc(ratings[0]!.map((_, column) => ratings.map((row) => row[column]!)));
    return {
      icc_1_1: r.oneWaySingle.estimate,
      icc_2_1: r.agreementSingle.estimate,
      icc_3_1: r.consistencySingle.estimate,
      icc_2_k: r.agreementAverage.estimate,
      icc_3_k: r.consistencyAverage.estimate,
    };
  },
  bland_altman: ({ method_a_ml: a, method_b_ml: b }) => {
    const r = blandAltman(a, b, { multiplier: PRINTED });
    return {
      bias_ml: r.estimate,
      sd_ml: r.sdOfDifferences,
      loa_ml: [r.lowerLimit.estimate, r.upperLimit.estimate],
      se_bias: r.biasSe,
      se_loa_approx: r.limitSeRough,
    };
  },
  technical_error_of_measurement: ({ pairs_cm: pairs }) => {
    const r = technicalError(pairs.map((pair) => pair[0]!), pairs.map((pair) => pair[1]!));
    return { tem_cm: r.estimate, relative_tem_pct: r.relativePercent, sdc95_cm: sdcFromSem(r.estimate!, { multiplier: PRINTED }) };
  },
  sem_from_icc: ({ sd_ml: sd, icc: reliability }) => {
    const sem = semFromIcc(sd, reliability);
    return { sem_ml: sem, sdc95_ml: sdcFromSem(sem, { multiplier: PRINTED }) };
  },
  sdc_from_sem: ({ sem_pct: sem }) => ({
    sdc95_pct: sdcFromSem(sem, { multiplier: PRINTED }),
    sdc90_pct: sdcFromSem(sem, { multiplier: PRINTED_90 }),
  }),
  max_sem_for_threshold: ({ thresholds_pct: thresholds }) => ({
    max_sem_pct: thresholds.map((threshold) => maxSemForThreshold(threshold, { multiplier: PRINTED })),
  }),
  rvc_false_positive: ({ sem_pct_per_arm: semPercent, threshold_pct: thresholdPercent, true_change: trueChangePercent }) => {
    const r = falseChange({ semPercent, thresholdPercent, trueChangePercent, multiplier: PRINTED });
    return { sd_rvc_pct: r.sdOfChange, sdc95_rvc_pct: r.sdc95, p_single_visit: r.probability };
  },
  weekly_progression: ({ week_loads_kg: loads }) => {
    const r = weeklyProgression(loads);
    return {
      slope_kg_per_week: r.slopePerWeek,
      total_change_kg: r.totalChange,
      pct_change: r.percentChange,
      weeks_with_raise: r.weeksWithRaise,
      max_step_kg: r.largestStep,
    };
  },
};

describe('published figures of agreement and progression', () => {
  const checks = readReference('clinical-checks.json') as Check[];
  const known = checks.filter(({ kind }) => kind in answers);

  test('every kind named here has a case', () => {
    expect(new Set(known.map(({ kind }) => kind))).toEqual(new Set(Object.keys(answers)));
  });

  for (const { id, kind, inputs, expected, tolerance } of known) {
    test(`${id} ${kind}`, () => {
      const got = answers[kind]!(inputs);
      for (const [name, want] of Object.entries(expected)) {
        const values = [want].flat() as number[];
        const own = [got[name]].flat() as number[];
        expect(own, name).toHaveLength(values.length);
        values.forEach((value, at) => expect(Math.abs(own[at]! - value), name).toBeLessThanOrEqual(tolerance));
      }
    });
  }

  test('REL-07: bias +- 1.96 SD gives the published limits back, to the rounding of print', () => {
    const [check] = checks.filter(({ kind }) => kind === 'published_agreement');
    const figures = check!.expected as Record<string, number & readonly [number, number]>;
    const limitsOf = (bias: number, sd: number): readonly (number | null)[] => {
      // Three differences with exactly this mean and SD.
      const r = blandAltman([bias - sd, bias, bias + sd], [0, 0, 0], { multiplier: PRINTED });
      return [r.lowerLimit.estimate, r.upperLimit.estimate];
    };
    for (const [name, rounding] of [['', 0.5], ['interlimb_diff_', 0.5], ['excess_pct_', 0.05]] as const) {
      const unit = name === 'excess_pct_' ? '' : '_ml';
      const [lower, upper] = figures[`${name}loa${unit}`]!;
      const [low, high] = limitsOf(figures[`${name}bias${unit}`]!, (upper! - lower!) / 2 / PRINTED);
      expect(Math.abs(low! - lower!)).toBeLessThanOrEqual(rounding);
      expect(Math.abs(high! - upper!)).toBeLessThanOrEqual(rounding);
    }
  });
});

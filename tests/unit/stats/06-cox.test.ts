import { cox, type CoxFit } from '@/stats/survival/cox';
import { cumulativeHazard, predictSurvival } from '@/stats/survival/cox-baseline';
import type { CoxData } from '@/stats/survival/cox-design';
import { proportionalHazardsTest, type PhForm, type TimeTransform } from '@/stats/survival/cox-ph-test';
import type { ChiSquareTest } from '@/stats/survival/log-rank';
import { lastNotAfter } from '@/stats/survival/times';
import { columnOf, followUpOf, levelOf, levelsOf, tableOf } from './follow-up-columns';
import { runTopic, type ReferenceCase, type Table } from './reference';

interface Expected {
  readonly coef: Record<string, number>;
  readonly baseline_cumhaz_x0?: { readonly time: number[] };
  readonly predicted?: { readonly newdata: Record<string, number>; readonly time: number[] };
}

/** Coded covariates that the cases name in words. */
const CODED: Record<string, (table: Table) => Float64Array> = {
  g6: (table) => indicator(table.text('treat'), 'control'),
  ct_smallcell: (table) => indicator(table.text('celltype'), 'smallcell'),
  ct_adeno: (table) => indicator(table.text('celltype'), 'adeno'),
  ct_large: (table) => indicator(table.text('celltype'), 'large'),
  trt2: (table) => indicator(table.text('trt'), '2'),
  tx: (table) => table.numbers('transplant'),
};

function indicator(cells: readonly string[], level: string): Float64Array {
  return Float64Array.from(cells, (cell) => (cell === level ? 1 : 0));
}

function dataOf(reference: ReferenceCase): CoxData {
  const table = tableOf(reference);
  const names = Object.keys((reference.expected as Expected).coef);
  const stratum = columnOf(reference, 'strata', [[/lung-strata/, 'ph.ecog'], [/bladder/, 'enum']]);
  const cluster = columnOf(reference, 'cluster', [[/cluster-site/, 'inst'], [/cluster-id|bladder/, 'id']]);
  return {
    ...followUpOf(table),
    x: names.map((name) => (CODED[name] ? CODED[name](table) : table.numbers(name))),
    ...(stratum && { stratum: levelsOf(table.text(stratum)).codes }),
    ...(cluster && { cluster: levelsOf(table.text(cluster)).codes }),
  };
}

const plain = ({ chiSquare, df, p }: ChiSquareTest) => ({ chisq: chiSquare, df, p });

function phTests(data: CoxData, fit: CoxFit, names: string[], form: PhForm) {
  return Object.fromEntries(
    (['km', 'identity', 'rank', 'log'] as TimeTransform[]).map((transform) => {
      const { covariates, global } = proportionalHazardsTest(data, fit, { form, transform });
      const all = [...covariates, { ...global, rho: null }];
      return [
        transform,
        { rows: [...names, 'GLOBAL'], rho: all.map(({ rho }) => rho), chisq: all.map((one) => one.chiSquare), df: all.map(({ df }) => df), p: all.map(({ p }) => p) },
      ];
    }),
  );
}

function fitted(reference: ReferenceCase) {
  const { coef, baseline_cumhaz_x0: baseline, predicted } = reference.expected as Expected;
  const names = Object.keys(coef);
  const data = dataOf(reference);
  const fit = cox(data, { ties: reference.id.includes('breslow') ? 'breslow' : 'efron', names, level: levelOf(reference) });
  const named = (read: (at: CoxFit['coefficients'][number]) => unknown) => Object.fromEntries(fit.coefficients.map((one) => [one.name, read(one)]));
  const [curve] = cumulativeHazard(data, fit, names.map(() => 0));
  const survival = predicted && predictSurvival(data, fit, names.map((name) => predicted.newdata[name]!), predicted.time);
  return {
    n: fit.n,
    n_event: fit.events,
    coef: named(({ estimate }) => estimate),
    se: named(({ se }) => se),
    vcov: fit.covariance,
    hr: named(({ hazardRatio }) => hazardRatio.estimate),
    hr_lower: named(({ hazardRatio }) => hazardRatio.lower),
    hr_upper: named(({ hazardRatio }) => hazardRatio.upper),
    loglik_null: fit.logLikelihoodNull,
    loglik: fit.logLikelihood,
    lrt: plain(fit.likelihoodRatio),
    wald: plain(fit.wald),
    score: plain(fit.score),
    ...(fit.robustWald && {
      robust_se: named(({ robustSe }) => robustSe),
      robust_vcov: fit.robustCovariance,
      robust_hr_lower: named(({ robustHazardRatio }) => robustHazardRatio?.lower),
      robust_hr_upper: named(({ robustHazardRatio }) => robustHazardRatio?.upper),
      robust_wald: plain(fit.robustWald),
    }),
    ph_test_score: phTests(data, fit, names, 'score'),
    ph_test_classic: phTests(data, fit, names, 'classic'),
    ...(baseline && { baseline_cumhaz_x0: { time: baseline.time, cumhaz: baseline.time.map((t) => curve!.hazard[lastNotAfter(curve!.time, t)] ?? 0) } }),
    ...(survival && {
      predicted: {
        newdata: predicted.newdata,
        time: predicted.time,
        surv: survival.map(({ estimate }) => estimate),
        se: survival.map(({ se }) => se),
        loglog_lower: survival.map(({ lower }) => lower),
        loglog_upper: survival.map(({ upper }) => upper),
      },
    }),
  };
}

runTopic('06-cox', { 'cox-': fitted });

import { kaplanMeier, type SurvivalCurve } from '@/stats/survival/kaplan-meier';
import type { LimitKind } from '@/stats/survival/limits';
import { logRank } from '@/stats/survival/log-rank';
import { nelsonAalen } from '@/stats/survival/nelson-aalen';
import { numberAtRisk } from '@/stats/survival/number-at-risk';
import { quantileOf } from '@/stats/survival/quantile-of';
import { rmst } from '@/stats/survival/rmst';
import { survivalAt } from '@/stats/survival/survival-at';
import { columnOf, followUpOf, levelOf, levelsOf, tableOf } from './follow-up-columns';
import { runTopic, type ReferenceCase } from './reference';

interface Expected {
  readonly time: number[];
  readonly p: number[];
  readonly tau: number;
  readonly quantiles?: { readonly p: number[] };
}

const KINDS: readonly LimitKind[] = ['log-log', 'log', 'plain'];

function curvesOf(reference: ReferenceCase): Record<LimitKind, SurvivalCurve> {
  const data = followUpOf(tableOf(reference));
  return Object.fromEntries(KINDS.map((limits) => [limits, kaplanMeier(data, { limits, level: levelOf(reference) })])) as Record<LimitKind, SurvivalCurve>;
}

/** 'log-log' to 'loglog_lower', as the cases name their limits. */
function limitsNamed(read: (kind: LimitKind) => readonly { readonly lower: number | null; readonly upper: number | null }[]) {
  return Object.fromEntries(
    KINDS.flatMap((kind) => {
      const name = kind.replace('-', '');
      const values = read(kind);
      return [
        [`${name}_lower`, values.map(({ lower }) => lower)],
        [`${name}_upper`, values.map(({ upper }) => upper)],
      ];
    }),
  );
}

function steps(reference: ReferenceCase) {
  const curves = curvesOf(reference);
  const curve = curves['log-log'];
  const { quantiles } = reference.expected as Expected;
  const at = [...curve.time.keys()].filter((g) => curve.eventsAt[g]! > 0);
  const hazard = nelsonAalen(curve);
  return {
    time: at.map((g) => curve.time[g]),
    n_risk: at.map((g) => curve.atRisk[g]),
    n_event: at.map((g) => curve.eventsAt[g]),
    surv: at.map((g) => curve.survival[g]),
    se_greenwood: at.map((g) => curve.se[g]),
    ...limitsNamed((kind) => at.map((g) => ({ lower: curves[kind].lower[g]!, upper: curves[kind].upper[g]! }))),
    nelson_aalen: at.map((g) => hazard.hazard[g]),
    nelson_aalen_se: at.map((g) => hazard.se[g]),
    ...(quantiles && { quantiles: quantilesAt(curves, quantiles.p) }),
  };
}

function quantilesAt(curves: Record<LimitKind, SurvivalCurve>, p: readonly number[]) {
  return { p, time: p.map((share) => quantileOf(curves['log-log'], share).estimate), ...limitsNamed((kind) => p.map((share) => quantileOf(curves[kind], share))) };
}

function chosenTimes(reference: ReferenceCase) {
  const curves = curvesOf(reference);
  const { time } = reference.expected as Expected;
  const read = (kind: LimitKind) => time.map((t) => survivalAt(curves[kind], t));
  return {
    time,
    n_risk: numberAtRisk(followUpOf(tableOf(reference)), time),
    surv: read('log-log').map(({ estimate }) => estimate),
    se_greenwood: read('log-log').map(({ se }) => se),
    ...limitsNamed(read),
  };
}

function restrictedMean(reference: ReferenceCase) {
  const { tau } = reference.expected as Expected;
  const { estimate, se, lower, upper } = rmst(kaplanMeier(followUpOf(tableOf(reference)), { level: levelOf(reference) }), tau);
  return { tau, rmst: estimate, se, lower, upper };
}

function test(reference: ReferenceCase) {
  const table = tableOf(reference);
  const group = columnOf(reference, 'group', [[/6mp/, 'treat'], [/celltype/, 'celltype'], [/lung/, 'sex'], [/./, 'group']])!;
  const stratum = columnOf(reference, 'strata', [[/stratified/, 'ph.ecog']]);
  const { levels, codes } = levelsOf(table.text(group));
  const rho = typeof reference.params?.rho === 'number' ? reference.params.rho : reference.id.startsWith('peto') ? 1 : 0;
  const result = logRank({ ...followUpOf(table), group: codes, ...(stratum && { stratum: levelsOf(table.text(stratum)).codes }) }, { rho });
  return {
    groups: levels,
    n: result.groups.map(({ n }) => n),
    observed: result.groups.map(({ observed }) => observed),
    expected: result.groups.map(({ expected }) => expected),
    variance: result.variance,
    chisq: result.chiSquare,
    df: result.df,
    p: result.p,
    trend_chisq_scores_1_to_k: result.trend.chiSquare,
    trend_p: result.trend.p,
  };
}

const quantiles = (reference: ReferenceCase) => quantilesAt(curvesOf(reference), (reference.expected as Expected).p);

runTopic('03-kaplan-meier', {
  'km-6mp-steps': steps,
  'km-control-steps': steps,
  'km-ovarian-steps': steps,
  'km-quantiles-': quantiles,
  'km-lung-median': quantiles,
  'km-flat-median': quantiles,
  'km-lung-at': chosenTimes,
  'km-left-truncated': chosenTimes,
  'rmst-': restrictedMean,
  'logrank-': test,
  'peto-': test,
});

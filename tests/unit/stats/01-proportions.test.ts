import { breslowDayTest } from '@/stats/proportion/breslow-day-test';
import { chiSquareTest } from '@/stats/proportion/chi-square-test';
import { clopperPearson } from '@/stats/proportion/clopper-pearson';
import { conditionalOddsRatio } from '@/stats/proportion/conditional-odds-ratio';
import type { FourfoldTable } from '@/stats/proportion/counts';
import { fisherExact } from '@/stats/proportion/fisher-exact';
import { fisherExactTable } from '@/stats/proportion/fisher-exact-table';
import { katzRiskRatio, type RatioEstimate } from '@/stats/proportion/katz-risk-ratio';
import { mantelHaenszel } from '@/stats/proportion/mantel-haenszel';
import { newcombeDifference } from '@/stats/proportion/newcombe-difference';
import { oddsRatio } from '@/stats/proportion/odds-ratio';
import type { Strata } from '@/stats/proportion/strata';
import { wilsonInterval } from '@/stats/proportion/wilson-interval';
import { inlineOf, runTopic, tableOf, type Adapter, type ReferenceCase } from './reference';

const levelOf = ({ params }: ReferenceCase) => Number(params?.conf ?? 0.95);
const logged = (ratio: RatioEstimate) => ({ ...ratio, se_log: ratio.standardErrorLog });

const oneProportion: Adapter = (reference) => {
  const { x, n } = inlineOf(reference) as { x: number; n: number };
  const group = { events: x, n, level: levelOf(reference) };
  return { wilson: wilsonInterval(group), clopper_pearson: clopperPearson(group) };
};

const twoByTwo: Adapter = (reference) => {
  const table = { ...(inlineOf(reference) as unknown as FourfoldTable), level: levelOf(reference) };
  const { a, b, c, d, level } = table;
  const groups = { events1: a, n1: a + b, events2: c, n2: c + d, level };
  const fisher = fisherExact(table);
  const conditional = conditionalOddsRatio(table);
  const tests = chiSquareTest(table);
  return {
    risk_ratio: logged(katzRiskRatio(groups)),
    odds_ratio: logged(oddsRatio(table)),
    fisher: {
      p_two_sided_minlike: fisher.p,
      p_less: fisher.pLess,
      p_greater: fisher.pGreater,
      p_midp_two_sided: fisher.pMidCentral,
      or_conditional_mle: conditional.estimate,
      or_exact_lower: conditional.lower,
      or_exact_upper: conditional.upper,
      or_midp_lower: conditional.midPLower,
      or_midp_upper: conditional.midPUpper,
    },
    chisq: { chisq: tests.pearson.statistic, p: tests.pearson.p, chisq_yates: tests.yates.statistic, p_yates: tests.yates.p },
    newcombe_difference: newcombeDifference(groups),
  };
};

function stratified(strata: Strata) {
  const mh = mantelHaenszel(strata);
  const homogeneity = breslowDayTest(strata);
  return {
    cmh: mh.test.statistic,
    cmh_p: mh.test.p,
    cmh_corrected: mh.testCorrected.statistic,
    cmh_corrected_p: mh.testCorrected.p,
    or_mh: mh.oddsRatio.estimate,
    or_se_log: mh.oddsRatio.standardErrorLog,
    or_lower: mh.oddsRatio.lower,
    or_upper: mh.oddsRatio.upper,
    rr_mh: mh.riskRatio.estimate,
    rr_se_log: mh.riskRatio.standardErrorLog,
    rr_lower: mh.riskRatio.lower,
    rr_upper: mh.riskRatio.upper,
    rd_mh: mh.riskDifference.estimate,
    rd_se: mh.riskDifference.standardError,
    rd_lower: mh.riskDifference.lower,
    rd_upper: mh.riskDifference.upper,
    breslow_day: homogeneity.breslowDay.statistic,
    breslow_day_tarone: homogeneity.tarone.statistic,
    bd_df: homogeneity.degreesOfFreedom,
    bd_p: homogeneity.breslowDay.p,
    tarone_p: homogeneity.tarone.p,
  };
}

runTopic('01-proportions', {
  'prop-': oneProportion,
  'diff-newcombe-': (reference) => {
    const { x1, n1, x2, n2 } = inlineOf(reference) as { x1: number; n1: number; x2: number; n2: number };
    return { newcombe: newcombeDifference({ events1: x1, n1, events2: x2, n2, level: levelOf(reference) }) };
  },
  'two-': twoByTwo,
  'fisher-rxc-': ({ dataset }) => fisherExactTable(dataset?.inline_rows as number[][]),
  'cmh-ucb': (reference) => {
    const table = tableOf(reference);
    const cell = (gender: string, admit: string) =>
      table.where((row) => table.text('Gender')[row] === gender && table.text('Admit')[row] === admit).numbers('Freq');
    return stratified({
      a: cell('Male', 'Admitted'),
      b: cell('Male', 'Rejected'),
      c: cell('Female', 'Admitted'),
      d: cell('Female', 'Rejected'),
    });
  },
  'cmh-esoph': (reference) => {
    const table = tableOf(reference);
    const exposed = table.filter('alcohol_80plus = TRUE');
    const rest = table.filter('alcohol_80plus = FALSE');
    return stratified({
      a: exposed.numbers('ncases'),
      b: exposed.numbers('ncontrols'),
      c: rest.numbers('ncases'),
      d: rest.numbers('ncontrols'),
    });
  },
});

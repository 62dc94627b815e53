/**
 * All of the statistics module. Pure: columns of numbers in, plain objects
 * out; no dates, no input or output, nothing of the project. Each function has
 * its file; `registry` says how each computes and where that is published.
 */
export { criticalValue } from './critical-value';
export { leastSquares } from './linear/least-squares';
export { meanAndDeviation } from './linear/mean-and-deviation';
export { oneWayAnova } from './linear/one-way-anova';
export { breslowDayTest } from './proportion/breslow-day-test';
export { chiSquareTest } from './proportion/chi-square-test';
export { clopperPearson } from './proportion/clopper-pearson';
export { conditionalOddsRatio } from './proportion/conditional-odds-ratio';
export { fisherExactTable } from './proportion/fisher-exact-table';
export { fisherExact } from './proportion/fisher-exact';
export { katzRiskRatio } from './proportion/katz-risk-ratio';
export { koopmanRiskRatio } from './proportion/koopman-risk-ratio';
export { mantelHaenszel } from './proportion/mantel-haenszel';
export { miettinenNurminenDifference } from './proportion/miettinen-nurminen-difference';
export { newcombeDifference } from './proportion/newcombe-difference';
export { oddsRatio } from './proportion/odds-ratio';
export { riskRatio } from './proportion/risk-ratio';
export { waldDifference } from './proportion/wald-difference';
export { waldProportion } from './proportion/wald-proportion';
export { wilsonInterval } from './proportion/wilson-interval';
export { digitPreference } from './quality/digit-preference';
export { intervalSymmetry } from './quality/interval-symmetry';
export { pFromInterval } from './quality/p-from-interval';
export { Mt19937 } from './random/mt19937';
export { Pcg32 } from './random/pcg32';
export { nextBelow, nextDouble } from './random/source';
export { splitMix64 } from './random/split-mix64';
export { Xoshiro128 } from './random/xoshiro128';
export { xoshiro256 } from './random/xoshiro256';
export { directStandardisedRate } from './rate/direct-standardised-rate';
export { exactRate } from './rate/exact-rate';
export { mantelHaenszelRateRatio } from './rate/mantel-haenszel-rate-ratio';
export { midPRate } from './rate/mid-p-rate';
export { personTime } from './rate/person-time';
export { rateDifference } from './rate/rate-difference';
export { rateRatioExact } from './rate/rate-ratio-exact';
export { rateRatioMidP } from './rate/rate-ratio-mid-p';
export { rateRatioWald } from './rate/rate-ratio-wald';
export { methodOf, statistics } from './registry';
export { cumulativeHazard } from './survival/cox-baseline';
export { proportionalHazardsTest } from './survival/cox-ph-test';
export { cox } from './survival/cox';
export { cumulativeIncidence } from './survival/cumulative-incidence';
export { grayTest } from './survival/gray';
export { intervalOnset } from './survival/interval-onset';
export { intervalRegression } from './survival/interval-regression';
export { kaplanMeier } from './survival/kaplan-meier';
export { logRank } from './survival/log-rank';
export { nelsonAalen } from './survival/nelson-aalen';
export { quantileOf } from './survival/quantile-of';
export { rmst, rmstDifference } from './survival/rmst';
export { betaDist, binomial, chiSquare, fisherF, gammaDist, hypergeometric, noncentralT, normal, poisson, studentT } from './distributions';
export type { Statistic, StatisticName } from './registry';
export type { Estimate, Interval, Provenance } from './result';

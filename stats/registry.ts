/**
 * How each figure is computed, in one place: screens and reports print the
 * method sentence and its reference from here, and the functions put the same
 * sentence in their results. In alphabetical order of name; a name is the
 * function's own.
 */

import { defineStatistic, type Statistic } from './define-statistic';
import { modelStatistics } from './registry-models';

export { defineStatistic, type Statistic };

const comparisons = [
  defineStatistic({
    name: 'breslowDayTest',
    method: 'Breslow-Day test of equal odds ratios, with Tarone’s correction',
    reference: 'Breslow NE, Day NE. Statistical Methods in Cancer Research I, 1980; Tarone RE. Biometrika 1985;72:91-95',
  }),
  defineStatistic({
    name: 'chiSquareTest',
    method: 'Chi-square test of a 2 by 2 table: Pearson, with Yates’ correction, and likelihood ratio',
    reference: 'Pearson K. Phil Mag 1900;50:157-175; Yates F. J R Stat Soc Suppl 1934;1:217-235',
  }),
  defineStatistic({
    name: 'clopperPearson',
    method: 'Clopper-Pearson exact limits of a proportion',
    reference: 'Clopper CJ, Pearson ES. Biometrika 1934;26:404-413',
  }),
  defineStatistic({
    name: 'conditionalOddsRatio',
    method: 'Odds ratio by conditional maximum likelihood, exact and mid-P limits',
    reference: 'Cornfield J. Proc 3rd Berkeley Symp 1956;4:135-148; Berry G, Armitage P. Statistician 1995;44:417-423',
  }),
  defineStatistic({
    name: 'cox',
    method: 'Cox proportional-hazards regression, Efron’s or Breslow’s ties, strata, Lin-Wei standard errors by cluster',
    reference:
      'Cox DR. J R Stat Soc B 1972;34:187-220; Efron B. J Am Stat Assoc 1977;72:557-565; Breslow N. Biometrics 1974;30:89-99; Lin DY, Wei LJ. J Am Stat Assoc 1989;84:1074-1078',
  }),
  defineStatistic({
    name: 'cumulativeHazard',
    method: 'Cumulative hazard at given covariates from a Cox fit',
    reference: 'Link CL. Biometrics 1984;40:601-610; Therneau TM, Grambsch PM. Modeling Survival Data, 2000, ch. 10',
  }),
  defineStatistic({
    name: 'cumulativeIncidence',
    method: 'Aalen-Johansen cumulative incidence with competing causes, multinomial variance, log-log limits',
    reference:
      'Aalen OO, Johansen S. Scand J Stat 1978;5:141-150; Marubini E, Valsecchi MG. Analysing Survival Data from Clinical Trials and Observational Studies, 1995, ch. 10',
  }),
  defineStatistic({
    name: 'digitPreference',
    method: 'Chi-square test that terminal digits are even',
    reference: 'Pearson K. Phil Mag 1900;50:157-175; thresholds of the flag are common practice, no source',
  }),
  defineStatistic({
    name: 'directStandardisedRate',
    method: 'Directly standardised rate with gamma limits',
    reference: 'Fay MP, Feuer EJ. Stat Med 1997;16:791-801',
  }),
  defineStatistic({
    name: 'exactRate',
    method: 'Incidence rate with exact Poisson (Garwood) limits',
    reference: 'Garwood F. Biometrika 1936;28:437-442',
  }),
  defineStatistic({
    name: 'firthCox',
    method: 'Cox proportional-hazards regression by Firth’s penalised likelihood, profile penalised-likelihood limits and tests',
    reference: 'Firth D. Biometrika 1993;80:27-38; Heinze G, Schemper M. Biometrics 2001;57:114-119',
  }),
  defineStatistic({
    name: 'fisherExact',
    method: 'Fisher’s exact test; two-sided by summing tables no more probable than the observed',
    reference: 'Fisher RA. J R Stat Soc 1935;98:39-54; mid-P: Lancaster HO. J Am Stat Assoc 1961;56:223-234',
  }),
  defineStatistic({
    name: 'fisherExactTable',
    method: 'Fisher’s exact test of an r by c table, by the network algorithm',
    reference: 'Freeman GH, Halton JH. Biometrika 1951;38:141-149; Mehta CR, Patel NR. J Am Stat Assoc 1983;78:427-434',
  }),
  defineStatistic({
    name: 'grayTest',
    method: 'Gray’s test of cumulative incidence, k groups, strata',
    reference: 'Gray RJ. Ann Stat 1988;16:1141-1154',
  }),
  defineStatistic({
    name: 'intervalOnset',
    method: 'Non-parametric maximum likelihood for onset seen between visits (Turnbull sets, EMICM, stopped on the KKT gap)',
    reference: 'Turnbull BW. J R Stat Soc B 1976;38:290-295; Wellner JA, Zhan Y. J Am Stat Assoc 1997;92:945-959',
  }),
  defineStatistic({
    name: 'intervalRegression',
    method: 'Weibull or exponential regression for interval-censored times, maximum likelihood',
    reference: 'Odell PM, Anderson KM, D’Agostino RB. Biometrics 1992;48:951-959; Lindsey JC, Ryan LM. Stat Med 1998;17:219-238',
  }),
  defineStatistic({
    name: 'kaplanMeier',
    method: 'Kaplan-Meier survival curve, Greenwood variance, log-log limits (log and plain on request)',
    reference:
      'Kaplan EL, Meier P. J Am Stat Assoc 1958;53:457-481; Greenwood M. Rep Public Health Med Subj 33, 1926; Kalbfleisch JD, Prentice RL. The Statistical Analysis of Failure Time Data, 1980',
  }),
  defineStatistic({
    name: 'katzRiskRatio',
    method: 'Risk ratio with Katz log limits',
    reference: 'Katz D, Baptista J, Azen SP, Pike MC. Biometrics 1978;34:469-474',
  }),
  defineStatistic({
    name: 'koopmanRiskRatio',
    method: 'Risk ratio with Koopman score limits',
    reference: 'Koopman PAR. Biometrics 1984;40:513-517',
  }),
  defineStatistic({
    name: 'leastSquares',
    method: 'Linear regression by least squares',
    reference: 'Golub GH. Numer Math 1965;7:206-216 (Householder triangularisation)',
  }),
  defineStatistic({
    name: 'logRank',
    method: 'Log-rank test of k groups, with strata, weights S(t-)^rho and a test for trend',
    reference:
      'Mantel N. Cancer Chemother Rep 1966;50:163-170; Peto R, Peto J. J R Stat Soc A 1972;135:185-207; Harrington DP, Fleming TR. Biometrika 1982;69:553-566; Tarone RE. Biometrika 1975;62:679-690',
  }),
  defineStatistic({
    name: 'mantelHaenszel',
    method: 'Mantel-Haenszel odds ratio, risk ratio and risk difference over strata, with the Cochran-Mantel-Haenszel test',
    reference:
      'Mantel N, Haenszel W. J Natl Cancer Inst 1959;22:719-748; Robins J, Breslow N, Greenland S. Biometrics 1986;42:311-323; Greenland S, Robins JM. Biometrics 1985;41:55-68; Sato T. Biometrics 1989;45:1323-1324',
  }),
  defineStatistic({
    name: 'mantelHaenszelRateRatio',
    method: 'Mantel-Haenszel rate ratio over strata',
    reference: 'Greenland S, Robins JM. Biometrics 1985;41:55-68',
  }),
  defineStatistic({
    name: 'meanAndDeviation',
    method: 'Mean and standard deviation, two passes, divisor n - 1',
    reference: 'Chan TF, Golub GH, LeVeque RJ. Am Stat 1983;37:242-247',
  }),
  defineStatistic({
    name: 'midPRate',
    method: 'Incidence rate with mid-P Poisson limits',
    reference: 'Lancaster HO. J Am Stat Assoc 1961;56:223-234; Berry G, Armitage P. Statistician 1995;44:417-423',
  }),
  defineStatistic({
    name: 'miettinenNurminenDifference',
    method: 'Difference of two proportions with Miettinen-Nurminen score limits',
    reference: 'Miettinen O, Nurminen M. Stat Med 1985;4:213-226',
  }),
  defineStatistic({
    name: 'nelsonAalen',
    method: 'Nelson-Aalen cumulative hazard',
    reference: 'Nelson W. Technometrics 1972;14:945-966; Aalen O. Ann Stat 1978;6:701-726',
  }),
  defineStatistic({
    name: 'newcombeDifference',
    method: 'Difference of two proportions with Newcombe hybrid score limits (method 10)',
    reference: 'Newcombe RG. Stat Med 1998;17:873-890',
  }),
  defineStatistic({
    name: 'oddsRatio',
    method: 'Odds ratio with Woolf log limits',
    reference: 'Woolf B. Ann Hum Genet 1955;19:251-253',
  }),
  defineStatistic({
    name: 'oneWayAnova',
    method: 'One-way analysis of variance',
    reference: 'Fisher RA. Statistical Methods for Research Workers, 1925',
  }),
  defineStatistic({
    name: 'personTime',
    method: 'Person-time as whole days summed, over 365.25 days a year',
    reference: 'Rothman KJ, Greenland S, Lash TL. Modern Epidemiology, 3rd ed. 2008, ch. 3',
  }),
  defineStatistic({
    name: 'pFromInterval',
    method: 'Standard error and normal p-value read back from a published 95% interval',
    reference: 'Altman DG, Bland JM. BMJ 2011;343:d2304',
  }),
  defineStatistic({
    name: 'proportionalHazardsTest',
    method: 'Test of proportional hazards against a covariate-by-time interaction, score form or the 1994 form by scaled Schoenfeld residuals',
    reference: 'Grambsch PM, Therneau TM. Biometrika 1994;81:515-526; Therneau TM, Grambsch PM. Modeling Survival Data, 2000, ch. 6',
  }),
  defineStatistic({
    name: 'quantileOf',
    method: 'Quantile of a survival curve, limits by inverting the pointwise limits',
    reference: 'Brookmeyer R, Crowley J. Biometrics 1982;38:29-41',
  }),
  defineStatistic({
    name: 'rateDifference',
    method: 'Difference of two incidence rates with Wald limits',
    reference: 'Rothman KJ, Greenland S, Lash TL. Modern Epidemiology, 3rd ed. 2008, ch. 14',
  }),
  defineStatistic({
    name: 'rateRatioExact',
    method: 'Ratio of two incidence rates, conditional exact limits',
    reference: 'Przyborowski J, Wilenski H. Biometrika 1940;31:313-323',
  }),
  defineStatistic({
    name: 'rateRatioMidP',
    method: 'Ratio of two incidence rates, conditional mid-P limits',
    reference: 'Berry G, Armitage P. Statistician 1995;44:417-423',
  }),
  defineStatistic({
    name: 'rateRatioWald',
    method: 'Ratio of two incidence rates, Wald limits on the log',
    reference: 'Rothman KJ, Greenland S, Lash TL. Modern Epidemiology, 3rd ed. 2008, ch. 14',
  }),
  defineStatistic({
    name: 'riskRatio',
    method: 'Risk ratio with Katz log limits, Koopman score limits where a cell is zero',
    reference: 'Katz D, Baptista J, Azen SP, Pike MC. Biometrics 1978;34:469-474; Koopman PAR. Biometrics 1984;40:513-517',
  }),
  defineStatistic({
    name: 'rmst',
    method: 'Restricted mean survival time, Greenwood-type variance',
    reference: 'Klein JP, Moeschberger ML. Survival Analysis, 2nd ed. 2003, section 4.5',
  }),
  defineStatistic({
    name: 'rmstDifference',
    method: 'Difference of two restricted mean survival times',
    reference: 'Royston P, Parmar MKB. BMC Med Res Methodol 2013;13:152',
  }),
  defineStatistic({
    name: 'waldDifference',
    method: 'Difference of two proportions with Wald limits',
    reference: 'Newcombe RG. Stat Med 1998;17:873-890 (method 1)',
  }),
  defineStatistic({
    name: 'waldProportion',
    method: 'Proportion with Wald limits',
    reference: 'Newcombe RG. Stat Med 1998;17:857-872 (method 1)',
  }),
  defineStatistic({
    name: 'wilsonInterval',
    method: 'Proportion with Wilson score limits, no continuity correction',
    reference: 'Wilson EB. J Am Stat Assoc 1927;22:209-212',
  }),
] as const;

type Registered = (typeof comparisons)[number] | (typeof modelStatistics)[number];

export const statistics: readonly Registered[] = [...comparisons, ...modelStatistics].sort((a, b) => (a.name.toLowerCase() < b.name.toLowerCase() ? -1 : 1));

export type StatisticName = Registered['name'];

const methods: ReadonlyMap<string, string> = new Map(statistics.map(({ name, method }) => [name, method]));

/** The method sentence of a registered statistic. */
export function methodOf(name: StatisticName): string {
  return methods.get(name) as string;
}

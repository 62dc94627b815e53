/**
 * How each figure is computed, in one place: screens and reports print the
 * method sentence and its reference from here, and the functions put the same
 * sentence in their results. In alphabetical order of name; a name is the
 * function's own.
 */

export interface Statistic {
  /** The exported function's name. */
  readonly name: string;
  /** The method as a reader would cite it. */
  readonly method: string;
  /** Where the method is published. */
  readonly reference: string;
}

/** Keeps the name literal, so that `methodOf` knows the names there are. */
export function defineStatistic<const S extends Statistic>(statistic: S): S {
  return statistic;
}

export const statistics = [
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
    name: 'pFromInterval',
    method: 'Standard error and normal p-value read back from a published 95% interval',
    reference: 'Altman DG, Bland JM. BMJ 2011;343:d2304',
  }),
  defineStatistic({
    name: 'personTime',
    method: 'Person-time as whole days summed, over 365.25 days a year',
    reference: 'Rothman KJ, Greenland S, Lash TL. Modern Epidemiology, 3rd ed. 2008, ch. 3',
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

export type StatisticName = (typeof statistics)[number]['name'];

const methods: ReadonlyMap<string, string> = new Map(statistics.map(({ name, method }) => [name, method]));

/** The method sentence of a registered statistic. */
export function methodOf(name: StatisticName): string {
  return methods.get(name) as string;
}

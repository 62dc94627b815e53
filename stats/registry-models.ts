import { defineStatistic } from './define-statistic';

/** The part of the register that models, describes progression and agreement, resamples, and counts what is missing. */
export const modelStatistics = [
  defineStatistic({
    name: 'blandAltman',
    method: 'Bland-Altman limits of agreement, with approximate and exact (non-central t) limits of their own',
    reference: 'Bland JM, Altman DG. Lancet 1986;i:307-310; Stat Methods Med Res 1999;8:135-160; Carkeet A. Optom Vis Sci 2015;92:e71-80',
  }),
  defineStatistic({
    name: 'bootstrapLimits',
    method: 'Bootstrap limits: percentile, basic, bias-corrected normal, or bias-corrected and accelerated (BCa)',
    reference:
      'Efron B. J Am Stat Assoc 1987;82:171-185; DiCiccio TJ, Efron B. Stat Sci 1996;11:189-228; Davison AC, Hinkley DV. Bootstrap Methods and their Application, 1997',
  }),
  defineStatistic({
    name: 'bootstrapReplicates',
    method: 'Seeded bootstrap of rows or whole clusters, one random stream a replicate',
    reference: 'Efron B. Ann Stat 1979;7:1-26; Field CA, Welsh AH. J R Stat Soc B 2007;69:369-390',
  }),
  defineStatistic({
    name: 'clusteredProportion',
    method: 'Pooled proportion, standard error clustered by participant (ratio estimator, t limits)',
    reference: 'Cochran WG. Sampling Techniques, 3rd ed, 1977, ch. 6 and 9',
  }),
  defineStatistic({
    name: 'exactMedian',
    method: 'Exact bootstrap distribution of the median of an odd number of values',
    reference: 'Efron B. The Jackknife, the Bootstrap and Other Resampling Plans, 1982, ch. 10',
  }),
  defineStatistic({
    name: 'falseChange',
    method: 'Chance that measurement error alone crosses a threshold of relative change (first-order propagation)',
    reference: 'Common practice, no source; first-order propagation of error as in Bland JM, Altman DG. BMJ 1996;313:744',
  }),
  defineStatistic({
    name: 'gee',
    method: 'Generalised estimating equations, independence or exchangeable working correlation, robust standard errors',
    reference: 'Liang KY, Zeger SL. Biometrika 1986;73:13-22',
  }),
  defineStatistic({
    name: 'icc',
    method: 'Intraclass correlations (Shrout-Fleiss forms, McGraw-Wong limits)',
    reference: 'Shrout PE, Fleiss JL. Psychol Bull 1979;86:420-428; McGraw KO, Wong SP. Psychol Methods 1996;1:30-46',
  }),
  defineStatistic({
    name: 'loadIntervals',
    method: 'Interval between the last log below the load and the first at or above it',
    reference: 'Turnbull BW. J R Stat Soc B 1976;38:290-295 (interval censoring)',
  }),
  defineStatistic({
    name: 'loadOnset',
    method: 'First log at or above the target load',
    reference: 'Kalbfleisch JD, Prentice RL. The Statistical Analysis of Failure Time Data, 2nd ed, 2002 (first passage, right censoring)',
  }),
  defineStatistic({
    name: 'logisticRegression',
    method: 'Logistic regression, maximum likelihood',
    reference: 'Cox DR. J R Stat Soc B 1958;20:215-242; Albert A, Anderson JA. Biometrika 1984;71:1-10',
  }),
  defineStatistic({
    name: 'maxSemForThreshold',
    method: 'Largest standard error of measurement at which a change of the threshold’s size is beyond error',
    reference: 'de Vet HCW, et al. J Clin Epidemiol 2006;59:1033-1039',
  }),
  defineStatistic({
    name: 'measurementError',
    method: 'Standard error of measurement from two-way ANOVA, chi-square limits',
    reference: 'de Vet HCW, et al. J Clin Epidemiol 2006;59:1033-1039',
  }),
  defineStatistic({
    name: 'medianLimits',
    method: 'Quantile with order-statistic limits',
    reference: 'Conover WJ. Practical Nonparametric Statistics, 3rd ed, 1999, sec. 3.2',
  }),
  defineStatistic({
    name: 'missingByVisit',
    method: 'Completeness by visit; drop-out only (monotone) or intermittent by subject',
    reference: 'Diggle PJ, et al. Analysis of Longitudinal Data, 2nd ed, 2002, ch. 13',
  }),
  defineStatistic({
    name: 'missingPatterns',
    method: 'Counts of missing values by column and pattern',
    reference: 'Little RJA, Rubin DB. Statistical Analysis with Missing Data, 2nd ed, 2002, ch. 1',
  }),
  defineStatistic({
    name: 'mixedModel',
    method: 'Linear mixed model with random intercept or random intercept and slope, profiled REML or maximum likelihood',
    reference:
      'Laird NM, Ware JH. Biometrics 1982;38:963-974; Lindstrom MJ, Bates DM. J Am Stat Assoc 1988;83:1014-1022; Bates D, et al. J Stat Softw 2015;67(1); Satterthwaite FE. Biometrics 1946;2:110-114',
  }),
  defineStatistic({
    name: 'negativeBinomial',
    method: 'Negative binomial regression (NB2), log link, shape by maximum likelihood',
    reference: 'Lawless JF. Can J Stat 1987;15:209-225; Venables WN, Ripley BD. Modern Applied Statistics with S, 4th ed, 2002, sec. 7.4',
  }),
  defineStatistic({
    name: 'poissonRegression',
    method: 'Poisson regression, log link',
    reference: 'McCullagh P, Nelder JA. Generalized Linear Models, 2nd ed, 1989, ch. 6; White H. Econometrica 1980;48:817-838',
  }),
  defineStatistic({
    name: 'profileLimits',
    method: 'Profile-likelihood limits of regression coefficients',
    reference: 'Venzon DJ, Moolgavkar SH. Appl Stat 1988;37:87-94',
  }),
  defineStatistic({
    name: 'quantileBands',
    method: 'Sample quantiles by week (Hyndman-Fan, type 7 unless stated)',
    reference: 'Hyndman RJ, Fan Y. Am Stat 1996;50:361-365',
  }),
  defineStatistic({
    name: 'ruleAdherence',
    method: 'Share of weekly steps that keep to a rule, standard error clustered by participant (ratio estimator, t limits)',
    reference: 'Cochran WG. Sampling Techniques, 3rd ed, 1977, ch. 6 and 9',
  }),
  defineStatistic({
    name: 'sdcFromSem',
    method: 'Smallest detectable change, z times root 2 times the standard error of measurement',
    reference: 'de Vet HCW, et al. J Clin Epidemiol 2006;59:1033-1039',
  }),
  defineStatistic({
    name: 'semFromIcc',
    method: 'Standard error of measurement from a published reliability, SD times root (1 - ICC)',
    reference: 'Streiner DL, Norman GR. Health Measurement Scales, 4th ed, 2008',
  }),
  defineStatistic({
    name: 'slopeVarianceTest',
    method: 'Likelihood ratio, 50:50 mixture of chi-square on 1 and 2 df',
    reference: 'Self SG, Liang KY. J Am Stat Assoc 1987;82:605-610; Stram DO, Lee JW. Biometrics 1994;50:1171-1177',
  }),
  defineStatistic({
    name: 'technicalError',
    method: 'Technical error of measurement (two trials), chi-square limits',
    reference: 'Dahlberg G. Statistical Methods for Medical and Biological Students, 1940; Ulijaszek SJ, Kerr DA. Br J Nutr 1999;82:165-177',
  }),
  defineStatistic({
    name: 'theilSen',
    method: 'Theil-Sen median slope, Sen rank limits (tie-corrected, interpolated)',
    reference: 'Theil H. Proc K Ned Akad Wet 1950;53:386-392; Sen PK. J Am Stat Assoc 1968;63:1379-1389',
  }),
  defineStatistic({
    name: 'timeToLoad',
    method: 'Time to the first log at or above a load, Kaplan-Meier',
    reference: 'Kaplan EL, Meier P. J Am Stat Assoc 1958;53:457-481',
  }),
  defineStatistic({
    name: 'weeklyProgression',
    method: 'Least-squares slope over the week index',
    reference: 'Draper NR, Smith H. Applied Regression Analysis, 3rd ed, 1998, ch. 1',
  }),
] as const;

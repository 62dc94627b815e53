import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import type { MixedModel } from './mixed-model';
import { requireRange } from '../result';

/** Likelihood ratio for a random slope. */
export interface SlopeVarianceTest {
  readonly method: string;
  readonly statistic: number;
  /** Chi-square on 2 df, as if the variance were not on the edge of its range: too large. */
  readonly pNaive: number;
  /** Equal mixture of chi-square on 1 and 2 df. */
  readonly pMixture: number;
}

/**
 * Does the slope vary between people? A variance of 0 lies on the edge of its
 * range, so the likelihood ratio follows a 50:50 mixture of chi-square on 1 and
 * 2 degrees of freedom. Self & Liang 1987, JASA 82:605; Stram & Lee 1994,
 * Biometrics 50:1171.
 *
 * @param intercept and @param slope fits of one data set with the same fixed effects, both REML or both ML.
 * @throws RangeError when the two fits cannot be compared.
 */
export function slopeVarianceTest(intercept: MixedModel, slope: MixedModel): SlopeVarianceTest {
  const comparable = intercept.reml === slope.reml && intercept.n === slope.n && intercept.fixed.length === slope.fixed.length;
  requireRange(comparable, 'Two fits are compared on the same rows, fixed effects and criterion.');
  requireRange(intercept.covarianceRandom.length === 1 && slope.covarianceRandom.length === 2, 'The first fit has a random intercept only, the second a slope as well.');
  const statistic = Math.max(0, intercept.deviance - slope.deviance);
  const pNaive = chiSquare.sf(statistic, 2);
  return { method: methodOf('slopeVarianceTest'), statistic, pNaive, pMixture: (chiSquare.sf(statistic, 1) + pNaive) / 2 };
}

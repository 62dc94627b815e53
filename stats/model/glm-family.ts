import { digamma } from '../special/digamma';
import { logGamma } from '../special/log-gamma';
import { trigamma } from '../special/trigamma';
import { requireRange } from '../result';

/** One row's counts: y events, of m trials where the outcome is binomial (m is 1 otherwise). */
export interface Family {
  readonly name: string;
  /** Mean for one row at the linear predictor. */
  mean(eta: number, m: number): number;
  /** Weight of the row in the (expected) information on eta. */
  weight(eta: number, m: number): number;
  /** Derivative of the log likelihood along eta. */
  score(y: number, eta: number, m: number): number;
  /** Log likelihood of a row, constants included. */
  logLikelihood(y: number, eta: number, m: number): number;
  /** Minus the log likelihood without what does not depend on eta: what a search compares. */
  loss(y: number, eta: number, m: number): number;
  /** Twice the log likelihood lost against the row's own mean. */
  deviance(y: number, eta: number, m: number): number;
  /** Variance of y. */
  variance(eta: number, m: number): number;
  /**
   * Where the likelihood can rise without end: -1 = only as eta falls, 1 = only
   * as it rises, 0 = neither (eta has to stay finite for this row).
   */
  escape(y: number, m: number): -1 | 0 | 1;
  /** Linear predictor of a common mean, the start of a fit; infinite where none exists. */
  commonEta(y: Float64Array, m: Float64Array, offset: Float64Array): number;
  /** Linear predictor near the row's own count: the classic start of scoring. */
  ownEta(y: number, m: number): number;
}

/** log(x!) for whole numbers. */
const logFactorial = (x: number): number => (x < 2 ? 0 : logGamma(x + 1));

/** Events over exposure. */
function logCommonRate(y: Float64Array, _: Float64Array, offset: Float64Array): number {
  let events = 0;
  let exposure = 0;
  // The offset's own size is kept out of the exponential: exp(800) is not a number of years.
  const largest = offset.reduce((most, value) => Math.max(most, value), -Infinity);
  for (let row = 0; row < y.length; row++) {
    events += y[row]!;
    exposure += Math.exp(offset[row]! - largest);
  }
  return Math.log(events / exposure) - largest;
}

export const poissonFamily: Family = {
  name: 'Poisson',
  mean: (eta) => Math.exp(eta),
  weight: (eta) => Math.exp(eta),
  score: (y, eta) => y - Math.exp(eta),
  logLikelihood: (y, eta) => y * eta - Math.exp(eta) - logFactorial(y),
  loss: (y, eta) => Math.exp(eta) - y * eta,
  deviance: (y, eta) => 2 * ((y > 0 ? y * (Math.log(y) - eta) : 0) - (y - Math.exp(eta))),
  variance: (eta) => Math.exp(eta),
  escape: (y) => (y === 0 ? -1 : 0),
  commonEta: logCommonRate,
  ownEta: (y) => Math.log(y + 0.1),
};

/** log(1 + exp(x)) without overflow or loss. */
const softplus = (x: number): number => (x > 0 ? x + Math.log1p(Math.exp(-x)) : Math.log1p(Math.exp(x)));
/** 1/(1 + exp(-x)); the two forms keep the small tail exact. */
const logistic = (x: number): number => (x >= 0 ? 1 / (1 + Math.exp(-x)) : Math.exp(x) / (1 + Math.exp(x)));

export const binomialFamily: Family = {
  name: 'logistic',
  mean: (eta, m) => m * logistic(eta),
  weight: (eta, m) => m * logistic(eta) * logistic(-eta),
  // y - m p, written so that neither tail is 1 minus something near 1.
  score: (y, eta, m) => y * logistic(-eta) - (m - y) * logistic(eta),
  logLikelihood: (y, eta, m) => -y * softplus(-eta) - (m - y) * softplus(eta) + logFactorial(m) - logFactorial(y) - logFactorial(m - y),
  loss: (y, eta, m) => y * softplus(-eta) + (m - y) * softplus(eta),
  deviance: (y, eta, m) =>
    2 * ((y > 0 ? y * (Math.log(y / m) + softplus(-eta)) : 0) + (y < m ? (m - y) * (Math.log((m - y) / m) + softplus(eta)) : 0)),
  variance: (eta, m) => m * logistic(eta) * logistic(-eta),
  escape: (y, m) => (y === 0 ? -1 : y === m ? 1 : 0),
  commonEta: (y, m) => {
    const events = y.reduce((sum, value) => sum + value, 0);
    const trials = m.reduce((sum, value) => sum + value, 0);
    return Math.log(events / (trials - events));
  },
  ownEta: (y, m) => Math.log((y + 0.5) / (m - y + 0.5)),
};

/** Counts up to here are summed term by term: differences of log-gammas lose digits at large theta. */
const SHORT = 200;

/** logGamma(theta + y) - logGamma(theta). */
export function logRising(theta: number, y: number): number {
  if (y > SHORT) return logGamma(theta + y) - logGamma(theta);
  let sum = 0;
  for (let k = 0; k < y; k++) sum += Math.log(theta + k);
  return sum;
}

/** digamma(theta + y) - digamma(theta). */
export function digammaRise(theta: number, y: number): number {
  if (y > SHORT) return digamma(theta + y) - digamma(theta);
  let sum = 0;
  for (let k = 0; k < y; k++) sum += 1 / (theta + k);
  return sum;
}

/** trigamma(theta) - trigamma(theta + y). */
export function trigammaFall(theta: number, y: number): number {
  if (y > SHORT) return trigamma(theta) - trigamma(theta + y);
  let sum = 0;
  for (let k = 0; k < y; k++) sum += 1 / (theta + k) ** 2;
  return sum;
}

/** NB2: variance mu + mu^2/theta, log link, theta held. */
export function negativeBinomialFamily(theta: number): Family {
  requireRange(theta > 0 && theta < Infinity, `The shape of a negative binomial is above 0, not ${theta}.`);
  // y log(mu/(mu + theta)) - theta log(1 + mu/theta), for any mu.
  const core = (y: number, eta: number): number => -y * softplus(Math.log(theta) - eta) - theta * Math.log1p(Math.exp(eta) / theta);
  return {
    name: 'negative binomial',
    mean: (eta) => Math.exp(eta),
    weight: (eta) => 1 / (Math.exp(-eta) + 1 / theta),
    score: (y, eta) => (y - Math.exp(eta)) / (1 + Math.exp(eta) / theta),
    logLikelihood: (y, eta) => logRising(theta, y) - logFactorial(y) + core(y, eta),
    loss: (y, eta) => (y + theta) * Math.log1p(Math.exp(eta) / theta) - y * eta,
    deviance: (y, eta) => 2 * ((y > 0 ? core(y, Math.log(y)) : 0) - core(y, eta)),
    variance: (eta) => Math.exp(eta) + Math.exp(2 * eta) / theta,
    escape: (y) => (y === 0 ? -1 : 0),
    commonEta: logCommonRate,
    ownEta: (y) => Math.log(y === 0 ? 1 / 6 : y),
  };
}

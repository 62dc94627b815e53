import { digamma } from '../special/digamma';
import { logGamma } from '../special/log-gamma';
import { trigamma } from '../special/trigamma';
import { requireRange } from '../result';

/** Rows of counts: y events of m trials each. */
export interface Counts {
  readonly y: Float64Array;
  readonly m: Float64Array;
}

/** How counts depend on their linear predictor: y events, of m trials where the outcome is binomial (m is 1 otherwise). */
export interface Family {
  readonly name: string;
  /**
   * One pass over all rows: each row's weight in the (expected) information on
   * eta and its derivative of the log likelihood along eta. Answers the loss:
   * minus the log likelihood without what does not depend on eta. A pass and
   * not a function a row: one exponential serves all three.
   */
  sweep(counts: Counts, eta: Float64Array, weight: Float64Array, score: Float64Array): number;
  /** The loss of a row at its own mean, below which no model gets. */
  leastLoss(y: number, m: number): number;
  /** Log likelihood of a row plus its loss. */
  constant(y: number, m: number): number;
  /** Mean for one row at the linear predictor. */
  mean(eta: number, m: number): number;
  /** Derivative of the log likelihood along eta. */
  score(y: number, eta: number, m: number): number;
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
  /** Is the common mean the maximum likelihood of a model without terms? */
  readonly commonIsBest: boolean;
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

/** y log y, 0 at 0. */
const timesLog = (y: number): number => (y > 0 ? y * Math.log(y) : 0);

export const poissonFamily: Family = {
  name: 'Poisson',
  sweep({ y }, eta, weight, score) {
    let loss = 0;
    for (let row = 0; row < y.length; row++) {
      const mean = Math.exp(eta[row]!);
      weight[row] = mean;
      score[row] = y[row]! - mean;
      loss += mean - y[row]! * eta[row]!;
    }
    return loss;
  },
  leastLoss: (y) => y - timesLog(y),
  constant: (y) => -logFactorial(y),
  mean: (eta) => Math.exp(eta),
  score: (y, eta) => y - Math.exp(eta),
  deviance: (y, eta) => 2 * ((y > 0 ? y * (Math.log(y) - eta) : 0) - (y - Math.exp(eta))),
  variance: (eta) => Math.exp(eta),
  escape: (y) => (y === 0 ? -1 : 0),
  commonEta: logCommonRate,
  commonIsBest: true,
  ownEta: (y) => Math.log(y + 0.1),
};

/** log(1 + exp(x)) without overflow or loss. */
const softplus = (x: number): number => (x > 0 ? x + Math.log1p(Math.exp(-x)) : Math.log1p(Math.exp(x)));
/** 1/(1 + exp(-x)); the two forms keep the small tail exact. */
const logistic = (x: number): number => (x >= 0 ? 1 / (1 + Math.exp(-x)) : Math.exp(x) / (1 + Math.exp(x)));

export const binomialFamily: Family = {
  name: 'logistic',
  sweep({ y, m }, eta, weight, score) {
    let loss = 0;
    for (let row = 0; row < y.length; row++) {
      const [events, trials, at] = [y[row]!, m[row]!, eta[row]!];
      // The smaller of the two chances keeps its digits: it is never 1 minus the other.
      const small = Math.exp(-Math.abs(at));
      const near = 1 / (1 + small);
      const p = at >= 0 ? near : small * near;
      const q = at >= 0 ? small * near : near;
      weight[row] = trials * p * q;
      score[row] = events * q - (trials - events) * p;
      loss += trials * Math.log1p(small) + (at > 0 ? (trials - events) * at : -events * at);
    }
    return loss;
  },
  leastLoss: (y, m) => timesLog(m) - timesLog(y) - timesLog(m - y),
  constant: (y, m) => logFactorial(m) - logFactorial(y) - logFactorial(m - y),
  mean: (eta, m) => m * logistic(eta),
  // y - m p, written so that neither tail is 1 minus something near 1.
  score: (y, eta, m) => y * logistic(-eta) - (m - y) * logistic(eta),
  deviance: (y, eta, m) =>
    2 * ((y > 0 ? y * (Math.log(y / m) + softplus(-eta)) : 0) + (y < m ? (m - y) * (Math.log((m - y) / m) + softplus(eta)) : 0)),
  variance: (eta, m) => m * logistic(eta) * logistic(-eta),
  escape: (y, m) => (y === 0 ? -1 : y === m ? 1 : 0),
  commonEta: (y, m) => {
    const events = y.reduce((sum, value) => sum + value, 0);
    const trials = m.reduce((sum, value) => sum + value, 0);
    return Math.log(events / (trials - events));
  },
  commonIsBest: true,
  ownEta: (y, m) => Math.log((y + 0.5) / (m - y + 0.5)),
};

/** Counts up to here are summed term by term: differences of log-gammas lose digits at large theta. */
const SHORT = 200;

/** logGamma(theta + y) - logGamma(theta) - y log(theta). */
function logRising(theta: number, y: number): number {
  if (y > SHORT) return logGamma(theta + y) - logGamma(theta) - y * Math.log(theta);
  let sum = 0;
  for (let k = 1; k < y; k++) sum += Math.log1p(k / theta);
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
  return {
    name: 'negative binomial',
    sweep({ y }, eta, weight, score) {
      let loss = 0;
      const alpha = 1 / theta;
      for (let row = 0; row < y.length; row++) {
        const mean = Math.exp(eta[row]!);
        weight[row] = 1 / (1 / mean + alpha);
        score[row] = (y[row]! - mean) / (1 + mean * alpha);
        loss += (y[row]! + theta) * Math.log1p(mean * alpha) - y[row]! * eta[row]!;
      }
      return loss;
    },
    leastLoss: (y) => (y + theta) * Math.log1p(y / theta) - timesLog(y),
    constant: (y) => logRising(theta, y) - logFactorial(y),
    mean: (eta) => Math.exp(eta),
    score: (y, eta) => (y - Math.exp(eta)) / (1 + Math.exp(eta) / theta),
    // The two logs are of y/mu and of (y + theta)/(mu + theta); the second is written as 1 and what is beyond it where they are close.
    deviance: (y, eta) => {
      const mean = Math.exp(eta);
      const beyond = (y - mean) / (mean + theta);
      const second = beyond > -0.5 ? Math.log1p(beyond) : Math.log((y + theta) / (mean + theta));
      return 2 * ((y > 0 ? y * (Math.log(y) - eta) : 0) - (y + theta) * second);
    },
    variance: (eta) => Math.exp(eta) + Math.exp(2 * eta) / theta,
    escape: (y) => (y === 0 ? -1 : 0),
    commonEta: logCommonRate,
    commonIsBest: false,
    ownEta: (y) => Math.log(y === 0 ? 1 / 6 : y),
  };
}

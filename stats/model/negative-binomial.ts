import { methodOf } from '../registry';
import { dot } from './design';
import type { Refusal } from './fit';
import { prepare, refusal, report, type Glm, type GlmInput } from './glm';
import { digammaRise, negativeBinomialFamily, poissonFamily, trigammaFall } from './glm-family';
import { irls, type GlmData, type IrlsFit } from './irls';
import { sumOver } from './tally';

/** A negative binomial fit; standard errors of the coefficients hold theta. */
export interface NegativeBinomial extends Glm {
  /** Shape: variance = mu + mu^2/theta. null where counts vary no more than Poisson ones (theta infinite). */
  readonly theta: number | null;
  /** From the observed information at theta, coefficients held. */
  readonly thetaSe: number | null;
  /**
   * The same from the last Newton step but one, as programs print it that stop
   * when theta moves less than 1.2e-4 (Venables & Ripley 2002): up to 1e-4 off.
   */
  readonly thetaSeEarly: number | null;
  /** Dispersion 1/theta; 0 on the edge. */
  readonly alpha: number;
  readonly notes: readonly string[];
}

const METHOD = methodOf('negativeBinomial');
const MAX_ROUNDS = 200;
/** Beyond this shape the variance is Poisson's to the last digit of any count that occurs. */
const LARGEST = 1e10;

/**
 * NB2 regression: coefficients and theta in turn until neither moves. The two
 * are orthogonal in the expected information, so few rounds are needed; theta
 * is found on the log scale. Lawless 1987, Can J Stat 15:209; Venables & Ripley
 * 2002, sec. 7.4. Where the score at alpha = 0 is not positive the counts vary
 * no more than Poisson's: the Poisson fit is returned and the note says so.
 *
 * @returns a refusal where no finite estimate exists.
 * @throws RangeError as `poissonRegression`.
 */
export function negativeBinomial(input: GlmInput): NegativeBinomial | Refusal {
  const prepared = prepare(input);
  const { data } = prepared;
  const provenance = { method: METHOD, n: data.design.n, leftOut: prepared.leftOut };
  if (data.design.n < data.design.p) return { fitted: false, reason: 'There are fewer rows than coefficients.', ...provenance };
  const poisson = irls(data, poissonFamily);
  const why = refusal(prepared, poissonFamily, poisson);
  if (why !== null) return { fitted: false, reason: why, ...provenance };
  const edge = (): NegativeBinomial => ({
    ...report(prepared, poissonFamily, poisson, METHOD, 1),
    theta: null,
    thetaSe: null,
    thetaSeEarly: null,
    alpha: 0,
    notes: ['The counts vary no more than Poisson counts: the dispersion is 0 and the fit is the Poisson one.'],
  });
  let means = meansOf(poisson);
  if (scoreAtZero(data, means) <= 0) return edge();
  let fit = poisson;
  let theta = shapeFrom(data, means);
  for (let round = 0, settled = false; round < MAX_ROUNDS && !settled; round++) {
    const next = bestTheta(data, means, theta);
    if (next > LARGEST) return edge();
    fit = irls(data, negativeBinomialFamily(next), fit.gamma);
    means = meansOf(fit);
    settled = Math.abs(next - theta) <= 1e-11 * theta;
    theta = next;
  }
  const { information } = thetaDerivatives(data, means, theta);
  return {
    ...report(prepared, negativeBinomialFamily(theta), fit, METHOD, 1),
    theta,
    thetaSe: information > 0 ? 1 / Math.sqrt(information) : null,
    thetaSeEarly: earlySe(data, means),
    alpha: 1 / theta,
    notes: [],
  };
}

/** Fitted means, one exponential a row a fit. */
function meansOf({ eta }: IrlsFit): Float64Array {
  const means = new Float64Array(eta.length);
  for (let row = 0; row < eta.length; row++) means[row] = Math.exp(eta[row]!);
  return means;
}

/** Derivative of the log likelihood along alpha at 0, twice over: sum (y - mu)^2 - y. */
function scoreAtZero({ y }: GlmData, means: Float64Array): number {
  let sum = 0;
  for (let row = 0; row < y.length; row++) sum += (y[row]! - means[row]!) ** 2 - y[row]!;
  return sum;
}

/** Moment start: alpha = sum((y - mu)^2 - y)/sum(mu^2). */
function shapeFrom(data: GlmData, means: Float64Array): number {
  return Math.min(1e6, Math.max(1e-6, dot(means, means) / scoreAtZero(data, means)));
}

/** First derivative of the log likelihood in theta and the observed information, coefficients held. */
function thetaDerivatives({ y, tally }: GlmData, means: Float64Array, theta: number): { slope: number; information: number } {
  let slope = sumOver(tally, (count) => digammaRise(theta, count));
  let information = sumOver(tally, (count) => trigammaFall(theta, count));
  for (let row = 0; row < y.length; row++) {
    const mu = means[row]!;
    const over = 1 / (mu + theta);
    const share = (mu - y[row]!) * over;
    // log(theta/(theta + mu)) + (mu - y)/(theta + mu): log1p keeps it when theta is large.
    slope += share - Math.log1p(mu / theta);
    information += (share - mu / theta) * over;
  }
  return { slope, information };
}

/** Newton on log theta, kept inside a factor of 5 a step. */
function bestTheta(data: GlmData, means: Float64Array, start: number): number {
  let theta = start;
  for (let step = 0; step < 100; step++) {
    const { slope, information } = thetaDerivatives(data, means, theta);
    // d/dlog theta and its curvature; where that is not negative, go uphill by a fixed factor.
    const first = theta * slope;
    const second = first - theta * theta * information;
    const move = second < 0 ? -first / second : Math.sign(first);
    const bounded = Math.max(-1.6, Math.min(1.6, move));
    theta *= Math.exp(bounded);
    if (Math.abs(bounded) < 1e-9 || theta > LARGEST) break;
  }
  return theta;
}

/** Newton on theta itself from n / sum (y/mu - 1)^2, stopped early; the information is that of the step before the last. */
function earlySe(data: GlmData, means: Float64Array): number | null {
  const spread = means.reduce((sum, mean, row) => sum + (data.y[row]! / mean - 1) ** 2, 0);
  let theta = data.y.length / spread;
  let last = NaN;
  let move = 1;
  for (let step = 1; step < 10 && Math.abs(move) > Number.EPSILON ** 0.25; step++) {
    const { slope, information } = thetaDerivatives(data, means, Math.abs(theta));
    last = information;
    move = slope / information;
    theta = Math.abs(theta) + move;
  }
  return last > 0 ? 1 / Math.sqrt(last) : null;
}

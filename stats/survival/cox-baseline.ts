import { criticalValue } from '../critical-value';
import { requireRange, type Interval } from '../result';
import { coefficientsOf, type CoxFit } from './cox';
import { coxDesign, type CoxData, type CoxDesign } from './cox-design';
import { CoxSweep } from './cox-sweep';
import { survivalLimit } from './limits';
import { lastNotAfter } from './times';

/** Cumulative hazard of one stratum at given covariates, at its event times. */
export interface HazardCurve {
  /** Code of the stratum, 0 when there are none. */
  readonly stratum: number;
  readonly time: Float64Array;
  /** NaN where it is beyond the largest number, at covariates far from the data; survival is 0 there. */
  readonly hazard: Float64Array;
  /** Standard error of the cumulative hazard; NaN where that or the hazard is beyond the largest number. */
  readonly se: Float64Array;
}

/**
 * Cumulative hazard for one set of covariates (all 0 gives the baseline), by the
 * same rule for ties as the fit. The variance has a part for the hazard and one
 * for the coefficients; the robust covariance is used where the fit has one.
 * @param data the data of the fit
 * @param x one value a covariate, in the fit's order
 * @throws RangeError when x has another length than the fit
 * @see Link, Biometrics 1984;40:601. Therneau & Grambsch 2000, section 10.2
 */
export function cumulativeHazard(data: CoxData, fit: CoxFit, x: readonly number[]): HazardCurve[] {
  requireRange(x.length === data.x.length && x.every(Number.isFinite), `Give ${data.x.length} finite covariate values, one for each.`);
  const design = coxDesign(data);
  const { p, spread, centre } = design;
  const beta = coefficientsOf(fit).map((b, j) => b * spread[j]!);
  const at = Float64Array.from(x, (value, j) => (value - centre[j]!) / spread[j]!);
  const steps = hazardSteps(design, fit, beta, at);
  const eta = beta.reduce((sum, b, j) => sum + b * at[j]!, 0);
  const risk = Math.exp(eta - steps.shift);
  const covariance = (fit.robustCovariance ?? fit.covariance).map((row, j) => row.map((value, l) => value * spread[j]! * spread[l]!));

  return Array.from(design.stratumCodes, (stratum, s) => {
    const groups: number[] = [];
    for (let g = design.stratumStarts[s]!; g < design.stratumStarts[s + 1]!; g++) if (steps.h[g]! > 0) groups.push(g);
    const out = { stratum, time: new Float64Array(groups.length), hazard: new Float64Array(groups.length), se: new Float64Array(groups.length) };
    const drift = new Float64Array(p);
    let hazard = 0;
    let own = 0;
    groups.forEach((g, k) => {
      hazard += steps.h[g]!;
      own += steps.h2[g]!;
      for (let j = 0; j < p; j++) drift[j]! += steps.drift[g * p + j]!;
      out.time[k] = design.time[g]!;
      out.hazard[k] = written(risk * hazard);
      out.se[k] = Number.isNaN(out.hazard[k]) ? NaN : written(risk * Math.sqrt(own + quadratic(drift, covariance)));
    });
    return out;
  });
}

/** Infinity is no hazard, and a product of it with 0 no number. */
function written(value: number): number {
  return value < Infinity ? value : NaN;
}

/** Steps of the hazard at each distinct time, of its variance, and of its drift with the coefficients. */
function hazardSteps(design: CoxDesign, fit: CoxFit, beta: Float64Array, at: Float64Array) {
  const { p, time } = design;
  const [h, h2, drift] = [new Float64Array(time.length), new Float64Array(time.length), new Float64Array(time.length * p)];
  const sweep = new CoxSweep(design, fit.ties);
  sweep.run(beta, (group, { s1, d1 }, ties) => {
    h[group] = ties.h;
    h2[group] = ties.h2;
    for (let j = 0; j < p; j++) drift[group * p + j] = at[j]! * ties.h - (s1[j]! * ties.h2 - d1[j]! * ties.h2f);
  });
  return { h, h2, drift, shift: sweep.predictors.shift };
}

function quadratic(v: Float64Array, matrix: readonly (readonly number[])[]): number {
  return v.reduce((sum, a, j) => sum + a * v.reduce((inner, b, l) => inner + matrix[j]![l]! * b, 0), 0);
}

/**
 * Predicted survival of a person with these covariates at asked times, with
 * log-log limits at the fit's level.
 * @param options.stratum code of the stratum, when the fit has several
 */
export function predictSurvival(
  data: CoxData,
  fit: CoxFit,
  x: readonly number[],
  times: readonly number[],
  options: { readonly stratum?: number } = {},
): (Interval & { readonly time: number; readonly se: number | null })[] {
  const curves = cumulativeHazard(data, fit, x);
  const curve = options.stratum === undefined ? curves[0] : curves.find(({ stratum }) => stratum === options.stratum);
  requireRange(curve !== undefined && (options.stratum !== undefined || curves.length === 1), 'Name the stratum to predict for; it must be one of the data.');
  const z = criticalValue(fit.level);
  const { level } = fit;
  return times.map((time) => {
    const k = lastNotAfter(curve.time, time);
    if (k < 0) return { time, estimate: 1, se: 0, lower: 1, upper: 1, level };
    const hazard = curve.hazard[k]!;
    const hazardSe = curve.se[k]!;
    const estimate = Number.isNaN(hazard) ? 0 : Math.exp(-hazard);
    if (estimate === 0) return { time, estimate, se: null, lower: null, upper: null, level, reason: 'predicted survival has reached 0' };
    return {
      time,
      estimate,
      se: estimate * hazardSe,
      lower: survivalLimit(estimate, hazardSe, z, 'log-log', -1),
      upper: survivalLimit(estimate, hazardSe, z, 'log-log', 1),
      level,
    };
  });
}

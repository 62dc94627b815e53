import { criticalValue } from '../critical-value';
import { normal } from '../distributions';
import { type Estimate, type Interval, requireRange } from '../result';
import type { SurvivalCurve } from './kaplan-meier';
import { isBefore } from './times';

/** Mean time free of the event up to tau, with its standard error. */
export interface RestrictedMean extends Estimate {
  readonly tau: number;
  readonly se: number | null;
}

/**
 * Restricted mean survival time: the area under the curve from 0 to tau.
 * Variance: sum over events of A² d / (n (n - d)), A the area from that time to
 * tau; the term is 0 when n = d, because the area beyond is 0 as well.
 * @param tau in the unit of the times, above 0
 * @returns null when follow-up ends before tau with the curve above 0: the area is not known
 * @throws RangeError when tau is not above 0
 * @see Klein & Moeschberger, Survival Analysis, section 4.5
 */
export function rmst(curve: SurvivalCurve, tau: number): RestrictedMean {
  requireRange(tau > 0 && tau < Infinity, `A restricted mean needs a finite time above 0, not ${tau}.`);
  const about = { tau, level: curve.level, n: curve.n, leftOut: curve.leftOut, method: `Restricted mean survival time to ${tau}, Greenwood-type variance` };
  const last = curve.time.length - 1;
  if (last < 0 || (isBefore(curve.time[last]!, tau) && curve.survival[last]! > 0)) {
    return { ...about, events: 0, estimate: null, se: null, lower: null, upper: null, reason: `follow-up ends before ${tau}` };
  }
  const { area, variance, events } = areaBackwards(curve, tau);
  const se = Math.sqrt(variance);
  const half = criticalValue(curve.level) * se;
  return { ...about, events, estimate: area, se, lower: area - half, upper: area + half };
}

/** From tau back to 0, so that the area to the right of each event is at hand when its term is added. */
function areaBackwards({ time, survival, atRisk, eventsAt }: SurvivalCurve, tau: number) {
  let area = 0;
  let variance = 0;
  let events = 0;
  let right = tau;
  for (let g = time.length - 1; g >= 0; g--) {
    if (isBefore(tau, time[g]!) || eventsAt[g] === 0) continue;
    const [n, d] = [atRisk[g]!, eventsAt[g]!];
    area += survival[g]! * (right - time[g]!);
    if (n > d) variance += (area * area * d) / (n * (n - d));
    events += d;
    right = time[g]!;
  }
  return { area: area + right, variance, events };
}

/**
 * Difference a - b of two restricted means of independent groups to the same tau.
 * In the unit of the times, with a normal test.
 * @throws RangeError when the two have another tau or level
 * @see Royston & Parmar, BMC Med Res Methodol 2013;13:152
 */
export function rmstDifference(a: RestrictedMean, b: RestrictedMean): Interval & { readonly se: number | null; readonly p: number | null } {
  requireRange(a.tau === b.tau && a.level === b.level, 'Restricted means are compared at one time and one level.');
  const { level } = a;
  if (a.estimate === null || b.estimate === null) {
    return { estimate: null, se: null, lower: null, upper: null, p: null, level, reason: a.reason ?? b.reason ?? 'not estimable' };
  }
  const estimate = a.estimate - b.estimate;
  const se = Math.hypot(a.se ?? 0, b.se ?? 0);
  const half = criticalValue(level) * se;
  if (se === 0) return { estimate, se, lower: estimate, upper: estimate, p: null, level, reason: 'no event in either group, so no test' };
  return { estimate, se, lower: estimate - half, upper: estimate + half, p: 2 * normal.sf(Math.abs(estimate) / se), level };
}

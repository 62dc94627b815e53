import { criticalValue } from '../critical-value';
import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import type { Interval, Provenance } from '../result';
import type { TestStatistic } from './chi-square-test';
import { requireStrata, type Strata } from './strata';

export interface MantelHaenszel extends Provenance {
  /** With the Robins-Breslow-Greenland variance of its log. */
  readonly oddsRatio: Interval & { readonly standardErrorLog: number | null };
  /** With the Greenland-Robins variance of its log. */
  readonly riskRatio: Interval & { readonly standardErrorLog: number | null };
  /** With Sato's variance. */
  readonly riskDifference: Interval & { readonly standardError: number | null };
  /** Cochran-Mantel-Haenszel chi-square on 1 df, and with half taken off its numerator. */
  readonly test: TestStatistic;
  readonly testCorrected: TestStatistic;
}

/**
 * Common effect of stratified 2 by 2 tables. Strata where the exposed or the
 * rest are absent carry no comparison and are left out, and said. A zero sum
 * leaves the ratio's limits null with a reason.
 *
 * @param strata columns of cells, one entry a stratum
 * @throws RangeError on columns of different length or cells that are no counts
 * @see Mantel & Haenszel 1959. Robins, Breslow & Greenland 1986. Greenland & Robins 1985. Sato 1989
 */
export function mantelHaenszel(strata: Strata, { level = 0.95 }: { readonly level?: number } = {}): MantelHaenszel {
  requireStrata(strata);
  const z = criticalValue(level);
  const s = sumsOf(strata);
  const test = testsOf(s);
  return {
    oddsRatio: ratio(s.r, s.s, oddsVariance(s), z, level),
    riskRatio: ratio(s.an0, s.cn1, s.riskInformation / (s.an0 * s.cn1), z, level),
    riskDifference: difference(s, z, level),
    ...test,
    method: methodOf('mantelHaenszel'),
    n: s.n,
    events: s.events,
    leftOut: s.empty === 0 ? [] : [{ reason: 'Strata without both groups', count: s.empty }],
  };
}

type Sums = ReturnType<typeof sumsOf>;

function sumsOf({ a: as, b: bs, c: cs, d: ds }: Strata) {
  const sums = {
    n: 0, events: 0, empty: 0, r: 0, s: 0, pr: 0, psqr: 0, qs: 0, an0: 0, cn1: 0, riskInformation: 0,
    weight: 0, satoP: 0, satoQ: 0, excess: 0, variance: 0,
  };
  for (let i = 0; i < as.length; i++) {
    const a = as[i] as number;
    const b = bs[i] as number;
    const c = cs[i] as number;
    const d = ds[i] as number;
    const n1 = a + b;
    const n0 = c + d;
    if (n1 === 0 || n0 === 0) {
      sums.empty++;
      continue;
    }
    const n = n1 + n0;
    const m1 = a + c;
    const r = (a * d) / n;
    const s = (b * c) / n;
    const p = (a + d) / n;
    const q = (b + c) / n;
    sums.n += n;
    sums.events += m1;
    sums.r += r;
    sums.s += s;
    sums.pr += p * r;
    sums.psqr += p * s + q * r;
    sums.qs += q * s;
    sums.an0 += (a * n0) / n;
    sums.cn1 += (c * n1) / n;
    sums.riskInformation += (m1 * n1 * n0 - a * c * n) / (n * n);
    sums.weight += (n1 * n0) / n;
    sums.satoP += (n1 * n1 * c - n0 * n0 * a + (n1 * n0 * (n0 - n1)) / 2) / (n * n);
    sums.satoQ += (a * (n0 - c) + c * (n1 - a)) / (2 * n);
    sums.excess += (a * n0 - c * n1) / n;
    sums.variance += ((n1 * n0) / n / n) * ((m1 * (n - m1)) / (n - 1));
  }
  return sums;
}

function oddsVariance({ r, s, pr, psqr, qs }: Sums): number {
  return pr / (2 * r * r) + psqr / (2 * r * s) + qs / (2 * s * s);
}

function ratio(top: number, bottom: number, variance: number, z: number, level: number): MantelHaenszel['oddsRatio'] {
  if (top === 0 || bottom === 0) {
    const estimate = top === bottom ? null : top / bottom;
    return { estimate, lower: null, upper: null, standardErrorLog: null, level, reason: 'One side of the sum over strata is zero.' };
  }
  const estimate = top / bottom;
  const standardErrorLog = Math.sqrt(Math.max(0, variance));
  const reach = Math.exp(z * standardErrorLog);
  return { estimate, lower: estimate / reach, upper: estimate * reach, standardErrorLog, level };
}

function difference({ weight, excess, satoP, satoQ }: Sums, z: number, level: number): MantelHaenszel['riskDifference'] {
  if (weight === 0) return { estimate: null, lower: null, upper: null, standardError: null, level, reason: 'No stratum has both groups.' };
  const estimate = excess / weight;
  const standardError = Math.sqrt(Math.max(0, estimate * satoP + satoQ)) / weight;
  return { estimate, lower: estimate - z * standardError, upper: estimate + z * standardError, standardError, level };
}

function testsOf({ excess, variance }: Sums): Pick<MantelHaenszel, 'test' | 'testCorrected'> {
  const none = { statistic: null, p: null };
  if (!(variance > 0)) return { test: none, testCorrected: none };
  const size = Math.abs(excess);
  const corrected = size - Math.min(0.5, size);
  return { test: withP((size * size) / variance), testCorrected: withP((corrected * corrected) / variance) };
}

function withP(statistic: number): TestStatistic {
  return { statistic, p: chiSquare.sf(statistic, 1) };
}

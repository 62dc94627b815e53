import { chiSquare } from '../distributions';
import { requireRange, type Provenance } from '../result';
import { quadraticForm, rowsOf } from './cholesky';
import { checkFollowUp, take, type FollowUp } from './follow-up';
import { RiskCounter } from './risk-counter';
import { countCodes, takeCodes, timeOrderByStratum, type Codes } from './strata';
import { orderTimes } from './times';

/** Follow-up with a group for each row, coded 0, 1, 2 …, and perhaps a stratum. */
export interface GroupedFollowUp extends FollowUp {
  readonly group: Codes;
  readonly stratum?: Codes;
}

export interface LogRankOptions {
  /** Number of groups, when the highest code may be absent from the rows. */
  readonly groups?: number;
  /** Weight S(t-)^rho: 0 is the log-rank test, 1 the Peto-Peto form of the Wilcoxon test. */
  readonly rho?: number;
  /** Scores of the groups for the trend test; 1, 2, 3 … unless given. */
  readonly scores?: readonly number[];
}

/** A chi-square test; null (with the reason) where no test exists. */
export interface ChiSquareTest {
  readonly chiSquare: number | null;
  readonly df: number;
  readonly p: number | null;
  readonly reason?: string;
}

export interface LogRank extends Provenance, ChiSquareTest {
  readonly events: number;
  /** Observed and expected events of each group, weighted when rho is not 0. */
  readonly groups: readonly { readonly n: number; readonly observed: number; readonly expected: number }[];
  /** Covariance matrix of observed - expected. */
  readonly variance: number[][];
  readonly trend: ChiSquareTest;
  readonly rho: number;
}

/**
 * Log-rank test of k groups, with strata, weights and a test for trend.
 * Groups without a row at risk at any event carry no degree of freedom.
 * @throws RangeError on columns of different length or codes out of range
 * @see Mantel, Cancer Chemother Rep 1966;50:163. Peto & Peto, JRSS A 1972;135:185. Fleming & Harrington 1991, ch. 7. Trend: Tarone, Biometrika 1975;62:679
 */
export function logRank(data: GroupedFollowUp, options: LogRankOptions = {}): LogRank {
  const { rho = 0 } = options;
  const { rows, leftOut } = checkFollowUp(data.time, data.event, data.entry, 1);
  const follow: FollowUp = { time: take(data.time, rows), event: take(data.event, rows), ...(data.entry && { entry: take(data.entry, rows) }) };
  const k = Math.max(countCodes(data.group, data.time.length, 'group'), options.groups ?? 0);
  const group = takeCodes(data.group, rows);
  const scores = options.scores ?? Array.from({ length: k }, (_, i) => i + 1);
  requireRange(Number.isFinite(rho), `The weight's power must be a number, not ${rho}.`);
  requireRange(scores.length === k, `There are ${k} groups but ${scores.length} scores.`);
  if (data.stratum) countCodes(data.stratum, data.time.length, 'stratum');

  const sums = newSums(k);
  for (let i = 0; i < group.length; i++) {
    sums.n[group[i]!]!++;
    sums.events += follow.event[i]!;
  }
  for (const stratum of timeOrderByStratum(follow.time, data.stratum && takeCodes(data.stratum, rows))) addStratum(sums, follow, group, stratum, rho);
  return {
    ...testOf(sums, k),
    method: methodName(rho, data.stratum !== undefined),
    n: group.length,
    events: sums.events,
    leftOut,
    rho,
    groups: Array.from({ length: k }, (_, a) => ({ n: sums.n[a]!, observed: sums.observed[a]!, expected: sums.expected[a]! })),
    variance: rowsOf(sums.variance, k),
    trend: trendOf(sums, k, scores),
  };
}

interface Sums {
  readonly n: Uint32Array;
  readonly observed: Float64Array;
  readonly expected: Float64Array;
  readonly variance: Float64Array;
  events: number;
  /** A weight S(t-)^rho was infinite: the curve had fallen to 0 and others entered later. */
  endless: boolean;
}

function newSums(k: number): Sums {
  return { n: new Uint32Array(k), observed: new Float64Array(k), expected: new Float64Array(k), variance: new Float64Array(k * k), events: 0, endless: false };
}

function addStratum(sums: Sums, { time, event, entry }: FollowUp, group: Codes, rows: Uint32Array, rho: number): void {
  const k = sums.n.length;
  const { starts, time: times } = orderTimes(time, rows);
  const counter = new RiskCounter(group, k, rows, entry);
  const eventsIn = new Uint32Array(k);
  let pooled = 1; // S(t-) of the stratum
  for (let g = 0; g < times.length; g++) {
    counter.enterBefore(times[g]!);
    let d = 0;
    for (let i = starts[g]!; i < starts[g + 1]!; i++) {
      if (event[rows[i]!] === 0) continue;
      eventsIn[group[rows[i]!]!]!++;
      d++;
    }
    if (d > 0) {
      const n = counter.total;
      if (pooled === 0 && rho < 0) sums.endless = true;
      else addTable(sums, eventsIn, counter.atRisk, d, n, rho === 0 ? 1 : Math.pow(pooled, rho));
      pooled *= (n - d) / n;
      eventsIn.fill(0);
    }
    counter.leave(starts[g]!, starts[g + 1]!);
  }
}

/** Adds one event time: the multivariate hypergeometric mean and variance of its k x 2 table. */
function addTable(sums: Sums, eventsIn: Uint32Array, atRisk: Uint32Array, d: number, n: number, weight: number): void {
  const k = atRisk.length;
  const spread = n > 1 ? (weight * weight * d * (n - d)) / (n - 1) : 0;
  for (let a = 0; a < k; a++) {
    const share = atRisk[a]! / n;
    sums.observed[a]! += weight * eventsIn[a]!;
    sums.expected[a]! += weight * d * share;
    if (spread === 0 || share === 0) continue;
    for (let b = 0; b < a; b++) {
      const covariance = spread * share * (atRisk[b]! / n);
      sums.variance[a * k + b]! -= covariance;
      sums.variance[b * k + a]! -= covariance;
    }
    sums.variance[a * k + a]! += spread * share * ((n - atRisk[a]!) / n);
  }
}

const ENDLESS = 'the weight is infinite where the curve has fallen to 0';

function testOf({ observed, expected, variance, endless }: Sums, k: number): ChiSquareTest {
  if (endless) return { chiSquare: null, df: 0, p: null, reason: ENDLESS };
  const difference = observed.map((o, a) => o - expected[a]!);
  const { chiSquare: statistic, df } = quadraticForm(difference, variance, k);
  if (df === 0) return { chiSquare: null, df, p: null, reason: 'no event at a time when two groups were at risk' };
  return { chiSquare: statistic, df, p: chiSquare.sf(statistic, df) };
}

function trendOf({ observed, expected, variance, endless }: Sums, k: number, scores: readonly number[]): ChiSquareTest {
  if (endless) return { chiSquare: null, df: 0, p: null, reason: ENDLESS };
  let sum = 0;
  let spread = 0;
  let scale = 0;
  for (let a = 0; a < k; a++) {
    sum += scores[a]! * (observed[a]! - expected[a]!);
    for (let b = 0; b < k; b++) {
      const term = scores[a]! * scores[b]! * variance[a * k + b]!;
      spread += term;
      scale += Math.abs(term);
    }
  }
  if (!(spread > 1e-12 * scale)) return { chiSquare: null, df: 0, p: null, reason: 'the scores do not vary among groups at risk together' };
  const statistic = (sum * sum) / spread;
  return { chiSquare: statistic, df: 1, p: chiSquare.sf(statistic, 1) };
}

function methodName(rho: number, stratified: boolean): string {
  const name = rho === 0 ? 'Log-rank test' : rho === 1 ? 'Peto-Peto weighted log-rank test' : `Log-rank test with weights S(t-)^${rho} (Fleming-Harrington)`;
  return stratified ? `${name}, stratified` : name;
}

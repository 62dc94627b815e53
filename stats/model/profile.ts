import { factor, inverse, solve } from '../survival/cholesky';
import type { PersonTotals } from './person-totals';

/**
 * The relative covariance of the random effects is L L' with L lower
 * triangular: theta = [l11] or [l11, l21, l22]. Signs do not matter, so the
 * search is free of bounds and a variance of 0 is an ordinary point of it.
 */
export type Theta = ArrayLike<number>;

/** The profiled criterion at one theta, with what the answer and its derivatives need. */
export interface Profile {
  /** -2 log (restricted) likelihood, all constants included. */
  readonly deviance: number;
  readonly gradient: Float64Array;
  readonly sigma2: number;
  /** Weighted residual sum of squares. */
  readonly rss: number;
  /** (Q' V^-1 Q)^-1 in units of sigma2, row-major. */
  readonly inverseInformation: Float64Array;
  /** Coefficients on the basis, to be added to those of least squares. */
  readonly gamma: Float64Array;
  /** Z' V^-1 Q of each person, laid out as `zq`. */
  readonly vzq: Float64Array;
  /** Z' V^-1 (y - Q gamma) of each person. */
  readonly u: Float64Array;
  /** Sum over people of u u': [11, 12, 22]. */
  readonly uu: readonly [number, number, number];
}

export interface Criterion {
  readonly reml: boolean;
  /** log |det R| of the design, so that the restricted likelihood is that of the named columns. */
  readonly logDeterminant: number;
  /** Holds the residual variance instead of profiling it out (for second derivatives). */
  readonly sigma2?: number;
}

/** L L' as [11, 12, 22]. */
export function relativeCovariance(theta: Theta): readonly [number, number, number] {
  const [a, b, c] = [theta[0]!, theta[1] ?? 0, theta[2] ?? 0];
  return [a * a, a * b, b * b + c * c];
}

/**
 * Profiled deviance and its gradient in O(people). Lindstrom & Bates 1988, JASA
 * 83:1014; Bates et al. 2015, J Stat Softw 67(1). With O = L L', B = I + Z'Z O:
 * Z' V^-1 = B^-1 Z' and |V| = |B|, a 2 x 2 solve that subtracts nothing large.
 * The gradient is 2 S L with
 * S = sum Z'V^-1 Z - Z'V^-1 Q (Q'V^-1 Q)^-1 Q'V^-1 Z - u u'/sigma2.
 */
export function profile(totals: PersonTotals, theta: Theta, criterion: Criterion): Profile {
  const { n, p } = totals;
  const sums = sweepPeople(totals, relativeCovariance(theta));
  const factored = factor(sums.information, p, 0);
  const inverseInformation = inverse(factored);
  const gamma = solve(factored, sums.right);
  let rss = sums.yvy;
  for (let j = 0; j < p; j++) rss -= gamma[j]! * sums.right[j]!;
  const df = criterion.reml ? n - p : n;
  const sigma2 = criterion.sigma2 ?? rss / df;
  let deviance = sums.logDet + df * Math.log(2 * Math.PI * sigma2) + rss / sigma2;
  if (criterion.reml) {
    deviance += 2 * criterion.logDeterminant;
    for (let j = 0; j < p; j++) deviance += 2 * Math.log(factored.lower[j * p + j]!);
  }
  const { u, uu } = residualTotals(sums.vzy, sums.vzq, gamma, totals);
  const projected = criterion.reml ? projectedTotals(sums.vzq, inverseInformation, totals) : ([0, 0, 0] as const);
  const s = [0, 1, 2].map((k) => sums.w[k]! - projected[k]! - uu[k]! / sigma2) as [number, number, number];
  return { deviance, gradient: timesL(s, theta), sigma2, rss, inverseInformation, gamma, vzq: sums.vzq, u, uu };
}

/** Derivative along each entry of L of tr(S L L'), S symmetric as [11, 12, 22]: 2 S L. */
export function timesL([s11, s12, s22]: readonly [number, number, number], theta: Theta): Float64Array {
  const a = theta[0]!;
  if (theta.length === 1) return Float64Array.of(2 * s11 * a);
  const [b, c] = [theta[1]!, theta[2]!];
  return Float64Array.of(2 * (s11 * a + s12 * b), 2 * (s12 * a + s22 * b), 2 * s22 * c);
}

/** One pass over the people: |V|, Q'V^-1 Q, Q'V^-1 y, y'V^-1 y, and Z'V^-1 of Q and y. */
function sweepPeople({ people, p, zz, zq, zy, yy }: PersonTotals, [o11, o12, o22]: readonly [number, number, number]) {
  const information = new Float64Array(p * p);
  for (let j = 0; j < p; j++) information[j * p + j] = 1;
  const right = new Float64Array(p);
  const vzq = new Float64Array(zq.length);
  const vzy = new Float64Array(zy.length);
  const w = new Float64Array(3);
  let logDet = 0;
  let yvy = yy;
  for (let i = 0; i < people; i++) {
    const n11 = zz[3 * i]!;
    const n12 = zz[3 * i + 1]!;
    const n22 = zz[3 * i + 2]!;
    const b11 = 1 + n11 * o11 + n12 * o12;
    const b12 = n11 * o12 + n12 * o22;
    const b21 = n12 * o11 + n22 * o12;
    const b22 = 1 + n12 * o12 + n22 * o22;
    // |I + N O| = 1 + tr(N O) + |N||O|: all terms of one sign, unlike b11 b22 - b12 b21.
    const det = 1 + n11 * o11 + 2 * n12 * o12 + n22 * o22 + Math.max(0, n11 * n22 - n12 * n12) * Math.max(0, o11 * o22 - o12 * o12);
    logDet += Math.log(det);
    w[0]! += (b22 * n11 - b12 * n12) / det;
    w[1]! += (b22 * n12 - b12 * n22) / det;
    w[2]! += (b11 * n22 - b21 * n12) / det;
    const y1 = (b22 * zy[2 * i]! - b12 * zy[2 * i + 1]!) / det;
    const y2 = (b11 * zy[2 * i + 1]! - b21 * zy[2 * i]!) / det;
    vzy[2 * i] = y1;
    vzy[2 * i + 1] = y2;
    const oy1 = o11 * y1 + o12 * y2;
    const oy2 = o12 * y1 + o22 * y2;
    yvy -= zy[2 * i]! * oy1 + zy[2 * i + 1]! * oy2;
    const at = 2 * p * i;
    for (let j = 0; j < p; j++) {
      const q1 = zq[at + j]!;
      const q2 = zq[at + p + j]!;
      vzq[at + j] = (b22 * q1 - b12 * q2) / det;
      vzq[at + p + j] = (b11 * q2 - b21 * q1) / det;
      right[j]! -= q1 * oy1 + q2 * oy2;
    }
    for (let j = 0; j < p; j++) {
      const oq1 = o11 * vzq[at + j]! + o12 * vzq[at + p + j]!;
      const oq2 = o12 * vzq[at + j]! + o22 * vzq[at + p + j]!;
      for (let k = 0; k < p; k++) information[k * p + j]! -= zq[at + k]! * oq1 + zq[at + p + k]! * oq2;
    }
  }
  return { information, right, vzq, vzy, w, logDet, yvy };
}

function residualTotals(vzy: Float64Array, vzq: Float64Array, gamma: Float64Array, { people, p }: PersonTotals) {
  const u = vzy.slice();
  const uu: [number, number, number] = [0, 0, 0];
  for (let i = 0; i < people; i++) {
    for (let j = 0; j < p; j++) {
      u[2 * i]! -= vzq[2 * p * i + j]! * gamma[j]!;
      u[2 * i + 1]! -= vzq[2 * p * i + p + j]! * gamma[j]!;
    }
    uu[0] += u[2 * i]! ** 2;
    uu[1] += u[2 * i]! * u[2 * i + 1]!;
    uu[2] += u[2 * i + 1]! ** 2;
  }
  return { u, uu };
}

/** Sum over people of C A^-1 C', C = Z'V^-1 Q: what estimating the coefficients takes from the information on L. */
function projectedTotals(vzq: Float64Array, inverseInformation: Float64Array, { people, p }: PersonTotals): readonly [number, number, number] {
  const out: [number, number, number] = [0, 0, 0];
  for (let i = 0; i < people; i++) {
    const at = 2 * p * i;
    for (let j = 0; j < p; j++) {
      for (let k = 0; k < p; k++) {
        const a = inverseInformation[j * p + k]!;
        out[0] += vzq[at + j]! * a * vzq[at + k]!;
        out[1] += vzq[at + j]! * a * vzq[at + p + k]!;
        out[2] += vzq[at + p + j]! * a * vzq[at + p + k]!;
      }
    }
  }
  return out;
}

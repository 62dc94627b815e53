import { backTransformCovariance } from './design';
import type { Family } from './glm-family';
import type { GlmData, IrlsFit } from './irls';

/**
 * Robust covariance of the named coefficients, A^-1 (sum s s') A^-1 with the
 * scores s summed by cluster (every row its own cluster: HC0). Huber 1967;
 * White 1980, Econometrica 48:817; Liang & Zeger 1986, Biometrika 73:13. No
 * small-sample factor; callers multiply by G/(G - 1) where they say so.
 *
 * @param cluster cluster number 0..G-1 of each row, or null for HC0.
 */
export function sandwich({ design, y, m }: GlmData, fit: IrlsFit, family: Family, cluster: Int32Array | null): Float64Array {
  const { n, p, basis } = design;
  if (cluster === null) return backTransformCovariance(design, rowByRow({ design, y, m }, fit, family));
  const groups = 1 + cluster.reduce((most, g) => Math.max(most, g), -1);
  const scores = new Float64Array(groups * p);
  for (let row = 0; row < n; row++) {
    const s = family.score(y[row]!, fit.eta[row]!, m[row]!);
    const at = cluster[row]! * p;
    for (let j = 0; j < p; j++) scores[at + j]! += s * basis[j]![row]!;
  }
  return backTransformCovariance(design, filled(fit.covariance, scores, p));
}

/** HC0: the middle of the sandwich is Q' diag(s^2) Q, so no row's score has to be kept. */
function rowByRow({ design, y, m }: Pick<GlmData, 'design' | 'y' | 'm'>, fit: IrlsFit, family: Family): Float64Array {
  const { n, p, basis } = design;
  const squares = new Float64Array(n);
  for (let row = 0; row < n; row++) squares[row] = family.score(y[row]!, fit.eta[row]!, m[row]!) ** 2;
  const middle = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    for (let k = 0; k <= j; k++) {
      const [a, b] = [basis[j]!, basis[k]!];
      let sum = 0;
      for (let row = 0; row < n; row++) sum += a[row]! * squares[row]! * b[row]!;
      middle[j * p + k] = middle[k * p + j] = sum;
    }
  }
  return product(product(fit.covariance, middle, p), fit.covariance, p);
}

function product(a: Float64Array, b: Float64Array, p: number): Float64Array {
  const out = new Float64Array(p * p);
  for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) for (let k = 0; k < p; k++) out[i * p + j]! += a[i * p + k]! * b[k * p + j]!;
  return out;
}

/** bread x (sum of score score') x bread, row-major. */
export function filled(bread: Float64Array, scores: Float64Array, p: number): Float64Array {
  const out = new Float64Array(p * p);
  const influence = new Float64Array(p);
  for (let at = 0; at < scores.length; at += p) {
    influence.fill(0);
    for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) influence[i]! += bread[i * p + j]! * scores[at + j]!;
    for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) out[i * p + j]! += influence[i]! * influence[j]!;
  }
  return out;
}

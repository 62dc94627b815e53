import { methodOf } from '../registry';
import { requireRange } from '../result';
import type { Refusal } from './fit';
import { fitGlm, type Glm, type GlmInput } from './glm';
import { binomialFamily } from './glm-family';

/**
 * Logistic regression of 0/1 outcomes, or of events among `trials` (grouped);
 * the ratios are odds ratios. Cox 1958, JRSS B 20:215.
 *
 * @returns a refusal that names the columns where they separate the outcomes:
 * the maximum is then at infinity and a printed coefficient would be the
 * number of iterations in disguise.
 * @throws RangeError for outcomes beyond their trials or collinear columns.
 */
export function logisticRegression(input: GlmInput): Glm | Refusal {
  requireRange(input.exposure === undefined, 'A logistic regression has no exposure; use trials for grouped outcomes.');
  for (let row = 0; input.trials === undefined && row < input.y.length; row++) {
    const y = input.y[row]!;
    if (!(y === 0 || y === 1 || Number.isNaN(y))) throw new RangeError(`An outcome is 0 or 1, not ${y} (row ${row}).`);
  }
  return fitGlm(input, binomialFamily, methodOf('logisticRegression'));
}

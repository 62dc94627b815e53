import { methodOf } from '../registry';
import type { Refusal } from './fit';
import { fitGlm, type Glm, type GlmInput } from './glm';
import { poissonFamily } from './glm-family';

/**
 * Poisson regression of counts with log link; `exposure` enters as log offset,
 * and the ratios are rate ratios. McCullagh & Nelder 1989, ch. 6. Standard
 * errors: model, HC0 and, with `cluster`, clustered.
 *
 * @returns a refusal where no finite estimate exists (no events, or separation).
 * @throws RangeError for counts that are not whole, an exposure that is not above 0 or collinear columns.
 */
export function poissonRegression(input: GlmInput): Glm | Refusal {
  return fitGlm(input, poissonFamily, methodOf('poissonRegression'));
}

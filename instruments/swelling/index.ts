import { defaultSwellingContext, type SwellingAssessment, type SwellingContext, type SwellingDefinition, type SwellingVerdict } from './define-swelling';
import { d1InterLimb2cm, d2Change2cm } from './girth';
import { d10Symptoms, d11Clinician, d8Impedance } from './other';
import { d5Rvc5, d6Rvc10 } from './relative-change';
import { d3InterLimb200ml, d4AtRisk200ml, d7InterLimb10pct, d9InterLimbIncrease } from './volume';

/** Every definition of swelling, in order of its number. */
export const swellingDefinitions: readonly SwellingDefinition[] = [
  d1InterLimb2cm,
  d2Change2cm,
  d3InterLimb200ml,
  d4AtRisk200ml,
  d5Rvc5,
  d6Rvc10,
  d7InterLimb10pct,
  d8Impedance,
  d9InterLimbIncrease,
  d10Symptoms,
  d11Clinician,
];

export const swellingCodes = ['D1', 'D2', 'D3', 'D4', 'D5', 'D6', 'D7', 'D8', 'D9', 'D10', 'D11'] as const;
export type SwellingCode = (typeof swellingCodes)[number];

export function swellingDefinition(code: SwellingCode): SwellingDefinition {
  const found = swellingDefinitions.find((definition) => definition.code === code);
  if (!found) throw new RangeError(`There is no definition ${code}.`);
  return found;
}

/** Every definition's verdict on one assessment, in registry order. */
export function judgeSwelling(
  assessment: SwellingAssessment,
  baseline: SwellingAssessment | null,
  context: SwellingContext = defaultSwellingContext,
): (SwellingVerdict & { readonly code: SwellingCode })[] {
  return swellingCodes.map((code) => ({ code, ...swellingDefinition(code).judge(assessment, baseline, context) }));
}

/** High water: the case threshold that charts of relative volume change draw, in percent. */
export interface HighWater {
  readonly percent: number;
  /** The definition whose line it is. */
  readonly name: string;
}

/** The primary definition's own line; where it is not one of relative change, that of RVC 10 %. */
export function highWater(primary: SwellingCode): HighWater {
  const { rvcLinePct, name } = swellingDefinition(primary);
  return rvcLinePct === undefined ? highWater('D6') : { percent: rvcLinePct, name };
}

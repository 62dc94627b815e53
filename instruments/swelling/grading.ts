import { isAbove, isAtLeast } from '../threshold';

/**
 * Least CTCAE v5.0 grade of 'Edema limbs' by size alone, from the inter-limb discrepancy in percent: 5–10 grade 1,
 * above 10 to 30 grade 2, above 30 grade 3; under 5 none. The clinician may raise it, never lower it by the number.
 */
export function ctcaeGradeBySize(discrepancyPct: number): 0 | 1 | 2 | 3 {
  if (isAbove(discrepancyPct, 30)) return 3;
  if (isAbove(discrepancyPct, 10)) return 2;
  return isAtLeast(discrepancyPct, 5) ? 1 : 0;
}

/**
 * Severity by excess volume in percent, as the ISL consensus documents band it (from memory, not re-read): from 5
 * minimal, from 20 moderate, above 40 severe. Stage is clinical and a field of its own.
 */
export function islSeverity(excessPct: number): 'none' | 'minimal' | 'moderate' | 'severe' {
  if (isAbove(excessPct, 40)) return 'severe';
  if (isAtLeast(excessPct, 20)) return 'moderate';
  return isAtLeast(excessPct, 5) ? 'minimal' : 'none';
}

/**
 * Where an inter-limb difference lies against prediction limits of normal arms (Lymphat Res Biol 2018;16:75): beyond the first
 * or second limit, 6 and 10 % with the dominant arm at risk, 0 and 4 % otherwise. Not a diagnosis.
 */
export function dominanceCategory({ interLimbPct, atRiskIsDominant }: { interLimbPct: number; atRiskIsDominant: boolean }): 'none/mild' | 'moderate' | 'severe' {
  const [moderateFrom, severeFrom] = atRiskIsDominant ? [6, 10] : [0, 4];
  if (isAtLeast(interLimbPct, severeFrom)) return 'severe';
  return isAtLeast(interLimbPct, moderateFrom) ? 'moderate' : 'none/mild';
}

/** Mean excess of the dominant arm's volume before surgery, percent (Smoot 2014, n = 397). */
export const DOMINANT_ARM_EXCESS_PCT = 1.12;

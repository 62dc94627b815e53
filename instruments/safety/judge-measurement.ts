import { isAtLeast } from '../threshold';
import { type SafetyVerdict, safetyVerdict } from './judge-symptom-report';

/** What a measurement shows; null = not known. Percentages, not ratios. */
export interface MeasuredFindings {
  readonly rvcPct: number | null;
  /** RVC now minus RVC at the last visit, in points. */
  readonly rvcSinceLastVisitPoints: number | null;
  readonly isImpedanceAboveCutoff: boolean | null;
  readonly ctcaeGrade: number | null;
}

/** S3, S2 or nothing, from what was measured rather than what was felt. */
export function judgeMeasurement({ rvcPct, rvcSinceLastVisitPoints, isImpedanceAboveCutoff, ctcaeGrade }: MeasuredFindings): SafetyVerdict | null {
  const isLarge = rvcPct !== null && isAtLeast(rvcPct, 10);
  const hasGrown = rvcSinceLastVisitPoints !== null && isAtLeast(rvcSinceLastVisitPoints, 5);
  if (isLarge || hasGrown || (ctcaeGrade ?? 0) >= 2) return safetyVerdict('S3');
  return isImpedanceAboveCutoff || (rvcPct !== null && isAtLeast(rvcPct, 5)) ? safetyVerdict('S2') : null;
}

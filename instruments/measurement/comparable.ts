import type { MeasurementMethodCode } from './index';
import { isSameMap, type MeasurementMap } from './map';

/** What a baseline is bound to; change is computed only within one identity. */
export interface MethodIdentity {
  readonly method: MeasurementMethodCode;
  /** Null for devices that give a volume. */
  readonly map: MeasurementMap | null;
  /** The instrument used, where it matters (null = not recorded). */
  readonly deviceId: string | null;
  readonly formulaVersion: string;
}

export type Comparability =
  | { readonly comparable: true }
  | { readonly comparable: false; readonly flag: 'METHOD_MISMATCH' | 'MAP_MISMATCH' | 'DEVICE_MISMATCH' | 'FORMULA_MISMATCH'; readonly reason: string };

/**
 * May change be computed between these two? A tape (girth methods) may be exchanged for another; a device that gives
 * its own volume may not. A switch needs one visit with both methods and a new baseline, never a conversion.
 */
export function areComparable(baseline: MethodIdentity, visit: MethodIdentity): Comparability {
  if (baseline.method !== visit.method) {
    return { comparable: false, flag: 'METHOD_MISMATCH', reason: `Baseline was measured by ${baseline.method}, this visit by ${visit.method}. Change is not computed across methods; measure by both on one day and set a new baseline.` };
  }
  if (baseline.map !== null && visit.map !== null && !isSameMap(baseline.map, visit.map)) {
    return { comparable: false, flag: 'MAP_MISMATCH', reason: 'The levels differ from the baseline map, so the volumes cover different lengths of arm.' };
  }
  if (baseline.map === null && baseline.deviceId !== visit.deviceId) {
    return { comparable: false, flag: 'DEVICE_MISMATCH', reason: 'The device differs from the one used at baseline.' };
  }
  if (baseline.formulaVersion !== visit.formulaVersion) {
    return { comparable: false, flag: 'FORMULA_MISMATCH', reason: 'The volumes were computed by different versions of the formula. Recompute both.' };
  }
  return { comparable: true };
}

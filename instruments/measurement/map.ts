/** Where the tape is laid: marks every `stepMm` from `startOffsetMm` above the ulnar styloid, `levels` marks in all. */
export interface MeasurementMap {
  readonly startOffsetMm: number;
  readonly stepMm: number;
  readonly levels: number;
}

/** 0 to 40 cm from the wrist in 4 cm steps: eleven marks. */
export const STANDARD_ARM_MAP: MeasurementMap = { startOffsetMm: 0, stepMm: 40, levels: 11 };

/** Distances of the marks from the styloid, in millimetres, in the order they are measured. */
export function levelOffsetsMm(map: MeasurementMap): number[] {
  return Array.from({ length: map.levels }, (_, level) => map.startOffsetMm + level * map.stepMm);
}

/** Volumes compare only within one map. */
export function isSameMap(a: MeasurementMap, b: MeasurementMap): boolean {
  return a.startOffsetMm === b.startOffsetMm && a.stepMm === b.stepMm && a.levels === b.levels;
}

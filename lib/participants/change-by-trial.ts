import { limbVolume } from '@/instruments/measurement/limb-volume';
import type { MeasurementMap } from '@/instruments/measurement/map';
import { relativeVolumeChange } from '@/instruments/measurement/relative-volume-change';

/** The readings of one sitting and the baseline's volumes. */
export interface TrialChange {
  readonly sides: readonly { readonly side: 'left' | 'right'; readonly trial: number; readonly girthsMm: readonly (number | null)[] }[];
  readonly map: MeasurementMap;
  readonly method: string | null;
  readonly affectedSide: 'left' | 'right';
  readonly baseline: { readonly leftMl: number; readonly rightMl: number };
}

/** The change that each of the two trials alone would give, as ratios: the upright through a diamond. Null when a trial is incomplete. */
export function changeByTrial({ sides, map, method, affectedSide, baseline }: TrialChange): readonly [number, number] | null {
  const volume = (side: 'left' | 'right', trial: number): number | null => {
    const pass = sides.find((candidate) => candidate.side === side && candidate.trial === trial);
    return pass ? limbVolume({ method: method === 'disk' ? 'disk' : 'frustum', girthsMm: [...pass.girthsMm], map }).volumeMl : null;
  };
  const change = (trial: number): number | null => {
    const [left, right] = [volume('left', trial), volume('right', trial)];
    if (left === null || right === null) return null;
    return affectedSide === 'left'
      ? relativeVolumeChange({ baselineAtRiskMl: baseline.leftMl, baselineUnaffectedMl: baseline.rightMl, atRiskMl: left, unaffectedMl: right })
      : relativeVolumeChange({ baselineAtRiskMl: baseline.rightMl, baselineUnaffectedMl: baseline.leftMl, atRiskMl: right, unaffectedMl: left });
  };
  const [first, second] = [change(1), change(2)];
  return first === null || second === null ? null : [first, second];
}

/**
 * Smallest detectable change of RVC in percentage points, 95 %: RVC carries four readings, so SD(RVC) ≈ 2·SEM and
 * SDC = 1.96·2·SEM = 3.92·SEM. `semPct` is the standard error of one arm's volume in percent of the volume.
 * Throws RangeError on a negative SEM.
 */
export function rvcMeasurementError(semPct: number): number {
  if (!(semPct >= 0) || !Number.isFinite(semPct)) throw new RangeError(`A measurement error is zero or more, not ${semPct}.`);
  return 3.92 * semPct;
}

/**
 * Relative volume change (A2·U1)/(U2·A1) − 1 as a ratio: 0.0497 is +5.0 %. Any one unit for all four volumes.
 * Source: Ancukiewicz et al., Int J Radiat Oncol Biol Phys 2011;79:1436–43. Throws RangeError unless all are above zero.
 */
export function relativeVolumeChange(volumes: { baselineAtRiskMl: number; baselineUnaffectedMl: number; atRiskMl: number; unaffectedMl: number }): number {
  const { baselineAtRiskMl, baselineUnaffectedMl, atRiskMl, unaffectedMl } = volumes;
  if (![baselineAtRiskMl, baselineUnaffectedMl, atRiskMl, unaffectedMl].every((volume) => volume > 0 && Number.isFinite(volume))) {
    throw new RangeError('Relative volume change needs four volumes above zero.');
  }
  return (atRiskMl * baselineUnaffectedMl) / (unaffectedMl * baselineAtRiskMl) - 1;
}

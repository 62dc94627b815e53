/** How limits of a survival curve are formed: on log(-log S), on log S, or on S itself. */
export type LimitKind = 'log-log' | 'log' | 'plain';

/** Name of a kind of limits, as a reader would cite it. */
export const LIMIT_NAMES: Record<LimitKind, string> = {
  'log-log': 'log-log limits (Kalbfleisch and Prentice)',
  log: 'limits on the log scale',
  plain: 'plain limits',
};

/**
 * Lower limit (side -1) or upper limit (side +1) of S.
 * @param survival S in [0, 1]
 * @param hazardSe standard error of log S, the root of Greenwood's sum
 * @param z normal quantile of the level
 * @returns NaN at S = 0, where the standard error of log S does not exist
 */
export function survivalLimit(survival: number, hazardSe: number, z: number, kind: LimitKind, side: -1 | 1): number {
  if (survival === 0) return NaN;
  if (hazardSe === 0) return survival;
  switch (kind) {
    case 'log-log':
      return Math.pow(survival, Math.exp((side * z * hazardSe) / Math.log(survival)));
    case 'log':
      return Math.min(1, survival * Math.exp(side * z * hazardSe));
    case 'plain':
      return Math.min(1, Math.max(0, survival * (1 + side * z * hazardSe)));
  }
}

import type { TwoGroups } from './counts';
import { katzRiskRatio, type RatioEstimate } from './katz-risk-ratio';
import { koopmanRiskRatio } from './koopman-risk-ratio';

/**
 * p1 / p2 with Katz limits, or Koopman's score limits where a group has no
 * event; the method in the result says which was used.
 * @param groups events among n in each of two groups
 * @throws RangeError where events or numbers are no counts, events pass n, or the level is not inside (0, 1)
 * @see Katz et al. 1978. Koopman 1984
 */
export function riskRatio(groups: TwoGroups): RatioEstimate {
  const katz = katzRiskRatio(groups);
  const zeroCell = katz.standardErrorLog === null && groups.n1 > 0 && groups.n2 > 0;
  return zeroCell ? { ...koopmanRiskRatio(groups), standardErrorLog: null } : katz;
}

import { type FollowUp, usableFollowUp } from './follow-up';
import { countBefore } from './times';

/**
 * Number at risk at asked times: rows with entry < t <= time. Without entry times
 * everyone is at risk from the start, so that the figure at 0 is n.
 * @throws RangeError as `kaplanMeier`
 */
export function numberAtRisk(follow: FollowUp, times: readonly number[]): number[] {
  const { data } = usableFollowUp(follow);
  const leaves = data.time.slice().sort();
  const enters = data.entry?.slice().sort();
  return times.map((t) => (enters === undefined ? leaves.length : countBefore(enters, t)) - countBefore(leaves, t));
}

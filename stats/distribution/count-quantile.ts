/**
 * Smallest count whose `reached` holds, by doubling out from a first guess and
 * halving back. `reached` is false, then true, along the counts.
 *
 * Shared by the discrete distributions; a slack of 64 units in the last place
 * in `reached` keeps quantile(cdf(k)) at k.
 */
export function smallestCount(reached: (k: number) => boolean, guess: number, lowest: number, highest: number): number {
  let high = Math.min(Math.max(Math.floor(guess), lowest), highest);
  let low = high;
  let width = 1;
  while (high < highest && !reached(high)) {
    low = high + 1;
    high = Math.min(highest, high + width);
    width *= 2;
  }
  width = 1;
  while (low > lowest && reached(low)) {
    high = low;
    low = Math.max(lowest, low - width);
    width *= 2;
  }
  while (low < high) {
    const middle = low + Math.floor((high - low) / 2);
    if (reached(middle)) high = middle;
    else low = middle + 1;
  }
  return high;
}

/** Slack of the comparison, as a factor. */
export const COUNT_SLACK = 64 * Number.EPSILON;

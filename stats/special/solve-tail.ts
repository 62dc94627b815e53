/** Longest step on the log scale. */
const longest = 50;

/**
 * Root u of tail(u) = p for a tail that is log-concave in u, by Newton's
 * method on log tail with a bracket kept about it. On that scale the method
 * cannot cycle, and it keeps relative accuracy for p as small as 1e-300.
 *
 * @param tail probability, monotone in u
 * @param weight its derivative's size, |d tail / du|
 * @param p target, in (0, 1/2]
 * @param rising whether tail grows with u
 * @param start any u where tail is not zero
 */
export function solveTail(tail: (u: number) => number, weight: (u: number) => number, p: number, rising: boolean, start: number): number {
  let low = Number.NEGATIVE_INFINITY;
  let high = Number.POSITIVE_INFINITY;
  let u = start;
  for (let round = 0; round < 400; round++) {
    const value = tail(u);
    const above = value > p;
    if (above === rising) high = u;
    else low = u;
    if (value === p) return u;
    const ratio = logRatio(value, p);
    const slope = weight(u) / value;
    const newton = (rising ? -ratio : ratio) / slope;
    // Quadratic convergence: after a step this small nothing is left but rounding.
    if (Math.abs(newton) <= 1e-9 && Math.abs(ratio) < 1e-6) return u + newton;
    const step = Math.max(-longest, Math.min(longest, newton));
    let next = u + step;
    if (!(next > low && next < high)) next = bisect(low, high, u);
    if (next === u || high - low <= 4e-16 * Math.abs(u)) return u;
    u = next;
  }
  throw new RangeError(`No quantile found for p = ${p}.`);
}

function logRatio(value: number, p: number): number {
  const excess = value - p;
  return Math.abs(excess) < 0.5 * p ? Math.log1p(excess / p) : Math.log(value) - Math.log(p);
}

function bisect(low: number, high: number, u: number): number {
  if (low === Number.NEGATIVE_INFINITY) return u - Math.min(longest, 1 + Math.abs(u));
  if (high === Number.POSITIVE_INFINITY) return u + Math.min(longest, 1 + Math.abs(u));
  return low + (high - low) / 2;
}

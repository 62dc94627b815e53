/**
 * Trigamma, the second derivative of log Gamma, for x > 0: recurrence up to
 * 10, then the asymptotic series (Abramowitz & Stegun 6.4.6, 6.4.12). Relative
 * error near 1e-15. Throws RangeError for other x.
 */
export function trigamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`trigamma needs a positive number, not ${x}.`);
  let shift = 0;
  let z = x;
  while (z < 12) {
    shift += 1 / (z * z);
    z += 1;
  }
  const w = 1 / (z * z);
  const series = 1 / 6 - w * (1 / 30 - w * (1 / 42 - w * (1 / 30 - w * (5 / 66 - w * (691 / 2730 - w * (7 / 6))))));
  return shift + 1 / z + w / 2 + (w / z) * series;
}

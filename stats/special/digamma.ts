/**
 * Digamma, the derivative of log Gamma, for x > 0: recurrence up to 10, then
 * the asymptotic series (Abramowitz & Stegun 6.3.5, 6.3.18). Absolute error
 * near 1e-15. Throws RangeError for other x.
 */
export function digamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`digamma needs a positive number, not ${x}.`);
  let shift = 0;
  let z = x;
  while (z < 12) {
    shift -= 1 / z;
    z += 1;
  }
  const w = 1 / (z * z);
  const series = w * (1 / 12 - w * (1 / 120 - w * (1 / 252 - w * (1 / 240 - w * (1 / 132 - w * (691 / 32760 - w / 12))))));
  return shift + Math.log(z) - 0.5 / z - series;
}

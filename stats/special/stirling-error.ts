/**
 * What Stirling's formula leaves over:
 * log Gamma(x + 1) - [(x + 1/2) log x - x + log(2 pi) / 2], for x > 0.
 *
 * Differences of log-gammas of large arguments are taken through this small
 * number, because the log-gammas themselves cancel (Loader C. Fast and
 * accurate computation of binomial probabilities, 2000). Absolute error below
 * 1e-15 everywhere.
 */
export function stirlingError(x: number): number {
  let total = 0;
  let z = x;
  while (z < 12) {
    total += (z + 0.5) * Math.log1p(1 / z) - 1;
    z += 1;
  }
  const w = 1 / (z * z);
  const series =
    1 / 12 - w * (1 / 360 - w * (1 / 1260 - w * (1 / 1680 - w * (1 / 1188 - w * (691 / 360360 - w * (1 / 156 - w * (3617 / 122400)))))));
  return total + series / z;
}

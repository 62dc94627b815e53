/**
 * x log(x / m) + m - x for x >= 0, m > 0: the exponent of a Poisson or
 * binomial probability at x about its mean m, without the cancellation of the
 * plain formula near x = m (Loader 2000, 'bd0').
 */
export function deviancePart(x: number, m: number): number {
  if (x === 0) return m;
  const difference = x - m;
  if (!(Math.abs(difference) < 0.3 * (x + m))) return x * Math.log(x / m) - difference;
  const v = difference / (x + m);
  const square = v * v;
  let sum = difference * v;
  let term = 2 * x * v;
  for (let j = 3; ; j += 2) {
    term *= square;
    const next = sum + term / j;
    if (next === sum) return sum;
    sum = next;
  }
}

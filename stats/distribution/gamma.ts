import { gammaTail, poissonWeight } from '../special/incomplete-gamma';
import { logGamma1p } from '../special/log-gamma';
import { normalQuantileTail } from '../special/normal-quantile';
import { solveTail } from '../special/solve-tail';
import { requireNumber, requirePositive, requireProbability, type Continuous } from './shape';

function check(shape: number, scale: number): void {
  requirePositive(shape, 'A gamma shape');
  requirePositive(scale, 'A gamma scale');
}

/** Gamma distribution by shape and scale (1 unless given). */
export const gammaDist: Continuous<[shape: number, scale?: number]> = {
  cdf(x, shape, scale = 1) {
    requireNumber(x);
    check(shape, scale);
    return gammaTail(shape, x / scale, false);
  },
  sf(x, shape, scale = 1) {
    requireNumber(x);
    check(shape, scale);
    return gammaTail(shape, x / scale, true);
  },
  quantile(p, shape, scale = 1) {
    requireProbability(p);
    check(shape, scale);
    return scale * gammaQuantileTail(shape, p, false);
  },
  isf(p, shape, scale = 1) {
    requireProbability(p);
    check(shape, scale);
    return scale * gammaQuantileTail(shape, p, true);
  },
  pdf(x, shape, scale = 1) {
    requireNumber(x);
    check(shape, scale);
    if (x < 0) return 0;
    if (x === 0) return shape < 1 ? Number.POSITIVE_INFINITY : shape === 1 ? 1 / scale : 0;
    const z = x / scale;
    return (poissonWeight(shape, z) * shape) / x;
  },
};

/** x with lower (or upper) tail p, solved on log x and log p. */
export function gammaQuantileTail(shape: number, p: number, upper: boolean): number {
  if (p > 0.5) return gammaQuantileTail(shape, 1 - p, !upper);
  if (p === 0) return upper ? Number.POSITIVE_INFINITY : 0;
  // The leading term x^a / Gamma(a + 1) bounds the lower tail from above, so this lies left of the root.
  const leading = (Math.log(p) + logGamma1p(shape)) / shape;
  if (!upper && leading < -600) return Math.exp(leading);
  return Math.exp(
    solveTail(
      (u) => gammaTail(shape, Math.exp(u), upper),
      (u) => shape * poissonWeight(shape, Math.exp(u)),
      p,
      !upper,
      start(shape, p, upper, leading),
    ),
  );
}

/** Wilson & Hilferty's cube where it is positive, the leading term below, the mean otherwise. */
function start(shape: number, p: number, upper: boolean, leading: number): number {
  const ninth = 1 / (9 * shape);
  const cube = 1 - ninth + normalQuantileTail(p, upper) * Math.sqrt(ninth);
  if (shape >= 1 && cube > 0.1) return Math.log(shape) + 3 * Math.log(cube);
  return upper ? Math.log(Math.max(shape, -Math.log(p) / 2)) : leading;
}

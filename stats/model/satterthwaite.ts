import { factor, solve } from '../survival/cholesky';
import { contrastOf, type Design } from './design';
import type { PersonTotals } from './person-totals';
import { profile, timesL, type Criterion, type Profile } from './profile';

/**
 * Satterthwaite degrees of freedom of each coefficient: 2 v^2 / (g' A g), with
 * v its variance, g the gradient of v along the variance parameters (theta,
 * log sigma^2) and A their covariance, twice the inverse Hessian of the
 * deviance. Satterthwaite 1946; Giesbrecht & Burns 1985, Biometrics 41:477;
 * Kuznetsova et al. 2017, J Stat Softw 82(13). null where the Hessian has no inverse.
 */
export function satterthwaiteDf(design: Design, totals: PersonTotals, theta: Float64Array, at: Profile, criterion: Criterion): (number | null)[] {
  const hessian = fullHessian(totals, theta, at, criterion);
  const size = theta.length + 1;
  let largest = 0;
  for (let i = 0; i < size; i++) largest = Math.max(largest, hessian[i * size + i]!);
  // Two entries of L can stand for one covariance (a variance of 0); a small ridge settles which, and v does not move along it.
  for (let i = 0; i < size; i++) hessian[i * size + i]! += 1e-10 * largest;
  const factored = factor(hessian, size, 0);
  if (factored.rank < size) return design.names.map(() => null);
  return design.names.map((_, k) => {
    const { variance, gradient } = varianceGradient(contrastOf(design, k), totals, theta, at);
    const x = solve(factored, gradient);
    const spread = 2 * gradient.reduce((sum, g, i) => sum + g * x[i]!, 0);
    return spread > 0 ? (2 * variance ** 2) / spread : null;
  });
}

/** Hessian of the unprofiled deviance in (theta, log sigma^2), at its optimum. */
function fullHessian(totals: PersonTotals, theta: Float64Array, at: Profile, criterion: Criterion): Float64Array {
  const k = theta.length;
  const size = k + 1;
  const hessian = new Float64Array(size * size);
  const held: Criterion = { ...criterion, sigma2: at.sigma2 };
  for (let j = 0; j < k; j++) {
    const h = 1e-5 * Math.max(0.1, Math.abs(theta[j]!));
    const moved = (sign: number): Float64Array => profile(totals, theta.map((value, i) => (i === j ? value + sign * h : value)), held).gradient;
    const up = moved(1);
    const down = moved(-1);
    for (let i = 0; i < k; i++) {
      const second = (up[i]! - down[i]!) / (2 * h);
      hessian[i * size + j]! += second / 2;
      hessian[j * size + i]! += second / 2;
    }
  }
  // Only the term -u u'/sigma^2 of the gradient knows sigma^2.
  const cross = timesL(at.uu.map((value) => value / at.sigma2) as [number, number, number], theta);
  for (let i = 0; i < k; i++) hessian[i * size + k] = hessian[k * size + i] = cross[i]!;
  hessian[k * size + k] = at.rss / at.sigma2;
  return hessian;
}

/** Variance of one contrast and its gradient in (theta, log sigma^2). */
function varianceGradient(contrast: Float64Array, { people, p }: PersonTotals, theta: Float64Array, at: Profile) {
  const m = new Float64Array(p);
  for (let i = 0; i < p; i++) for (let j = 0; j < p; j++) m[i]! += at.inverseInformation[i * p + j]! * contrast[j]!;
  const variance = at.sigma2 * contrast.reduce((sum, c, j) => sum + c * m[j]!, 0);
  const t: [number, number, number] = [0, 0, 0];
  for (let i = 0; i < people; i++) {
    let first = 0;
    let second = 0;
    for (let j = 0; j < p; j++) {
      first += at.vzq[2 * p * i + j]! * m[j]!;
      second += at.vzq[2 * p * i + p + j]! * m[j]!;
    }
    t[0] += first * first;
    t[1] += first * second;
    t[2] += second * second;
  }
  const alongL = timesL(t, theta).map((value) => value * at.sigma2);
  return { variance, gradient: Float64Array.of(...alongL, variance) };
}

import { factor, solve } from '../survival/cholesky';

/** A value to make small, with its exact gradient; Infinity bars a region. */
export interface Point {
  readonly value: number;
  readonly gradient: Float64Array;
}

export interface Minimum {
  readonly x: Float64Array;
  readonly value: number;
  readonly iterations: number;
  readonly converged: boolean;
}

const MAX_ITERATIONS = 200;
/** Promised decrease below which only full steps are taken: the value itself no longer shows it. */
const POLISH = 1e-7;
const POLISH_STEPS = 8;
/** Relative step at which polishing ends. */
const STEP = 1e-11;
/** Ridge, as a share of the largest curvature, that still counts as positive definite: a flat direction is no saddle. */
const FLAT = 1e-9;

/**
 * Newton in a few unknowns inside a trust radius, second derivatives by central
 * differences of the exact gradient. Where curvature is not positive, or the
 * step is longer than the radius, a ridge is added (Levenberg 1944; More 1978),
 * so a saddle is left and never reported as an optimum.
 */
export function minimise(at: (x: Float64Array) => Point, start: Float64Array): Minimum {
  let x = start;
  let here = at(x);
  let radius = 1;
  let polished = 0;
  for (let iterations = 1; iterations <= MAX_ITERATIONS; iterations++) {
    const hessian = curvature(at, x);
    if (!hessian.every(Number.isFinite)) return { x, value: here.value, iterations, converged: false };
    const { step, convex } = boundedStep(hessian, here.gradient, radius);
    const promise = -promised(step, here.gradient, hessian);
    if (convex && promise < POLISH) {
      const small = step.every((s, i) => Math.abs(s) <= STEP * (1 + Math.abs(x[i]!)));
      if (small || polished === POLISH_STEPS) return { x, value: here.value, iterations, converged: true };
      polished++;
      x = x.map((value, i) => value + step[i]!);
      here = at(x);
      continue;
    }
    const move = convex ? step : offSaddle(step, x, hessian);
    const tried = x.map((value, i) => value + move[i]!);
    const there = at(tried);
    const gain = (here.value - there.value) / Math.max(promise, 1e-12);
    if (there.value < here.value && gain > 1e-4) {
      x = tried;
      here = there;
      if (gain > 0.5) radius *= 2;
    } else {
      radius = Math.min(radius, length(move)) / 4;
      if (radius < 1e-12) return { x, value: here.value, iterations, converged: false };
    }
  }
  return { x, value: here.value, iterations: MAX_ITERATIONS, converged: false };
}

/** Change of the quadratic model along a step. */
function promised(step: Float64Array, gradient: Float64Array, hessian: Float64Array): number {
  const size = step.length;
  let change = 0;
  for (let i = 0; i < size; i++) {
    change += gradient[i]! * step[i]!;
    for (let j = 0; j < size; j++) change += 0.5 * step[i]! * hessian[i * size + j]! * step[j]!;
  }
  return change;
}

function length(step: Float64Array): number {
  return Math.sqrt(step.reduce((sum, s) => sum + s * s, 0));
}

/** The step of the least ridge that is positive definite and no longer than the radius. */
function boundedStep(hessian: Float64Array, gradient: Float64Array, radius: number): { step: Float64Array; convex: boolean } {
  const size = gradient.length;
  const largest = hessian.reduce((most, value) => Math.max(most, Math.abs(value)), Number.MIN_VALUE);
  let convex = false;
  for (let ridge = 0; ; ridge = ridge === 0 ? FLAT * largest : 3 * ridge) {
    const damped = hessian.slice();
    for (let i = 0; i < size; i++) damped[i * size + i]! += ridge;
    const factored = factor(damped, size, 0);
    if (factored.rank < size) continue;
    if (ridge <= FLAT * largest) convex = true;
    const step = solve(factored, gradient).map((s) => -s);
    if (length(step) <= radius) return { step, convex };
  }
}

/** At a saddle the gradient is 0 and no Newton step leads away: nudge the coordinate whose curvature is negative. */
function offSaddle(step: Float64Array, x: Float64Array, hessian: Float64Array): Float64Array {
  const size = x.length;
  if (length(step) > 1e-6 * (1 + length(x))) return step;
  return step.map((s, i) => (hessian[i * size + i]! < 0 ? 0.05 : s));
}

function curvature(at: (x: Float64Array) => Point, x: Float64Array): Float64Array {
  const size = x.length;
  const hessian = new Float64Array(size * size);
  for (let j = 0; j < size; j++) {
    const h = 1e-5 * Math.max(0.1, Math.abs(x[j]!));
    const shifted = (sign: number): Float64Array => at(x.map((value, i) => (i === j ? value + sign * h : value))).gradient;
    const up = shifted(1);
    const down = shifted(-1);
    for (let i = 0; i < size; i++) {
      const second = (up[i]! - down[i]!) / (2 * h);
      hessian[i * size + j]! += second / 2;
      hessian[j * size + i]! += second / 2;
    }
  }
  return hessian;
}

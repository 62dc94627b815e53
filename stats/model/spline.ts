/**
 * Interpolating cubic spline whose end pieces take their third derivative from
 * the cubic through the four points nearest each end. Forsythe, Malcolm & Moler
 * 1977, Computer Methods for Mathematical Computations, ch. 4.
 *
 * @param points at least four, ascending in x.
 */
export function fourPointSpline(points: readonly (readonly [number, number])[]): (x: number) => number {
  const x = points.map(([at]) => at);
  const y = points.map(([, value]) => value);
  const curvature = curvatures(x, y);
  return (at) => {
    let i = 0;
    while (i < x.length - 2 && at >= x[i + 1]!) i++;
    const step = x[i + 1]! - x[i]!;
    const t = at - x[i]!;
    const slope = (y[i + 1]! - y[i]!) / step - step * (curvature[i + 1]! + 2 * curvature[i]!);
    return y[i]! + t * (slope + t * (3 * curvature[i]! + (t * (curvature[i + 1]! - curvature[i]!)) / step));
  };
}

/** Sixths of the second derivatives at the points, by elimination of the tridiagonal system. */
function curvatures(x: readonly number[], y: readonly number[]): Float64Array {
  const n = x.length;
  const step = Array.from({ length: n - 1 }, (_, i) => x[i + 1]! - x[i]!);
  const slope = step.map((width, i) => (y[i + 1]! - y[i]!) / width);
  const diagonal = new Float64Array(n);
  const right = new Float64Array(n);
  for (let i = 1; i < n - 1; i++) {
    diagonal[i] = 2 * (step[i - 1]! + step[i]!);
    right[i] = slope[i]! - slope[i - 1]!;
  }
  diagonal[0] = -step[0]!;
  diagonal[n - 1] = -step[n - 2]!;
  const third = (i: number): number => (right[i + 1]! / (x[i + 2]! - x[i]!) - right[i]! / (x[i + 1]! - x[i - 1]!)) / (x[i + 2]! - x[i - 1]!);
  right[0] = third(1) * step[0]! ** 2;
  right[n - 1] = -third(n - 3) * step[n - 2]! ** 2;
  for (let i = 1; i < n; i++) {
    const share = step[i - 1]! / diagonal[i - 1]!;
    diagonal[i]! -= share * step[i - 1]!;
    right[i]! -= share * right[i - 1]!;
  }
  right[n - 1]! /= diagonal[n - 1]!;
  for (let i = n - 2; i >= 0; i--) right[i] = (right[i]! - step[i]! * right[i + 1]!) / diagonal[i]!;
  return right;
}

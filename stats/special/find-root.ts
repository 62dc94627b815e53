/**
 * Root of a continuous function between two points where it has opposite
 * signs (or is zero), by Brent's method (Brent RP. Algorithms for Minimization
 * without Derivatives, 1973, ch. 4), to the last digits of the root.
 * Throws RangeError when the signs agree.
 */
export function findRoot(f: (x: number) => number, from: number, to: number, tolerance = 0): number {
  let a = from;
  let b = to;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa * fb < 0) && Math.sign(fa) === Math.sign(fb)) throw new RangeError(`No sign change between ${from} and ${to}.`);
  let c = a;
  let fc = fa;
  let width = b - a;
  let previous = width;
  for (let round = 0; round < 300; round++) {
    if (Math.sign(fb) === Math.sign(fc)) {
      c = a;
      fc = fa;
      width = previous = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      a = b;
      b = c;
      c = a;
      fa = fb;
      fb = fc;
      fc = fa;
    }
    const slack = 2.3e-16 * Math.abs(b) + tolerance / 2;
    const half = (c - b) / 2;
    if (Math.abs(half) <= slack || fb === 0) return b;
    const step = interpolate(a, b, c, fa, fb, fc);
    if (Math.abs(previous) >= slack && Math.abs(fa) > Math.abs(fb) && accepts(step, half, slack, previous)) {
      previous = width;
      width = step;
    } else {
      width = previous = half;
    }
    a = b;
    fa = fb;
    b += Math.abs(width) > slack ? width : Math.sign(half) * slack;
    fb = f(b);
  }
  return b;
}

function interpolate(a: number, b: number, c: number, fa: number, fb: number, fc: number): number {
  const s = fb / fa;
  if (a === c) return ((c - b) * s) / (s - 1) || 0;
  const q = fa / fc;
  const r = fb / fc;
  return (s * ((c - b) * q * (q - r) - (b - a) * (r - 1))) / ((q - 1) * (r - 1) * (s - 1)) * -1;
}

function accepts(step: number, half: number, slack: number, previous: number): boolean {
  return Number.isFinite(step) && step * half > 0 && Math.abs(step) < Math.min(1.5 * Math.abs(half) - slack / 2, Math.abs(previous) / 2);
}

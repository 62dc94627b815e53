/**
 * Error function and its complements, by Cody's rational approximations
 * (Cody WJ. Math Comp 1969;23:631-637; coefficients as in ACM Algorithm 715,
 * 1993). Relative error near 1e-16 in both tails.
 */

const A = [3.16112374387056560, 113.864154151050156, 377.485237685302021, 3209.37758913846947, 0.185777706184603153] as const;
const B = [23.6012909523441209, 244.024637934444173, 1282.61652607737228, 2844.23683343917062] as const;
const C = [
  0.564188496988670089, 8.88314979438837594, 66.1191906371416295, 298.635138197400131, 881.95222124176909, 1712.04761263407058,
  2051.07837782607147, 1230.33935479799725, 2.15311535474403846e-8,
] as const;
const D = [
  15.7449261107098347, 117.693950891312499, 537.181101862009858, 1621.38957456669019, 3290.79923573345963, 4362.61909014324716,
  3439.36767414372164, 1230.33935480374942,
] as const;
const P = [0.305326634961232344, 0.360344899949804439, 0.125781726111229246, 0.0160837851487422766, 6.58749161529837803e-4, 0.0163153871373020978] as const;
const Q = [2.56852019228982242, 1.87295284992346047, 0.527905102951428412, 0.0605183413124413191, 2.33520497626869185e-3] as const;

const ONE_OVER_SQRT_PI = 0.56418958354775628695;

/** 2/sqrt(pi) times the integral of exp(-t^2) from x to infinity. Keeps its digits for large x, where 1 - erf(x) has none. */
export function erfc(x: number): number {
  const y = Math.abs(x);
  if (y <= 0.46875) return 1 - smallErf(x);
  const tail = expMinusSquare(y) * scaledTail(y);
  return x < 0 ? 2 - tail : tail;
}

/** exp(x^2) erfc(x): the tail without its exponential, for logarithms of tails that underflow. */
export function erfcx(x: number): number {
  const y = Math.abs(x);
  if (y <= 0.46875) return Math.exp(x * x) * (1 - smallErf(x));
  if (x > 0) return scaledTail(y);
  return 2 * Math.exp(x * x) - scaledTail(y);
}

/** 2/sqrt(pi) times the integral of exp(-t^2) from 0 to x. */
export function erf(x: number): number {
  return Math.abs(x) <= 0.46875 ? smallErf(x) : x < 0 ? erfc(-x) - 1 : 1 - erfc(x);
}

function smallErf(x: number): number {
  const square = x * x;
  let top = A[4] * square;
  let bottom = square;
  for (let i = 0; i < 3; i++) {
    top = (top + (A[i] as number)) * square;
    bottom = (bottom + (B[i] as number)) * square;
  }
  return (x * (top + A[3])) / (bottom + B[3]);
}

/** exp(y^2) erfc(y) for y > 0.46875. */
function scaledTail(y: number): number {
  if (y <= 4) {
    let top = C[8] * y;
    let bottom = y;
    for (let i = 0; i < 7; i++) {
      top = (top + (C[i] as number)) * y;
      bottom = (bottom + (D[i] as number)) * y;
    }
    return (top + C[7]) / (bottom + D[7]);
  }
  const inverse = 1 / (y * y);
  let top = P[5] * inverse;
  let bottom = inverse;
  for (let i = 0; i < 4; i++) {
    top = (top + (P[i] as number)) * inverse;
    bottom = (bottom + (Q[i] as number)) * inverse;
  }
  return (ONE_OVER_SQRT_PI - (inverse * (top + P[4])) / (bottom + Q[4])) / y;
}

/** exp(-y^2) with y^2 split in two, so that its rounding does not grow with y^2. */
function expMinusSquare(y: number): number {
  const head = Math.trunc(y * 16) / 16;
  return Math.exp(-head * head) * Math.exp(-(y - head) * (y + head));
}

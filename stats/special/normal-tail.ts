/**
 * Upper tail of the standard normal, P(Z > x), by Cody's rational
 * approximations in x itself (Cody 1969; ACM Algorithm 715, 'ANORM'), which
 * spares the rounding of x / sqrt 2 in the far tail.
 */

const A = [2.2352520354606839287, 161.02823106855587881, 1067.6894854603709582, 18154.981253343561249, 0.065682337918207449113] as const;
const B = [47.20258190468824187, 976.09855173777669322, 10260.932208618978205, 45507.789335026729956] as const;
const C = [
  0.39894151208813466764, 8.8831497943883759412, 93.506656132177855979, 597.27027639480026226, 2494.5375852903726711, 6848.1904505362823326,
  11602.651437647350124, 9842.7148383839780218, 1.0765576773720192317e-8,
] as const;
const D = [
  22.266688044328115691, 235.38790178262499861, 1519.377599407554805, 6485.558298266760755, 18615.571640885098091, 34900.952721145977266,
  38912.003286093271411, 19685.429676859990727,
] as const;
const P = [
  0.21589853405795699, 0.1274011611602473639, 0.022235277870649807, 0.001421619193227893466, 2.9112874951168792e-5, 0.02307344176494017303,
] as const;
const Q = [1.28426009614491121, 0.468238212480865118, 0.0659881378689285515, 0.00378239633202758244, 7.29751555083966205e-5] as const;

const ONE_OVER_SQRT_TWO_PI = 0.39894228040143267794;

export function normalTail(x: number): number {
  const y = Math.abs(x);
  if (y <= 0.67448975) return 0.5 - centre(x);
  if (y > 39) return x > 0 ? 0 : 1;
  const tail = expMinusHalfSquare(y) * (y <= Math.sqrt(32) ? middle(y) : far(y));
  return x > 0 ? tail : 1 - tail;
}

function centre(x: number): number {
  const square = x * x;
  let top = A[4] * square;
  let bottom = square;
  for (let i = 0; i < 3; i++) {
    top = (top + (A[i] as number)) * square;
    bottom = (bottom + (B[i] as number)) * square;
  }
  return (x * (top + A[3])) / (bottom + B[3]);
}

function middle(y: number): number {
  let top = C[8] * y;
  let bottom = y;
  for (let i = 0; i < 7; i++) {
    top = (top + (C[i] as number)) * y;
    bottom = (bottom + (D[i] as number)) * y;
  }
  return (top + C[7]) / (bottom + D[7]);
}

function far(y: number): number {
  const inverse = 1 / (y * y);
  let top = P[5] * inverse;
  let bottom = inverse;
  for (let i = 0; i < 4; i++) {
    top = (top + (P[i] as number)) * inverse;
    bottom = (bottom + (Q[i] as number)) * inverse;
  }
  return (ONE_OVER_SQRT_TWO_PI - (inverse * (top + P[4])) / (bottom + Q[4])) / y;
}

/** exp(-y^2 / 2) with y^2 split in two, so that its rounding does not grow with y^2. */
function expMinusHalfSquare(y: number): number {
  const head = Math.trunc(y * 16) / 16;
  return Math.exp(-head * head * 0.5) * Math.exp(-(y - head) * (y + head) * 0.5);
}

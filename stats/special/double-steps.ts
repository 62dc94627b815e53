/** The doubles in their order as whole numbers: neighbours differ by one, both zeros are 0. */
const cell = new Float64Array(1);
const bits = new BigInt64Array(cell.buffer);
const SIGN = -(2n ** 63n);

/** Place of a double (not NaN) among all doubles. */
export function placeOf(value: number): bigint {
  cell[0] = value;
  const raw = bits[0]!;
  return raw >= 0n ? raw : SIGN - raw;
}

/** The double at a place. */
export function doubleAt(place: bigint): number {
  bits[0] = place >= 0n ? place : SIGN - place;
  return cell[0]!;
}

const LAST = placeOf(Infinity);

/** The double so many steps up (or down, below 0), at most infinite. */
export function stepsFrom(value: number, steps: number): number {
  const place = placeOf(value) + BigInt(steps);
  return doubleAt(place > LAST ? LAST : place < -LAST ? -LAST : place);
}

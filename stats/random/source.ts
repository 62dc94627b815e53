/** A stream of unsigned 32-bit integers; everything random in the module is drawn from one. */
export interface RandomSource {
  /** Next output, 0 to 2^32 - 1. */
  next32(): number;
}

/** Uniform double in [0, 1) with 53 random bits: 27 of one draw, 26 of the next. */
export function nextDouble(source: RandomSource): number {
  const high = source.next32() >>> 5;
  const low = source.next32() >>> 6;
  return (high * 67108864 + low) / 9007199254740992;
}

const WORD = 4294967296;

/**
 * Uniform integer 0..n-1 without bias, for n from 1 to 2^32: multiply-shift
 * with rejection (Lemire D. ACM Trans Model Comput Simul 2019;29:3). Almost
 * always one draw and no division.
 * @throws RangeError where n is no whole number in that range
 */
export function nextBelow(source: RandomSource, n: number): number {
  if (!(Number.isInteger(n) && n >= 1 && n <= WORD)) throw new RangeError(`Choices are counted from 1 to 2^32, not ${n}.`);
  let draw = source.next32();
  let low = Math.imul(draw, n) >>> 0;
  if (low < n) {
    const least = (WORD - n) % n;
    while (low < least) {
      draw = source.next32();
      low = Math.imul(draw, n) >>> 0;
    }
  }
  return highWord(draw, n);
}

/** Upper 32 bits of the 64-bit product, exact: no partial product passes 2^53. */
function highWord(draw: number, n: number): number {
  const carry = Math.floor(((draw & 0xffff) * n) / 65536);
  return Math.floor(((draw >>> 16) * n + carry) / 65536);
}

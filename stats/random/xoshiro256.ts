const MASK = (1n << 64n) - 1n;

function rotate(x: bigint, by: bigint): bigint {
  return ((x << by) | (x >> (64n - by))) & MASK;
}

/**
 * xoshiro256** (Blackman & Vigna 2021) from four 64-bit words, as unsigned
 * 64-bit integers. Slow here; kept to repeat runs made elsewhere with it.
 * A state of zeros throws RangeError.
 */
export function xoshiro256(words: readonly [bigint, bigint, bigint, bigint]): () => bigint {
  let [a, b, c, d] = words.map((word) => BigInt.asUintN(64, word)) as [bigint, bigint, bigint, bigint];
  if ((a | b | c | d) === 0n) throw new RangeError('A generator cannot start from a state of zeros.');
  return () => {
    const result = (rotate((b * 5n) & MASK, 7n) * 9n) & MASK;
    const shifted = (b << 17n) & MASK;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotate(d, 45n);
    return result;
  };
}

const MASK = (1n << 64n) - 1n;
const GOLDEN = 0x9e3779b97f4a7c15n;

/**
 * SplitMix64 (Steele, Lea, Flood. OOPSLA 2014), as unsigned 64-bit integers:
 * used to spread a seed over the state of other generators, never in a loop
 * over data.
 *
 * @param seed any integer; taken modulo 2^64
 */
export function splitMix64(seed: bigint | number): () => bigint {
  let state = BigInt.asUintN(64, BigInt(seed));
  return () => {
    state = (state + GOLDEN) & MASK;
    let z = state;
    z = ((z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n) & MASK;
    z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) & MASK;
    return z ^ (z >> 31n);
  };
}

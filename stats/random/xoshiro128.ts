import type { RandomSource } from './source';
import { splitMix64 } from './split-mix64';

/**
 * xoshiro128** (Blackman & Vigna. ACM Trans Math Softw 2021;47:36): the
 * module's own generator. Period 2^128 - 1, four words of state.
 */
export class Xoshiro128 implements RandomSource {
  /** Words in a typed array: as plain fields every other one would be boxed. */
  private readonly words: Int32Array;

  private constructor(words: readonly number[]) {
    this.words = Int32Array.from(words, (word) => word | 0);
  }

  /** From four 32-bit words, not all zero (RangeError). */
  static fromState(words: readonly [number, number, number, number]): Xoshiro128 {
    if (words.every((word) => word >>> 0 === 0)) throw new RangeError('A generator cannot start from a state of zeros.');
    return new Xoshiro128(words);
  }

  /** From a whole-number seed: the low halves of its first four SplitMix64 outputs. */
  static fromSeed(seed: number): Xoshiro128 {
    if (!Number.isSafeInteger(seed)) throw new RangeError(`A seed is a whole number, not ${seed}.`);
    return Xoshiro128.spread(splitMix64(seed));
  }

  /**
   * The stream of one replicate of a seeded run. It depends on the seed and
   * the replicate's number alone, so a run gives the same result however its
   * replicates are shared among workers.
   */
  static forReplicate(seed: number, replicate: number): Xoshiro128 {
    if (!Number.isSafeInteger(seed)) throw new RangeError(`A seed is a whole number, not ${seed}.`);
    if (!(Number.isSafeInteger(replicate) && replicate >= 0)) throw new RangeError(`Replicates are numbered from 0, not ${replicate}.`);
    // Two rounds of mixing part the streams: neighbouring seeds and numbers share no pattern.
    const base = splitMix64(seed)();
    return Xoshiro128.spread(splitMix64(base ^ splitMix64(replicate)()));
  }

  private static spread(next: () => bigint): Xoshiro128 {
    const word = () => Number(next() & 0xffffffffn);
    return Xoshiro128.fromState([word(), word(), word(), word()]);
  }

  /** The four words as they stand, for a record of where a run began. */
  get state(): [number, number, number, number] {
    return Array.from(this.words, (word) => word >>> 0) as [number, number, number, number];
  }

  next32(): number {
    const words = this.words;
    let a = words[0] as number;
    let b = words[1] as number;
    let c = words[2] as number;
    let d = words[3] as number;
    const five = Math.imul(b, 5);
    const result = Math.imul((five << 7) | (five >>> 25), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    words[0] = a;
    words[1] = b;
    words[2] = c ^ shifted;
    words[3] = (d << 11) | (d >>> 21);
    return result;
  }
}

import type { RandomSource } from './source';
import { splitMix64 } from './split-mix64';

/**
 * xoshiro128** (Blackman & Vigna. ACM Trans Math Softw 2021;47:36): the
 * module's own generator. Period 2^128 - 1, four words of state.
 */
export class Xoshiro128 implements RandomSource {
  private constructor(
    private a: number,
    private b: number,
    private c: number,
    private d: number,
  ) {}

  /** From four 32-bit words, not all zero (RangeError). */
  static fromState(words: readonly [number, number, number, number]): Xoshiro128 {
    if (words.every((word) => word >>> 0 === 0)) throw new RangeError('A generator cannot start from a state of zeros.');
    return new Xoshiro128(words[0] | 0, words[1] | 0, words[2] | 0, words[3] | 0);
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
    return [this.a >>> 0, this.b >>> 0, this.c >>> 0, this.d >>> 0];
  }

  next32(): number {
    const five = Math.imul(this.b, 5);
    const result = Math.imul((five << 7) | (five >>> 25), 9) >>> 0;
    const shifted = this.b << 9;
    this.c ^= this.a;
    this.d ^= this.b;
    this.b ^= this.c;
    this.a ^= this.d;
    this.c ^= shifted;
    this.d = (this.d << 11) | (this.d >>> 21);
    return result;
  }
}

import type { RandomSource } from './source';

const MULTIPLIER = 6364136223846793005n;

/**
 * PCG32, XSH-RR output (O'Neill ME. HMC-CS-2014-0905): kept to repeat runs made
 * elsewhere with it.
 */
export class Pcg32 implements RandomSource {
  private state = 0n;
  private readonly increment: bigint;

  /** @param seed initial state, `stream` which of the 2^63 sequences; whole numbers */
  constructor(seed: number | bigint, stream: number | bigint) {
    this.increment = BigInt.asUintN(64, (BigInt(stream) << 1n) | 1n);
    this.next32();
    this.state = BigInt.asUintN(64, this.state + BigInt(seed));
    this.next32();
  }

  next32(): number {
    const old = this.state;
    this.state = BigInt.asUintN(64, old * MULTIPLIER + this.increment);
    const shifted = Number(BigInt.asUintN(32, ((old >> 18n) ^ old) >> 27n));
    const turn = Number(old >> 59n);
    return ((shifted >>> turn) | (shifted << (-turn & 31))) >>> 0;
  }
}

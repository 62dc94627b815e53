import type { RandomSource } from './source';

const SIZE = 624;
const SHIFT = 397;

/**
 * Mersenne Twister MT19937 (Matsumoto & Nishimura. ACM Trans Model Comput
 * Simul 1998;8:3-30), seeded by init_genrand: kept to repeat runs made with R
 * or NumPy, whose default generators it is.
 */
export class Mt19937 implements RandomSource {
  private readonly words = new Uint32Array(SIZE);
  private at = SIZE;

  /** @param seed taken modulo 2^32 */
  constructor(seed: number) {
    let word = seed >>> 0;
    this.words[0] = word;
    for (let i = 1; i < SIZE; i++) {
      word = (Math.imul(word ^ (word >>> 30), 1812433253) + i) >>> 0;
      this.words[i] = word;
    }
  }

  next32(): number {
    if (this.at === SIZE) this.turn();
    let y = this.words[this.at++] as number;
    y ^= y >>> 11;
    y ^= (y << 7) & 0x9d2c5680;
    y ^= (y << 15) & 0xefc60000;
    y ^= y >>> 18;
    return y >>> 0;
  }

  private turn(): void {
    const words = this.words;
    for (let i = 0; i < SIZE; i++) {
      const y = ((words[i] as number) & 0x80000000) | ((words[(i + 1) % SIZE] as number) & 0x7fffffff);
      words[i] = (words[(i + SHIFT) % SIZE] as number) ^ (y >>> 1) ^ ((y & 1) * 0x9908b0df);
    }
    this.at = 0;
  }
}

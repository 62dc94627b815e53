import { describe, expect, test } from 'vitest';
import { Mt19937 } from '@/stats/random/mt19937';
import { Pcg32 } from '@/stats/random/pcg32';
import { nextBelow, nextDouble, type RandomSource } from '@/stats/random/source';
import { splitMix64 } from '@/stats/random/split-mix64';
import { Xoshiro128 } from '@/stats/random/xoshiro128';
import { xoshiro256 } from '@/stats/random/xoshiro256';
import { chiSquare } from '@/stats/distributions';
import { inlineOf, runTopic, type ReferenceCase } from './reference';

const take = <T>(count: number, next: () => T): T[] => Array.from({ length: count }, next);
const howMany = ({ expected }: ReferenceCase) => (expected as { first: unknown[] }).first.length;
const seedOf = (reference: ReferenceCase) => inlineOf(reference).seed as number;
const stateOf = (reference: ReferenceCase) => reference.dataset?.inline?.state as unknown as [number, number, number, number];

runTopic(
  '11-missing-bootstrap-rng',
  {
    'rng-mt19937-5489': (reference) => {
      const source = new Mt19937(seedOf(reference));
      const outputs = take(10_000, () => source.next32());
      return { first: outputs.slice(0, howMany(reference)), output_10000: outputs[9_999] };
    },
    'rng-mt19937-res53': (reference) => {
      const source = new Mt19937(seedOf(reference));
      return { first: take(howMany(reference), () => nextDouble(source)) };
    },
    'rng-mt19937-bounded': (reference) => {
      const source = new Mt19937(seedOf(reference));
      return { first: take(howMany(reference), () => nextBelow(source, inlineOf(reference).n as number)) };
    },
    'rng-pcg32': (reference) => {
      const source = new Pcg32(seedOf(reference), inlineOf(reference).stream as number);
      return { first: take(howMany(reference), () => source.next32()) };
    },
    'rng-splitmix64': (reference) => ({ first: take(howMany(reference), splitMix64(seedOf(reference))).map(String) }),
    'rng-xoshiro128ss-1234': (reference) => {
      const source = Xoshiro128.fromState(stateOf(reference));
      return { first: take(howMany(reference), () => source.next32()) };
    },
    'rng-xoshiro128ss-seeded': (reference) => {
      const source = Xoshiro128.fromSeed(seedOf(reference));
      const { state } = source;
      return { state, first: take(howMany(reference), () => source.next32()) };
    },
    'rng-xoshiro256ss': (reference) => {
      const next = xoshiro256(stateOf(reference).map(BigInt) as [bigint, bigint, bigint, bigint]);
      return { first: take(howMany(reference), next).map(String) };
    },
  },
  ({ id }) => id.startsWith('rng-'),
);

describe('streams and draws', () => {
  test('a replicate draws the same numbers in whatever order the replicates are run', () => {
    const forward = [0, 1, 2, 3].map((replicate) => Xoshiro128.forReplicate(7, replicate).next32());
    const backward = [3, 2, 1, 0].map((replicate) => Xoshiro128.forReplicate(7, replicate).next32());
    expect(backward.reverse()).toEqual(forward);
    expect(new Set(forward).size).toBe(4);
  });

  test('ten thousand neighbouring streams begin with different, uniform words', () => {
    const firsts = Array.from({ length: 10_000 }, (_, replicate) => Xoshiro128.forReplicate(1, replicate).next32());
    expect(new Set(firsts).size).toBeGreaterThan(9_980);
    expect(uniformityP(firsts.map((word) => word >>> 28), 16)).toBeGreaterThan(1e-4);
  });

  test('draws below n are uniform where n does not divide the range', () => {
    const source = Xoshiro128.fromSeed(5);
    expect(uniformityP(take(70_000, () => nextBelow(source, 7)), 7)).toBeGreaterThan(1e-4);
  });

  test('draws below a number near the word size are the exact high word, and biased draws are thrown away', () => {
    const fixed = (words: number[]): RandomSource => ({ next32: () => words.shift() as number });
    for (const [draw, n] of [[4294967295, 4294967295], [123456789, 4000000000], [4294967295, 3]] as const) {
      expect(BigInt(nextBelow(fixed([draw]), n))).toBe((BigInt(draw) * BigInt(n)) >> 32n);
    }
    // 2^32 mod 3 = 1: the low word 0 of draw 0 must be refused.
    expect(nextBelow(fixed([0, 4294967295]), 3)).toBe(2);
    expect(nextBelow(fixed([9]), 4294967296)).toBe(9);
  });

  test('a double lies in [0, 1) at both ends of the words', () => {
    expect(nextDouble({ next32: () => 0 })).toBe(0);
    expect(nextDouble({ next32: () => 0xffffffff })).toBe(1 - 2 ** -53);
  });

  test('misuse is refused', () => {
    const source = Xoshiro128.fromSeed(1);
    for (const n of [0, -1, 1.5, Number.NaN, 4294967297]) expect(() => nextBelow(source, n)).toThrow(RangeError);
    expect(() => Xoshiro128.fromState([0, 0, 0, 0])).toThrow(RangeError);
    expect(() => xoshiro256([0n, 0n, 0n, 0n])).toThrow(RangeError);
    expect(() => Xoshiro128.fromSeed(0.5)).toThrow(RangeError);
    expect(() => Xoshiro128.forReplicate(1, -1)).toThrow(RangeError);
    expect(() => Xoshiro128.forReplicate(Number.NaN, 1)).toThrow(RangeError);
  });
});

/** p of the chi-square test that values fall evenly into `bins`. */
function uniformityP(values: number[], bins: number): number {
  const counts = new Float64Array(bins);
  for (const value of values) counts[value] = (counts[value] as number) + 1;
  const want = values.length / bins;
  return chiSquare.sf(counts.reduce((sum, count) => sum + (count - want) ** 2 / want, 0), bins - 1);
}

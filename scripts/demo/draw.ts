import { nextBelow, nextDouble, type RandomSource } from '@/stats/random/source';
import { Xoshiro128 } from '@/stats/random/xoshiro128';

/** Everything that happens to one invented person is drawn from streams of their own, so that more people change nobody. */
const purposes = ['facts', 'names', 'screening', 'course', 'arm', 'visits', 'sitting', 'training', 'reports', 'questions', 'margin', 'ids'] as const;
export type Purpose = (typeof purposes)[number];

/** Seeded draws in the shapes the demonstration needs. */
export class Draw {
  private spare: number | null = null;

  private constructor(private readonly source: RandomSource) {}

  /** The stream of one person (any whole number) and one purpose. */
  static of(seed: number, person: number, purpose: Purpose): Draw {
    return new Draw(Xoshiro128.forReplicate(seed, person * purposes.length + purposes.indexOf(purpose)));
  }

  uniform(low: number, high: number): number {
    return low + (high - low) * nextDouble(this.source);
  }

  /** Whole number from `low` to `high`, both possible. */
  whole(low: number, high: number): number {
    return low + nextBelow(this.source, high - low + 1);
  }

  chance(share: number): boolean {
    return nextDouble(this.source) < share;
  }

  /** Normal by the polar method (Marsaglia & Bray 1964). */
  normal(mean = 0, sd = 1): number {
    if (this.spare !== null) {
      const kept = this.spare;
      this.spare = null;
      return mean + sd * kept;
    }
    for (;;) {
      const u = this.uniform(-1, 1);
      const v = this.uniform(-1, 1);
      const s = u * u + v * v;
      if (s === 0 || s >= 1) continue;
      const factor = Math.sqrt((-2 * Math.log(s)) / s);
      this.spare = v * factor;
      return mean + sd * u * factor;
    }
  }

  /** Normal, held between two limits. */
  between(low: number, high: number, mean: number, sd: number): number {
    return Math.min(high, Math.max(low, this.normal(mean, sd)));
  }

  pick<T>(choices: readonly T[]): T {
    return choices[nextBelow(this.source, choices.length)] as T;
  }

  /** One of the choices, each as likely as its weight. */
  weighted<T>(choices: readonly (readonly [T, number])[]): T {
    let left = this.uniform(0, choices.reduce((sum, [, weight]) => sum + weight, 0));
    for (const [value, weight] of choices) {
      left -= weight;
      if (left < 0) return value;
    }
    return (choices.at(-1) as readonly [T, number])[0];
  }

  /** Whole days with the given mean, at least `least`; long waits are rarer. */
  wait(meanDays: number, least = 0): number {
    return least + Math.floor(-Math.log(1 - nextDouble(this.source)) * Math.max(0, meanDays - least) + 0.5);
  }

  /** An identifier in the form of RFC 9562, version 4. */
  uuid(): string {
    const hex = Array.from({ length: 4 }, () => this.source.next32().toString(16).padStart(8, '0')).join('');
    const variant = '89ab'.charAt(parseInt(hex.charAt(16), 16) & 3);
    return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-${variant}${hex.slice(17, 20)}-${hex.slice(20)}`;
  }
}

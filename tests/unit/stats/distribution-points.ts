import * as distributions from '@/stats/distributions';
import { loadTopic } from './reference';

/** One point of topics 12 and 14: what function, where, and its value from 60-digit arithmetic. */
export interface Point {
  readonly dist: string;
  readonly fn: 'cdf' | 'sf' | 'quantile' | 'isf' | 'pmf';
  readonly params: readonly number[];
  readonly x: number;
  readonly expected: number | string;
  /** Topic 14: libraries found wrong at the point, with their relative error. */
  readonly fails_in?: readonly string[];
}

type Functions = Record<string, ((x: number, ...params: number[]) => number) | undefined>;

const names: Readonly<Record<string, keyof typeof distributions>> = {
  normal: 'normal',
  t: 'studentT',
  chisq: 'chiSquare',
  f: 'fisherF',
  beta: 'betaDist',
  gamma: 'gammaDist',
  poisson: 'poisson',
  binomial: 'binomial',
  hypergeometric: 'hypergeometric',
};

export function pointsOf(topic: string): Point[] {
  return loadTopic(topic).cases as unknown as Point[];
}

/** The value at a point through the one door to distributions, whatever stands behind it. */
export function valueAt({ dist, fn, params, x }: Point): number {
  const name = names[dist];
  const evaluate = name === undefined ? undefined : (distributions[name] as unknown as Functions)[fn];
  if (evaluate === undefined) throw new Error(`nothing answers ${dist}.${fn}`);
  return evaluate(x, ...params);
}

export function relativeError(point: Point): number {
  const want = Number(point.expected);
  const got = valueAt(point);
  return got === want ? 0 : Math.abs(got - want) / Math.abs(want);
}

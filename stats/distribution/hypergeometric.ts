import { requireRange } from '../result';
import { binomialWeight } from '../special/incomplete-beta';
import { COUNT_SLACK, smallestCount } from './count-quantile';
import { requireNumber, requireProbability, type Discrete } from './shape';

function check(population: number, marked: number, drawn: number): void {
  const whole = [population, marked, drawn].every((count) => Number.isInteger(count) && count >= 0);
  requireRange(
    whole && marked <= population && drawn <= population,
    `A hypergeometric draw needs whole counts with marked and drawn within the population, not ${population}, ${marked}, ${drawn}.`,
  );
}

function mass(k: number, population: number, marked: number, drawn: number): number {
  const rest = population - marked;
  if (k < Math.max(0, drawn - rest) || k > Math.min(marked, drawn)) return 0;
  if (drawn === 0 || drawn === population) return 1;
  // Loader 2000: three binomial masses at the common chance drawn / population.
  const x = drawn / population;
  const y = (population - drawn) / population;
  const among = binomialWeight(k, marked - k, x, y) * binomialWeight(drawn - k, rest - drawn + k, x, y);
  return among / binomialWeight(drawn, population - drawn, x, y);
}

/** Sum of masses from k downwards (or from k + 1 upwards), by the ratio of neighbours. */
function tail(x: number, population: number, marked: number, drawn: number, upper: boolean): number {
  const lowest = Math.max(0, drawn - population + marked);
  const highest = Math.min(marked, drawn);
  const k = Math.floor(x);
  if (k < lowest) return upper ? 1 : 0;
  if (k >= highest) return upper ? 0 : 1;
  const mean = (drawn * marked) / population;
  if (upper === k + 1 < mean) return 1 - tailSum(k, population, marked, drawn, !upper);
  return tailSum(k, population, marked, drawn, upper);
}

function tailSum(k: number, population: number, marked: number, drawn: number, upper: boolean): number {
  const lowest = Math.max(0, drawn - population + marked);
  const highest = Math.min(marked, drawn);
  const rest = population - marked;
  let at = upper ? k + 1 : k;
  let term = 1;
  let sum = 1;
  const first = mass(at, population, marked, drawn);
  while (upper ? at < highest : at > lowest) {
    term *= upper
      ? ((marked - at) * (drawn - at)) / ((at + 1) * (rest - drawn + at + 1))
      : (at * (rest - drawn + at)) / ((marked - at + 1) * (drawn - at + 1));
    at += upper ? 1 : -1;
    const next = sum + term;
    if (next === sum) break;
    sum = next;
  }
  return first * sum;
}

/** Hypergeometric distribution: marked ones among `drawn` taken from `population` without return. */
export const hypergeometric: Discrete<[population: number, marked: number, drawn: number]> = {
  cdf(x, population, marked, drawn) {
    requireNumber(x);
    check(population, marked, drawn);
    return tail(x, population, marked, drawn, false);
  },
  sf(x, population, marked, drawn) {
    requireNumber(x);
    check(population, marked, drawn);
    return tail(x, population, marked, drawn, true);
  },
  quantile(p, population, marked, drawn) {
    requireProbability(p);
    check(population, marked, drawn);
    const reached = (k: number) => tail(k, population, marked, drawn, false) >= p * (1 - COUNT_SLACK);
    return smallestCount(reached, meanOf(population, marked, drawn), Math.max(0, drawn - population + marked), Math.min(marked, drawn));
  },
  isf(p, population, marked, drawn) {
    requireProbability(p);
    check(population, marked, drawn);
    const reached = (k: number) => tail(k, population, marked, drawn, true) <= p * (1 + COUNT_SLACK);
    return smallestCount(reached, meanOf(population, marked, drawn), Math.max(0, drawn - population + marked), Math.min(marked, drawn));
  },
  pmf(x, population, marked, drawn) {
    requireNumber(x);
    check(population, marked, drawn);
    return Number.isInteger(x) ? mass(x, population, marked, drawn) : 0;
  },
};

function meanOf(population: number, marked: number, drawn: number): number {
  return population === 0 ? 0 : (drawn * marked) / population;
}

/**
 * jstat behind the interface of stats/distributions, as a careful user of it
 * would write: upper tails as 1 - cdf and quantiles of 1 - p, because it has
 * no others. Used to prove that the suite notices (mutation.test.ts) and as a
 * second opinion in ordinary cases.
 */
import jstat from 'jstat';
import { noncentralT } from '@/stats/distribution/noncentral-t';

function named(name: string) {
  const own = jstat[name];
  if (own === undefined) throw new Error(`jstat has no ${name}`);
  return own;
}

function continuous(name: string, adapt: (params: number[]) => number[] = (params) => params) {
  const own = named(name);
  return {
    cdf: (x: number, ...params: number[]) => own.cdf(x, ...adapt(params)),
    sf: (x: number, ...params: number[]) => 1 - own.cdf(x, ...adapt(params)),
    quantile: (p: number, ...params: number[]) => own.inv(p, ...adapt(params)),
    isf: (p: number, ...params: number[]) => own.inv(1 - p, ...adapt(params)),
    pdf: (x: number, ...params: number[]) => own.pdf(x, ...adapt(params)),
  };
}

function discrete(name: string, adapt: (params: number[]) => number[] = (params) => params) {
  const own = named(name);
  return {
    cdf: (x: number, ...params: number[]) => own.cdf(x, ...adapt(params)),
    sf: (x: number, ...params: number[]) => 1 - own.cdf(x, ...adapt(params)),
    pmf: (x: number, ...params: number[]) => own.pdf(x, ...adapt(params)),
  };
}

export const normal = continuous('normal', () => [0, 1]);
export const studentT = continuous('studentt');
export const chiSquare = continuous('chisquare');
export const fisherF = continuous('centralF');
export const betaDist = continuous('beta');
export const gammaDist = continuous('gamma', ([shape = 1, scale = 1]) => [shape, scale]);
export const poisson = discrete('poisson');
export const binomial = discrete('binomial');
export const hypergeometric = discrete('hypgeom');

/** jstat has none for its upper tail or quantile; left as it is. */
export { noncentralT };

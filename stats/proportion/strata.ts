import { requireRange } from '../result';
import { requireCount } from './counts';

/** Stratified 2 by 2 tables as columns of equal length: a, b = events and others among the exposed, c, d = among the rest. */
export interface Strata {
  readonly a: ArrayLike<number>;
  readonly b: ArrayLike<number>;
  readonly c: ArrayLike<number>;
  readonly d: ArrayLike<number>;
}

export function requireStrata({ a, b, c, d }: Strata): void {
  requireRange(a.length === b.length && a.length === c.length && a.length === d.length, 'The four columns of strata differ in length.');
  for (const column of [a, b, c, d]) {
    for (let i = 0; i < column.length; i++) requireCount(column[i] as number, 'A cell of a stratum');
  }
}

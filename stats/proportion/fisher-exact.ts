import { methodOf } from '../registry';
import type { Provenance } from '../result';
import { requireTable, type FourfoldTable } from './counts';
import { supportOf } from './table-support';

export interface FisherExact extends Provenance {
  /** Two-sided: all tables no more probable than the observed. */
  readonly p: number;
  /** P(X <= a), evidence that the odds ratio is below 1. */
  readonly pLess: number;
  /** P(X >= a), evidence that it is above 1. */
  readonly pGreater: number;
  /** The same two-sided sum, tables as probable as the observed counted half. */
  readonly pMid: number;
  /** Twice the smaller mid-P tail, at most 1: the one that agrees with mid-P limits. */
  readonly pMidCentral: number;
}

/** Probabilities that differ by less are ties in exact arithmetic: without it p depends on rounding. */
const TIE_SLACK = 1 + 1e-7;

/**
 * Fisher's exact test of a 2 by 2 table. The several p-values differ in general and are named apart.
 * @param table four counts
 * @throws RangeError where a cell is no count (a whole number from 0 up) or the level is not inside (0, 1)
 * @see Fisher 1935. Mid-P: Lancaster 1961
 */
export function fisherExact(table: FourfoldTable): FisherExact {
  requireTable(table);
  const { logWeights, observed } = supportOf(table);
  const own = Math.exp(logWeights[observed] as number);
  let all = 0;
  let less = 0;
  let greater = 0;
  let rarer = 0;
  let ties = 0;
  for (let k = 0; k < logWeights.length; k++) {
    const weight = Math.exp(logWeights[k] as number);
    all += weight;
    if (k < observed) less += weight;
    if (k > observed) greater += weight;
    if (weight * TIE_SLACK < own) rarer += weight;
    else if (weight <= own * TIE_SLACK) ties += weight;
  }
  const { a, b, c, d } = table;
  return {
    p: Math.min(1, (rarer + ties) / all),
    pLess: Math.min(1, (less + own) / all),
    pGreater: Math.min(1, (greater + own) / all),
    pMid: (rarer + ties / 2) / all,
    pMidCentral: Math.min(1, (2 * Math.min(less, greater) + own) / all),
    method: methodOf('fisherExact'),
    n: a + b + c + d,
    events: a + c,
    leftOut: [],
  };
}

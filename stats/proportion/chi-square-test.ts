import { chiSquare } from '../distributions';
import { methodOf } from '../registry';
import type { Provenance } from '../result';
import { requireTable, type FourfoldTable } from './counts';

export interface ChiSquareTest extends Provenance {
  readonly degreesOfFreedom: 1;
  readonly pearson: TestStatistic;
  /** Correction as min(1/2, |observed - expected|), so that it never turns the sign. */
  readonly yates: TestStatistic;
  readonly likelihoodRatio: TestStatistic;
  /** Why the tests do not exist. */
  readonly reason?: string;
}

export interface TestStatistic {
  readonly statistic: number | null;
  readonly p: number | null;
}

/**
 * Tests of no association in a 2 by 2 table, three ways, named apart because papers differ. An empty margin gives nulls.
 * @param table four counts
 * @throws RangeError where a cell is no count (a whole number from 0 up)
 * @see Pearson 1900. Yates 1934
 */
export function chiSquareTest(table: FourfoldTable): ChiSquareTest {
  const { a, b, c, d } = table;
  requireTable(table);
  const n = a + b + c + d;
  const about = { method: methodOf('chiSquareTest'), n, events: a + c, leftOut: [], degreesOfFreedom: 1 as const };
  const rows = [a + b, c + d] as const;
  const columns = [a + c, b + d] as const;
  if (rows[0] === 0 || rows[1] === 0 || columns[0] === 0 || columns[1] === 0) {
    const none = { statistic: null, p: null };
    return { pearson: none, yates: none, likelihoodRatio: none, reason: 'A margin of the table is empty.', ...about };
  }
  const expected = (rows[0] * columns[0]) / n;
  const excess = Math.abs(a - expected);
  const invariant = n / rows[0] / rows[1] / columns[0] / columns[1];
  const corrected = excess - Math.min(0.5, excess);
  return {
    pearson: withP(excess * excess * n * n * invariant),
    yates: withP(corrected * corrected * n * n * invariant),
    likelihoodRatio: withP(deviance(table, rows, columns, n)),
    ...about,
  };
}

function withP(statistic: number): TestStatistic {
  return { statistic, p: chiSquare.sf(statistic, 1) };
}

function deviance({ a, b, c, d }: FourfoldTable, rows: readonly [number, number], columns: readonly [number, number], n: number): number {
  const part = (observed: number, row: number, column: number) => (observed === 0 ? 0 : observed * Math.log((observed * n) / (row * column)));
  const sum = part(a, rows[0], columns[0]) + part(b, rows[0], columns[1]) + part(c, rows[1], columns[0]) + part(d, rows[1], columns[1]);
  return Math.max(0, 2 * sum);
}

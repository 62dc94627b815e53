import { methodOf } from '../registry';
import { requireRange, type Provenance } from '../result';

/** Which columns are missing together. */
export interface MissingPatterns extends Provenance {
  /** Missing values of each column. */
  readonly missing: Readonly<Record<string, number>>;
  readonly completeRows: number;
  /** One character a column in the order given, 1 = missing; most frequent first. */
  readonly patterns: readonly { readonly pattern: string; readonly count: number }[];
}

/**
 * Counts missing values by column and by pattern. Little & Rubin 2002,
 * Statistical Analysis with Missing Data, ch. 1.
 *
 * @param columns equally long; NaN is missing.
 * @throws RangeError for no column or columns of different length.
 */
export function missingPatterns(columns: Readonly<Record<string, ArrayLike<number>>>): MissingPatterns {
  const named = Object.entries(columns);
  requireRange(named.length > 0, 'Patterns of missing values need a column.');
  const n = named[0]![1].length;
  for (const [name, column] of named) requireRange(column.length === n, `Columns must be equally long: ${name} has ${column.length} rows, not ${n}.`);
  const counts = new Map<string, number>();
  for (let row = 0; row < n; row++) {
    let pattern = '';
    for (const [, column] of named) pattern += Number.isNaN(column[row]) ? '1' : '0';
    counts.set(pattern, (counts.get(pattern) ?? 0) + 1);
  }
  const missing = Object.fromEntries(
    named.map(([name], at) => [name, [...counts].reduce((sum, [pattern, count]) => sum + (pattern[at] === '1' ? count : 0), 0)]),
  );
  const patterns = [...counts]
    .map(([pattern, count]) => ({ pattern, count }))
    .sort((a, b) => b.count - a.count || (a.pattern < b.pattern ? -1 : 1));
  return { method: methodOf('missingPatterns'), n, leftOut: [], missing, completeRows: counts.get('0'.repeat(named.length)) ?? 0, patterns };
}

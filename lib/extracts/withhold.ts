import type { Cell } from './clean-cell';

/** What stands in a cell that was withheld. No list of codes holds the word. */
export const WITHHELD = 'withheld';

type Row = Readonly<Record<string, Cell>>;

/** What withholding came to. */
export interface Withholding {
  /** Rows that share every one of the columns, in the smallest such group; 0 where there is no row. */
  readonly smallestGroup: number;
  /** Values lost, by column; a cell that held nothing loses nothing. */
  readonly withheld: Readonly<Record<string, number>>;
  readonly rowsWithAny: number;
}

/** Rows by their cells under the columns. A withheld cell is a value of its own: it is like no other but withheld. */
function groupsOf(rows: readonly Row[], columns: readonly string[]): Map<string, number[]> {
  const groups = new Map<string, number[]>();
  for (const [index, row] of rows.entries()) {
    const key = JSON.stringify(columns.map((column) => row[column] ?? null));
    const group = groups.get(key);
    if (group) group.push(index);
    else groups.set(key, [index]);
  }
  return groups;
}

const sizesOf = (rows: readonly Row[], columns: readonly string[]): number[] => [...groupsOf(rows, columns).values()].map(({ length }) => length);

/** Fully withheld rows fewer than k: the smallest other groups join them, one whole group at a time. */
function joinRest(rows: Row[], columns: readonly string[], k: number, blank: (index: number, columns: readonly string[]) => void): void {
  const hidden = JSON.stringify(columns.map(() => WITHHELD));
  for (;;) {
    const groups = groupsOf(rows, columns);
    const rest = groups.get(hidden);
    if (!rest || rest.length >= k) return;
    const [next] = [...groups].filter(([key]) => key !== hidden).toSorted(([a, left], [b, right]) => left.length - right.length || (a < b ? -1 : 1));
    if (!next) return;
    for (const index of next[1]) blank(index, columns);
  }
}

/**
 * Local suppression until every group of rows that agree on the columns has at least k members (k-anonymity: Sweeney 2002,
 * Int J Uncertain Fuzz 10:557). The columns come least important first. In that order, one column at a time, the cells of all
 * rows that still stand in a smaller group are withheld, whatever they held. A row is only ever in one group because a
 * withheld cell counts as a value of its own: counted as 'could be anything' groups would be larger, so this is the careful
 * choice. Fewer than k rows in all lose every cell. The outcome does not depend on the order of the rows.
 */
export function withhold<R extends Row>(rows: readonly R[], columns: readonly string[], k: number): { rows: Row[]; report: Withholding } {
  const out: Row[] = rows.map((row) => ({ ...row }));
  const blank = (index: number, which: readonly string[]): void => {
    out[index] = { ...out[index], ...Object.fromEntries(which.map((column) => [column, WITHHELD])) };
  };
  for (const column of columns) for (const group of groupsOf(out, columns).values()) if (group.length < k) for (const index of group) blank(index, [column]);
  joinRest(out, columns, k, blank);
  const lost = (column: string) => out.filter((row, index) => row[column] === WITHHELD && (rows[index]?.[column] ?? null) !== null).length;
  return {
    rows: out,
    report: {
      smallestGroup: out.length === 0 ? 0 : Math.min(...sizesOf(out, columns)),
      withheld: Object.fromEntries(columns.map((column) => [column, lost(column)])),
      rowsWithAny: out.filter((row, index) => columns.some((column) => row[column] === WITHHELD && (rows[index]?.[column] ?? null) !== null)).length,
    },
  };
}

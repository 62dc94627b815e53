/** A value as JSON carries it into the data base. */
export type Cell = string | number | boolean | null | readonly unknown[] | { readonly [key: string]: unknown };
export type Row = Readonly<Record<string, Cell>>;

/** Rows of one table that one act inserts, or changes by id. */
export interface Change {
  readonly op: 'insert' | 'update';
  readonly table: string;
  readonly rows: readonly Row[];
}

/** Something somebody did, as the trail will tell it. */
export interface DemoEvent {
  readonly at: Date;
  readonly actor: string;
  readonly role: string;
  readonly act: string;
  readonly reason?: string;
  readonly changes: readonly Change[];
}

export const inserted = (table: string, ...rows: Row[]): Change => ({ op: 'insert', table, rows });
export const updated = (table: string, ...rows: Row[]): Change => ({ op: 'update', table, rows });

/** Who does something: the account, and the role in use. */
export interface Doer {
  readonly accountId: string;
  readonly role: string;
  readonly label: string;
}

export const eventBy = (doer: Doer, at: Date, act: string, changes: readonly Change[], reason?: string): DemoEvent => ({
  at, actor: doer.accountId, role: doer.role, act, changes, ...(reason !== undefined && { reason }),
});

/** Events in the order they happened; those of one moment keep the order they were written in. */
export const inOrder = (events: readonly DemoEvent[]): DemoEvent[] => events.toSorted((a, b) => a.at.getTime() - b.at.getTime());

/** What the rows look like when all events have happened: for loads that leave the trail out. */
export function finalRows(events: readonly DemoEvent[]): Map<string, Row[]> {
  const tables = new Map<string, Map<string, Row>>();
  for (const { table, rows, op } of inOrder(events).flatMap(({ changes }) => changes)) {
    const kept = tables.get(table) ?? new Map<string, Row>();
    tables.set(table, kept);
    for (const row of rows) {
      const key = String(row['id'] ?? row['account_id']);
      kept.set(key, op === 'insert' ? row : { ...kept.get(key), ...row });
    }
  }
  return new Map([...tables].map(([table, rows]) => [table, [...rows.values()]]));
}

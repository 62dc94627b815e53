import type { FieldTarget, TargetTable } from '@/lib/queries/targets';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** A value that was saved and then replaced, with the reason for its replacement. */
export interface StruckValue extends FieldTarget {
  readonly value: unknown;
  readonly replacedBy: unknown;
  readonly reason: string;
  readonly label: string;
  readonly at: string;
}

interface Change {
  table_name: TargetTable;
  row_id: string;
  before: Record<string, unknown>;
  after: Record<string, unknown>;
  reason: string;
  label: string | null;
  at: string;
}

/** What a form shows of each table: whole columns, or a column of girths taken level by level. */
const shown: Partial<Record<TargetTable, readonly string[]>> = {
  visit: ['done_on'],
  limb_assessment: ['position', 'sleeve_worn', 'hours_since_training', 'body_weight_g', 'impedance_ratio', 'impedance_rest_min', 'remarks'],
};

const differs = (a: unknown, b: unknown): boolean => JSON.stringify(a ?? null) !== JSON.stringify(b ?? null);

function fieldsOf({ table_name, before, after }: Change): { field: string; value: unknown; replacedBy: unknown }[] {
  if (table_name !== 'limb_trial')
    return (shown[table_name] ?? []).map((field) => ({ field, value: before[field], replacedBy: after[field] }));
  const [was, is] = [before['circumferences_mm'] as unknown[], after['circumferences_mm'] as unknown[]];
  return is.map((replacedBy, level) => ({ field: `circumferences_mm.${level}`, value: was[level], replacedBy }));
}

/**
 * Every value of the given rows that was replaced with a reason, oldest first: one statement. What was typed anew while
 * a form was still open carries no reason and is left to the field's history.
 */
export async function earlierValues(work: Work, rows: readonly { table: TargetTable; id: string }[]): Promise<StruckValue[]> {
  const changes = await work.sql<Change>(
    `select a.table_name, a.row_id, a.before, a.after, a.reason, a.at::text,
       (select g.label from role_grant g where g.account_id = a.actor_id and g.role = a.role order by g.starts_at desc limit 1) as label
     from audit_entry a where a.table_name = any (?::text[]) and a.row_id = any (?::text[]) and a.op = 'UPDATE' and a.reason is not null order by a.id`,
    [`{${[...new Set(rows.map(({ table }) => table))].join(',')}}`, `{${rows.map(({ id }) => id).join(',')}}`],
  );
  return changes.flatMap((change) =>
    fieldsOf(change)
      .filter(({ value, replacedBy }) => differs(value, replacedBy))
      .map(({ field, value, replacedBy }) => ({
        table: change.table_name,
        id: change.row_id,
        field,
        value: value ?? null,
        replacedBy: replacedBy ?? null,
        reason: change.reason,
        label: change.label ?? 'Tidemark',
        at: moment(change.at).toISOString(),
      })),
  );
}

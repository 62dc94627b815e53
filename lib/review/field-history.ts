import { findTarget, type FieldTarget } from '@/lib/queries/targets';
import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';

/** One value that a field has held. */
export interface HeldValue {
  readonly value: unknown;
  readonly reason: string | null;
  readonly label: string;
  readonly role: string;
  readonly at: string;
}

interface Image {
  value: unknown;
  reason: string | null;
  role: string;
  label: string | null;
  at: string;
}

/**
 * Every value a field has held, oldest first, from the row images of the audit trail.
 * The by-line is the label under which the account holds the role; the trail keeps the account itself.
 * @throws Refusal 'not-found' out of reach.
 */
export async function fieldHistory(work: Work, target: FieldTarget): Promise<HeldValue[]> {
  await findTarget(work, target);
  const images = await work.sql<Image>(
    `select a.after #> string_to_array(?, '.') as value, a.reason, a.role, a.at::text,
       (select g.label from role_grant g where g.account_id = a.actor_id and g.role = a.role order by g.starts_at desc limit 1) as label
     from audit_entry a where a.table_name = ? and a.row_id = ? and a.op in ('INSERT', 'UPDATE') order by a.id`,
    [target.field, target.table, target.id],
  );
  const changes = images.filter(({ value }, index) => index === 0 || JSON.stringify(value) !== JSON.stringify(images[index - 1]?.value));
  return changes
    .filter(({ value }, index) => index > 0 || value !== null || changes.length === 1)
    .map(({ value, reason, role, label, at }) => ({ value: value ?? null, reason, role, label: label ?? 'Tidemark', at: moment(at).toISOString() }));
}

import { moment } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { MarkView } from './mark-verified';

/** The marks that stand on the values of one visit. */
export async function marksOfVisit(work: Work, visitId: string): Promise<MarkView[]> {
  const rows = await work.sql<Omit<MarkView, 'at'> & { at: string }>(
    `select target_table as table, target_id as id, field, verified_label as label, verified_at::text as at from verification where visit_id = ? and fell_at is null`,
    [visitId],
  );
  return rows.map((row) => ({ ...row, at: moment(row.at).toISOString() }));
}

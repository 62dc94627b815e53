import { completeVisit as complete } from '@/entities/visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { findVisit, toVisitView, type VisitView } from './view-visit';

/** Ends a visit at which no arms could be measured. Saving the limb assessment ends the others by itself. */
export async function completeVisit(work: Work, { id }: { id: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  const [open] = await work.sql("select id from limb_assessment where visit_id = ? and state = 'open'", [id]);
  if (open) throw new Refusal('conflict', 'The limb assessment of this visit is unfinished. Save it; that ends the visit.');
  complete(visit);
  await work.em.flush();
  return toVisitView(visit);
}

import { missVisit as miss } from '@/entities/visit';
import type { Work } from '@/lib/work/work';
import { findVisit, toVisitView, type VisitView } from './view-visit';

/** The visit did not take place; its reason feeds the follow-up figures. */
export async function missVisit(work: Work, { id, missedReason }: { id: string; missedReason: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  miss(visit, missedReason);
  await work.em.flush();
  return toVisitView(visit);
}

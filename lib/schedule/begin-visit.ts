import type { Work } from '@/lib/work/work';
import { startVisit } from './start-visit';
import { findVisit, toVisitView, type VisitView } from './view-visit';

/** The person is here: the visit begins today, by the clock of the site. */
export async function beginVisit(work: Work, { id, windowReason }: { id: string; windowReason?: string | undefined }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  await startVisit(work, visit, windowReason);
  await work.em.flush();
  return toVisitView(visit);
}

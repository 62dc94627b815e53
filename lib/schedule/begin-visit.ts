import { beginVisit as begin } from '@/entities/visit';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { findVisit, timeZoneOf, toVisitView, type VisitView } from './view-visit';

/** The person is here: the visit begins today, by the clock of the site. */
export async function beginVisit(work: Work, { id }: { id: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  begin(visit, localDate(work.now, await timeZoneOf(work, visit.siteId)));
  await work.em.flush();
  return toVisitView(visit);
}

import { missVisit as miss } from '@/entities/visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { studyDaysOf } from './study-days';
import { findVisit, toVisitView, type VisitView } from './view-visit';

/** The visit did not take place; its reason feeds the follow-up figures. */
export async function missVisit(work: Work, { id, missedReason }: { id: string; missedReason: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  const { today } = await studyDaysOf(work, visit.participantId);
  if (today <= visit.closesOn) throw new Refusal('conflict', `${visit.name} can still take place until ${visit.closesOn}. It can be marked as missed from the day after.`);
  miss(visit, missedReason);
  await work.em.flush();
  return toVisitView(visit);
}

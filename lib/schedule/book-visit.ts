import { lawful } from '@/entities/lawful';
import { momentAt } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { requireDay, studyDaysOf } from './study-days';
import { findVisit, timeZoneOf, toVisitView, type VisitView } from './view-visit';

/** An appointment from today on, by the clock of the site. Out of window is allowed: the window is a label, not a wall. */
export async function bookVisit(work: Work, { id, on, time }: { id: string; on: string; time: string }): Promise<VisitView> {
  const visit = await findVisit(work, id);
  work.expect(visit);
  lawful(visit.state === 'to come', 'Only a visit that has not begun can be booked.', 'locked');
  const { today, lastOn } = await studyDaysOf(work, visit.participantId);
  requireDay(on, { from: today, fromWords: 'today', lastOn }, 'on');
  visit.bookedAt = momentAt(on, time, await timeZoneOf(work, visit.siteId));
  await work.em.flush();
  return toVisitView(visit);
}

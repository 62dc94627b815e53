import { ParticipantSchema } from '@/entities/participant';
import { VisitSchema } from '@/entities/visit';
import { addDays } from '@/instruments/calendar';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { requireDay, studyDaysOf } from './study-days';
import { toVisitView, type VisitView } from './view-visit';

/** Days after its day in which an unscheduled visit is still taken for it. Common practice, no source. */
const graceDays = 7;

/** An unscheduled visit, after a symptom report for one. Its window is the day and the week after it. */
export async function addUnscheduledVisit(work: Work, { participantId, on, why }: { participantId: string; on: string; why: string }): Promise<VisitView> {
  const participant = await work.em.findOne(ParticipantSchema, { id: participantId });
  if (!participant) throw new Refusal('not-found', 'There is no such participant in your reach.');
  const { enrolledOn, lastOn } = await studyDaysOf(work, participantId);
  requireDay(on, { from: enrolledOn, fromWords: 'the enrolment', lastOn }, 'on');
  if (participant.state !== 'enrolled' && participant.leftGrade !== 'stops training')
    throw new Refusal('locked', 'This participant has left, so no visit can be added.');
  const visit = work.em.create(VisitSchema, {
    siteId: participant.siteId,
    participantId,
    key: 'extra',
    name: 'Unscheduled visit',
    targetOn: on,
    opensOn: on,
    closesOn: addDays(on, graceDays),
    state: 'to come',
    unscheduledReason: why,
    protocolVersionId: participant.protocolVersionId,
  });
  await work.em.flush();
  return toVisitView(visit);
}

/** The same, asked for by participant code. */
export async function addVisit(work: Work, { code, on, why }: { code: string; on: string; why: string }): Promise<VisitView> {
  const participant = await work.em.findOne(ParticipantSchema, { code });
  if (!participant) throw new Refusal('not-found', 'There is no such participant in your reach.');
  return addUnscheduledVisit(work, { participantId: participant.id, on, why });
}

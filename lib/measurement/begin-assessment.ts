import { LimbAssessmentSchema } from '@/entities/limb-assessment';
import { findProtocol } from '@/lib/protocol/find-protocol';
import { startVisit } from '@/lib/schedule/start-visit';
import { findVisit } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';
import { trialsOf } from './find-assessment';
import { viewOpen, type OpenAssessmentView } from './view-open';

/** Opens the limb assessment of a visit with the map of its protocol version, or takes up the one that was left unfinished. */
export async function beginAssessment(work: Work, { id, windowReason }: { id: string; windowReason?: string | undefined }): Promise<OpenAssessmentView> {
  const visit = await findVisit(work, id);
  const found = await work.em.findOne(LimbAssessmentSchema, { visitId: id });
  if (found?.state === 'complete') throw new Refusal('locked', 'The limb assessment of this visit is saved.');
  const isFresh = visit.state === 'to come';
  await startVisit(work, visit, windowReason);
  if (found) {
    // The form was opened once by mistake and is empty: it belongs to who measures now.
    if (isFresh) Object.assign(found, { assessorId: work.actor.accountId, measuredAt: work.now });
    await work.em.flush();
    return viewOpen(found, await trialsOf(work, found.id));
  }
  const { measurement } = (await findProtocol(work, visit.protocolVersionId)).document;
  const assessment = work.em.create(LimbAssessmentSchema, {
    siteId: visit.siteId,
    participantId: visit.participantId,
    visitId: id,
    assessorId: work.actor.accountId,
    measuredAt: work.now,
    position: null,
    method: measurement.method,
    startOffsetMm: measurement.startOffsetMm,
    stepMm: measurement.stepMm,
    levelCount: measurement.levelCount,
    toleranceMm: measurement.toleranceMm,
    state: 'open',
    verdicts: {},
    findings: [],
  });
  await work.em.flush();
  return viewOpen(assessment, []);
}

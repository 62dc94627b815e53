import { findProtocol } from '@/lib/protocol/find-protocol';
import { findVisit, toVisitView, type VisitView } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { viewAssessment } from './view-assessment';
import type { CompleteAssessmentView } from './view-complete';
import type { OpenAssessmentView } from './view-open';

/** What the limb page needs beside the readings. */
export interface LimbPageView {
  readonly visit: VisitView;
  readonly code: string;
  readonly affectedSide: 'left' | 'right';
  readonly siteName: string;
  readonly today: string;
  /** How the arms are held, as the protocol says. */
  readonly protocolPosition: string;
  /** Where the tape is laid, and how far two readings may differ: of the assessment, or of the protocol before it began. */
  readonly map: { readonly startOffsetMm: number; readonly stepMm: number; readonly levelCount: number };
  readonly toleranceMm: number;
  readonly assessment: OpenAssessmentView | CompleteAssessmentView | null;
}

/**
 * The limb page of a visit. While the assessment is open no earlier value is in it.
 * @throws Refusal 'not-found' when the visit is out of reach, or is not of the participant with that code.
 */
export async function viewLimbPage(work: Work, { visitId, code }: { visitId: string; code: string }): Promise<LimbPageView> {
  const visit = await findVisit(work, visitId);
  const [whose] = await work.sql<{ code: string; affected_side: 'left' | 'right'; site_name: string; time_zone: string }>(
    'select p.code, p.affected_side, s.name as site_name, s.time_zone from participant p join site s on s.id = p.site_id where p.id = ?',
    [visit.participantId],
  );
  if (whose?.code !== code) throw new Refusal('not-found', 'There is no such visit in your reach.');
  const { measurement } = (await findProtocol(work, visit.protocolVersionId)).document;
  const assessment = await viewAssessment(work, { visitId });
  const { startOffsetMm, stepMm, levelCount, toleranceMm } = measurement;
  return {
    visit: toVisitView(visit),
    code,
    affectedSide: whose.affected_side,
    siteName: whose.site_name,
    today: localDate(work.now, whose.time_zone),
    protocolPosition: measurement.position,
    map: assessment?.map ?? { startOffsetMm, stepMm, levelCount },
    toleranceMm: assessment?.toleranceMm ?? toleranceMm,
    assessment,
  };
}

import { LimbAssessmentSchema } from '@/entities/limb-assessment';
import { trialsOf } from '@/lib/measurement/find-assessment';
import { viewComplete, type CompleteAssessmentView } from '@/lib/measurement/view-complete';
import { targetTables } from '@/lib/queries/targets';
import { queriesOfVisit, type QueryView } from '@/lib/queries/view-query';
import { findVisit, toVisitView, type VisitView } from '@/lib/schedule/view-visit';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { earlierValues, type StruckValue } from './earlier-values';
import type { MarkView } from './mark-verified';
import { marksOfVisit } from './marks-of-visit';
import { questionnairesOfVisit, type VisitQuestionnaireView } from './visit-questionnaires';

/** Whose visit it is, and by whose clock. */
export interface ReviewParticipant {
  readonly id: string;
  readonly code: string;
  readonly affectedSide: 'left' | 'right';
  readonly siteName: string;
  readonly timeZone: string;
}

/** One visit with everything that stands in its margin. */
export interface ReviewView {
  readonly visit: VisitView;
  readonly participant: ReviewParticipant;
  /** The saved limb assessment; null before it is complete, so that nothing of an open one is read here. */
  readonly assessment: CompleteAssessmentView | null;
  /** An assessment is being taken: how many of its four passes are in. */
  readonly underWay: { readonly passes: number } | null;
  readonly assessorLabel: string | null;
  readonly struck: readonly StruckValue[];
  readonly queries: readonly QueryView[];
  readonly marks: readonly MarkView[];
  readonly questionnaires: readonly VisitQuestionnaireView[];
  /** The next visit of this participant that has begun. */
  readonly nextVisitId: string | null;
  /** Today by the clock of the site. */
  readonly today: string;
}

interface Whose {
  id: string;
  code: string;
  affected_side: 'left' | 'right';
  site_name: string;
  time_zone: string;
  assessor_label: string | null;
  next_visit_id: string | null;
}

/**
 * The review page in one view: a constant number of statements, however much was written in the margin.
 * @throws Refusal 'not-found' when the visit is out of reach, or is not of the participant with that code.
 */
export async function viewReview(work: Work, { visitId, code }: { visitId: string; code: string }): Promise<ReviewView> {
  const visit = await findVisit(work, visitId);
  const [whose] = await work.sql<Whose>(
    `select p.id, p.code, p.affected_side, s.name as site_name, s.time_zone,
       (select g.label from limb_assessment a join role_grant g on g.account_id = a.assessor_id and s.id = any (g.site_ids) where a.visit_id = ? order by g.role = 'assessor' desc limit 1) as assessor_label,
       (select v.id from visit v where v.participant_id = p.id and v.done_on > ?::date order by v.done_on, v.id limit 1) as next_visit_id
     from participant p join site s on s.id = p.site_id where p.id = ?`,
    [visitId, visit.doneOn ?? visit.targetOn, visit.participantId],
  );
  if (whose?.code !== code) throw new Refusal('not-found', 'There is no such visit in your reach.');
  const taken = await work.em.findOne(LimbAssessmentSchema, { visitId });
  const trials = taken ? await trialsOf(work, taken.id) : [];
  const complete = taken?.state === 'complete';
  const rows = [
    { table: targetTables[0], id: visitId },
    ...(complete ? [{ table: targetTables[1], id: taken.id }, ...trials.map(({ id }) => ({ table: targetTables[2], id }))] : []),
  ];
  return {
    visit: toVisitView(visit),
    participant: { id: whose.id, code: whose.code, affectedSide: whose.affected_side, siteName: whose.site_name, timeZone: whose.time_zone },
    assessment: complete ? await viewComplete(work, taken) : null,
    underWay: taken && !complete && visit.state === 'in progress' ? { passes: trials.filter(({ trial, circumferencesMm }) => trial < 3 && circumferencesMm.every((girth) => girth !== null)).length } : null,
    assessorLabel: whose.assessor_label,
    struck: await earlierValues(work, rows),
    queries: await queriesOfVisit(work, visitId),
    marks: await marksOfVisit(work, visitId),
    questionnaires: await questionnairesOfVisit(work, visitId),
    nextVisitId: whose.next_visit_id,
    today: localDate(work.now, whose.time_zone),
  };
}

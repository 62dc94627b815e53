import { randomUUID } from 'node:crypto';
import type { Actor } from '@/lib/auth/roles';
import { withWork } from '@/lib/work/with-work';
import { beginAssessment } from '@/lib/measurement/begin-assessment';
import { asOwner, givenConsent, givenParticipant, givenScreening, type GivenScene, type GivenSite } from '../../given';

/** One of everything an address can name, all of one site (and of one participant). */
export interface Subject {
  readonly site: GivenSite;
  /** Whoever holds the tablet that was handed over for the open screening. */
  readonly atTablet: Actor;
  readonly participant: { readonly id: string; readonly code: string; readonly actor: Actor };
  readonly screeningId: string;
  readonly openScreeningId: string;
  readonly consentId: string;
  readonly visitId: string;
  readonly laterVisitId: string;
  readonly assessmentId: string;
  readonly queryId: string;
  readonly reportId: string;
  readonly responseId: string;
  readonly flagId: string;
  readonly extractId: string;
}

const made = async (sql: string, values: readonly unknown[]): Promise<string> => {
  const [row] = await asOwner<{ id: string }>(`${sql} returning id`, values);
  if (!row) throw new Error('Nothing was made.');
  return row.id;
};

/** Lays out a whole subject at a site. */
export async function subjectAt(scene: GivenScene, site: GivenSite, staff: Actor): Promise<Subject> {
  const participant = await givenParticipant(site, scene.protocol, staff, { enrolledOn: '2026-10-05' });
  const [visitId, laterVisitId] = Object.values(participant.visits) as [string, string];
  const open = await givenScreening(site, scene.protocol, { confirmedBy: staff });
  const consent = await givenConsent(open, scene.protocol, staff, 'reading');
  const assessment = await withWork(staff, 'assessment.begin', (work) => beginAssessment(work, { id: visitId, windowReason: 'The scene is set on whatever day it is.' }));
  const record = [site.id, participant.id];
  const queryId = await made(
    `insert into data_query (site_id, participant_id, visit_id, target_table, target_id, field, field_label, origin, state, raised_by, raised_at, due_on, answered_at)
     values ($1, $2, $3, 'limb_assessment', $4, 'body_weight_g', 'Body weight', 'manual', 'answered', $5, now(), '2027-01-01', now())`,
    [...record, visitId, assessment.id, staff.accountId],
  );
  const reportId = await made(
    `insert into symptom_report (site_id, participant_id, reported_at, noticed_on, answers, level, due_at, hold_training, client_key)
     values ($1, $2, now(), '2026-11-01', '{"signs":["heavier"],"lastedOverADay":true,"soreness":null}', 'S1', now(), true, $3)`,
    [...record, randomUUID()],
  );
  const [response] = await asOwner<{ id: string }>('select id from questionnaire_response where participant_id = $1 order by due_on limit 1', [participant.id]);
  const sessionId = await made(
    `insert into training_session (site_id, participant_id, local_on, time_zone, entered_at, arm_check, soreness, client_key) values ($1, $2, '2026-11-02', 'UTC', now(), 'the same', 'no', $3)`,
    [...record, randomUUID()],
  );
  const flagId = await made(
    `insert into training_flag (site_id, participant_id, session_id, flag_key, rule, raised_at) values ($1, $2, $3, 'k', 'START_HIGH', now())`,
    [...record, sessionId],
  );
  const extractId = await made(
    `insert into extract (study_id, profile, purpose, recipient, as_of, requested_by, requested_label, requested_at) values ($1, 'open', 'To see who may read it.', 'Nobody', now(), $2, $3, now())`,
    [site.studyId, staff.accountId, staff.label],
  );
  return {
    site,
    atTablet: open.atTablet,
    participant,
    screeningId: participant.screeningId,
    openScreeningId: open.id,
    consentId: consent.id,
    visitId,
    laterVisitId,
    assessmentId: assessment.id,
    queryId,
    reportId,
    responseId: response?.id ?? '',
    flagId,
    extractId,
  };
}

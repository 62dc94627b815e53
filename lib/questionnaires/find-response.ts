import { QuestionnaireResponseSchema, type QuestionnaireResponse } from '@/entities/questionnaire-response';
import { findQuestionnaire } from '@/instruments/questionnaires';
import type { Questionnaire } from '@/instruments/questionnaires/define-questionnaire';
import { findOwnRecord, type OwnRecord } from '@/lib/people/find-own-record';
import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** A questionnaire of the participant who acts, with the version it was laid out in. */
export interface OwnResponse {
  readonly own: OwnRecord;
  readonly response: QuestionnaireResponse;
  readonly questionnaire: Questionnaire;
}

/** @throws Refusal 'not-found' for another person's, or one that is not there. */
export async function findOwnResponse(work: Work, id: string): Promise<OwnResponse> {
  const own = await findOwnRecord(work);
  const response = await work.em.findOne(QuestionnaireResponseSchema, { id, participantId: own.participant.id });
  const questionnaire = response ? findQuestionnaire(response.instrument, response.instrumentVersion) : undefined;
  if (!response || !questionnaire) throw new Refusal('not-found', 'There is no such questionnaire for you.');
  return { own, response, questionnaire };
}

/** Answers are taken inside the window only, and until they were submitted. @throws Refusal 'locked' or 'expired'. */
export function assertOpen({ own, response }: OwnResponse): void {
  if (response.state === 'submitted') throw new Refusal('locked', 'This questionnaire was submitted and is closed. If an answer is wrong, tell your site; the answers stay as they were sent.');
  if (own.today < response.opensOn) throw new Refusal('conflict', `This questionnaire opens on ${plainDate(response.opensOn)}.`);
  if (own.today > response.closesOn || response.state === 'missed')
    throw new Refusal('expired', `This questionnaire closed on ${plainDate(response.closesOn)}, so answers are no longer taken. You did nothing wrong; the next one comes with your next visit.`);
}

/** Whether two sets of answers are the same, in any order. */
export function areSame(a: Readonly<Record<string, unknown>>, b: Readonly<Record<string, unknown>>): boolean {
  const names = new Set([...Object.keys(a), ...Object.keys(b)]);
  return [...names].every((name) => a[name] === b[name]);
}

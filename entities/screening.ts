import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';
import { lawful } from './lawful';

/** One person considered for the study, enrolled or not, and why not. */
export const ScreeningSchema = defineEntity({
  name: 'Screening',
  tableName: 'screening',
  properties: {
    ...base(),
    siteId: p.uuid(),
    participantId: p.uuid().nullable(),
    number: p.integer(),
    screenedOn: p.date(),
    cohort: p.string(),
    referredBy: p.string().nullable(),
    state: p.enum(['screening', 'not enrolled', 'enrolled']),
    notEnrolledReason: p.string().nullable(),
    notEnrolledNote: p.string().nullable(),
    eligibilityConfirmedAt: p.datetime().nullable(),
    eligibilityConfirmedBy: p.uuid().nullable(),
    protocolVersionId: p.uuid(),
    createdAt: p.datetime(),
  },
});
export type Screening = InferEntity<typeof ScreeningSchema>;

/** The screening ends without enrolment; the reason feeds the participant flow. */
export function leaveNotEnrolled(screening: Screening, reason: string, note: string | null): void {
  lawful(screening.state === 'screening', 'This screening has already ended.');
  screening.state = 'not enrolled';
  screening.notEnrolledReason = reason;
  screening.notEnrolledNote = note;
}

/** The answers let the person in; who confirmed it, and when, is kept. */
export function confirmEligibility(screening: Screening, by: string, at: Date): void {
  lawful(screening.state === 'screening', 'This screening has already ended.');
  lawful(screening.eligibilityConfirmedAt == null, 'Eligibility is already confirmed.');
  screening.eligibilityConfirmedAt = at;
  screening.eligibilityConfirmedBy = by;
}

/** Nobody is enrolled without confirmed eligibility and complete consent. The data base asks for the consent as well, whoever enrols. */
export function assertEnrollable(screening: Screening, hasConsent: boolean): void {
  lawful(screening.state === 'screening', 'This screening has already ended.');
  lawful(screening.eligibilityConfirmedAt != null, 'Confirm eligibility first: nobody can be enrolled without it.');
  lawful(hasConsent, 'Consent is not complete: both signatures are needed before anybody can be enrolled.');
}

/** The screening ends in enrolment. */
export function endInEnrolment(screening: Screening, participantId: string): void {
  lawful(screening.state === 'screening', 'This screening has already ended.');
  screening.state = 'enrolled';
  screening.participantId = participantId;
}

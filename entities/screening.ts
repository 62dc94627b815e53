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

import { ConsentSchema } from '@/entities/consent';
import { ParticipantSchema } from '@/entities/participant';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { ScreeningSchema } from '@/entities/screening';
import { SiteSchema } from '@/entities/site';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { ageYears, checkBirthDate } from './birth-date';
import type { CorrectIdentityInput } from './input';

/** The least age of a participant; it is asked of the day that counts for the person. */
const adultYears = 18;

/** Somebody enrolled keeps a date of birth, of an age that may take part, and the age at enrolment follows it. */
async function keepAge(work: Work, { participantId, bornOn }: { participantId: string; bornOn: string | null | undefined }): Promise<void> {
  const participant = await work.em.findOneOrFail(ParticipantSchema, { id: participantId });
  if (!bornOn) throw new Refusal('invalid', 'The age at enrolment is counted from the date of birth, so it cannot be taken away.', 'bornOn');
  checkAdult(bornOn, participant.enrolledOn, 'enrolment');
  participant.ageYears = ageYears(bornOn, participant.enrolledOn);
}

/** @throws Refusal 'invalid' at 'bornOn' when the person was no adult on that day. */
function checkAdult(bornOn: string, on: string, day: string): void {
  const age = ageYears(bornOn, on);
  if (age < adultYears) throw new Refusal('invalid', `The date of birth makes ${age} years on the day of ${day}. Participants are ${adultYears} or older.`, 'bornOn');
}

/**
 * Corrects or completes name and contact. The trail keeps the values before it, behind the same door.
 * @throws Refusal 'invalid' at 'reason' once the person has signed and none is given; at 'bornOn' for an age that may not take part.
 */
export async function correctIdentity(work: Work, input: CorrectIdentityInput): Promise<{ version: number }> {
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId: input.id });
  if (!identity) throw new Refusal('not-found', 'There is no such screening.');
  work.expect(identity);
  const site = await work.em.findOneOrFail(SiteSchema, { id: identity.siteId });
  if (input.bornOn) checkBirthDate(input.bornOn, localDate(work.now, site.timeZone));
  const screening = await work.em.findOneOrFail(ScreeningSchema, { id: input.id });
  const signed = (await work.em.count(ConsentSchema, { screeningId: input.id, state: { $in: ['signed by participant', 'complete'] } })) > 0;
  if (signed && !work.reason) throw new Refusal('invalid', 'The person has signed under this name. Say why it changes.', 'reason');
  if (signed && input.bornOn) checkAdult(input.bornOn, screening.screenedOn, 'screening');
  if (screening.participantId) await keepAge(work, { participantId: screening.participantId, bornOn: input.bornOn });
  Object.assign(identity, { name: input.name, email: input.email ?? null, phone: input.phone ?? null, bornOn: input.bornOn ?? null });
  await work.em.flush();
  return { version: identity.version };
}

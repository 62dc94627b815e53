import { addDays } from '@/instruments/calendar';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { ScreeningSchema } from '@/entities/screening';
import { currentProtocol } from '@/lib/protocol/find-protocol';
import { plainDate } from '@/lib/people/plain-date';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import type { OpenScreeningInput } from './input';
import { checkBirthDate } from './birth-date';

/** A screening that was just opened. */
export interface OpenedScreening {
  readonly id: string;
  readonly number: number;
}

/** The site in question: the only one in reach, or the one that was named. */
function chooseSite(work: Work, siteId: string | undefined): string {
  const chosen = siteId ?? (work.actor.reach.length === 1 ? work.actor.reach[0] : undefined);
  if (!chosen) throw new Refusal('invalid', 'Choose the site.', 'siteId');
  if (!work.actor.reach.includes(chosen)) throw new Refusal('not-found', 'There is no such site.');
  return chosen;
}

/**
 * Opens a screening with its running number at the site, and the person's identity in its own table.
 * @throws Refusal 'invalid' for a day to come or long past, or a cohort the protocol does not have.
 */
export async function openScreening(work: Work, input: OpenScreeningInput): Promise<OpenedScreening> {
  const siteId = chooseSite(work, input.siteId);
  // The update locks the site's row until this transaction ends: running numbers have no gap and no twin.
  const [site] = await work.sql<{ number: number; zone: string }>('update site set screening_count = screening_count + 1 where id = ? returning screening_count as number, time_zone as zone', [siteId]);
  if (!site) throw new Refusal('not-found', 'There is no such site.');
  const today = localDate(work.now, site.zone);
  if (input.screenedOn > today) throw new Refusal('invalid', `${plainDate(input.screenedOn)} is still to come. Give the day of screening.`, 'screenedOn');
  if (input.screenedOn < addDays(today, -365)) throw new Refusal('invalid', `${plainDate(input.screenedOn)} is more than a year ago. Check the year.`, 'screenedOn');
  if (input.bornOn) checkBirthDate(input.bornOn, today);
  const protocol = await currentProtocol(work, site.zone);
  if (!protocol.document.cohorts.some(({ key }) => key === input.cohort)) throw new Refusal('invalid', 'The protocol has no such cohort.', 'cohort');
  const screening = work.em.create(ScreeningSchema, {
    siteId,
    participantId: null,
    number: site.number,
    screenedOn: input.screenedOn,
    cohort: input.cohort,
    referredBy: input.referredBy ?? null,
    state: 'screening',
    notEnrolledReason: null,
    notEnrolledNote: null,
    eligibilityConfirmedAt: null,
    eligibilityConfirmedBy: null,
    protocolVersionId: protocol.id,
    createdAt: work.now,
  });
  await work.em.flush();
  work.em.create(ParticipantIdentitySchema, {
    screeningId: screening.id,
    siteId,
    participantId: null,
    name: input.name,
    email: input.email ?? null,
    phone: input.phone ?? null,
    bornOn: input.bornOn ?? null,
  });
  await work.em.flush();
  return { id: screening.id, number: screening.number };
}

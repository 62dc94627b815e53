import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { SiteSchema } from '@/entities/site';
import { Refusal } from '@/lib/work/refusal';
import { localDate } from '@/lib/work/time';
import type { Work } from '@/lib/work/work';
import { checkBirthDate } from './birth-date';
import type { CorrectIdentityInput } from './input';

/** Corrects or completes name and contact. The trail keeps the values before it, behind the same door. */
export async function correctIdentity(work: Work, input: CorrectIdentityInput): Promise<{ version: number }> {
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId: input.id });
  if (!identity) throw new Refusal('not-found', 'There is no such screening.');
  work.expect(identity);
  const site = await work.em.findOneOrFail(SiteSchema, { id: identity.siteId });
  if (input.bornOn) checkBirthDate(input.bornOn, localDate(work.now, site.timeZone));
  Object.assign(identity, { name: input.name, email: input.email ?? null, phone: input.phone ?? null, bornOn: input.bornOn ?? null });
  await work.em.flush();
  return { version: identity.version };
}

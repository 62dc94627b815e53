import { ConsentSchema } from '@/entities/consent';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import { Refusal } from '@/lib/work/refusal';
import type { Work } from '@/lib/work/work';

/** Name and contact, for the own site only. */
export interface IdentityView {
  readonly version: number;
  readonly name: string;
  readonly email: string | null;
  readonly phone: string | null;
  readonly bornOn: string | null;
  /** Somebody signed under this identity: from then on it changes with a reason only. */
  readonly needsReason: boolean;
}

/** Reads name and contact of a screening; the reading itself is written to the trail. @throws Refusal 'not-found'. */
export async function viewIdentity(work: Work, { id }: { id: string }): Promise<IdentityView> {
  const identity = await work.em.findOne(ParticipantIdentitySchema, { screeningId: id });
  if (!identity) throw new Refusal('not-found', 'There is no such screening.');
  await work.event('participant_identity', identity.id, { what: 'read' }, { siteId: identity.siteId, ...(identity.participantId ? { participantId: identity.participantId } : {}) });
  const needsReason = (await work.em.count(ConsentSchema, { screeningId: id, state: { $in: ['signed by participant', 'complete'] } })) > 0;
  const { version, name, email, phone, bornOn } = identity;
  return { version, name, email: email ?? null, phone: phone ?? null, bornOn: bornOn ?? null, needsReason };
}

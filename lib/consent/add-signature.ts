import type { Consent } from '@/entities/consent';
import { ConsentSignatureSchema, type ConsentSignature } from '@/entities/consent-signature';
import { ParticipantIdentitySchema } from '@/entities/participant-identity';
import type { Work } from '@/lib/work/work';

/** A signature as it was made. Without a name of its own it carries the one the site knows the person by. */
export interface MadeSignature extends Pick<ConsentSignature, 'who' | 'means' | 'contentSha256'> {
  readonly name?: string;
  readonly drawing?: string;
  /** Whose account signed, for the second signature. */
  readonly accountId?: string;
}

/** Puts a signature under a consent, with the hash of what was signed; it is never changed. */
export async function addSignature(work: Work, consent: Consent, { who, means, contentSha256, name, drawing, accountId }: MadeSignature): Promise<void> {
  const { id: consentId, screeningId, siteId } = consent;
  const known = name === undefined ? await work.em.findOne(ParticipantIdentitySchema, { screeningId }) : null;
  work.em.create(ConsentSignatureSchema, {
    consentId,
    screeningId,
    siteId,
    participantId: null,
    who,
    means,
    name: name ?? known?.name ?? '',
    accountId: accountId ?? null,
    drawing: drawing ?? null,
    signedAt: work.now,
    contentSha256,
  });
}

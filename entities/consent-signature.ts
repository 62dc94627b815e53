import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** A signature and the hash of what was signed. Holds a name, so it is identity data; never changed. */
export const ConsentSignatureSchema = defineEntity({
  name: 'ConsentSignature',
  tableName: 'consent_signature',
  properties: {
    id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
    siteId: p.uuid(),
    screeningId: p.uuid(),
    participantId: p.uuid().nullable(),
    consentId: p.uuid(),
    who: p.enum(['participant', 'staff']),
    means: p.enum(['typed', 'drawn', 'paper']),
    name: p.string(),
    /** Whose account signed second; null for the participant's own. */
    accountId: p.uuid().nullable(),
    drawing: p.text().nullable(),
    signedAt: p.datetime(),
    contentSha256: p.string(),
  },
});
export type ConsentSignature = InferEntity<typeof ConsentSignatureSchema>;

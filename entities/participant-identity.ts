import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { screeningBase } from './columns';

/** Name, contact and date of birth. Its own table, behind its own policy: the own site only. */
export const ParticipantIdentitySchema = defineEntity({
  name: 'ParticipantIdentity',
  tableName: 'participant_identity',
  properties: {
    ...screeningBase(),
    name: p.string(),
    email: p.string().nullable(),
    phone: p.string().nullable(),
    bornOn: p.date().nullable(),
  },
});
export type ParticipantIdentity = InferEntity<typeof ParticipantIdentitySchema>;

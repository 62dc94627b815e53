import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** A single-use link. Only the hash of its token is kept. */
export const InvitationSchema = defineEntity({
  name: 'Invitation',
  tableName: 'invitation',
  properties: {
    ...base(),
    tokenHash: p.string(),
    kind: p.enum(['consent', 'join', 'staff', 'password']),
    siteId: p.uuid().nullable(),
    screeningId: p.uuid().nullable(),
    participantId: p.uuid().nullable(),
    accountId: p.uuid().nullable(),
    createdAt: p.datetime(),
    expiresAt: p.datetime(),
    usedAt: p.datetime().nullable(),
  },
});
export type Invitation = InferEntity<typeof InvitationSchema>;

/** Whether the link may still be used at a moment. */
export const isUsable = (invitation: Pick<Invitation, 'expiresAt' | 'usedAt'>, at: Date): boolean =>
  invitation.usedAt == null && invitation.expiresAt > at;

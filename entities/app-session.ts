import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** A signed-in browser. Kept here so that it can be ended at once, from anywhere. */
export const AppSessionSchema = defineEntity({
  name: 'AppSession',
  tableName: 'app_session',
  properties: {
    id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
    accountId: p.uuid(),
    tokenHash: p.string(),
    roleGrantId: p.uuid().nullable(),
    handedOverScreeningId: p.uuid().nullable(),
    handedOverSiteId: p.uuid().nullable(),
    createdAt: p.datetime(),
    seenAt: p.datetime(),
    expiresAt: p.datetime(),
    endedAt: p.datetime().nullable(),
  },
});
export type AppSession = InferEntity<typeof AppSessionSchema>;

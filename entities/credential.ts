import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

/** How an account signs in. Readable only by the acts that sign somebody in. */
export const CredentialSchema = defineEntity({
  name: 'Credential',
  tableName: 'credential',
  properties: {
    accountId: p.uuid().primary(),
    email: p.string(),
    passwordHash: p.string().nullable(),
    changedAt: p.datetime(),
    version: p.integer().version(),
  },
});
export type Credential = InferEntity<typeof CredentialSchema>;

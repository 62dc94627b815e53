import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** Somebody who can act. How they sign in stands in Credential, behind its own policy. */
export const AccountSchema = defineEntity({
  name: 'Account',
  tableName: 'account',
  properties: {
    ...base(),
    kind: p.enum(['staff', 'participant', 'system']),
    label: p.string(),
    /** What a person of the staff signs with; null for everybody else. */
    name: p.string().nullable(),
    state: p.enum(['invited', 'active', 'closed']),
    createdAt: p.datetime(),
  },
});
export type Account = InferEntity<typeof AccountSchema>;

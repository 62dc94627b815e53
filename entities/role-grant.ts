import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** A role at sites for a period. One account may hold several; one is in use at a time. */
export const RoleGrantSchema = defineEntity({
  name: 'RoleGrant',
  tableName: 'role_grant',
  properties: {
    ...base(),
    accountId: p.uuid(),
    studyId: p.uuid(),
    role: p.enum(['participant', 'site-coordinator', 'assessor', 'site-investigator', 'monitor', 'investigator', 'data-manager', 'administrator', 'auditor']),
    label: p.string(),
    wholeStudy: p.boolean(),
    siteIds: p.array<string>().columnType('uuid[]'),
    ofParticipantId: p.uuid().nullable(),
    startsAt: p.datetime(),
    endsAt: p.datetime().nullable(),
  },
});
export type RoleGrant = InferEntity<typeof RoleGrantSchema>;

/** Whether the grant is in force at a moment. */
export const isInForce = (grant: Pick<RoleGrant, 'startsAt' | 'endsAt'>, at: Date): boolean =>
  grant.startsAt <= at && (grant.endsAt == null || grant.endsAt > at);

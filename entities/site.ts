import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { base } from './columns';

/** A place where participants are seen. Its time zone is the clock of everything done there; the counters issue running numbers. */
export const SiteSchema = defineEntity({
  name: 'Site',
  tableName: 'site',
  properties: {
    ...base(),
    studyId: p.uuid(),
    code: p.string(),
    name: p.string(),
    timeZone: p.string(),
    phone: p.string(),
    email: p.string(),
    recruitmentTarget: p.integer(),
    participantCount: p.integer(),
    screeningCount: p.integer(),
  },
});
export type Site = InferEntity<typeof SiteSchema>;

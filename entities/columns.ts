import { p } from '@mikro-orm/core';

/**
 * Columns that many tables share, so that an entity file shows only what is its own.
 * Foreign keys are plain uuids: a service fetches what it needs, within its reach.
 * Dates of the calendar are 'YYYY-MM-DD' strings; moments are Date.
 */
export const base = () => ({
  id: p.uuid().primary().defaultRaw('gen_random_uuid()'),
  version: p.integer().version(),
});

/** Every row of a participant's record hangs on the site and the participant. */
export const recordBase = () => ({
  ...base(),
  siteId: p.uuid(),
  participantId: p.uuid(),
});

/** Rows that exist before enrolment hang on the site and the screening. */
export const screeningBase = () => ({
  ...base(),
  siteId: p.uuid(),
  screeningId: p.uuid(),
  participantId: p.uuid().nullable(),
});

/** A list of whole numbers; null stands for a level not yet read. */
export const integers = () =>
  p
    .array<number | null>(
      (text) => (text === null || text === 'NULL' ? null : Number(text)),
      (value) => (value === null ? 'NULL' : String(value)),
    )
    .columnType('integer[]');

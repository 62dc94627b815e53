import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';
import { lawful } from './lawful';

/** A visit and its window. Window status is a label: a visit out of window is kept and analysed by its date. */
export const VisitSchema = defineEntity({
  name: 'Visit',
  tableName: 'visit',
  properties: {
    ...recordBase(),
    key: p.string(),
    name: p.string(),
    targetOn: p.date(),
    opensOn: p.date(),
    closesOn: p.date(),
    bookedAt: p.datetime().nullable(),
    doneOn: p.date().nullable(),
    state: p.enum(['to come', 'in progress', 'complete', 'missed']),
    missedReason: p.string().nullable(),
    unscheduledReason: p.string().nullable(),
    /** Why it took place out of its window. */
    windowReason: p.string().nullable(),
    protocolVersionId: p.uuid(),
  },
});
export type Visit = InferEntity<typeof VisitSchema>;

/** The visit starts on a local date of the site. */
export function beginVisit(visit: Visit, on: string): void {
  lawful(visit.state === 'to come' || visit.state === 'in progress', 'This visit has already ended.', 'locked');
  visit.state = 'in progress';
  visit.doneOn ??= on;
}

/** The visit was begun by mistake: it is to come. */
export function undoBegin(visit: Visit): void {
  lawful(visit.state === 'in progress', 'Only a visit in progress can be set back.');
  visit.state = 'to come';
  visit.doneOn = null;
  visit.windowReason = null;
}

/** The visit is complete. */
export function completeVisit(visit: Visit): void {
  lawful(visit.state === 'in progress', 'Only a visit in progress can be completed.');
  visit.state = 'complete';
}

/** The visit did not take place; the reason is kept. */
export function missVisit(visit: Visit, reason: string): void {
  lawful(visit.state === 'to come', 'Only a visit that has not begun can be missed.');
  visit.state = 'missed';
  visit.missedReason = reason;
}

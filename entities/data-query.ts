import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { recordBase } from './columns';
import { lawful } from './lawful';

/** A question about one value, asked in the margin. */
export const DataQuerySchema = defineEntity({
  name: 'DataQuery',
  tableName: 'data_query',
  properties: {
    ...recordBase(),
    number: p.bigint('number').defaultRaw('identity'),
    visitId: p.uuid().nullable(),
    targetTable: p.string(),
    targetId: p.uuid(),
    field: p.string(),
    fieldLabel: p.string(),
    origin: p.enum(['manual', 'check']),
    checkId: p.string().nullable(),
    state: p.enum(['open', 'answered', 'closed', 'cancelled']),
    raisedBy: p.uuid(),
    raisedAt: p.datetime(),
    dueOn: p.date(),
    answeredAt: p.datetime().nullable(),
    closedAt: p.datetime().nullable(),
  },
});
export type DataQuery = InferEntity<typeof DataQuerySchema>;

/** The site answers; it never closes. */
export function answerQuery(query: DataQuery, at: Date): void {
  lawful(query.state === 'open', 'This query is not waiting for an answer.');
  query.state = 'answered';
  query.answeredAt = at;
}

/** The asker accepts the answer. */
export function closeQuery(query: DataQuery, at: Date): void {
  lawful(query.state === 'answered', 'A query can be closed once it has been answered.');
  query.state = 'closed';
  query.closedAt = at;
}

/** The asker takes the question back. */
export function cancelQuery(query: DataQuery, at: Date): void {
  lawful(query.state === 'open' || query.state === 'answered', 'This query has already ended.');
  query.state = 'cancelled';
  query.closedAt = at;
}

/** Asking again, or reopening a closed query: it waits on the site once more. */
export function askAgain(query: DataQuery): void {
  lawful(query.state === 'answered' || query.state === 'closed', 'Only an answered or closed query can be asked again.');
  query.state = 'open';
  query.closedAt = null;
}

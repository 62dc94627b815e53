import PgBoss from 'pg-boss';
import type { EntityManager } from '@mikro-orm/postgresql';
import type { Job } from './define-job';
import { queueSchema } from './queues';

/** The part of the ORM's transaction that lends its connection. */
interface LendsConnection {
  client: { acquireConnection(): Promise<{ query(text: string, values: unknown[]): Promise<{ rows: unknown[] }> }> };
}

/** Speaks to the queue through the connection of the caller's transaction. */
function inTransactionOf(em: EntityManager): PgBoss.Db {
  const transaction = em.getTransactionContext<LendsConnection>();
  if (!transaction) throw new Error('A job can be put in the queue only inside a transaction.');
  return {
    executeSql: async (text, values) => (await transaction.client.acquireConnection()).query(text, values),
  };
}

/** Never started and never connected: it only writes the statement that the transaction runs. */
const writer = new PgBoss({
  schema: queueSchema,
  db: { executeSql: () => Promise.reject(new Error('The queue is written inside a transaction only.')) },
});

/**
 * Puts a job in the queue inside the caller's transaction: both are kept or neither.
 *
 * @param options.startAfter the earliest time to run it.
 * @param options.onceKey at most one waiting job per key and `onceSeconds`; a second one is dropped.
 * @returns the job's id, or null when `onceKey` dropped it.
 * @throws ZodError when the payload is not what the job takes; Error outside a transaction.
 */
export async function enqueue<P extends object>(
  em: EntityManager,
  job: Job<P>,
  payload: P,
  options: { startAfter?: Date; onceKey?: string; onceSeconds?: number } = {},
): Promise<string | null> {
  const data = job.payload.parse(payload);
  return writer.send(job.name, data, {
    db: inTransactionOf(em),
    ...(options.startAfter ? { startAfter: options.startAfter } : {}),
    ...(options.onceKey ? { singletonKey: options.onceKey, singletonSeconds: options.onceSeconds ?? 3600 } : {}),
  });
}

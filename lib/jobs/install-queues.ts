import PgBoss from 'pg-boss';
import { jobs } from './index';
import { deadQueueOf, queueSchema } from './queues';

/** What the application's login needs on the queue's tables. Rows of done jobs are moved and deleted, hence `delete`. */
const grants = `
  grant usage on schema ${queueSchema} to app_rw;
  grant select, insert, update, delete on all tables in schema ${queueSchema} to app_rw;
  grant execute on all functions in schema ${queueSchema} to app_rw;`;

/**
 * Makes or migrates the queue's tables and one queue with a dead-letter queue for every job. Run as the owner, after the migrations.
 * The application and the worker then need no right to change tables.
 */
export async function installQueues(ownerUrl: string): Promise<void> {
  // `schedule` makes the queue that the worker's clock uses, which the worker itself may not make.
  const boss = new PgBoss({ connectionString: ownerUrl, schema: queueSchema, supervise: false, schedule: true, max: 2 });
  let troubled: Error | undefined;
  boss.on('error', (error) => (troubled ??= error));
  await boss.start();
  try {
    for (const job of jobs) {
      const retry = { retryLimit: job.retry.limit, retryDelay: job.retry.delaySeconds, retryBackoff: job.retry.backoff };
      await boss.createQueue(deadQueueOf(job.name), { name: deadQueueOf(job.name), retryLimit: 0 });
      await boss.createQueue(job.name, { name: job.name, ...retry, deadLetter: deadQueueOf(job.name) });
      await boss.updateQueue(job.name, { name: job.name, ...retry, deadLetter: deadQueueOf(job.name) });
    }
    await boss.getDb().executeSql(grants, []);
  } finally {
    await boss.stop({ graceful: false });
  }
  if (troubled) throw troubled;
}

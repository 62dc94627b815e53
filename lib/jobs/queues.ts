/** The schema of the queue's own tables. */
export const queueSchema = 'pgboss';

/** Where a job goes after its last retry failed; the worker logs it there as an error. */
export function deadQueueOf(jobName: string): string {
  return `${jobName}.dead`;
}

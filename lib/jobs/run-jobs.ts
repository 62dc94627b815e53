import PgBoss from 'pg-boss';
import { describeError } from '@/lib/log';
import type { AnyJob, JobDeps } from './define-job';
import { jobs as everyJob } from './index';
import { deadQueueOf, queueSchema } from './queues';

/** Job rows may name people's ids: done ones leave the queue after an hour and the archive after two days. */
const keep = { archiveCompletedAfterSeconds: 3600, archiveFailedAfterSeconds: 7 * 24 * 3600, deleteAfterDays: 2 };

export interface RunJobsSettings {
  databaseUrl: string;
  deps: Omit<JobDeps, 'jobId'>;
  jobs?: readonly AnyJob[];
  pollSeconds?: number;
}

/** Runs one job; what it throws is logged without values and passed on as a bare sentence, because the queue keeps it. */
async function attempt(job: AnyJob, id: string, data: unknown, deps: RunJobsSettings['deps']): Promise<void> {
  try {
    await job.runRaw(data, { ...deps, jobId: id });
    deps.log.info({ job: job.name, jobId: id }, 'job done');
  } catch (error) {
    deps.log.warn({ job: job.name, jobId: id, err: error }, 'job failed and will be tried again if attempts are left');
    const { kind, code } = describeError(error);
    throw new Error(`${job.name} failed: ${code ?? kind}`);
  }
}

async function watch(boss: PgBoss, job: AnyJob, settings: RunJobsSettings): Promise<void> {
  const { deps, pollSeconds = 1 } = settings;
  // One at a time: a failing job fails its whole batch, and the others in it would run twice.
  const options = { batchSize: 1, pollingIntervalSeconds: pollSeconds };
  await boss.work(job.name, options, async (batch) => {
    for (const { id, data } of batch) await attempt(job, id, data, deps);
  });
  await boss.work(deadQueueOf(job.name), options, (batch) => {
    for (const { id } of batch) deps.log.error({ job: job.name, deadId: id }, 'job gave up after its last attempt');
    return Promise.resolve();
  });
  if (job.cron) await boss.schedule(job.name, job.cron, {}, { tz: 'UTC' });
}

/**
 * Starts running every job under the application's login.
 * @returns the way to stop: it waits for the jobs in hand.
 */
export async function runJobs(settings: RunJobsSettings): Promise<{ stop(): Promise<void> }> {
  const { databaseUrl, deps, jobs = everyJob } = settings;
  const boss = new PgBoss({ connectionString: databaseUrl, schema: queueSchema, migrate: false, supervise: true, max: 4, ...keep });
  boss.on('error', (error) => deps.log.error({ err: error }, 'job queue error'));
  await boss.start();
  for (const job of jobs) await watch(boss, job, settings);
  return { stop: () => boss.stop({ graceful: true, timeout: 20_000 }) };
}

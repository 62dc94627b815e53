/**
 * Runs the jobs of the registry, under the application's login, until it is told to stop.
 * Every few seconds it notes that it is alive, which `/api/health` reads.
 */
import { hostname } from 'node:os';
import { Pool } from 'pg';
import { env } from '@/lib/env';
import { runJobs } from '@/lib/jobs/run-jobs';
import { log } from '@/lib/log';
import { makeSendLetter } from '@/lib/mail/send-letter';
import { storage } from '@/lib/storage';

const beatEveryMs = 5000;

async function beat(pool: Pool): Promise<void> {
  await pool.query(
    `insert into worker_heartbeat (worker, seen_at) values ($1, now()) on conflict (worker) do update set seen_at = excluded.seen_at`,
    [hostname()],
  );
}

async function work(): Promise<void> {
  const { DATABASE_URL: databaseUrl, SMTP_URL: smtpUrl, MAIL_FROM: from } = env();
  const pool = new Pool({ connectionString: databaseUrl, max: 1 });
  pool.on('error', (error) => log().error({ err: error }, 'heartbeat connection lost'));
  const deps = { log: log(), storage: storage(), sendLetter: makeSendLetter({ smtpUrl, from }), now: () => new Date() };
  const running = await runJobs({ databaseUrl, deps });
  await beat(pool);
  const beats = setInterval(() => {
    beat(pool).catch((error: unknown) => log().error({ err: error }, 'heartbeat failed'));
  }, beatEveryMs);
  log().info('worker ready');
  process.send?.('ready');

  let stopping = false;
  const stop = async (): Promise<void> => {
    if (stopping) return;
    stopping = true;
    clearInterval(beats);
    await running.stop();
    await pool.end();
    log().info('worker stopped');
    process.exit(0);
  };
  for (const sign of ['SIGTERM', 'SIGINT', 'disconnect']) process.on(sign, () => void stop());
}

work().catch((error: unknown) => {
  console.error('The job worker could not start:', error instanceof Error ? error.message : error);
  process.exit(1);
});

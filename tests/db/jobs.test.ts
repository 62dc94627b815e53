import { MikroORM } from '@mikro-orm/postgresql';
import { Client } from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { z } from 'zod';
import { env } from '@/lib/env';
import { jobs } from '@/lib/jobs';
import { defineJob, type AnyJob, type JobDeps } from '@/lib/jobs/define-job';
import { enqueue } from '@/lib/jobs/enqueue';
import { mailSend } from '@/lib/jobs/handlers/mail-send';
import { deadQueueOf } from '@/lib/jobs/queues';
import { runJobs } from '@/lib/jobs/run-jobs';
import { makeLog } from '@/lib/log';
import type { Posting } from '@/lib/mail/send-letter';
import { storage } from '@/lib/storage';
import config from '../../mikro-orm.config';

let orm: MikroORM;
let login: Client;

beforeAll(async () => {
  orm = await MikroORM.init({ ...config, clientUrl: env().DATABASE_URL });
  login = new Client({ connectionString: env().DATABASE_URL });
  await login.connect();
});

afterAll(async () => {
  await orm.close();
  await login.end();
});

const letter = (to: string) => ({ letter: 'password-reset', to, data: { url: 'https://registry.example/p', validMinutes: 60 } });

const waiting = async (to: string) => {
  const found = await login.query(`select id from pgboss.job where name = 'mail.send' and data ->> 'to' = $1`, [to]);
  return found.rowCount;
};

function depsWith(sendLetter: JobDeps['sendLetter']) {
  let logged = '';
  const log = makeLog('info', { write: (line) => void (logged += line) });
  return { deps: { log, storage: storage(), sendLetter, now: () => new Date('2027-03-01T08:00:00Z') }, logged: () => logged };
}

async function until(what: () => boolean | Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 150; tries += 1) {
    if (await what()) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error('It did not happen within 15 seconds.');
}

it('the application’s login has a queue and a dead-letter queue for every job, and may not make tables there', async () => {
  const queues = await login.query<{ name: string; dead_letter: string | null }>('select name, dead_letter from pgboss.queue');
  for (const { name } of jobs) {
    expect(queues.rows).toContainEqual({ name, dead_letter: deadQueueOf(name) });
  }
  await expect(login.query('create table pgboss.extra (id int)')).rejects.toMatchObject({ code: '42501' });
});

it('a job is kept when the transaction that asked for it is kept, and gone when it is not', async () => {
  await orm.em.fork().transactional((em) => enqueue(em, mailSend, letter('kept@home.example')));
  expect(await waiting('kept@home.example')).toBe(1);
  await expect(
    orm.em.fork().transactional(async (em) => {
      await enqueue(em, mailSend, letter('lost@home.example'));
      throw new Error('the record was refused');
    }),
  ).rejects.toThrow('the record was refused');
  expect(await waiting('lost@home.example')).toBe(0);
});

it('a job outside a transaction, or with a payload it does not take, is refused', async () => {
  await expect(enqueue(orm.em.fork(), mailSend, letter('a@home.example'))).rejects.toThrow('only inside a transaction');
  await expect(orm.em.fork().transactional((em) => enqueue(em, mailSend, letter('not an address')))).rejects.toThrow();
});

it('a key that is used once drops the second job', async () => {
  const once = { onceKey: 'reset-7', onceSeconds: 600 };
  const ids = await orm.em.fork().transactional(async (em) => [
    await enqueue(em, mailSend, letter('once@home.example'), once),
    await enqueue(em, mailSend, letter('once@home.example'), once),
  ]);
  expect(ids[0]).toMatch(/^[0-9a-f-]{36}$/);
  expect(ids[1]).toBeNull();
});

it('the worker sends a letter with its attachment from the file store', async () => {
  const sent: Posting[] = [];
  const { deps } = depsWith((_letter, posting) => Promise.resolve(void sent.push(posting)));
  await storage().put('consent/7.pdf', Buffer.from('%PDF-'), { contentType: 'application/pdf' });
  const attachments = [{ filename: 'copy.pdf', contentType: 'application/pdf', key: 'consent/7.pdf' }];
  const payload = { letter: 'consent-copy', to: 'with@home.example', data: { greetingName: 'Ada', siteName: 'Northmoor' }, attachments };
  const id = await orm.em.fork().transactional((em) => enqueue(em, mailSend, payload));
  const running = await runJobs({ databaseUrl: env().DATABASE_URL, deps, pollSeconds: 0.5 });
  await until(() => sent.some(({ to }) => to === 'with@home.example'));
  await running.stop();
  const posting = sent.find(({ to }) => to === 'with@home.example');
  expect(posting?.attachments?.[0]?.content.toString()).toBe('%PDF-');
  expect(posting?.id).toBe(id);
});

it('a failing job is tried again, then given up with an error in the log, and its reason holds no values', async () => {
  let attempts = 0;
  const failing: AnyJob = {
    ...mailSend,
    runRaw: () => {
      attempts += 1;
      return Promise.reject(Object.assign(new Error('550 ada@home.example unknown'), { code: 'EENVELOPE' }));
    },
  };
  const { deps, logged } = depsWith(() => Promise.resolve());
  await login.query(`delete from pgboss.job where name = 'mail.send'`);
  await orm.em.fork().transactional((em) => enqueue(em, mailSend, letter('ada@home.example')));
  await login.query(`update pgboss.job set retry_limit = 1, retry_delay = 0, retry_backoff = false where name = 'mail.send'`);
  const running = await runJobs({ databaseUrl: env().DATABASE_URL, deps, jobs: [failing], pollSeconds: 0.5 });
  await until(() => logged().includes('gave up'));
  await running.stop();
  expect(attempts).toBe(2);
  expect(logged()).not.toContain('ada@');
  const { rows } = await login.query<{ output: unknown }>(`select output from pgboss.job where name = 'mail.send' and state = 'failed'`);
  expect(JSON.stringify(rows)).toContain('EENVELOPE');
  expect(JSON.stringify(rows)).not.toContain('ada@');
});

it('a job by the clock is scheduled under the application’s login', async () => {
  const nightly = { ...defineJob({ name: 'mail.send', payload: z.object({}), retry: mailSend.retry, run: () => Promise.resolve() }), cron: '15 2 * * *' };
  const { deps } = depsWith(() => Promise.resolve());
  const running = await runJobs({ databaseUrl: env().DATABASE_URL, deps, jobs: [nightly] });
  await running.stop();
  const { rows } = await login.query(`select name, cron, timezone from pgboss.schedule where name = 'mail.send'`);
  expect(rows).toEqual([{ name: 'mail.send', cron: '15 2 * * *', timezone: 'UTC' }]);
});

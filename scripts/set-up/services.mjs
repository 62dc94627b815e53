import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { ensureBuild, serveArgs } from './build.mjs';
import { answering, firstMessage, startChild, stopChild } from './children.mjs';
import { freePort } from './port.mjs';
import { dataFolder, run } from './tell.mjs';

const node = process.execPath;
const asServer = ['--import', 'tsx', '--conditions=react-server'];

/** The key that signs session cookies; made once per clone. */
function sessionSecret() {
  const folder = join(dataFolder, 'secrets');
  const file = join(folder, 'session');
  mkdirSync(folder, { recursive: true });
  chmodSync(folder, 0o700);
  if (!existsSync(file)) writeFileSync(file, randomBytes(48).toString('base64url'), { mode: 0o600 });
  return readFileSync(file, 'utf8');
}

/** Migrates a data base as its owner. */
export function migrate({ appUrl, ownerUrl }) {
  const env = { ...process.env, DATABASE_URL: appUrl, OWNER_DATABASE_URL: ownerUrl };
  const mend = process.env.DATABASE_URL
    ? 'The data base could not be migrated: see above, and check that DATABASE_URL and OWNER_DATABASE_URL are the right addresses.'
    : "The data base could not be migrated: see above; 'npm run db:reset' starts with an empty one.";
  run(node, [...asServer, 'scripts/migrate.ts'], { env, mend });
}

/** Fills an empty data base with the invented study; one that holds data is left as it is. */
export function seed({ appUrl, ownerUrl, filesFolder }, args = ['--if-empty']) {
  const env = {
    ...process.env, ...commonEnv({ appUrl, filesFolder, demo: true }), OWNER_DATABASE_URL: ownerUrl, NEXTAUTH_URL: process.env.NEXTAUTH_URL ?? 'http://127.0.0.1:3000',
  };
  run(node, [...asServer, 'scripts/seed.ts', ...args], { env, mend: "The demonstration could not be seeded: see above; 'npm run db:reset' starts afresh." });
}

/** Settings that every process of the application shares; what the user has set wins. */
function commonEnv({ appUrl, filesFolder, demo }) {
  return {
    DATABASE_URL: appUrl,
    NEXTAUTH_SECRET: process.env.NEXTAUTH_SECRET ?? sessionSecret(),
    MAIL_FROM: process.env.MAIL_FROM ?? 'Tidemark <registry@tidemark.example>',
    STORAGE: process.env.STORAGE ?? `folder:${filesFolder}`,
    DEMO: demo ? '1' : '0',
    NEXT_TELEMETRY_DISABLED: '1',
  };
}

/** The caller's environment without the owner's address: no serving process needs it. */
function withoutOwner() {
  const { OWNER_DATABASE_URL: _owner, ...rest } = process.env;
  return rest;
}

/**
 * Starts mail capture, job worker and web server over a migrated data base.
 *
 * @param options.mode 'start' serves the production build, 'dev' the development server.
 * @param options.folder where letters, files and logs of this instance are kept.
 * @returns the one address, the mail capture's address, the children, and `stop()`.
 */
export async function startServices({ appUrl, mode, folder, preferredPort, demo = true }) {
  const children = [];
  const stop = async () => {
    for (const started of [...children].reverse()) await stopChild(started);
  };
  const launch = (...args) => {
    const started = startChild(...args);
    children.push(started);
    return started;
  };
  const logFolder = join(folder, 'log');
  try {
    const port = await freePort(preferredPort);
    const url = process.env.NEXTAUTH_URL ?? `http://127.0.0.1:${port}`;
    const env = {
      ...withoutOwner(),
      ...commonEnv({ appUrl, filesFolder: join(folder, 'files'), demo }),
      NEXTAUTH_URL: url,
      NODE_ENV: mode === 'dev' ? 'development' : 'production',
    };
    if (!process.env.SMTP_URL) {
      const mail = launch('mail', ['scripts/mail-capture.mjs'], { env: { ...env, MAIL_FOLDER: join(folder, 'mail') }, ipc: true, logFolder });
      const { smtpPort, httpPort } = await firstMessage(mail);
      Object.assign(env, { SMTP_URL: `smtp://127.0.0.1:${smtpPort}`, DEMO_MAILBOX_URL: `http://127.0.0.1:${httpPort}` });
    }
    if (mode === 'start') ensureBuild(env);
    await firstMessage(launch('worker', [...asServer, 'scripts/worker.ts'], { env, ipc: true, logFolder }));
    const web = launch('web', serveArgs(mode, port), { env, logFolder });
    await answering(web, `http://127.0.0.1:${port}/api/health`);
    return { url, mailUrl: env.DEMO_MAILBOX_URL ?? null, children, stop };
  } catch (error) {
    await stop();
    throw error;
  }
}

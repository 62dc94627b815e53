import { mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { ensureDatabase } from '../pg.mjs';
import { migrate, seed, startServices } from './services.mjs';
import { dataFolder, tell } from './tell.mjs';

const database = 'tidemark_e2e';

/**
 * Serves the production build over a freshly seeded data base of its own while `work` runs.
 * @param work receives the environment with E2E_BASE_URL and E2E_MAIL_URL.
 */
export async function withTestServers(work) {
  const folder = join(dataFolder, 'e2e');
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  // What the user has set for the application must not lead the tests to other data.
  for (const name of ['DATABASE_URL', 'OWNER_DATABASE_URL', 'NEXTAUTH_URL', 'SMTP_URL', 'STORAGE']) delete process.env[name];
  const base = await ensureDatabase({ name: 'pg-test', fsync: false, database, fresh: true });
  try {
    migrate(base);
    seed({ ...base, filesFolder: join(folder, 'files') });
    const services = await startServices({ appUrl: base.appUrl, mode: 'start', folder });
    tell(`Browser tests run against ${services.url}; logs are in ${join(folder, 'log')}`);
    try {
      return await work({ ...process.env, E2E_BASE_URL: services.url, E2E_MAIL_URL: services.mailUrl, DATABASE_URL: base.appUrl, OWNER_DATABASE_URL: base.ownerUrl });
    } finally {
      await services.stop();
    }
  } finally {
    base.stop();
  }
}

/**
 * Brings the data base of OWNER_DATABASE_URL up to date: tables, rows' policies, triggers, grants, then the job queues.
 * Runs in its own process under `node --import tsx --conditions=react-server`: a bundler or a test runner cannot load the migrations' files.
 */
import { MikroORM } from '@mikro-orm/postgresql';
import { env } from '@/lib/env';
import { installQueues } from '@/lib/jobs/install-queues';
import config from '../mikro-orm.config';

async function migrate(): Promise<void> {
  const clientUrl = env().OWNER_DATABASE_URL;
  const orm = await MikroORM.init({ ...config, clientUrl });
  try {
    const done = await orm.getMigrator().up();
    console.log(done.length === 0 ? 'The data base is up to date.' : `Migrated: ${done.map(({ name }) => name).join(', ')}.`);
  } finally {
    await orm.close();
  }
  await installQueues(clientUrl);
}

migrate().catch((error: unknown) => {
  console.error('The data base could not be migrated; read the reason below, mend the migration or the address, and start again.');
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
});

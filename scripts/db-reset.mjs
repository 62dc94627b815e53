/** `npm run db:reset`: deletes the demonstration's data base, files and letters of this clone and makes them anew. */
import { existsSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { ensureDatabase, keepFile } from './pg.mjs';
import { removeCluster } from './set-up/cluster.mjs';
import { ensurePackages } from './set-up/packages.mjs';
import { migrate, seed } from './set-up/services.mjs';
import { dataFolder, fail, Mendable, tell } from './set-up/tell.mjs';

async function reset() {
  if (process.env.DATABASE_URL) throw new Mendable('DATABASE_URL names a data base of your own, which this never deletes: empty it yourself, or unset the variable.');
  if (existsSync(join(dataFolder, 'run.json'))) throw new Mendable(`Stop 'npm start' first; if it does not run, delete ${join(dataFolder, 'run.json')}.`);
  ensurePackages();
  removeCluster('pg');
  for (const name of ['files', 'mail']) rmSync(join(dataFolder, name), { recursive: true, force: true });
  const base = await ensureDatabase();
  try {
    migrate(base);
    seed({ ...base, filesFolder: join(dataFolder, 'files') });
  } finally {
    base.stop();
  }
  tell(existsSync(keepFile('pg')) ? 'Made anew and left running.' : 'Made anew.');
}

reset().catch(fail);

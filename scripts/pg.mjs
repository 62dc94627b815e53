/**
 * The data base of this clone, with Node's built-ins only.
 *
 *   node scripts/pg.mjs up [--test]     make where missing, start, keep running, print the addresses
 *   node scripts/pg.mjs down [--test]   stop
 *   node scripts/pg.mjs env [--test]    print `export …` lines for a shell: eval "$(node scripts/pg.mjs env)"
 *   node scripts/pg.mjs psql [--test]   open psql as the owner
 */
import { spawnSync } from 'node:child_process';
import { existsSync, rmSync, writeFileSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { startCluster, stopCluster } from './set-up/cluster.mjs';
import { dataFolder, fail, Mendable, tell } from './set-up/tell.mjs';

export const databaseName = 'tidemark';

/** While this file stands, the cluster was started by hand and `npm start` leaves it running at its end. */
export const keepFile = (name) => `${dataFolder}/${name}.keep`;

/**
 * Three roles. `app_owner` owns every table and runs the migrations; it passes row-level security so that
 * functions with `security definer` can look where their caller may not. `app_login` is what the application
 * and the worker sign in as: it owns nothing and has only what migrations grant to the group `app_rw`.
 */
function makeRoles(cluster) {
  const quoted = (role) => `'${cluster.passwordOf(role).replaceAll("'", "''")}'`;
  cluster.sql(
    'postgres',
    `do $$ begin
       if not exists (select from pg_roles where rolname = 'app_rw') then create role app_rw nologin; end if;
       if not exists (select from pg_roles where rolname = 'app_owner') then create role app_owner login; end if;
       if not exists (select from pg_roles where rolname = 'app_login') then create role app_login login; end if;
     end $$;
     alter role app_owner nosuperuser createdb createrole bypassrls password ${quoted('app_owner')};
     alter role app_login nosuperuser nocreatedb nocreaterole nobypassrls password ${quoted('app_login')};
     grant app_rw to app_login;
     -- Dropping a data base ends the sessions that are still closing in it.
     grant app_login to app_owner;`,
  );
}

function makeDatabase(cluster, database, fresh) {
  if (fresh) cluster.sql('postgres', `drop database if exists ${database} with (force)`);
  if (cluster.sql('postgres', `select 1 from pg_database where datname = '${database}'`) === '1') return;
  cluster.sql('postgres', `create database ${database} owner app_owner`);
  cluster.sql('postgres', `revoke all on database ${database} from public; grant connect on database ${database} to app_rw`);
}

/**
 * The data base to work with. DATABASE_URL (the application) and OWNER_DATABASE_URL (migrations) name one of the
 * user's own; without them the private cluster in `.data/pg` is made and started.
 *
 * @param options.fresh empties the data base first.
 * @returns { appUrl, ownerUrl, stop } where `stop` ends only what this call may end.
 */
export async function ensureDatabase({ name = 'pg', fsync = true, database = databaseName, fresh = false } = {}) {
  const own = process.env.DATABASE_URL;
  if (name === 'pg' && own) {
    const ownerUrl = process.env.OWNER_DATABASE_URL;
    if (!ownerUrl) throw new Mendable('DATABASE_URL is set but OWNER_DATABASE_URL is not: set it to the same data base with the role that owns the tables.');
    return { appUrl: own, ownerUrl, stop: () => {} };
  }
  const cluster = await startCluster(name, { fsync });
  makeRoles(cluster);
  makeDatabase(cluster, database, fresh);
  return {
    appUrl: cluster.url('app_login', database),
    ownerUrl: cluster.url('app_owner', database),
    cluster,
    stop: () => {
      if (!existsSync(keepFile(name))) cluster.stop();
    },
  };
}

function printEnv({ appUrl, ownerUrl }) {
  tell(`export DATABASE_URL='${appUrl}'`);
  tell(`export OWNER_DATABASE_URL='${ownerUrl}'`);
}

async function main([command, ...flags]) {
  const name = flags.includes('--test') ? 'pg-test' : 'pg';
  const options = { name, fsync: name === 'pg' };
  switch (command) {
    case 'up':
    case 'env': {
      const base = await ensureDatabase(options);
      writeFileSync(keepFile(name), '');
      return printEnv(base);
    }
    case 'down':
      rmSync(keepFile(name), { force: true });
      return tell(stopCluster(name) ? 'Stopped.' : 'It was not running.');
    case 'psql': {
      const { ownerUrl } = await ensureDatabase(options);
      process.exitCode = spawnSync('psql', [ownerUrl], { stdio: 'inherit' }).status ?? 1;
      return undefined;
    }
    default:
      throw new Mendable('Say what to do: up, down, env or psql; add --test for the tests’ cluster.');
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  main(process.argv.slice(2)).catch(fail);
}

import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync, realpathSync } from 'node:fs';
import { delimiter, dirname, join } from 'node:path';
import { aptInstall, forbidDebianCluster } from './debian.mjs';
import { Mendable } from './tell.mjs';

const oldestVersion = 15;
const debianFolder = '/usr/lib/postgresql';

/** The folders that may hold PostgreSQL's programs: PG_BIN, then PATH, then Debian's, newest first. */
function candidates() {
  const debian = existsSync(debianFolder) ? readdirSync(debianFolder).sort((a, b) => Number(b) - Number(a)) : [];
  return [
    ...(process.env.PG_BIN ? [process.env.PG_BIN] : []),
    ...(process.env.PATH ?? '').split(delimiter).filter(Boolean),
    ...debian.map((version) => join(debianFolder, version, 'bin')),
  ];
}

/** Major version of the PostgreSQL in a folder, or null when the folder lacks one of the programs needed. */
function versionIn(folder) {
  if (!['postgres', 'initdb', 'pg_ctl'].every((name) => existsSync(join(folder, name)))) return null;
  const answer = spawnSync(join(folder, 'postgres'), ['--version'], { encoding: 'utf8' });
  const found = /\(PostgreSQL\) (\d+)/.exec(answer.stdout ?? '');
  return found ? Number(found[1]) : null;
}

function findPrograms() {
  for (const folder of candidates()) {
    // Programs on the PATH are often links: the neighbours of the real file count.
    const real = existsSync(join(folder, 'postgres')) ? dirname(realpathSync(join(folder, 'postgres'))) : folder;
    const version = versionIn(real);
    if (version !== null && version >= oldestVersion) return real;
  }
  return null;
}

/** The folder of PostgreSQL's programs; installs Debian's package when there is none. */
export function postgresPrograms() {
  const found = findPrograms();
  if (found) return found;
  forbidDebianCluster();
  aptInstall(['postgresql'], `set PG_BIN to the folder of PostgreSQL ${oldestVersion} or newer, or DATABASE_URL to a data base of your own`);
  const installed = findPrograms();
  if (!installed) throw new Mendable(`PostgreSQL ${oldestVersion} or newer was not found after the installation: set PG_BIN to the folder with its programs.`);
  return installed;
}

/** PostgreSQL refuses to run as root, so root lends it the user 'postgres' of Debian's package. */
export function postgresUser() {
  if (process.getuid() !== 0) return {};
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith('postgres:'));
  if (!line) throw new Mendable("PostgreSQL will not run as root and there is no user 'postgres': run 'adduser --system --group postgres' and start again.");
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

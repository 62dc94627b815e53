import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { Mendable, run, tell } from './tell.mjs';

const aptEnv = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
// Another process often holds apt's lock on a fresh machine: wait for it instead of failing.
const patience = ['-o', 'DPkg::Lock::Timeout=300'];

/** How this user may run apt-get: as root, through a sudo that asks nothing, or not at all (null). */
function aptCommand() {
  if (!existsSync('/usr/bin/apt-get')) return null;
  if (process.getuid() === 0) return ['apt-get'];
  const sudo = spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' });
  return sudo.status === 0 ? ['sudo', '-n', 'DEBIAN_FRONTEND=noninteractive', 'apt-get'] : null;
}

/**
 * Installs Debian packages.
 * @throws Mendable naming the command to type, and `otherwise`, when this user may not install.
 */
export function aptInstall(packages, otherwise) {
  const apt = aptCommand();
  const byHand = `sudo apt-get update && sudo apt-get install -y ${packages.join(' ')}`;
  if (!apt) throw new Mendable(`Missing: ${packages.join(', ')}. Run '${byHand}'${otherwise ? `, or ${otherwise}` : ''}, then start again.`);
  tell(`Installing ${packages.join(', ')} from Debian's packages …`);
  const [program, ...first] = apt;
  const mend = `apt-get could not install ${packages.join(', ')}: check the network and run '${byHand}' to see its reason.`;
  run(program, [...first, ...patience, '-q', 'update'], { env: aptEnv, mend });
  run(program, [...first, ...patience, '-q', '-y', '--no-install-recommends', 'install', ...packages], { env: aptEnv, mend });
}

/** Keeps Debian's package from making and starting a cluster of its own on port 5432. */
export function forbidDebianCluster() {
  const folder = '/etc/postgresql-common/createcluster.d';
  if (process.getuid() !== 0 || existsSync('/etc/postgresql-common/createcluster.conf')) return;
  mkdirSync(folder, { recursive: true });
  writeFileSync(`${folder}/zz-tidemark.conf`, 'create_main_cluster = false\n');
}

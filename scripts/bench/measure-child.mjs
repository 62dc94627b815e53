import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { Mendable, root } from '../set-up/tell.mjs';

const asServer = ['--import', 'tsx', '--conditions=react-server'];

/**
 * Runs scripts/bench/measure.ts, which loads the application's own services, and passes on what it tells.
 * @returns its exit code; 1 when a part could not be measured.
 */
export function measure({ base, url, filesFolder, size, parts, pairs }, heard) {
  const env = {
    ...process.env,
    DATABASE_URL: base.appUrl,
    OWNER_DATABASE_URL: base.ownerUrl,
    NEXTAUTH_URL: url,
    STORAGE: `folder:${filesFolder}`,
    LOG_LEVEL: 'error',
    NODE_ENV: 'production',
  };
  const args = [...asServer, join(root, 'scripts/bench/measure.ts'), '--url', url, '--participants', String(size), '--pairs', String(pairs), '--parts', parts.join(',')];
  const child = spawn(process.execPath, args, { cwd: root, env, stdio: ['ignore', 'inherit', 'inherit', 'ipc'] });
  child.on('message', heard);
  return new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('exit', (code, signal) => (code === null ? reject(new Mendable(`The measuring process was ended (${signal}).`)) : resolve(code)));
  });
}

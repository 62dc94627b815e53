import { existsSync } from 'node:fs';
import { aptInstall } from './debian.mjs';
import { Mendable } from './tell.mjs';

const program = '/usr/bin/chromium';

/** Installs Debian's Chromium for the browser tests where it is missing. */
export function ensureChromium() {
  if (existsSync(program)) return;
  aptInstall(['chromium'], undefined);
  if (!existsSync(program)) throw new Mendable(`Chromium was installed but ${program} is missing: run 'sudo apt-get install --reinstall chromium' and start again.`);
}

import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { Mendable, root, run, tell } from './tell.mjs';

const oldestNode = [20, 19];

/** @throws Mendable when this Node is too old for the packages. */
export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  const tooOld = major < oldestNode[0] || (major === oldestNode[0] && minor < oldestNode[1]);
  if (tooOld) throw new Mendable(`Node ${oldestNode.join('.')} or newer is needed and this is ${process.versions.node}: install it and start again.`);
}

/** Whether node_modules holds what package-lock.json names: npm writes a lock of its own there when it has finished. */
function packagesFit() {
  const written = join(root, 'node_modules/.package-lock.json');
  if (!existsSync(written)) return false;
  const read = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;
  const installed = read(written);
  return Object.entries(read(join(root, 'package-lock.json')))
    .filter(([path, wanted]) => path !== '' && !wanted.optional)
    .every(([path, wanted]) => installed[path]?.version === wanted.version);
}

/** Installs the packages when they differ from the lock. */
export function ensurePackages() {
  if (packagesFit()) return;
  tell('Installing packages …');
  const args = ['ci', '--include=dev', '--no-audit', '--no-fund'];
  const mend = "The packages could not be installed: check the network and the free space, delete 'node_modules' and start again.";
  const npm = process.env.npm_execpath;
  if (npm?.endsWith('.js')) run(process.execPath, [npm, ...args], { mend });
  else run('npm', args, { mend });
}

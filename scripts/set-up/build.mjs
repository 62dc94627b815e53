import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { root, run, tell } from './tell.mjs';

const stamp = join(root, '.next/inputs');
const nextProgram = join(root, 'node_modules/next/dist/bin/next');
/** Files at the root that change what is built. */
const rootFile = /\.(ts|mjs)$|^package-lock\.json$|^tsconfig\.json$/;
const folders = ['app', 'components', 'entities', 'fonts', 'instruments', 'lib', 'migrations', 'public', 'stats'];

function filesBelow(folder) {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name));
}

/** One hash over everything the build reads. */
function inputsHash() {
  const atRoot = readdirSync(root).filter((name) => rootFile.test(name) && name !== 'next-env.d.ts').map((name) => join(root, name));
  const hash = createHash('sha256');
  for (const file of [...atRoot, ...folders.flatMap((name) => filesBelow(join(root, name)))].sort()) {
    hash.update(file.slice(root.length)).update('\0').update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

/** Builds the application when its inputs changed since the last complete build. */
export function ensureBuild(env) {
  const wanted = inputsHash();
  if (existsSync(join(root, '.next/BUILD_ID')) && existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) return;
  tell('Building the application (about a minute) …');
  rmSync(stamp, { force: true });
  // Types left by the development server name routes that may be gone and would fail the build.
  rmSync(join(root, '.next/dev'), { recursive: true, force: true });
  run(process.execPath, [nextProgram, 'build'], { env, mend: 'The build failed: mend what it names above and start again.' });
  writeFileSync(stamp, wanted);
}

/** Program and arguments that serve the application on the loopback. */
export function serveArgs(mode, port) {
  return [nextProgram, mode, '-H', '127.0.0.1', '-p', String(port)];
}

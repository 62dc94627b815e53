/**
 * `npm run bench`: what the application takes beside the least it could take, both measured in the same run.
 *
 *   npm run bench                                   at 200 and at 20,000 participants (the larger seed takes some minutes)
 *   npm run bench -- --participants 200             one size
 *   npm run bench -- --only list,today              some parts: save, list, today, extract, pages
 *   npm run bench -- --pairs 15                     fewer paired runs
 *   npm run bench -- --keep                         takes up the data bases of an earlier run where they stand
 *
 * Everything runs in a cluster of its own (.data/pg-bench), which is left stopped. Nothing fails for being slow: figures from a
 * busy machine are for reading side by side, never for a limit.
 */
import { mkdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { measure } from './bench/measure-child.mjs';
import { printFigures, progressLine } from './bench/print.mjs';
import { ensureDatabase } from './pg.mjs';
import { ensureChromium } from './set-up/chromium.mjs';
import { checkNode, ensurePackages } from './set-up/packages.mjs';
import { migrate, seed, startServices } from './set-up/services.mjs';
import { dataFolder, fail, Mendable, tell } from './set-up/tell.mjs';

const allParts = ['save', 'list', 'today', 'extract', 'pages'];

function readOptions() {
  const { values } = parseArgs({
    options: {
      participants: { type: 'string', default: '200,20000' },
      only: { type: 'string', default: allParts.join(',') },
      pairs: { type: 'string', default: '25' },
      keep: { type: 'boolean', default: false },
    },
  });
  const sizes = values.participants.split(',').map(Number);
  const parts = values.only.split(',');
  const pairs = Number(values.pairs);
  if (sizes.some((size) => !Number.isInteger(size) || size < 3)) throw new Mendable(`--participants takes whole numbers such as 200,20000, not '${values.participants}'.`);
  const unknown = parts.filter((part) => !allParts.includes(part));
  if (unknown.length > 0) throw new Mendable(`--only takes ${allParts.join(', ')}, not '${unknown.join(', ')}'.`);
  if (!Number.isInteger(pairs) || pairs < 1) throw new Mendable(`--pairs takes a whole number, not '${values.pairs}'.`);
  return { sizes, parts, pairs, keep: values.keep };
}

/** What stands while a size is measured, so that Ctrl-C puts it away: its processes stand in groups of their own. */
const standing = { services: null, base: null };

async function putAway() {
  const { services, base } = standing;
  Object.assign(standing, { services: null, base: null });
  await services?.stop();
  base?.stop();
}

/** Serves one size and measures the parts over it. */
async function measureSize(size, { parts, pairs, keep }, heard) {
  const folder = join(dataFolder, 'bench', String(size));
  if (!keep) rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const filesFolder = join(folder, 'files');
  const base = await ensureDatabase({ name: 'pg-bench', database: `bench_${size}`, fresh: !keep });
  standing.base = base;
  try {
    migrate(base);
    seed({ ...base, filesFolder }, ['--if-empty', '--light', '--participants', String(size)]);
    standing.services = await startServices({ appUrl: base.appUrl, mode: 'start', folder });
    return await measure({ base, url: standing.services.url, filesFolder, size, parts, pairs }, heard);
  } finally {
    await putAway();
  }
}

async function bench() {
  const options = readOptions();
  checkNode();
  ensurePackages();
  if (options.parts.includes('pages')) ensureChromium();
  // What the user has set for the application must not lead the bench to other data.
  for (const name of ['DATABASE_URL', 'OWNER_DATABASE_URL', 'NEXTAUTH_URL', 'SMTP_URL', 'STORAGE']) delete process.env[name];
  const told = [];
  for (const [index, size] of options.sizes.entries()) {
    // A page's scripts do not depend on how many participants there are.
    const parts = options.parts.filter((part) => part !== 'pages' || index === 0);
    if (parts.length === 0) continue;
    const code = await measureSize(size, { ...options, parts }, (one) => {
      told.push(one);
      tell(progressLine(one));
    });
    if (code !== 0) process.exitCode = 1;
  }
  printFigures(told, tell);
}

for (const sign of ['SIGINT', 'SIGTERM']) process.once(sign, () => void putAway().then(() => process.exit(1), fail));

bench().catch(fail);

/**
 * `npm test`: prepares everything, then runs types, lint, unit, data base and browser tests.
 * Its last line is 'N passed, N failed', and it fails when anything did.
 *
 *   npm test -- --only=unit,db          some parts: types, lint, unit, db, e2e
 *   npm test -- --only=e2e -- consent   what follows the second -- goes to the parts' own runners
 */
import { existsSync, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { keepFile } from './pg.mjs';
import { ensureChromium } from './set-up/chromium.mjs';
import { stopCluster } from './set-up/cluster.mjs';
import { checkNode, ensurePackages } from './set-up/packages.mjs';
import { command, playwrightCounts, vitestCounts } from './set-up/test-counts.mjs';
import { withTestServers } from './set-up/test-servers.mjs';
import { dataFolder, fail, Mendable, root, tell } from './set-up/tell.mjs';

const bin = (path) => join(root, 'node_modules', path);
const next = bin('next/dist/bin/next');
const results = join(dataFolder, 'test');

/** Each part answers with how many checks passed, failed and were skipped. */
const parts = {
  types: async () => command('types', [[next, 'typegen'], [bin('typescript/bin/tsc'), '--noEmit']]),
  lint: async () => command('lint', [[bin('eslint/bin/eslint.js'), '.', '--max-warnings', '0']]),
  unit: async (extra) => vitest('unit', extra),
  db: async (extra) => vitest('db', extra),
  e2e: async (extra) => {
    ensureChromium();
    return withTestServers((env) => playwrightCounts(bin('@playwright/test/cli.js'), join(results, 'e2e.json'), extra, env));
  },
};

function vitest(project, extra) {
  return vitestCounts(bin('vitest/vitest.mjs'), project, join(results, `${project}.json`), extra);
}

function chosenParts(flags) {
  const only = flags.find((flag) => flag.startsWith('--only='))?.slice('--only='.length).split(',') ?? Object.keys(parts);
  const unknown = only.filter((name) => !(name in parts));
  if (unknown.length > 0) throw new Mendable(`There is no part '${unknown.join(', ')}': choose among ${Object.keys(parts).join(', ')}.`);
  return Object.keys(parts).filter((name) => only.includes(name));
}

async function runPart(name, extra) {
  const began = Date.now();
  tell(`\n=== ${name} ===`);
  // One part that cannot run is a failure of that part; the others still tell their own.
  const counts = await parts[name](extra).catch((error) => {
    tell(error instanceof Mendable ? error.message : error.stack);
    return { passed: 0, failed: 1, skipped: 0 };
  });
  return { name, ...counts, seconds: Math.round((Date.now() - began) / 1000) };
}

async function main(args) {
  process.env.NEXT_TELEMETRY_DISABLED = '1';
  const divide = args.indexOf('--');
  const names = chosenParts(divide < 0 ? args : args.slice(0, divide));
  const extra = divide < 0 ? [] : args.slice(divide + 1);
  checkNode();
  ensurePackages();
  mkdirSync(results, { recursive: true });
  // Told to stop, the part in hand ends and puts away what it started; the rest is not begun.
  let told = false;
  for (const sign of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(sign, () => (told = true));
  const done = [];
  for (const name of names) if (!told) done.push(await runPart(name, extra));
  if (told) {
    if (!existsSync(keepFile('pg-test'))) stopCluster('pg-test');
    throw new Mendable('Stopped before the end.');
  }
  const sum = (key) => done.reduce((total, part) => total + part[key], 0);
  tell('');
  for (const { name, passed, failed, skipped, seconds } of done) tell(`${name.padEnd(6)} ${passed} passed, ${failed} failed, ${skipped} skipped in ${seconds} s`);
  tell(`${sum('passed')} passed, ${sum('failed')} failed`);
  process.exit(sum('failed') > 0 || sum('passed') === 0 ? 1 : 0);
}

main(process.argv.slice(2)).catch(fail);

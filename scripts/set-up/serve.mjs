import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { demoAccounts } from '../demo-accounts.mjs';
import { ensureDatabase } from '../pg.mjs';
import { firstToEnd, killGroup } from './children.mjs';
import { checkNode, ensurePackages } from './packages.mjs';
import { migrate, seed, startServices } from './services.mjs';
import { dataFolder, fail, Mendable, tell } from './tell.mjs';

const runFile = join(dataFolder, 'run.json');
// npm passes on a Ctrl-C that the terminal has sent already, so a second signal counts only after a while.
const impatientAfterMs = 2000;

function isOurs(pid) {
  const commandLine = `/proc/${pid}/cmdline`;
  return existsSync(commandLine) && /scripts\/(start|dev)\.mjs/.test(readFileSync(commandLine, 'utf8'));
}

/** Refuses a second instance on the same data, and ends what an instance left behind that was ended by force. */
function claimClone() {
  mkdirSync(dataFolder, { recursive: true });
  if (existsSync(runFile)) {
    const { pid, url, children = [] } = JSON.parse(readFileSync(runFile, 'utf8'));
    if (isOurs(pid)) throw new Mendable(`Tidemark already runs at ${url ?? 'an address of its own'}: stop it with Ctrl-C in its window or 'kill ${pid}', then start again.`);
    for (const left of children) if (isLeftOver(left)) killGroup(left);
  }
  writeFileSync(runFile, JSON.stringify({ pid: process.pid }));
}

function isLeftOver({ pid, startedAt }) {
  return startedAt !== null && processStart(pid) === startedAt;
}

/** When a process began, in the kernel's ticks: tells a process from a later one that got the same number. */
function processStart(pid) {
  const file = `/proc/${pid}/stat`;
  if (!existsSync(file)) return null;
  return readFileSync(file, 'utf8').split(') ')[1]?.split(' ')[19] ?? null;
}

function printAddress(url, mailUrl) {
  const widest = Math.max(...demoAccounts.map(({ roleLabel }) => roleLabel.length));
  tell(`\nTidemark is ready at ${url}\n`);
  tell('Demonstration sign-ins (invented people and data; password in the last column):');
  for (const { roleLabel, siteName, email, password } of demoAccounts) {
    tell(`  ${roleLabel.padEnd(widest)}  ${(siteName ?? 'whole study').padEnd(11)}  ${email.padEnd(36)} ${password}`);
  }
  if (mailUrl) tell(`\nLetters are captured, not sent: read them at ${url}/mailbox`);
  tell('Ctrl-C stops everything; the data stays.');
}

/** `npm start` and `npm run dev`: from a clean clone to a served application, until told to stop. */
export async function serve(mode) {
  checkNode();
  claimClone();
  const running = { base: null, services: null };
  const told = untilTold(() => running.services?.children ?? []);
  try {
    await bringUp(mode, running);
    const end = await Promise.race([told, firstToEnd(running.services.children)]);
    if (end instanceof Mendable) throw end;
    tell('\nStopping …');
  } catch (error) {
    await putAway(running);
    fail(error);
  }
  await putAway(running);
  tell('Stopped. The data is kept.');
  process.exit(0);
}

/** Notes in `running` what it has started, so that a failure half-way is put away too. */
async function bringUp(mode, running) {
  ensurePackages();
  running.base = await ensureDatabase();
  migrate(running.base);
  seed({ ...running.base, filesFolder: join(dataFolder, 'files') });
  const preferredPort = Number(process.env.PORT) || 3000;
  running.services = await startServices({ appUrl: running.base.appUrl, mode, folder: dataFolder, preferredPort });
  const { url, mailUrl } = running.services;
  const children = running.services.children.map(({ child }) => ({ pid: child.pid, startedAt: processStart(child.pid) }));
  writeFileSync(runFile, JSON.stringify({ pid: process.pid, url, children }));
  printAddress(url, mailUrl);
}

async function putAway({ base, services }) {
  await services?.stop();
  base?.stop();
  rmSync(runFile, { force: true });
}

/** Resolves at the first Ctrl-C or SIGTERM; a later one ends the children by force. */
function untilTold(children) {
  return new Promise((resolve) => {
    let first = null;
    const hear = () => {
      if (first !== null && Date.now() - first > impatientAfterMs) for (const { child } of children()) killGroup(child);
      first ??= Date.now();
      resolve('told');
    };
    for (const sign of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(sign, hear);
    // npm may be ended without passing the signal on: nothing is left serving behind its back.
    const parent = process.ppid;
    if (process.env.npm_lifecycle_event) setInterval(() => process.ppid !== parent && hear(), 1000).unref();
  });
}

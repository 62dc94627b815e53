import { spawn } from 'node:child_process';
import { closeSync, mkdirSync, openSync } from 'node:fs';
import { join } from 'node:path';
import { dataFolder, Mendable, root } from './tell.mjs';

const readyWithinMs = 90_000;
const stopWithinMs = 30_000;

const ended = (child) => child.exitCode !== null || child.signalCode !== null;

/**
 * Starts a program of ours whose output goes to `.data/log/<name>.log`. It runs in a group of its own, so that Ctrl-C reaches
 * this process alone, which then stops everything in order.
 *
 * @param options.ipc the program tells its parent when it is ready and ends when the parent is gone.
 */
export function startChild(name, args, { env, ipc = false, logFolder = join(dataFolder, 'log') }) {
  mkdirSync(logFolder, { recursive: true });
  const logFile = join(logFolder, `${name}.log`);
  const out = openSync(logFile, 'w', 0o600);
  const child = spawn(process.execPath, args, { cwd: root, env, detached: true, stdio: ipc ? ['ignore', out, out, 'ipc'] : ['ignore', out, out] });
  closeSync(out);
  return { name, child, logFile };
}

function endedSentence({ name, child, logFile }) {
  return new Mendable(`The ${name} process ended by itself (${child.exitCode ?? child.signalCode}): read ${logFile} for its reason.`);
}

/** The first message of a child started with `ipc`. */
export function firstMessage(started) {
  const { name, child, logFile } = started;
  return new Promise((resolve, reject) => {
    const late = setTimeout(() => reject(new Mendable(`The ${name} process was not ready in time: read ${logFile}.`)), readyWithinMs);
    child.once('message', (message) => {
      clearTimeout(late);
      resolve(message);
    });
    child.once('exit', () => {
      clearTimeout(late);
      reject(endedSentence(started));
    });
  });
}

/** Waits until an address answers with anything at all. */
export async function answering(started, url) {
  const until = Date.now() + readyWithinMs;
  while (Date.now() < until) {
    if (ended(started.child)) throw endedSentence(started);
    try {
      const response = await fetch(url, { redirect: 'manual', signal: AbortSignal.timeout(30_000) });
      await response.body?.cancel();
      return;
    } catch {
      // Refused while the server is still starting: ask again.
      await new Promise((resolve) => setTimeout(resolve, 200));
    }
  }
  throw new Mendable(`The ${started.name} process did not answer at ${url} in time: read ${started.logFile}.`);
}

/** Resolves with a sentence when the first of the children ends by itself. */
export function firstToEnd(children) {
  return new Promise((resolve) => {
    for (const started of children) {
      if (ended(started.child)) resolve(endedSentence(started));
      started.child.once('exit', () => resolve(endedSentence(started)));
    }
  });
}

/** Asks a child to stop and waits; after half a minute it is ended by force, with all that it started. */
export function stopChild({ child }) {
  if (ended(child)) return Promise.resolve();
  return new Promise((resolve) => {
    const late = setTimeout(() => killGroup(child), stopWithinMs);
    child.once('exit', () => {
      clearTimeout(late);
      resolve();
    });
    child.kill('SIGTERM');
  });
}

/** Ends a child's whole group at once. */
export function killGroup(child) {
  try {
    process.kill(-child.pid, 'SIGKILL');
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

/** The root of the clone, without a slash at its end. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Everything the set-up makes lives below this folder, which git ignores. */
export const dataFolder = `${root}/.data`;

/** A failure that its reader can mend: its message is one sentence that says how. */
export class Mendable extends Error {}

export function tell(text) {
  process.stdout.write(`${text}\n`);
}

/** Ends the process after a failure: a mendable one with its sentence alone, any other with its stack. */
export function fail(error) {
  process.stderr.write(`\n${error instanceof Mendable ? error.message : (error.stack ?? error)}\n`);
  process.exit(1);
}

/**
 * Runs a program to its end and shows what it prints.
 * @throws Mendable with `mend` when the program fails.
 */
export function run(program, args, { mend, env = process.env, cwd = root } = {}) {
  const done = spawnSync(program, args, { cwd, env, stdio: 'inherit' });
  if (done.error || done.status !== 0) {
    const why = done.error?.message ?? `exit ${done.status ?? done.signal}`;
    throw new Mendable(mend ? `${mend} (${why})` : `'${program} ${args.join(' ')}' failed (${why}).`);
  }
}

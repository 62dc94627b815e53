import { spawn } from 'node:child_process';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { root, tell } from './tell.mjs';

/** Runs one of node's programs, shows its output, and resolves with its exit code. */
function node(args, env = process.env) {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, args, { cwd: root, env, stdio: 'inherit' });
    // Ctrl-C reaches the child by itself, SIGTERM does not.
    const passOn = () => child.kill('SIGTERM');
    process.on('SIGTERM', passOn);
    child.once('error', reject);
    child.once('exit', (code) => {
      process.off('SIGTERM', passOn);
      resolve(code ?? 1);
    });
  });
}

/** Programs that answer yes or no count as one check together. */
export async function command(name, programs) {
  for (const args of programs) {
    if ((await node(args)) !== 0) {
      tell(`${name}: failed`);
      return { passed: 0, failed: 1, skipped: 0 };
    }
  }
  tell(`${name}: passed`);
  return { passed: 1, failed: 0, skipped: 0 };
}

/** A runner that failed as a whole (a file that could not be loaded, a global set-up) without a failed test is a failure too. */
function withRunner(counts, code) {
  return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
}

function read(file) {
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null;
}

export async function vitestCounts(program, project, file, extra) {
  rmSync(file, { force: true });
  const code = await node([program, 'run', '--project', project, '--reporter=dot', '--reporter=json', `--outputFile.json=${file}`, ...extra]);
  const report = read(file);
  const counts = { passed: report?.numPassedTests ?? 0, failed: report?.numFailedTests ?? 0, skipped: (report?.numPendingTests ?? 0) + (report?.numTodoTests ?? 0) };
  return withRunner(counts, code);
}

export async function playwrightCounts(program, file, extra, env) {
  rmSync(file, { force: true });
  const code = await node([program, 'test', ...extra], { ...env, E2E_RESULTS: file });
  const stats = read(file)?.stats;
  // A test that passed only when repeated is not trusted: no retries are set, and a flaky one counts as failed.
  const counts = { passed: stats?.expected ?? 0, failed: (stats?.unexpected ?? 0) + (stats?.flaky ?? 0), skipped: stats?.skipped ?? 0 };
  return withRunner(counts, code);
}

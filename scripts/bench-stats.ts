/**
 * Times the statistics beside R on the same seeded numbers.
 *
 *   npm run bench:stats                 all tasks
 *   npm run bench:stats -- cox          tasks whose name holds 'cox'
 *   npm run bench:stats -- --runs 1     fewer paired runs
 *
 * A pair is our run and R's, one after the other; the ratio is the median over
 * pairs, because a shared machine is noisy. Ends with 1 when an answer differs
 * from R's or a ratio is over its limit.
 */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import { measurePeak, peakOf } from './bench-stats/memory';
import { missingPackages, startR, type RProcess } from './bench-stats/r-process';
import type { BenchTask } from './bench-stats/task';
import { tasks } from './bench-stats/tasks';

const MOST_MEMORY = 10;

const { values, positionals } = parseArgs({ allowPositionals: true, options: { runs: { type: 'string' }, memory: { type: 'string' } } });

if (values.memory !== undefined) await measurePeak(tasks.find(({ name }) => name === values.memory)!);
else await main();

async function main(): Promise<void> {
  const chosen = tasks.filter(({ name }) => positionals.length === 0 || positionals.some((part) => name.includes(part)));
  const missing = missingPackages();
  const folder = mkdtempSync(join(tmpdir(), 'bench-stats-'));
  const r = missing.length === 0 ? startR(folder) : undefined;
  if (!r) console.log(`R is not beside us: our times alone, compared with nothing. Debian packages missing: ${missing.join(' ')}\n`);
  try {
    await compare(chosen, r, folder);
    showGrowth(chosen);
    showMemory(chosen);
  } finally {
    r?.close();
    rmSync(folder, { recursive: true });
  }
}

async function compare(chosen: readonly BenchTask[], r: RProcess | undefined, folder: string): Promise<void> {
  row('task', 'rows', 'ours ms', 'R ms', 'ours/R', 'limit', 'answer');
  for (const task of chosen) {
    const n = task.comparedSize ?? task.sizes[2];
    const columns = task.data(n);
    if (r) for (const [name, column] of Object.entries(columns)) writeFileSync(join(folder, `${task.name}.${name}.f64`), Buffer.from(column.buffer));
    const { run } = task.prepare(columns);
    run(); // warm, as R's byte code is after its first call
    const ours: number[] = [];
    const theirs: number[] = [];
    let worst = 0;
    for (let k = 0; k < (values.runs === undefined ? task.runs : Number(values.runs)); k++) {
      const [seconds, value] = timed(run);
      ours.push(seconds);
      if (!r) continue;
      const answer = await r.ask(task.name, task.name);
      theirs.push(answer.seconds);
      worst = Math.max(worst, farthest(value, answer.value));
    }
    if (!r) {
      row(task.name, n, milliseconds(median(ours)), '-', '-', task.limit, '-');
      continue;
    }
    const ratio = median(ours.map((seconds, k) => seconds / theirs[k]!));
    const same = worst <= task.tolerance;
    const limit = `${task.limit}${ratio > task.limit ? ' OVER' : ''}`;
    row(task.name, n, milliseconds(median(ours)), milliseconds(median(theirs)), ratio.toPrecision(2), limit, `${same ? 'same to' : 'DIFFERENT by'} ${worst.toExponential(0)}`);
    if (!same || ratio > task.limit) process.exitCode = 1;
  }
}

/** The power of n that the time grows with from the smallest size to the largest; n log n reads as about 1.1. */
function showGrowth(chosen: readonly BenchTask[]): void {
  console.log('\nGrowth (our best of five, ms)');
  row('task', 'three sizes', 'ms', 'ms', 'ms', 'power', '');
  for (const task of chosen) {
    const times = task.sizes.map((n) => {
      const { run } = task.prepare(task.data(n));
      run();
      return Math.min(...[0, 1, 2, 3, 4].map(() => timed(run)[0]));
    });
    const power = Math.log(times[2]! / times[0]!) / Math.log(task.sizes[2] / task.sizes[0]);
    row(task.name, task.sizes.map((n) => n.toExponential(0)).join(' '), ...times.map(milliseconds), power.toFixed(2), '');
  }
}

function showMemory(chosen: readonly BenchTask[]): void {
  console.log('\nMemory (peak of one call over its input)');
  for (const task of chosen) {
    const peak = peakOf(task);
    if (peak === null) {
      console.log('not measured: this system does not tell the peak of a process');
      return;
    }
    const share = peak.bytes / peak.inputBytes;
    row(task.name, task.memorySize ?? task.sizes[2], `${(peak.inputBytes / 1e6).toFixed(1)} MB in`, `${(peak.bytes / 1e6).toFixed(1)} MB`, `x ${share.toFixed(1)}`, share > MOST_MEMORY ? 'OVER' : '', '');
    if (share > MOST_MEMORY) process.exitCode = 1;
  }
}

function timed(run: () => readonly number[]): [number, readonly number[]] {
  const start = performance.now();
  const value = run();
  return [(performance.now() - start) / 1000, value];
}

/** Largest relative difference, number by number; Infinity when the answers have different lengths. */
function farthest(a: readonly number[], b: readonly number[]): number {
  if (a.length !== b.length) return Infinity;
  return Math.max(...a.map((value, k) => Math.abs(value - b[k]!) / Math.max(Math.abs(b[k]!), 1e-12)));
}

function median(list: readonly number[]): number {
  const sorted = [...list].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : (sorted[half - 1]! + sorted[half]!) / 2;
}

function milliseconds(seconds: number): string {
  return (1000 * seconds).toFixed(seconds < 0.01 ? 2 : 0);
}

function row(...cells: readonly (string | number)[]): void {
  const widths = [26, 17, 12, 10, 8, 10, 20];
  console.log(cells.map((cell, k) => (k === 0 ? String(cell).padEnd(widths[k]!) : String(cell).padStart(widths[k]!))).join(' '));
}

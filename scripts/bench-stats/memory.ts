/** Peak memory of one call, in a process of its own. */
import { execFileSync } from 'node:child_process';
import { setTimeout } from 'node:timers/promises';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { BenchTask } from './task';

const RESET = '/proc/self/clear_refs';
const script = fileURLToPath(new URL('../bench-stats.ts', import.meta.url));

/** Bytes that the call took at its peak beyond what was there before it, or null where the system does not tell. */
export function peakOf(task: BenchTask): { readonly bytes: number; readonly inputBytes: number } | null {
  if (!existsSync(RESET)) return null;
  const out = execFileSync(process.execPath, ['--expose-gc', '--import', 'tsx', script, '--memory', task.name], { encoding: 'utf8' });
  return JSON.parse(out) as { bytes: number; inputBytes: number };
}

/** The child's part: warm the code on a small input, clear the high-water mark, run once. */
export async function measurePeak(task: BenchTask): Promise<void> {
  const small = task.prepare(task.data(task.sizes[0]));
  for (let i = 0; i < 3; i++) small.run();
  const { inputBytes, run } = task.prepare(task.data(task.memorySize ?? task.sizes[2]));
  globalThis.gc?.();
  await setTimeout(200); // freed buffers go back to the system in the background
  globalThis.gc?.();
  writeFileSync(RESET, '5');
  const before = status('VmRSS');
  run();
  console.log(JSON.stringify({ bytes: status('VmHWM') - before, inputBytes }));
}

function status(name: string): number {
  const line = readFileSync('/proc/self/status', 'utf8').split('\n').find((one) => one.startsWith(`${name}:`));
  return 1024 * Number(line?.replace(/\D/g, ''));
}

import { requireRange } from '../result';
import type { ReplicateRange } from './resample';
import { runRange, type BootstrapTask } from './task';

/** Runs one range somewhere: in this thread, in a worker thread, on another machine. */
export type RunRange = (task: BootstrapTask, range: ReplicateRange) => Promise<Float64Array>;

/**
 * A whole run in parts, put together in replicate order. The parts change where
 * the work is done and nothing else: each replicate has its own stream.
 *
 * @param parts how many ranges to share out; 1 runs it in one piece.
 * @param run where a range is run; this thread unless given.
 * @throws RangeError for fewer than one replicate or part.
 */
export async function runShared(
  task: BootstrapTask,
  { seed, replicates }: { readonly seed: number; readonly replicates: number },
  parts = 1,
  run: RunRange = (own, range) => Promise.resolve(runRange(own, range)),
): Promise<Float64Array> {
  requireRange(Number.isInteger(replicates) && replicates > 0, `A run has one replicate or more, not ${replicates}.`);
  requireRange(Number.isInteger(parts) && parts > 0, `A run has one part or more, not ${parts}.`);
  const ranges = Array.from({ length: parts }, (_, part) => ({
    seed,
    from: Math.floor((replicates * part) / parts),
    to: Math.floor((replicates * (part + 1)) / parts),
  }));
  const pieces = await Promise.all(ranges.filter(({ from, to }) => to > from).map((range) => run(task, range)));
  const out = new Float64Array(replicates);
  let at = 0;
  for (const piece of pieces) {
    out.set(piece, at);
    at += piece.length;
  }
  return out;
}

import type { ReplicateRange } from './resample';
import { bootstrapReplicates, type Drawing, type ResampledStatistic } from './resample';
import { resampledMean, resampledMedian, resampledRmst } from './statistics';

/** A statistic and its data in a form that crosses to a worker: a function cannot. */
export type BootstrapTask =
  | { readonly statistic: 'mean' | 'median'; readonly values: Float64Array; readonly clusters?: Int32Array }
  | { readonly statistic: 'rmst'; readonly time: Float64Array; readonly event: Uint8Array; readonly tau: number; readonly clusters?: Int32Array };

export function statisticOf(task: BootstrapTask): ResampledStatistic {
  switch (task.statistic) {
    case 'mean':
      return resampledMean(task.values);
    case 'median':
      return resampledMedian(task.values);
    case 'rmst':
      return resampledRmst(task.time, task.event, task.tau);
  }
}

export function drawingOf(task: BootstrapTask): Drawing {
  const rows = task.statistic === 'rmst' ? task.time.length : task.values.length;
  return task.clusters === undefined ? { rows } : { rows, clusters: task.clusters };
}

/** Replicates of a task in one range; the same in this thread or another. */
export function runRange(task: BootstrapTask, range: ReplicateRange): Float64Array {
  return bootstrapReplicates(statisticOf(task), drawingOf(task), range);
}

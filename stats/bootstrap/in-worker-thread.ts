import { Worker } from 'node:worker_threads';
import type { ReplicateRange } from './resample';
import type { BootstrapTask } from './task';

/**
 * Runs one range in a worker thread of its own (`runShared` takes this as its
 * `run`). The worker is this folder's worker.mjs. A thread costs about half a
 * second to start, so it pays from some ten thousand replicates on.
 *
 * @throws what the worker threw.
 */
export function inWorkerThread(task: BootstrapTask, range: ReplicateRange): Promise<Float64Array> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(new URL('./worker.mjs', import.meta.url), { workerData: { task, range } });
    worker.once('message', (replicates: Float64Array) => {
      resolve(replicates);
      void worker.terminate();
    });
    worker.once('error', reject);
    worker.once('exit', (code) => reject(new Error(`The bootstrap worker ended with ${code} before it answered.`)));
  });
}

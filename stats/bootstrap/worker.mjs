// The thread that runs one range of replicates. Plain JavaScript, because a
// thread starts without the loader for TypeScript and has to register it first.
import { parentPort, workerData } from 'node:worker_threads';
import { register } from 'tsx/esm/api';

register();
const { runRange } = await import('./task.ts');
const replicates = runRange(workerData.task, workerData.range);
parentPort?.postMessage(replicates, [replicates.buffer]);

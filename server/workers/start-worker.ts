import { URL } from 'node:url';
import { Worker } from 'node:worker_threads';

/** A thread that runs a TypeScript module of ours, with a bound on its memory (MB). */
export function startWorker(module: URL, memory: number): Worker {
  return new Worker(new URL('./entry.mjs', import.meta.url), {
    workerData: { module: module.href },
    execArgv: [],
    resourceLimits: { maxOldGenerationSizeMb: memory },
  });
}

// A worker thread starts without the TypeScript loader of its parent: this loads it, then the module the parent names.
import { register } from 'tsx/esm/api';
import { workerData } from 'node:worker_threads';

register();
await import(workerData.module);

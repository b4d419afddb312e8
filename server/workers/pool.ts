import type { URL } from 'node:url';
import { Worker } from 'node:worker_threads';
import { startWorker } from './start-worker.ts';

export type WorkerPool<Q, A> = {
  readonly ask: (question: Q) => Promise<A>;
  readonly close: () => Promise<void>;
};

/** What a thread sends back: the answer, or what its code threw. */
export type WorkerMessage<A> =
  { readonly ok: true; readonly answer: A } | { readonly ok: false; readonly message: string; readonly stack: string };

/** Why a question got no answer although the thread's code did nothing wrong. */
export class WorkerRefusal extends Error {
  readonly why: 'busy' | 'deadline' | 'memory';
  constructor(why: WorkerRefusal['why']) {
    super(`the worker gave up: ${why}`);
    this.why = why;
  }
}

type Settings = {
  readonly module: URL;
  readonly threads: number;
  /** Questions that may wait for a thread before the next is turned away. */
  readonly waiting: number;
  /** Bound on a thread's memory, MB. */
  readonly memory: number;
  /** Time for one answer, ms, beside what a new thread needs to start; the thread is ended when it takes longer. */
  readonly deadline: number;
};

/** Time a new thread may take to load its code on a busy machine, ms. */
const startTime = 10_000;

type Task<Q, A> = { readonly question: Q; resolve(answer: A): void; reject(error: Error): void };

/** Threads for pure computing, each started when first needed, so that the server goes on answering meanwhile. */
export function createPool<Q, A>({ module, threads, waiting, memory, deadline }: Settings): WorkerPool<Q, A> {
  const queue: Task<Q, A>[] = [];
  const idle: Worker[] = [];
  const busy = new Map<Worker, { readonly task: Task<Q, A>; readonly timer: NodeJS.Timeout }>();

  const give = () => {
    while (queue.length > 0) {
      const waited = idle.pop();
      const worker = waited ?? (busy.size < threads ? start() : null);
      const task = worker ? queue.shift() : undefined;
      if (!worker || !task) return;
      // a new thread must load its code first, which says nothing about the question
      busy.set(worker, { task, timer: endAfter(worker, waited ? deadline : deadline + startTime) });
      worker.ref();
      worker.postMessage(task.question);
    }
  };

  const endAfter = (worker: Worker, time: number): NodeJS.Timeout =>
    setTimeout(() => {
      drop(worker)?.reject(new WorkerRefusal('deadline'));
      void worker.terminate();
      give();
    }, time);

  /** Takes the thread out of the books; gives the task it was at. */
  const drop = (worker: Worker): Task<Q, A> | undefined => {
    const at = busy.get(worker);
    clearTimeout(at?.timer);
    busy.delete(worker);
    const free = idle.indexOf(worker);
    if (free >= 0) idle.splice(free, 1);
    return at?.task;
  };

  const start = (): Worker => {
    const worker = startWorker(module, memory);
    worker.on('message', (message: WorkerMessage<A> | 'ready') => {
      if (message === 'ready') {
        const at = busy.get(worker);
        clearTimeout(at?.timer);
        if (at) busy.set(worker, { ...at, timer: endAfter(worker, deadline) });
        return;
      }
      const task = drop(worker);
      worker.unref(); // an idle thread keeps no process alive
      idle.push(worker);
      if (message.ok) task?.resolve(message.answer);
      else task?.reject(Object.assign(new Error(message.message), { stack: message.stack }));
      give();
    });
    worker.on('error', (error: Error & { code?: string }) => {
      drop(worker)?.reject(error.code === 'ERR_WORKER_OUT_OF_MEMORY' ? new WorkerRefusal('memory') : error);
      give();
    });
    return worker;
  };

  return {
    ask: (question) =>
      new Promise((resolve, reject) => {
        if (queue.length >= waiting) {
          reject(new WorkerRefusal('busy'));
          return;
        }
        queue.push({ question, resolve, reject });
        give();
      }),
    close: async () => {
      await Promise.all([...idle, ...busy.keys()].map((worker) => worker.terminate()));
    },
  };
}

import { parentPort } from 'node:worker_threads';
import type { WorkerMessage } from './pool.ts';

/** In a worker's module: answers each question of the pool by `answer`. */
export function answerQuestions<Q, A>(answer: (question: Q) => A): void {
  parentPort?.on('message', (question: Q) => {
    let message: WorkerMessage<A>;
    try {
      message = { ok: true, answer: answer(question) };
    } catch (error) {
      const fault = error instanceof Error ? error : new Error(String(error));
      message = { ok: false, message: fault.message, stack: fault.stack ?? '' };
    }
    parentPort?.postMessage(message);
  });
}

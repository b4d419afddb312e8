import { parentPort } from 'node:worker_threads';
import type { WorkerMessage } from './pool.ts';

/** In a worker's module: answers each question of the pool by `answer`. */
export function answerQuestions<Q, A>(answer: (question: Q) => A | Promise<A>): void {
  const answered = async (question: Q): Promise<WorkerMessage<A>> => {
    try {
      return { ok: true, answer: await answer(question) };
    } catch (error) {
      const fault = error instanceof Error ? error : new Error(String(error));
      return { ok: false, message: fault.message, stack: fault.stack ?? '' };
    }
  };
  parentPort?.on('message', (question: Q) => {
    void answered(question).then((message) => parentPort?.postMessage(message));
  });
  // its code is loaded: from now on the time is its own
  parentPort?.postMessage('ready');
}

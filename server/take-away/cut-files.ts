import { URL } from 'node:url';
import { AppError } from '../errors.ts';
import { createPool, WorkerRefusal } from '../workers/pool.ts';
import type { ShownPath } from '../../shared/take-away.ts';
import type { FileAnswer, FileAsked } from './file.ts';
import type { TakenPlan } from './repository.ts';
import type { PathAnswer, PathAsked } from './shown-path.ts';

/** Makes the files of cut paths away from the thread that answers requests, within a time and a memory. */
export type CutFiles = {
  /** 422 with a sentence when a contour can't be cut. */
  make(asked: FileAsked): Promise<Uint8Array>;
  /** The path alone, to be looked at. */
  path(taken: TakenPlan): Promise<ShownPath>;
  close(): Promise<void>;
};

/** Time for one file, s. A sheet of 2,000 corners takes a fifth of it. */
const seconds = 20;

export function createCutFiles(): CutFiles {
  const module = new URL('./cut-file.worker.ts', import.meta.url);
  const pool = createPool<FileAsked | PathAsked, FileAnswer | PathAnswer>({
    module,
    threads: 1,
    waiting: 20,
    memory: 384,
    deadline: seconds * 1000,
  });
  const ask = (asked: FileAsked | PathAsked, what: string) =>
    pool.ask(asked).catch((error: unknown) => {
      if (!(error instanceof WorkerRefusal)) throw error;
      if (error.why === 'busy') throw new AppError('unavailable', 'Too many files at once.', { retryAfter: 5 });
      throw new AppError(
        'unavailable',
        `The ${what} could not be made within ${seconds} s: the plan has too much in it.`,
      );
    });
  return {
    make: async (asked) => {
      const answer = await ask(asked, 'file');
      if (answer.kind === 'none') throw new AppError('no-cut-path', answer.why);
      if (answer.kind !== 'file') throw new Error('the worker answered another question');
      return answer.bytes;
    },
    path: async (taken) => {
      const answer = await ask({ taken, as: 'path' }, 'path');
      if (answer.kind !== 'path') throw new Error('the worker answered another question');
      return answer.path;
    },
    close: () => pool.close(),
  };
}

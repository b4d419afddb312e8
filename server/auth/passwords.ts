import { URL } from 'node:url';
import bcrypt from 'bcryptjs';
import { AppError } from '../errors.ts';
import { createPool, WorkerRefusal } from '../workers/pool.ts';

export type PasswordQuestion =
  | { readonly kind: 'hash'; readonly password: string; readonly cost: number }
  | { readonly kind: 'compare'; readonly password: string; readonly hash: string };
export type PasswordAnswer = { readonly hash: string; readonly matches: boolean };

export type Passwords = {
  hash(password: string): Promise<string>;
  /** With no hash it takes as long as with one and says no: an unknown account must not answer sooner. */
  matches(password: string, hash: string | null): Promise<boolean>;
  close(): Promise<void>;
};

/**
 * Hashes and compares, two at once at most, in threads of their own: a comparison is a good part of a second of pure computing, and
 * sign-ins must not eat the machine. `cost` is bcrypt's, 2^cost rounds; tests may go lower.
 */
export function createPasswords(cost = 12): Passwords {
  const nobody = bcrypt.hashSync('nobody has this password', cost);
  const pool = createPool<PasswordQuestion, PasswordAnswer>({
    module: new URL('./passwords.worker.ts', import.meta.url),
    threads: 2,
    waiting: 60,
    memory: 64,
    deadline: 30_000,
  });
  const ask = async (question: PasswordQuestion) => {
    try {
      return await pool.ask(question);
    } catch (error) {
      if (!(error instanceof WorkerRefusal)) throw error;
      throw new AppError('unavailable', 'Too many people are signing in at once.', { retryAfter: 5 });
    }
  };
  return {
    hash: async (password) => (await ask({ kind: 'hash', password, cost })).hash,
    matches: async (password, hash) => {
      const { matches } = await ask({ kind: 'compare', password, hash: hash ?? nobody });
      return hash !== null && matches;
    },
    close: () => pool.close(),
  };
}

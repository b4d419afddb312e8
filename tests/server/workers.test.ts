import { URL } from 'node:url';
import { afterEach, describe, expect, test } from 'vitest';
import { createPool, type WorkerPool } from '../../server/workers/pool.ts';
import type { Order } from '../support/stubborn.worker.ts';

let pool: WorkerPool<Order, string> | undefined;
afterEach(() => pool?.close());

const made = (change: { waiting?: number; deadline?: number } = {}) => {
  pool = createPool<Order, string>({
    module: new URL('../support/stubborn.worker.ts', import.meta.url),
    threads: 1,
    waiting: 10,
    memory: 64,
    deadline: 20_000,
    ...change,
  });
  return pool;
};

describe('a thread for computing', () => {
  test('answers questions in turn', async () => {
    const { ask } = made();
    expect(await Promise.all(['a', 'b', 'c'].map((text) => ask({ kind: 'echo', text })))).toEqual(['a', 'b', 'c']);
  });

  test('is ended when it takes too long, and the next question finds a new one', async () => {
    const { ask } = made({ deadline: 1500 });
    const hung = expect(ask({ kind: 'hang' })).rejects.toMatchObject({ why: 'deadline' });
    const next = ask({ kind: 'echo', text: 'still here' });
    await hung;
    expect(await next).toBe('still here');
  });

  test('is ended when it wants too much memory, and the server lives on', async () => {
    const { ask } = made();
    await expect(ask({ kind: 'hoard' })).rejects.toMatchObject({ why: 'memory' });
    expect(await ask({ kind: 'echo', text: 'still here' })).toBe('still here');
  });

  test('hands on what its code throws', async () => {
    const { ask } = made();
    await expect(ask({ kind: 'throw' })).rejects.toThrow('told to');
    expect(await ask({ kind: 'echo', text: 'still here' })).toBe('still here');
  });

  test('turns questions away when too many wait already', async () => {
    const { ask } = made({ waiting: 2 });
    const asked = Array.from({ length: 6 }, (_, n) =>
      ask({ kind: 'echo', text: `${n}` }).catch((error: { why: string }) => error.why),
    );
    expect((await Promise.all(asked)).filter((answer) => answer === 'busy')).toHaveLength(3);
  });
});

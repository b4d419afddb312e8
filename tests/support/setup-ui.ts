import { cleanup } from '@testing-library/react';
import { afterEach } from 'vitest';
import { PageWorker } from './page-worker.ts';

Object.assign(globalThis, { Worker: PageWorker });

afterEach(() => {
  cleanup();
  window.localStorage.clear();
});

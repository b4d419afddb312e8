import { cleanup } from '@testing-library/react';
import { afterEach } from 'vitest';
import { ProposalWorker } from './proposal-worker.ts';

Object.assign(globalThis, { Worker: ProposalWorker });

afterEach(() => {
  cleanup();
  window.localStorage.clear();
});

import { useSyncExternalStore } from 'react';

/** Whether the sign-in ended while somebody was at work: then it is asked for again over the page, and what was typed stays. */
let expired = false;
const listeners = new Set<() => void>();

export function setExpired(next: boolean): void {
  if (expired === next) return;
  expired = next;
  for (const listener of listeners) listener();
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

export const useExpired = (): boolean =>
  useSyncExternalStore(
    subscribe,
    () => expired,
    () => false,
  );

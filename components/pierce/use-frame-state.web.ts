import { useCallback, useRef, useState } from 'react';
import { flushSync } from 'react-dom';

/**
 * State that is drawn at most once a frame however often it is set; null is drawn at once. React Native can't have a change drawn in the
 * frame it is made in; the browser's renderer can.
 */
export function useFrameState<T>(first: T | null): [T | null, (next: T | null) => void] {
  const [state, setState] = useState(first);
  const waiting = useRef<{ frame: number; next: T } | null>(null);
  const set = useCallback((next: T | null) => {
    if (next === null) {
      if (waiting.current) cancelAnimationFrame(waiting.current.frame);
      waiting.current = null;
      setState(null);
      return;
    }
    if (waiting.current) {
      waiting.current.next = next;
      return;
    }
    const frame = requestAnimationFrame(() => {
      const last = waiting.current;
      waiting.current = null;
      // drawn in this very frame, not in one after it
      if (last) flushSync(() => setState(last.next));
    });
    waiting.current = { frame, next };
  }, []);
  return [state, set];
}

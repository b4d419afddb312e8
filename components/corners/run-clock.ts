import { useEffect, useRef, useState, useSyncExternalStore } from 'react';

/**
 * The time that the run of the cut is shown at, s. Beside React's state, so that a frame of the run draws the head and the slider and not the page.
 */
export type RunClock = {
  readonly time: () => number;
  readonly set: (time: number) => void;
  readonly subscribe: (listener: () => void) => () => void;
};

export function createRunClock(): RunClock {
  let now = 0;
  const listeners = new Set<() => void>();
  return {
    time: () => now,
    set: (time) => {
      if (time === now) return;
      now = time;
      for (const listener of listeners) listener();
    },
    subscribe: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

export const useRunTime = (clock: RunClock): number => useSyncExternalStore(clock.subscribe, clock.time, () => 0);

/** A whole run is shown in at most this time, s; a short one as it is. */
const longestShow = 45;
/** Who asked for less movement sees a place a second, ms. */
const calmStep = 1000;

/** How many times as fast as the cut a run of this duration, s, is shown. */
export const runSpeed = (duration: number): number => Math.max(1, duration / longestShow);

const wantsCalm = () => window.matchMedia('(prefers-reduced-motion: reduce)').matches;

/** Runs the clock up to the duration while `running`; from the beginning again when it stands at the end. */
export function useRunning(clock: RunClock, duration: number): { running: boolean; toggle: () => void } {
  const [running, setRunning] = useState(false);
  const last = useRef(0);
  useEffect(() => {
    if (!running) return undefined;
    const speed = runSpeed(duration);
    const step = (seconds: number) => {
      const next = Math.min(duration, clock.time() + seconds * speed);
      clock.set(next);
      if (next >= duration) setRunning(false);
    };
    if (wantsCalm()) {
      const timer = window.setInterval(() => step(calmStep / 1000), calmStep);
      return () => window.clearInterval(timer);
    }
    last.current = performance.now();
    let frame = requestAnimationFrame(function next(now) {
      step(Math.max(0, now - last.current) / 1000);
      last.current = now;
      frame = requestAnimationFrame(next);
    });
    return () => cancelAnimationFrame(frame);
  }, [running, clock, duration]);
  return {
    running,
    toggle: () => {
      if (!running && clock.time() >= duration) clock.set(0);
      setRunning(!running);
    },
  };
}

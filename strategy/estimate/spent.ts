import type { PlateClock } from '../motion/plate-clock.ts';
import { pointDistance } from '../path/point.ts';

/** What the time of a cut goes into, s. Together they are the clock's duration. */
export type TimeSpent = {
  readonly pierce: number;
  /** Along contours and lead-ins. */
  readonly cut: number;
  readonly loop: number;
  /** Waits at corners, and beside them what gets the cut going again. */
  readonly dwell: number;
  readonly restart: number;
  readonly rapid: number;
  /** The head's way up and down. */
  readonly height: number;
};

/** What a cut spends: time, s, length, m, pierces, and the time for which the beam is on along the path, s at the straight cut's mean power. */
export type CutSpent = {
  readonly time: TimeSpent;
  readonly length: { readonly cut: number; readonly loop: number; readonly rapid: number };
  readonly pierces: number;
  readonly beam: number;
};

/** What the steps of a plate's clock add up to, s and m. */
export function cutSpent({ steps, runs }: PlateClock): CutSpent {
  const time = { pierce: 0, cut: 0, loop: 0, dwell: 0, restart: 0, rapid: 0, height: 0 };
  const length = { cut: 0, loop: 0, rapid: 0 };
  let pierces = 0;
  let beam = 0;
  for (const step of steps) {
    const duration = step.end - step.start;
    switch (step.phase) {
      case 'rapid':
        time.rapid += duration;
        length.rapid += pointDistance(step.from, step.to);
        break;
      case 'raise':
      case 'lower':
        time.height += duration;
        break;
      case 'pierce':
        time.pierce += duration;
        pierces++;
        break;
      case 'wait':
        time.restart += step.restart;
        time.dwell += duration - step.restart;
        break;
      case 'cut': {
        const run = runs[step.run];
        let [now, along] = [0, 0];
        step.ends.forEach((end, i) => {
          const reached = step.reached[i] ?? along;
          const of = run?.kinds[step.first + i] === 'loop' ? 'loop' : 'cut';
          time[of] += end - now;
          length[of] += reached - along;
          beam += (end - now) * (run?.powerShares[step.first + i] ?? 1);
          [now, along] = [end, reached];
        });
      }
    }
  }
  return { time, length, pierces, beam };
}

import type { MachineProfile } from '../machine.ts';

/** How a plate gets onto the machine and off it. */
export type Loading = {
  /** Clearing a table of what was cut and laying the next plate on it, s. */
  readonly time: number;
  /** With a second table: swapping the two, s, while nothing is cut. */
  readonly exchange: number;
  /** Is there a second table, that is loaded while the first is cut on? */
  readonly shuttleTable: boolean;
};

/** Some minutes with a crane, and a swap of the tables in half a minute. Own choice, no source: plants differ by far more. */
export const loadingDefaults = { time: 300, exchange: 30 } as const;

/** How a machine is loaded, s: as its profile says, else as `loadingDefaults`. */
export const loadingOf = ({ loading, bed }: Pick<MachineProfile, 'loading' | 'bed'>): Loading => ({
  time: loading?.time ?? loadingDefaults.time,
  exchange: loading?.exchange ?? loadingDefaults.exchange,
  shuttleTable: bed.shuttleTable,
});

/** What loading costs a plate, s: how much of it hides behind the cut, and how much the machine stands for it. */
export type LoadingCost = { readonly hidden: number; readonly added: number };

/**
 * Loading hidden behind a cut of `cutTime` s and the time it adds to it, s. With a second table the next plate is loaded while this one is cut: hidden as far as the
 * loading is not longer than the cut, and the swap is added. Without it all of it is added. Throws RangeError for a time below 0.
 */
export function loadingCost(cutTime: number, { time, exchange, shuttleTable }: Loading): LoadingCost {
  if (!(cutTime >= 0 && time >= 0 && exchange >= 0)) {
    throw new RangeError(`times of cut ${cutTime} s, loading ${time} s and exchange ${exchange} s must not be below 0`);
  }
  if (!shuttleTable) return { hidden: 0, added: time };
  const hidden = Math.min(time, cutTime);
  return { hidden, added: time - hidden + exchange };
}

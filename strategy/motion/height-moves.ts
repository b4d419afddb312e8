import type { MachineProfile } from '../machine.ts';
import { sCurveMove } from './rest-to-rest.ts';

/** How the head moves up and down between cuts. Heights of the nozzle above the plate's top, m. */
export type HeightMoves = {
  /** While it travels over the plate. */
  readonly travel: number;
  /** Standoff with which a pierce begins, with which it ends, and of the cut. */
  readonly pierceFrom: number;
  readonly pierceTo: number;
  readonly cut: number;
  readonly speed: number; // m/s
  readonly acceleration: number; // m/s²
  /** m/s³; without it the acceleration is there at once. */
  readonly jerk?: number;
};

/**
 * What a machine does whose profile says nothing of it: 15 mm above the plate a head clears the crater's rim and most of what tips; it moves gently,
 * as it feels for the plate on its way down. Own choice, no source.
 */
export const heightDefaults = { travel: 15e-3, speed: 0.15, acceleration: 2 } as const;

/** How a machine moves its head, m, m/s, m/s² and m/s³: as its profile says, else as `heightDefaults`; its jerk is that of its axes. */
export function heightMoves(
  { heights, axes }: Pick<MachineProfile, 'heights' | 'axes'>,
  standoffs: Pick<HeightMoves, 'pierceFrom' | 'pierceTo' | 'cut'>,
): HeightMoves {
  return {
    travel: heights?.travel ?? heightDefaults.travel,
    speed: heights?.speed ?? heightDefaults.speed,
    acceleration: heights?.acceleration ?? heightDefaults.acceleration,
    jerk: axes.jerk,
    ...standoffs,
  };
}

/** Time from one height to another, s, from rest to rest. Throws RangeError for a speed or an acceleration that is not positive. */
export const heightTime = (from: number, to: number, { speed, acceleration, jerk }: HeightMoves): number =>
  from === to ? 0 : sCurveMove(Math.abs(to - from), speed, acceleration, jerk ?? 1e12).time;

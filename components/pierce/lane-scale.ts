import type { Stage } from '@/strategy/pierce/stage.ts';
import { quantityIn, type Dimension, type UnitSystem } from '@/strategy/units/index.ts';
import { niceCeiling } from './nice-ticks.ts';
import { lanePoints, type LaneName } from './section-layout.ts';

/** The line above a lane that its name stands on, px. */
export const nameRow = 24;
const below = 16;

/** Height of a lane with its name, px, from the height of its drawn range. */
export const laneHeight = (box: number): number => nameRow + box + below;

const measures: Readonly<Record<LaneName, { dimension: Dimension; metric: string; inch: string }>> = {
  standoff: { dimension: 'length', metric: 'mm', inch: 'in' },
  focusPosition: { dimension: 'length', metric: 'mm', inch: 'in' },
  meanPower: { dimension: 'power', metric: 'kW', inch: 'kW' },
  oxygenPressure: { dimension: 'pressure', metric: 'bar', inch: 'psi' },
};

export const laneUnit = (lane: LaneName, system: UnitSystem): string => measures[lane][system];

export const laneNumber = (si: number, lane: LaneName, system: UnitSystem): number =>
  quantityIn(si, measures[lane].dimension, measures[lane][system]);

/** What a lane's drawn range stands for, in the lane's unit. */
export type LaneScale = { readonly floor: number; readonly most: number };

/** Round ends that hold every course given, and zero. */
export function laneScale(courses: readonly (readonly Stage[])[], lane: LaneName, system: UnitSystem): LaneScale {
  const values = courses.flatMap((stages) =>
    lanePoints(stages, lane).map(({ value }) => laneNumber(value, lane, system)),
  );
  const least = Math.min(0, ...values);
  return { floor: least < 0 ? -niceCeiling(-least) : 0, most: niceCeiling(Math.max(0, ...values)) };
}

/** Height of a number of the lane's unit in px from the page's top, for a lane that begins at `top`. */
export const laneY = (value: number, { floor, most }: LaneScale, top: number, box: number): number =>
  top + nameRow + box - ((value - floor) / (most - floor)) * box;

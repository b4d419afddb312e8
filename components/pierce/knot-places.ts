import { touch } from '@/components/theme/space.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { laneKnots, targetOf, targetSame, type Knot, type Target } from './knots.ts';
import { laneNumber, laneY, type LaneScale } from './lane-scale.ts';
import type { SectionGeometry } from './section-geometry.ts';
import { stageEnds, type LaneName } from './section-layout.ts';

/** A rectangle of the drawing, px. */
export type Area = { readonly x: number; readonly y: number; readonly width: number; readonly height: number };

/** Something that can be taken hold of, where it stands in the drawing. */
export type Place = {
  readonly target: Target;
  readonly chosen: boolean;
  /** What is seen of it. */
  readonly mark: Area;
  /** Where a finger means it. */
  readonly zone: Area;
};

export type KnotPlace = Place & { readonly knot: Knot };
export type EndPlace = Place & { readonly stage: number; readonly duration: number };

type LanePlaces = {
  stages: readonly Stage[];
  lane: LaneName;
  scale: LaneScale;
  /** Where the lane begins, px. */
  top: number;
  geometry: SectionGeometry;
  system: UnitSystem;
  chosen: Target | null;
};

/** The knots of a lane from left to right. */
export function knotPlaces({ stages, lane, scale, top, geometry, system, chosen }: LanePlaces): readonly KnotPlace[] {
  const knots = laneKnots(stages, lane);
  const columns = zonesBetween(knots.map(({ time }) => geometry.x(time)));
  return knots.map((knot, index) => {
    const x = geometry.x(knot.time);
    const y = laneY(laneNumber(knot.value, lane, system), scale, top, geometry.box);
    const own = isAt(knot, chosen);
    const half = own ? 6.5 : 5;
    const column = columns[index] ?? { x, width: 0 };
    return {
      knot,
      target: targetOf(knot),
      chosen: own,
      mark: { x: x - half, y: y - half, width: 2 * half, height: 2 * half },
      zone: { ...column, y: y - touch.least / 2, height: touch.least },
    };
  });
}

/** The stages' ends on the time axis from left to right. */
export function endPlaces(
  stages: readonly Stage[],
  geometry: SectionGeometry,
  chosen: Target | null,
): readonly EndPlace[] {
  const ends = stageEnds(stages).map(geometry.x);
  const columns = zonesBetween(ends);
  return ends.map((x, stage) => {
    const target: Target = { kind: 'duration', stage };
    const column = columns[stage] ?? { x, width: 0 };
    return {
      stage,
      duration: stages[stage]?.duration ?? 0,
      target,
      chosen: targetSame(chosen, target),
      mark: { x: x - 4, y: geometry.handleRow - 9, width: 8, height: 17 },
      zone: { ...column, y: geometry.lanesBottom - 8, height: touch.least },
    };
  });
}

const isAt = (knot: Knot, target: Target | null): boolean =>
  target?.kind === 'knot' &&
  target.lane === knot.lane &&
  knot.ends.some(({ stage, end }) => stage === target.stage && end === target.end);

/** Where a finger means which of them: halfway to both neighbours, at most a finger's width. */
function zonesBetween(at: readonly number[]): { x: number; width: number }[] {
  return at.map((x, i) => {
    const before = at[i - 1];
    const after = at[i + 1];
    const from = Math.max(x - touch.least / 2, before === undefined ? -Infinity : (before + x) / 2);
    const to = Math.min(x + touch.least / 2, after === undefined ? Infinity : (x + after) / 2);
    return { x: from, width: to - from };
  });
}

import { easedShare } from '../path/ease.ts';
import { roundTangent } from '../path/round.ts';
import { segmentLength } from '../path/segment.ts';
import type { CornerPlanRequest, CornerTreatment, EasedPath } from './case.ts';
import type { PlannedCorner } from './planned.ts';

export type CornerPlanTotals = {
  readonly corners: number;
  readonly treated: number;
  readonly loops: number;
  readonly dwells: number;
  readonly eases: number;
  readonly rounds: number;
  readonly problems: number;
  readonly addedTime: number; // s
  readonly addedLength: number; // m of cut; rounds take some off
  readonly addedHeat: number; // J into plate and slugs
  /** K; null when there is no corner. */
  readonly hottestReturn: number | null;
  readonly hottestUntreated: number | null;
};

/** What the corners of a plan come to. */
export function totalsOf(corners: readonly PlannedCorner[], { cut, thickness }: CornerPlanRequest): CornerPlanTotals {
  const of = (treatment: CornerTreatment) => corners.filter((c) => c.treatment === treatment).length;
  const sum = (measure: (c: PlannedCorner) => number) => corners.reduce((total, c) => total + measure(c), 0);
  const hottest = (measure: (c: PlannedCorner) => number) =>
    corners.reduce<number | null>((most, c) => (most === null ? measure(c) : Math.max(most, measure(c))), null);
  const addedLength = sum(addedLengthOf);
  return {
    corners: corners.length,
    treated: corners.length - of('leave'),
    loops: of('loop'),
    dwells: of('dwell'),
    eases: of('ease'),
    rounds: of('round'),
    problems: corners.filter((c) => c.problem).length,
    addedTime: sum((c) => c.addedTime),
    addedLength,
    addedHeat: cut.heatIntoPlate * thickness * (addedLength + sum(({ ease }) => (ease ? easedLength(ease) : 0))),
    hottestReturn: hottest((c) => c.returnWith),
    hottestUntreated: hottest((c) => c.returnWithout),
  };
}

/** Path that a treatment adds, m: a loop with what a drawn fillet spares, and a round less the two straight pieces it replaces. */
function addedLengthOf({ loop, round, drawn, angle, pathPoint }: PlannedCorner): number {
  const rounded = (radius: number) => radius * (Math.PI - angle) - 2 * roundTangent(radius, angle);
  if (loop) {
    const taken = drawn ? Math.hypot(drawn.from.x - pathPoint.x, drawn.from.y - pathPoint.y) : 0;
    return loop.length - (drawn ? rounded(taken * Math.tan(angle / 2)) : 0);
  }
  return round ? rounded(round.onPath.radius) : 0;
}

/** Length of straight cut that would leave as much heat as an ease adds, m; below 0 where the power falls more than the feed. */
const easedLength = ({ pieces, feedShare, powerShare }: EasedPath): number =>
  pieces.reduce(
    (sum, { segment, eased }) =>
      sum + segmentLength(segment) * (easedShare(eased, powerShare) / easedShare(eased, feedShare) - 1),
    0,
  );

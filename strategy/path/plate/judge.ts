import { contourLength } from '../contour.ts';
import type { LayoutProblem, LayoutRoom } from './checks.ts';
import { layoutProblems } from './checks.ts';
import { cutOrder, cutOrderFault, travelLength } from './cut-order.ts';
import type { PlateOutline } from './outline.ts';
import type { PlacedPart } from './placement.ts';

/** A layout with what a person decided of it. */
export type LayoutAsked = {
  readonly parts: readonly PlacedPart[];
  readonly outline: PlateOutline;
  readonly room: LayoutRoom;
  /** Contours in the order by hand, or null for the computed one. */
  readonly order: readonly string[] | null;
};

export type LayoutJudgement = {
  readonly order: readonly string[];
  /** Why the order by hand is none; it stands as it is then. */
  readonly fault: string | null;
  readonly problems: readonly LayoutProblem[];
  readonly moreProblems: boolean;
  readonly travel: number; // m
  readonly cutLength: number; // m, finished contours
};

/** All that follows from a layout: its order, what is wrong with it, how long the way and the cut are, m. */
export function layoutJudged({ parts, outline, room, order: byHand }: LayoutAsked): LayoutJudgement {
  const order = byHand ?? cutOrder(parts);
  const { problems, more } = layoutProblems(parts, outline, room);
  return {
    order,
    fault: byHand === null ? null : cutOrderFault(parts, byHand),
    problems,
    moreProblems: more,
    travel: travelLength(parts, order),
    cutLength: parts.reduce(
      (sum, { contours }) => contours.reduce((length, { contour }) => length + contourLength(contour), sum),
      0,
    ),
  };
}

import type { Arc, Box, Point, Segment } from '@/strategy/path/index.ts';
import { boxUnion, emptyBox, segmentBox } from '@/strategy/path/index.ts';

type Closed = { readonly segments: readonly Segment[] };

export const pathsBox = (paths: readonly Closed[]): Box =>
  paths.reduce((all, { segments }) => segments.reduce((box, one) => boxUnion(box, segmentBox(one)), all), emptyBox);

/** The circle a contour is, or none: arcs about one centre that make a full turn. */
export function contourCircle({ segments }: Closed): { centre: Point; radius: number } | null {
  const arcs = segments.filter((segment): segment is Arc => segment.kind === 'arc');
  const first = arcs[0];
  if (!first || arcs.length !== segments.length) return null;
  const slack = first.radius * 1e-6;
  const same = arcs.every(
    (arc) =>
      Math.abs(arc.radius - first.radius) <= slack &&
      Math.hypot(arc.centre.x - first.centre.x, arc.centre.y - first.centre.y) <= slack,
  );
  const turn = Math.abs(arcs.reduce((sum, arc) => sum + arc.sweep, 0));
  return same && Math.abs(turn - 2 * Math.PI) < 1e-6 ? { centre: first.centre, radius: first.radius } : null;
}

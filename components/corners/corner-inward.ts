import type { PlannedCorner } from '@/shared/corner-plans.ts';
import { contourCorners, cornerInward, type Point, type Segment } from '@/strategy/path/index.ts';

/**
 * Unit vector into the part at each planned corner, by the corner's id, so that its badge stands on the steel; corners that the contour
 * doesn't know get none.
 */
export function cornersInward(
  corners: readonly Pick<PlannedCorner, 'id' | 'contourId' | 'at'>[],
  contours: readonly { id: string; segments: readonly Segment[] }[],
): ReadonlyMap<string, Point> {
  const own = new Map<string, Pick<PlannedCorner, 'id' | 'contourId' | 'at'>[]>();
  for (const corner of corners) {
    const known = own.get(corner.contourId);
    if (known) known.push(corner);
    else own.set(corner.contourId, [corner]);
  }
  const found = new Map<string, Point>();
  for (const contour of contours) {
    const planned = own.get(contour.id);
    if (!planned) continue;
    const breaks = new Map(contourCorners(contour).map((one) => [cellOf(one.point), one]));
    for (const { id, at } of planned) {
      const one = cellsAround(at).flatMap((cell) => breaks.get(cell) ?? [])[0];
      if (one) found.set(id, cornerInward(one));
    }
  }
  return found;
}

/** A drawing's corner and the plan's lie nearer than this, m; corners of a drawing lie farther apart. */
const cellSize = 1e-4;
const cellOf = ({ x, y }: Point) => `${Math.round(x / cellSize)} ${Math.round(y / cellSize)}`;

/** The cell of a place first, then those that it may have been rounded into. */
const cellsAround = ({ x, y }: Point) =>
  [0, 1, -1].flatMap((i) => [0, 1, -1].map((j) => cellOf({ x: x + i * cellSize, y: y + j * cellSize })));

/** How many times as far as usual a corner's badge stands in: the narrower the tip the further, so that it lies on the steel. */
export const badgeStretch = (angle: number): number =>
  Math.min(2, Math.max(1, Math.SQRT1_2 / Math.sin(Math.min(angle, Math.PI) / 2)));

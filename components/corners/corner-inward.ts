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
  const found = new Map<string, Point>();
  for (const contour of contours) {
    const own = corners.filter((corner) => corner.contourId === contour.id);
    if (own.length === 0) continue;
    const breaks = contourCorners(contour);
    for (const corner of own) {
      const nearest = breaks.reduce<{ at: number; inward: Point } | null>((best, one) => {
        const at = Math.hypot(one.point.x - corner.at.x, one.point.y - corner.at.y);
        return best === null || at < best.at ? { at, inward: cornerInward(one) } : best;
      }, null);
      if (nearest && nearest.at < 1e-4) found.set(corner.id, nearest.inward);
    }
  }
  return found;
}

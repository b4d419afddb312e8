import { pathsBox } from '@/components/parts/drawing-geometry.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { outlineOf } from '@/shared/layouts.ts';
import type { PlateShape } from '@/strategy/heat/plate/index.ts';
import { lineBetween, type Box, type Segment } from '@/strategy/path/index.ts';

/** The plate that a part's plan supposes: its drawing with the free skeleton around, m. */
export function plateAround({ part, skeleton }: Pick<CornerPlan, 'part' | 'skeleton'>): Box {
  const box = pathsBox(part.contours);
  const { left, right, below, above } = skeleton;
  return { minX: box.minX - left, minY: box.minY - below, maxX: box.maxX + right, maxY: box.maxY + above };
}

/** The box of the plate a plan is cut from, m, and its outline where it is not its box. */
export function plateOf(plan: Pick<CornerPlan, 'part' | 'skeleton' | 'layout'>): {
  plate: Box;
  shape: PlateShape | null;
} {
  if (!plan.layout) return { plate: plateAround(plan), shape: null };
  const { edge, openings, box } = outlineOf(plan.layout.outline);
  const plain = openings.length === 0 && edge.segments.length === 4;
  return { plate: box, shape: plain ? null : { edge, openings } };
}

/** The edge of a box as a closed path. */
export function boxSegments({ minX, minY, maxX, maxY }: Box): Segment[] {
  const corners = [
    { x: minX, y: minY },
    { x: maxX, y: minY },
    { x: maxX, y: maxY },
    { x: minX, y: maxY },
  ];
  return corners.map((start, i) => lineBetween(start, corners[(i + 1) % 4] ?? start));
}

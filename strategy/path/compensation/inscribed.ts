import type { Contour } from '../contour.ts';
import { contourBox, contourContains } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';

/**
 * The largest circle inside a closed contour, to `precision` m of its radius: centre and radius, m. Cells of the plane are halved, most promising first, until
 * none can hold a centre that much better. Throws RangeError for a precision that is not positive.
 */
export function largestCircleInside(contour: Contour, precision: number): { centre: Point; radius: number } {
  if (!(precision > 0)) throw new RangeError(`precision ${precision} m is outside (0, ∞)`);
  const box = contourBox(contour);
  const reachOf = (p: Point): number => {
    const distance = contour.segments.reduce((least, s) => Math.min(least, segmentPointDistance(s, p)), Infinity);
    return contourContains(contour, p) ? distance : -distance;
  };
  type Cell = { readonly at: Point; readonly half: number; readonly reach: number; readonly most: number };
  const cellAt = (x: number, y: number, half: number): Cell => {
    const reach = reachOf({ x, y });
    return { at: { x, y }, half, reach, most: reach + half * Math.SQRT2 };
  };
  const half = Math.min(box.maxX - box.minX, box.maxY - box.minY) / 2;
  const columns = Math.ceil((box.maxX - box.minX) / (2 * half) - 1e-9);
  const rows = Math.ceil((box.maxY - box.minY) / (2 * half) - 1e-9);
  // no more than a long, thin contour needs
  const open: Cell[] = [];
  for (let i = 0; i < columns; i++) {
    for (let k = 0; k < rows; k++)
      open.push(cellAt(box.minX + (2 * i + 1) * half, box.minY + (2 * k + 1) * half, half));
  }
  let best = open.reduce((a, b) => (b.reach > a.reach ? b : a));
  while (open.length > 0) {
    const next = open.reduce((a, b, i) => (b.most > (open[a]?.most ?? -Infinity) ? i : a), 0);
    const cell = open[next];
    const last = open.pop();
    if (!cell || !last) break;
    if (last !== cell) open[next] = last;
    if (cell.most - best.reach <= precision) break;
    const h = cell.half / 2;
    for (const [dx, dy] of [
      [-h, -h],
      [h, -h],
      [-h, h],
      [h, h],
    ] as const) {
      const part = cellAt(cell.at.x + dx, cell.at.y + dy, h);
      if (part.reach > best.reach) best = part;
      if (part.most - best.reach > precision) open.push(part);
    }
  }
  return { centre: best.at, radius: best.reach };
}

import type { Contour } from '../contour.ts';
import { contourBox, contourContains } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';

/** A circle within a contour: centre and radius, m. */
export type Circle = { readonly centre: Point; readonly radius: number };

/** Directions in which a centre is moved as long as that makes the circle larger. */
const directions = Array.from({ length: 8 }, (_, i) => ({
  x: Math.cos((i * Math.PI) / 4),
  y: Math.sin((i * Math.PI) / 4),
}));

/**
 * The largest circle inside a closed contour, its radius at most `precision` m below the largest possible. Cells of the plane are halved as long as they can
 * hold a centre that much better, then the best centre is moved to the middle of where it is, to rounding. Ends as soon as a radius of `enough` m is found.
 * Throws RangeError for a precision that is not positive.
 */
export function largestCircleInside(contour: Contour, precision: number, enough = Infinity): Circle {
  if (!(precision > 0)) throw new RangeError(`precision ${precision} m is outside (0, ∞)`);
  const box = contourBox(contour);
  const reachOf = (p: Point): number => {
    const distance = contour.segments.reduce((least, s) => Math.min(least, segmentPointDistance(s, p)), Infinity);
    return contourContains(contour, p) ? distance : -distance;
  };
  let best: Circle = { centre: { x: box.minX, y: box.minY }, radius: -Infinity };
  const reached = (centre: Point): number => {
    const radius = reachOf(centre);
    if (radius > best.radius) best = { centre, radius };
    return radius;
  };
  let half = Math.min(box.maxX - box.minX, box.maxY - box.minY) / 2;
  const columns = Math.ceil((box.maxX - box.minX) / (2 * half) - 1e-9);
  const rows = Math.ceil((box.maxY - box.minY) / (2 * half) - 1e-9);
  let cells = Array.from({ length: columns * rows }, (_, i): Point => ({
    x: box.minX + (2 * (i % columns) + 1) * half,
    y: box.minY + (2 * Math.floor(i / columns) + 1) * half,
  }));
  while (cells.length > 0 && best.radius < enough) {
    const found = cells.map((centre) => ({ centre, radius: reached(centre) }));
    const [size, h] = [half, half / 2];
    cells = found
      .filter(({ radius }) => radius + size * Math.SQRT2 > best.radius + precision)
      .flatMap(({ centre: { x, y } }) => [
        { x: x - h, y: y - h },
        { x: x + h, y: y - h },
        { x: x - h, y: y + h },
        { x: x + h, y: y + h },
      ]);
    half = h;
  }
  for (let step = precision; step > 1e-9 * precision;) {
    const { centre, radius } = best;
    for (const { x, y } of directions) reached({ x: centre.x + step * x, y: centre.y + step * y });
    if (best.radius <= radius) step /= 2;
  }
  return best;
}

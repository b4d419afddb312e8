import type { Contour } from '../contour.ts';
import { contourBox, segmentCrossesRay } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';
import { segmentBox, segmentStart } from '../segment.ts';

/** A circle within a contour: centre and radius, m. */
export type Circle = { readonly centre: Point; readonly radius: number };

/** Cells along the longer side at first, at most: a slit a thousand times as long as wide begins with cells wider than itself. */
const mostAcross = 256;
/** Moves of the best centre at most: some 30 halve the step down to rounding. */
const mostMoves = 500;
/** Coordinates differ by less from rounding, m. */
const rounding = 1e-9;
/** Directions in which a centre is moved as long as that makes the circle larger. */
const directions = Array.from({ length: 8 }, (_, i) => ({
  x: Math.cos((i * Math.PI) / 4),
  y: Math.sin((i * Math.PI) / 4),
}));

/**
 * The largest circle inside a closed contour, its radius at most `precision` m, or this `share` of it, below the largest possible. Cells of the plane are halved as long as they can
 * hold a centre that much better, then the best centre is moved to the middle of where it is, to rounding. Ends as soon as a radius of `enough` m is found,
 * wherever that is.
 * Throws RangeError for a precision that is not positive.
 */
export function largestCircleInside(
  contour: Contour,
  precision: number,
  { enough = Infinity, share = 0 } = {},
): Circle {
  if (!(precision > 0)) throw new RangeError(`precision ${precision} m is outside (0, ∞)`);
  const box = contourBox(contour);
  const reachOf = reachInto(contour);
  let best: Circle = { centre: { x: box.minX, y: box.minY }, radius: -Infinity };
  const reached = (centre: Point): number => {
    const radius = reachOf(centre);
    if (radius > best.radius) best = { centre, radius };
    return radius;
  };
  const [width, height] = [box.maxX - box.minX, box.maxY - box.minY];
  let half = Math.max(Math.min(width, height) / 2, Math.max(width, height) / (2 * mostAcross));
  const columns = Math.ceil(width / (2 * half) - 1e-9);
  const rows = Math.ceil(height / (2 * half) - 1e-9);
  let cells = Array.from({ length: columns * rows }, (_, i): Point => ({
    x: box.minX + (2 * (i % columns) + 1) * half,
    y: box.minY + (2 * Math.floor(i / columns) + 1) * half,
  }));
  while (cells.length > 0 && best.radius < enough) {
    const found = cells.map((centre) => ({ centre, radius: reached(centre) }));
    const [size, h] = [half, half / 2];
    cells = found
      .filter(({ radius }) => radius + size * Math.SQRT2 > best.radius + Math.max(precision, share * best.radius))
      .flatMap(({ centre: { x, y } }) => [
        { x: x - h, y: y - h },
        { x: x + h, y: y - h },
        { x: x - h, y: y + h },
        { x: x + h, y: y + h },
      ]);
    half = h;
  }
  let step = precision;
  for (let moves = 0; moves < mostMoves && step > 1e-9 * precision && best.radius < enough; moves++) {
    const { centre, radius } = best;
    for (const { x, y } of directions) reached({ x: centre.x + step * x, y: centre.y + step * y });
    // between parallel edges a circle gains nothing but rounding, all along them
    if (best.radius <= radius + 1e-6 * step) step /= 2;
  }
  return best;
}

/**
 * How far a place lies inside a contour, m; below 0 outside. Segments whose box is no nearer than the nearest so far, and does not reach a ray to the right, are not
 * looked at: of a curve in thousands of pieces, nearly all.
 */
function reachInto({ segments }: Contour): (p: Point) => number {
  const boxes = Float64Array.from(
    segments.flatMap((segment) => {
      const { minX, minY, maxX, maxY } = segmentBox(segment);
      return [minX, minY, maxX, maxY];
    }),
  );
  const starts = segments.map(segmentStart);
  // the next place is beside the last one as a rule: what was nearest there is tried first
  let nearest = 0;
  return (p) => {
    const { x, y } = p;
    const first = segments[nearest];
    let least = first ? segmentPointDistance(first, p) : Infinity;
    let square = least * least;
    let inside = false;
    for (let i = 0, b = 0; i < segments.length; i++, b += 4) {
      const minX = boxes[b] ?? 0;
      const minY = boxes[b + 1] ?? 0;
      const maxX = boxes[b + 2] ?? 0;
      const maxY = boxes[b + 3] ?? 0;
      const dx = x < minX ? minX - x : x > maxX ? x - maxX : 0;
      const dy = y < minY ? minY - y : y > maxY ? y - maxY : 0;
      if (dx * dx + dy * dy < square) {
        const segment = segments[i];
        const distance = segment ? segmentPointDistance(segment, p) : Infinity;
        if (distance < least) {
          least = distance;
          square = distance * distance;
          nearest = i;
        }
      }
      // an arc's end is where the next segment starts, up to rounding outside its own box
      if (dy <= rounding && x <= maxX + rounding) {
        const [segment, to] = [segments[i], starts[i + 1] ?? starts[0]];
        if (segment && to && segmentCrossesRay(segment, to, p)) inside = !inside;
      }
    }
    return inside ? least : -least;
  };
}

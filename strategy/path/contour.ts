import type { Box, Point } from './point.ts';
import { boxUnion, emptyBox, pointCross, pointSubtract } from './point.ts';
import type { Arc, Segment } from './segment.ts';
import {
  pathLength,
  segmentBox,
  segmentEnd,
  segmentReverse,
  segmentRotate,
  segmentShift,
  segmentStart,
} from './segment.ts';

/** A closed path: each segment starts where the one before ends, and the last ends where the first starts. m. */
export type Contour = { readonly segments: readonly Segment[] };

/** Signed area enclosed, m²; positive when the contour runs counter-clockwise. Green's theorem, exact on lines and arcs. */
export function contourArea(contour: Contour): number {
  const { segments } = contour;
  const first = segments[0];
  if (!first) return 0;
  // measured from a point of the contour itself, so that a part far from the origin loses no digits
  const origin = segmentStart(first);
  let doubled = 0;
  for (const segment of segments) {
    const a = segmentStart(segment);
    const b = segmentEnd(segment);
    doubled += pointCross(pointSubtract(a, origin), pointSubtract(b, origin));
    if (segment.kind === 'arc') doubled += segment.radius * segment.radius * (segment.sweep - Math.sin(segment.sweep));
  }
  return doubled / 2;
}

/** Length around, m. */
export const contourLength = (contour: Contour): number => pathLength(contour.segments);

/** The same contour travelled the other way. */
export const contourReverse = (contour: Contour): Contour => ({
  segments: contour.segments.map(segmentReverse).reverse(),
});

/** Exact bounds, m. */
export const contourBox = (contour: Contour): Box =>
  contour.segments.reduce((box, segment) => boxUnion(box, segmentBox(segment)), emptyBox);

/** The contour shifted by a vector, m. */
export const contourShift = (contour: Contour, by: Point): Contour => ({
  segments: contour.segments.map((s) => segmentShift(s, by)),
});

/** The contour turned counter-clockwise by `angle` rad about the origin. */
export const contourRotate = (contour: Contour, angle: number): Contour => ({
  segments: contour.segments.map((s) => segmentRotate(s, angle)),
});

/**
 * Whether the point lies inside, by the parity of crossings of a ray to the right. Arcs are split where they turn back in y and
 * neighbours share the very same y at their common point, so a ray through a vertex counts once. A point on the contour
 * itself may come out either way: ask for its distance first when that matters.
 */
export function contourContains(contour: Contour, p: Point): boolean {
  const { segments } = contour;
  let inside = false;
  for (let i = 0; i < segments.length; i++) {
    const segment = segments[i];
    const next = segments[(i + 1) % segments.length];
    if (segment && next && segmentCrossesRay(segment, segmentStart(next), p)) inside = !inside;
  }
  return inside;
}

/**
 * Whether a segment of a contour crosses the ray from p to the right an odd number of times. `to` is where the next segment starts, so that
 * neighbours share the very same place.
 */
export function segmentCrossesRay(segment: Segment, to: Point, p: Point): boolean {
  const from = segmentStart(segment);
  if (segment.kind === 'arc') return arcCrossings(segment, from.y, to.y, p) % 2 === 1;
  if (from.y > p.y === to.y > p.y) return false;
  return from.x + ((p.y - from.y) / (to.y - from.y)) * (to.x - from.x) > p.x;
}

/** Crossings of an arc with the ray from p to the right; its ends are given so that they equal the neighbours' to the last bit. */
function arcCrossings(arc: Arc, fromY: number, toY: number, p: Point): number {
  const { centre, radius, startAngle, sweep } = arc;
  // angles where y turns back: π/2 + kπ strictly inside the arc
  const low = Math.min(startAngle, startAngle + sweep);
  const high = Math.max(startAngle, startAngle + sweep);
  const turns: number[] = [];
  for (let k = Math.ceil((low - Math.PI / 2) / Math.PI); Math.PI / 2 + k * Math.PI < high; k++) {
    const angle = Math.PI / 2 + k * Math.PI;
    if (angle > low) turns.push(angle);
  }
  if (sweep < 0) turns.reverse();
  const stops = [startAngle, ...turns, startAngle + sweep];
  let crossings = 0;
  let y0 = fromY;
  for (let i = 1; i < stops.length; i++) {
    const a = stops[i - 1] ?? startAngle;
    const b = stops[i] ?? startAngle;
    const last = i === stops.length - 1;
    const y1 = last ? toY : centre.y + radius * Math.sign(Math.sin(b));
    if (y0 > p.y !== y1 > p.y) {
      const h = p.y - centre.y;
      const reach = Math.sqrt(Math.max(0, radius * radius - h * h));
      const x = centre.x + (Math.cos((a + b) / 2) >= 0 ? reach : -reach);
      if (x > p.x) crossings++;
    }
    y0 = y1;
  }
  return crossings;
}

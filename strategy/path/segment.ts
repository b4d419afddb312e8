import type { Box, Point } from './point.ts';
import { pointAdd, pointDistance, pointLeft, pointRotate, pointSubtract, pointUnit } from './point.ts';

/** A straight piece of path. */
export type Line = { readonly kind: 'line'; readonly start: Point; readonly end: Point };

/**
 * A piece of a circle. Angles in rad; `sweep` is signed, counter-clockwise positive, and ±2π is the full circle, so no flags
 * are needed and every arc has one reading.
 */
export type Arc = {
  readonly kind: 'arc';
  readonly centre: Point;
  readonly radius: number; // m
  readonly startAngle: number; // rad
  readonly sweep: number; // rad, −2π..2π, never 0
};

export type Segment = Line | Arc;

/** A straight segment from `start` to `end`, m. */
export const lineBetween = (start: Point, end: Point): Line => ({ kind: 'line', start, end });

/** An arc. Throws RangeError when the radius is not positive or the sweep is 0 or beyond a full turn. */
export function arcOf(centre: Point, radius: number, startAngle: number, sweep: number): Arc {
  if (!(radius > 0 && Number.isFinite(radius))) throw new RangeError(`arc radius ${radius} m is outside (0, ∞)`);
  if (!(Math.abs(sweep) > 0 && Math.abs(sweep) <= 2 * Math.PI + 1e-9)) {
    throw new RangeError(`arc sweep ${sweep} rad is outside ±(0, 2π]`);
  }
  return { kind: 'arc', centre, radius, startAngle, sweep };
}

/** Full circle, counter-clockwise, from its rightmost point. */
export const circleOf = (centre: Point, radius: number): Arc => arcOf(centre, radius, 0, 2 * Math.PI);

/**
 * The segment between two places with a bulge = tan(quarter of the sweep), as polylines of a DXF store it; 0 is straight.
 * Positive bulges run counter-clockwise.
 */
export function segmentFromBulge(start: Point, end: Point, bulge: number): Segment {
  const chord = pointDistance(start, end);
  // a sagitta below a millionth of the chord is rounding, and a centre that far away costs the ends their digits
  if (Math.abs(bulge) < 1e-6 || chord === 0) return lineBetween(start, end);
  const sweep = 4 * Math.atan(bulge);
  const radius = (chord * (1 + bulge * bulge)) / (4 * Math.abs(bulge));
  // signed distance of the centre from the chord's middle, to the left of the chord
  const offset = (chord * (1 - bulge * bulge)) / (4 * bulge);
  const left = pointLeft(pointUnit(pointSubtract(end, start)));
  const centre = { x: (start.x + end.x) / 2 + left.x * offset, y: (start.y + end.y) / 2 + left.y * offset };
  return arcOf(centre, radius, Math.atan2(start.y - centre.y, start.x - centre.x), sweep);
}

/** Point of a circle at an angle, m. */
export const arcPointAtAngle = (arc: Arc, angle: number): Point => ({
  x: arc.centre.x + arc.radius * Math.cos(angle),
  y: arc.centre.y + arc.radius * Math.sin(angle),
});

/** Point at the share `t` (0 start, 1 end) of the segment's length, m. */
export function segmentPointAt(segment: Segment, t: number): Point {
  if (segment.kind === 'arc') return arcPointAtAngle(segment, segment.startAngle + t * segment.sweep);
  if (t === 1) return segment.end;
  return {
    x: segment.start.x + t * (segment.end.x - segment.start.x),
    y: segment.start.y + t * (segment.end.y - segment.start.y),
  };
}

/** First point of the segment, m. */
export const segmentStart = (segment: Segment): Point =>
  segment.kind === 'line' ? segment.start : arcPointAtAngle(segment, segment.startAngle);

/** Last point of the segment, m. */
export const segmentEnd = (segment: Segment): Point =>
  segment.kind === 'line' ? segment.end : arcPointAtAngle(segment, segment.startAngle + segment.sweep);

/** Length along the segment, m. */
export const segmentLength = (segment: Segment): number =>
  segment.kind === 'line' ? pointDistance(segment.start, segment.end) : segment.radius * Math.abs(segment.sweep);

/** Unit vector of travel at the share `t` of the length. Throws RangeError for a line without length. */
export function segmentTangentAt(segment: Segment, t: number): Point {
  if (segment.kind === 'line') return pointUnit(pointSubtract(segment.end, segment.start));
  const angle = segment.startAngle + t * segment.sweep;
  const turn = Math.sign(segment.sweep);
  return { x: -turn * Math.sin(angle), y: turn * Math.cos(angle) };
}

/** The same piece travelled the other way. */
export function segmentReverse(segment: Segment): Segment {
  if (segment.kind === 'line') return lineBetween(segment.end, segment.start);
  return { ...segment, startAngle: segment.startAngle + segment.sweep, sweep: -segment.sweep };
}

/** The part of a segment between the shares t0 < t1 of its length. */
export function segmentPart(segment: Segment, t0: number, t1: number): Segment {
  if (segment.kind === 'line') return lineBetween(segmentPointAt(segment, t0), segmentPointAt(segment, t1));
  return { ...segment, startAngle: segment.startAngle + t0 * segment.sweep, sweep: (t1 - t0) * segment.sweep };
}

/** The segment shifted by a vector, m. */
export function segmentShift(segment: Segment, by: Point): Segment {
  if (segment.kind === 'line') return lineBetween(pointAdd(segment.start, by), pointAdd(segment.end, by));
  return { ...segment, centre: pointAdd(segment.centre, by) };
}

/** The segment turned counter-clockwise by `angle` rad about the origin. */
export function segmentRotate(segment: Segment, angle: number): Segment {
  if (segment.kind === 'line') return lineBetween(pointRotate(segment.start, angle), pointRotate(segment.end, angle));
  return { ...segment, centre: pointRotate(segment.centre, angle), startAngle: segment.startAngle + angle };
}

/** Does the arc pass the direction `angle` from its centre? Ends count, within `slack` rad. */
export function arcCovers(arc: Arc, angle: number, slack = 1e-12): boolean {
  const turn = 2 * Math.PI;
  const from = arc.sweep > 0 ? arc.startAngle : arc.startAngle + arc.sweep;
  const offset = (((angle - from) % turn) + turn) % turn;
  return offset <= Math.abs(arc.sweep) + slack || offset >= turn - slack;
}

/** Exact bounds of the segment, m. */
export function segmentBox(segment: Segment): Box {
  const a = segmentStart(segment);
  const b = segmentEnd(segment);
  let minX = Math.min(a.x, b.x);
  let maxX = Math.max(a.x, b.x);
  let minY = Math.min(a.y, b.y);
  let maxY = Math.max(a.y, b.y);
  if (segment.kind === 'arc') {
    const { centre, radius } = segment;
    if (arcCovers(segment, 0)) maxX = centre.x + radius;
    if (arcCovers(segment, Math.PI / 2)) maxY = centre.y + radius;
    if (arcCovers(segment, Math.PI)) minX = centre.x - radius;
    if (arcCovers(segment, -Math.PI / 2)) minY = centre.y - radius;
  }
  return { minX, minY, maxX, maxY };
}

/** Length of a path, m. */
export const pathLength = (path: readonly Segment[]): number => path.reduce((sum, s) => sum + segmentLength(s), 0);

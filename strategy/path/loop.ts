import type { Contour } from './contour.ts';
import { contourArea } from './contour.ts';
import { cornerOfPath } from './corner.ts';
import type { Point } from './point.ts';
import { pointAdd, pointDistance, pointLeft, pointScale, pointSubtract } from './point.ts';
import type { Arc, Line } from './segment.ts';
import { arcOf, lineBetween, segmentEnd } from './segment.ts';

/** The corner of the path a loop is put on: where it is, how the cut arrives and how it leaves, the angle inside the part. */
export type LoopCorner = {
  readonly point: Point; // m, corner of the path (not of the finished edges)
  readonly incoming: Point;
  readonly outgoing: Point;
  readonly angle: number; // rad
};

type Of<Shape, Segments> = {
  readonly shape: Shape;
  /** Of its arc, or of each of its two arcs, m. */
  readonly radius: number;
  readonly extension: number; // m
  readonly length: number; // m
  /** Farthest distance of the path from the corner, m. */
  readonly reach: number;
  readonly segments: Segments;
};

/** Run on past the corner, turn away from the part on one arc, come back along the second edge's line. */
export type TangentLoop = Of<'tangent', readonly [Line, Arc, Line]>;

/** The same with the far side cut off straight between two smaller arcs, for a skeleton too narrow for the one arc. */
export type FlatLoop = Of<'flat', readonly [Line, Arc, Line, Arc, Line]>;

/** A loop on the scrap side of a tip. */
export type Loop = TangentLoop | FlatLoop;

/** Length of the tangent loop's path, m: 2e + r(π + β), with β the angle inside the part, rad. Plane geometry. */
export const loopLength = (radius: number, extension: number, angle: number): number =>
  2 * extension + radius * (Math.PI + angle);

/** Farthest distance of the tangent loop's path from the corner, m: e(1 + sin(β/2))/cos(β/2). Plane geometry. */
export const loopReach = (extension: number, angle: number): number =>
  (extension * (1 + Math.sin(angle / 2))) / Math.cos(angle / 2);

/** Extension that belongs to a radius, m: e = r/tan(β/2). Plane geometry of a circle that touches both edges' lines. */
export const loopExtension = (radius: number, angle: number): number => radius / Math.tan(angle / 2);

/** Length of the straight of a flat loop, m: 2(e·sin(β/2) − r·cos(β/2)); 0 where it is the tangent loop. Plane geometry. */
export const flatLoopStraight = (radius: number, extension: number, angle: number): number =>
  2 * (extension * Math.sin(angle / 2) - radius * Math.cos(angle / 2));

/** Length of the flat loop's path, m: 2e + r(π + β) + 2(e·sin(β/2) − r·cos(β/2)). Plane geometry. */
export const flatLoopLength = (radius: number, extension: number, angle: number): number =>
  loopLength(radius, extension, angle) + flatLoopStraight(radius, extension, angle);

/** Farthest distance of the flat loop's path from the corner, m: √(e² + r²) + r, across the centre of one of its arcs. Plane geometry. */
export const flatLoopReach = (radius: number, extension: number): number => Math.hypot(extension, radius) + radius;

/** How deep a flat loop stands into the skeleton along the bisector, m: e·cos(β/2) + r(1 + sin(β/2)). Plane geometry. */
export const flatLoopDepth = (radius: number, extension: number, angle: number): number =>
  extension * Math.cos(angle / 2) + radius * (1 + Math.sin(angle / 2));

/**
 * The tangent loop of a given radius, m, on a convex corner of the path. Throws RangeError when the corner is no tip (angle outside (0, π)) or
 * the radius is not positive.
 */
export function loopAt(corner: LoopCorner, radius: number): TangentLoop {
  const { angle } = corner;
  checked(corner, radius);
  const extension = loopExtension(radius, angle);
  const { out, arc } = outAndArc(corner, radius, extension, Math.PI + angle);
  const back = pointSubtract(corner.point, pointScale(corner.outgoing, extension));
  return {
    shape: 'tangent',
    radius,
    extension,
    length: loopLength(radius, extension, angle),
    reach: loopReach(extension, angle),
    segments: [out, arc, lineBetween(back, corner.point)],
  };
}

/**
 * The flat loop on a convex corner of the path: it runs on by `extension` m, turns on an arc of `radius` m until it runs square to the bisector,
 * goes straight, and turns the same way on to the second edge's line. With e = r/tan(β/2) the straight has no length and the figure is the tangent loop's;
 * at the same extension it is shorter and stands less deep into the skeleton. Throws RangeError when the corner is no tip, the radius not positive
 * or the extension not above r/tan(β/2).
 */
export function flatLoopAt(corner: LoopCorner, radius: number, extension: number): FlatLoop {
  const { angle } = corner;
  checked(corner, radius);
  const straight = flatLoopStraight(radius, extension, angle);
  if (!(straight > 0)) {
    throw new RangeError(`extension ${extension} m of a flat loop is outside (${loopExtension(radius, angle)}, ∞) m`);
  }
  const turn = (Math.PI + angle) / 2;
  const { out, arc } = outAndArc(corner, radius, extension, turn);
  const back = pointSubtract(corner.point, pointScale(corner.outgoing, extension));
  const centre = pointSubtract(back, pointScale(pointLeft(corner.outgoing), radius));
  const second = arcOf(centre, radius, Math.atan2(back.y - centre.y, back.x - centre.x) + turn, -turn);
  return {
    shape: 'flat',
    radius,
    extension,
    length: flatLoopLength(radius, extension, angle),
    reach: flatLoopReach(radius, extension),
    segments: [
      out,
      arc,
      lineBetween(segmentEnd(arc), {
        x: centre.x + radius * Math.cos(second.startAngle),
        y: centre.y + radius * Math.sin(second.startAngle),
      }),
      second,
      lineBetween(back, corner.point),
    ],
  };
}

function checked({ angle }: LoopCorner, radius: number): void {
  if (!(angle > 0 && angle < Math.PI))
    throw new RangeError(`corner angle ${angle} rad is outside (0, π): no tip to loop`);
  if (!(radius > 0)) throw new RangeError(`loop radius ${radius} m is outside (0, ∞)`);
}

/** The run past the corner and the arc that turns right from its end, away from the part on the left. */
function outAndArc({ point, incoming }: LoopCorner, radius: number, extension: number, turn: number) {
  const end = pointAdd(point, pointScale(incoming, extension));
  const centre = pointSubtract(end, pointScale(pointLeft(incoming), radius));
  const arc = arcOf(centre, radius, Math.atan2(end.y - centre.y, end.x - centre.x), -turn);
  return { out: lineBetween(point, end), arc };
}

/** What a loop cuts out and lets fall. */
export type Slug = {
  readonly contour: Contour;
  readonly area: number; // m²
  /** Its greatest width, m. */
  readonly extent: number;
};

/**
 * The slug of a loop, its outline in m, area in m² and greatest width in m, or null when the kerf takes all of it. Half the kerf is lost all round; the rest
 * is the same figure with radii smaller by half the kerf, whose tip lies half a kerf further out; a triangle where the arcs of a flat loop are too
 * small to leave one.
 */
export function loopSlug(corner: LoopCorner, loop: Loop, kerfWidth: number): Slug | null {
  const inner: LoopCorner = { ...corner, point: cornerOfPath(corner, kerfWidth) };
  const radius = loop.radius - kerfWidth / 2;
  if (loop.shape === 'flat') {
    // the arcs keep their centres, whose foot on the edge's line is nearer to the inner tip
    const extension = loop.extension - loopExtension(kerfWidth / 2, corner.angle);
    if (radius > 0) return slugOf(flatLoopAt(inner, radius, extension));
    return triangleSlug(inner, flatLoopDepth(radius, extension, corner.angle));
  }
  return radius > 0 ? slugOf(loopAt(inner, radius)) : null;
}

function slugOf(loop: Loop): Slug {
  const contour = { segments: loop.segments };
  return { contour, area: Math.abs(contourArea(contour)), extent: extentOf(loop) };
}

/** `depth` from the tip to the far side along the bisector, m. */
function triangleSlug({ point, incoming, outgoing, angle }: LoopCorner, depth: number): Slug | null {
  const side = depth / Math.cos(angle / 2);
  if (!(side > 0)) return null;
  const a = pointAdd(point, pointScale(incoming, side));
  const b = pointSubtract(point, pointScale(outgoing, side));
  const contour = { segments: [lineBetween(point, a), lineBetween(a, b), lineBetween(b, point)] };
  return { contour, area: Math.abs(contourArea(contour)), extent: Math.max(side, pointDistance(a, b)) };
}

/** Greatest width of the figure within a loop, m: from the tip across an arc's centre, or across both centres. */
function extentOf(loop: Loop): number {
  if (loop.shape === 'tangent') return Math.max(loop.reach, 2 * loop.radius);
  const [, , straight] = loop.segments;
  return Math.max(loop.reach, pointDistance(straight.start, straight.end) + 2 * loop.radius);
}

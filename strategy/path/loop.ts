import type { Contour } from './contour.ts';
import { contourArea } from './contour.ts';
import { cornerOfPath } from './corner.ts';
import type { Point } from './point.ts';
import { pointAdd, pointLeft, pointScale, pointSubtract } from './point.ts';
import type { Arc, Line } from './segment.ts';
import { arcOf, lineBetween } from './segment.ts';

/** The corner of the path a loop is put on: where it is, how the cut arrives and how it leaves, the angle inside the part. */
export type LoopCorner = {
  readonly point: Point; // m, corner of the path (not of the finished edges)
  readonly incoming: Point;
  readonly outgoing: Point;
  readonly angle: number; // rad
};

/** A loop on the scrap side of a tip: run on past the corner, turn away from the part, come back along the second edge's line. */
export type Loop = {
  readonly radius: number; // m
  readonly extension: number; // m
  readonly length: number; // m
  /** Farthest distance of the path from the corner, m. */
  readonly reach: number;
  readonly segments: readonly [Line, Arc, Line];
};

/** Length of the loop's path, m: 2e + r(π + β), with β the angle inside the part, rad. Plane geometry. */
export const loopLength = (radius: number, extension: number, angle: number): number =>
  2 * extension + radius * (Math.PI + angle);

/** Farthest distance of the loop's path from the corner, m: e(1 + sin(β/2))/cos(β/2). Plane geometry. */
export const loopReach = (extension: number, angle: number): number =>
  (extension * (1 + Math.sin(angle / 2))) / Math.cos(angle / 2);

/** Extension that belongs to a radius, m: e = r/tan(β/2). Plane geometry of a circle that touches both edges' lines. */
export const loopExtension = (radius: number, angle: number): number => radius / Math.tan(angle / 2);

/**
 * The loop of a given radius, m, on a convex corner of the path. Throws RangeError when the corner is no tip (angle outside (0, π)) or
 * the radius is not positive.
 */
export function loopAt(corner: LoopCorner, radius: number): Loop {
  const { point, incoming, outgoing, angle } = corner;
  if (!(angle > 0 && angle < Math.PI))
    throw new RangeError(`corner angle ${angle} rad is outside (0, π): no tip to loop`);
  if (!(radius > 0)) throw new RangeError(`loop radius ${radius} m is outside (0, ∞)`);
  const extension = loopExtension(radius, angle);
  const out = pointAdd(point, pointScale(incoming, extension));
  const back = pointSubtract(point, pointScale(outgoing, extension));
  // the part is on the left, so the arc turns right
  const centre = pointSubtract(out, pointScale(pointLeft(incoming), radius));
  const arc = arcOf(centre, radius, Math.atan2(out.y - centre.y, out.x - centre.x), -(Math.PI + angle));
  return {
    radius,
    extension,
    length: loopLength(radius, extension, angle),
    reach: loopReach(extension, angle),
    segments: [lineBetween(point, out), arc, lineBetween(back, point)],
  };
}

/** What a loop cuts out and lets fall. */
export type Slug = { readonly contour: Contour; readonly area: number };

/**
 * The slug of a loop, its outline in m and area in m², or null when the kerf takes all of it. Half the kerf is lost all round; the rest is
 * the same figure with a radius smaller by half the kerf, whose tip lies half a kerf further out.
 */
export function loopSlug(corner: LoopCorner, loop: Loop, kerfWidth: number): Slug | null {
  const radius = loop.radius - kerfWidth / 2;
  if (!(radius > 0)) return null;
  const contour = { segments: loopAt({ ...corner, point: cornerOfPath(corner, kerfWidth) }, radius).segments };
  return { contour, area: Math.abs(contourArea(contour)) };
}

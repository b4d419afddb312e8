import type { Contour } from './contour.ts';
import type { Corner } from './corner.ts';
import { cornerInward } from './corner.ts';
import { segmentMeetings, segmentNearestPoint } from './distance.ts';
import type { LoopCorner } from './loop.ts';
import type { Point } from './point.ts';
import { pointAdd, pointCross, pointDistance, pointDot, pointLeft, pointScale, pointSubtract } from './point.ts';
import type { Arc, Segment } from './segment.ts';
import { arcOf, lineBetween, segmentLength, segmentPart, segmentStart, segmentTangentAt } from './segment.ts';

/** A finished corner rounded by an arc that both edges run into without a kink. */
export type CornerRound = {
  readonly radius: number; // m
  /** Greatest distance of the rounded edge from the drawn corner, m. */
  readonly deviation: number;
  readonly arc: Arc;
  /** Shares of the edge before and of the edge after at which the arc begins and ends. */
  readonly from: number;
  readonly to: number;
};

/** How far a corner of an angle (rad) between straight edges is off when it is rounded with a radius (m): r(1/sin(β/2) − 1), m. Plane geometry. */
export const roundDeviation = (radius: number, angle: number): number => radius * (1 / Math.sin(angle / 2) - 1);

/** The radius that a deviation allows, m: the other way round. */
export const roundRadius = (deviation: number, angle: number): number => deviation / (1 / Math.sin(angle / 2) - 1);

/** Length of edge that the rounding of a corner takes from each side, m: r/tan(β/2). Plane geometry. */
export const roundTangent = (radius: number, angle: number): number => radius / Math.tan(angle / 2);

/** The arc on which a path goes round a tip, from one edge's line to the other's, the part on its left. Plane geometry. */
export function arcRound({ point, incoming, angle }: LoopCorner, radius: number): Arc {
  const start = pointSubtract(point, pointScale(incoming, roundTangent(radius, angle)));
  const centre = pointAdd(start, pointScale(pointLeft(incoming), radius));
  return arcOf(centre, radius, Math.atan2(start.y - centre.y, start.x - centre.x), Math.PI - angle);
}

/**
 * The round of a sharp convex corner of a contour with a radius in m, or null where an edge is too short for it. Exact for lines and arcs: the arc's
 * centre lies the radius inside both edges. Throws RangeError for a corner that is concave or drawn with a fillet, and a radius that is not positive.
 */
export function cornerRound(contour: Contour, corner: Corner, radius: number): CornerRound | null {
  if (!corner.convex || corner.fillet) throw new RangeError('only a sharp tip can be rounded');
  if (!(radius > 0)) throw new RangeError(`radius ${radius} m is outside (0, ∞)`);
  const { segments } = contour;
  const [before, after] = [segments[(corner.index + segments.length - 1) % segments.length], segments[corner.index]];
  if (!before || !after || segmentLength(before) === 0 || segmentLength(after) === 0) return null;
  const [inBefore, inAfter] = [moved(before, radius), moved(after, radius)];
  if (!inBefore || !inAfter) return null;
  // of two places where the moved edges meet the one by the corner is meant
  const expected = pointAdd(corner.point, pointScale(cornerInward(corner), radius / Math.sin(corner.angle / 2)));
  const centre = nearestTo(expected, segmentMeetings(inBefore, inAfter));
  if (!centre) return null;
  const [start, end] = [segmentNearestPoint(before, centre), segmentNearestPoint(after, centre)];
  const sweep = angleFrom(start, centre, end);
  // an arc that turns back is none between these edges
  if (!(sweep > 0 && sweep < Math.PI)) return null;
  return {
    radius,
    deviation: pointDistance(corner.point, centre) - radius,
    arc: arcOf(centre, radius, Math.atan2(start.y - centre.y, start.x - centre.x), sweep),
    from: shareAt(before, start),
    to: shareAt(after, end),
  };
}

/** Angle about a centre from one place to another, counter-clockwise, 0..2π rad. */
function angleFrom(from: Point, centre: Point, to: Point): number {
  const [a, b] = [pointSubtract(from, centre), pointSubtract(to, centre)];
  const angle = Math.atan2(pointCross(a, b), pointDot(a, b));
  return angle < 0 ? angle + 2 * Math.PI : angle;
}

function nearestTo(place: Point, found: readonly Point[]): Point | null {
  return found.reduce<Point | null>(
    (best, p) => (best === null || pointDistance(p, place) < pointDistance(best, place) ? p : best),
    null,
  );
}

/** A segment moved to its left by a distance, m; null for an arc that vanishes. */
function moved(segment: Segment, by: number): Segment | null {
  if (segment.kind === 'line') {
    const shift = pointScale(pointLeft(segmentTangentAt(segment, 0)), by);
    return lineBetween(pointAdd(segment.start, shift), pointAdd(segment.end, shift));
  }
  // the left of a counter-clockwise arc is towards its centre
  const radius = segment.radius - Math.sign(segment.sweep) * by;
  return radius > 0 ? { ...segment, radius } : null;
}

/** Share of a segment's length at which a place on it lies. */
function shareAt(segment: Segment, p: Point): number {
  if (segment.kind === 'line') return pointDistance(segment.start, p) / segmentLength(segment);
  const turned = angleFrom(segmentStart(segment), segment.centre, p);
  return (segment.sweep > 0 ? turned : 2 * Math.PI - turned) / Math.abs(segment.sweep);
}

/** The contour with some of its sharp corners rounded; each round belongs to the corner at the start of the segment `index`. */
export function contourRounded(
  contour: Contour,
  rounds: readonly { readonly index: number; readonly round: CornerRound }[],
): Contour {
  const { segments } = contour;
  const count = segments.length;
  const byIndex = new Map(rounds.map(({ index, round }) => [index, round]));
  const rounded = segments.flatMap((segment, i): Segment[] => {
    const here = byIndex.get(i);
    const next = byIndex.get((i + 1) % count);
    const [from, to] = [here?.to ?? 0, next?.from ?? 1];
    const rest = to - from > 1e-12 ? [segmentPart(segment, from, to)] : [];
    return here ? [here.arc, ...rest] : rest;
  });
  return { segments: rounded };
}

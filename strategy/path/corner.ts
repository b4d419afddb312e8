import type { Contour } from './contour.ts';
import type { Point } from './point.ts';
import { pointAdd, pointCross, pointDot, pointLeft, pointScale } from './point.ts';
import { segmentStart, segmentTangentAt } from './segment.ts';

/** A break of direction on a finished contour whose part lies on the left. */
export type Corner = {
  /** The corner stands at the start of this segment of the contour. */
  readonly index: number;
  readonly point: Point; // m, where the two finished edges meet
  /** Angle inside the part, rad, 0..2π. */
  readonly angle: number;
  /** True for a tip of the part (angle below π), whether on its outside or poking into a hole. */
  readonly convex: boolean;
  readonly incoming: Point; // unit vector of travel into the corner
  readonly outgoing: Point; // unit vector of travel out of it
};

/** Breaks of direction below this are a curve drawn in pieces, not a corner, rad (15°; common practice, no source). */
export const smallestBreak = (15 * Math.PI) / 180;

/**
 * Corners of a contour in the order of travel. The contour must have the part on its left: outer contours counter-clockwise, holes
 * clockwise, as a drawing reading leaves them; then the angle inside the part is π minus the turn, whatever the role.
 */
export function contourCorners(contour: Contour, leastBreak: number = smallestBreak): Corner[] {
  const { segments } = contour;
  const corners: Corner[] = [];
  for (let index = 0; index < segments.length; index++) {
    const before = segments[(index + segments.length - 1) % segments.length];
    const after = segments[index];
    if (!before || !after) continue;
    const incoming = segmentTangentAt(before, 1);
    const outgoing = segmentTangentAt(after, 0);
    const turn = Math.atan2(pointCross(incoming, outgoing), pointDot(incoming, outgoing));
    if (Math.abs(turn) < leastBreak) continue;
    const angle = Math.PI - turn;
    corners.push({ index, point: segmentStart(after), angle, convex: angle < Math.PI, incoming, outgoing });
  }
  return corners;
}

/** Unit vector from the corner along the bisector into the part. */
export function cornerInward(corner: Pick<Corner, 'incoming' | 'outgoing' | 'angle'>): Point {
  // turning the outgoing edge by half the inside angle to the left lands on the bisector, also for a spike of angle near 0
  const c = Math.cos(corner.angle / 2);
  const s = Math.sin(corner.angle / 2);
  const left = pointLeft(corner.outgoing);
  return { x: c * corner.outgoing.x + s * left.x, y: c * corner.outgoing.y + s * left.y };
}

/**
 * The corner of the path the cut runs on, m: half the kerf outside both finished edges, so (kerf/2)/sin(angle/2) from the finished
 * corner along the bisector. Edges that are arcs are taken by their tangents.
 */
export function cornerOfPath(
  corner: Pick<Corner, 'point' | 'incoming' | 'outgoing' | 'angle'>,
  kerfWidth: number,
): Point {
  const away = -kerfWidth / 2 / Math.sin(corner.angle / 2);
  return pointAdd(corner.point, pointScale(cornerInward(corner), away));
}

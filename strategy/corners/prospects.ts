import type { Contour } from '../path/contour.ts';
import { contourLength } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import { contourCorners, cornerOfPath } from '../path/corner.ts';
import type { Point } from '../path/point.ts';
import { pointSubtract } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentLength, segmentShift } from '../path/segment.ts';
import type { PlanContour, Prospect } from './case.ts';
import type { CutConditions } from './rules.ts';

/** Path before a corner whose heat is counted, m. */
const countedPath = 0.3;

/** Sharper than this a tip, or a notch, is a spike of no use: within any kerf for centimetres, rad (about 2°). */
const spike = 0.04;

/** The corners of a contour in the order of travel. */
export function prospectsOf(
  contour: PlanContour,
  { cut }: { readonly cut: Pick<CutConditions, 'kerfWidth'> },
): Prospect[] {
  const corners = contourCorners(contour.contour);
  if (corners.length === 0) return [];
  const starts: number[] = [];
  let length = 0;
  for (const segment of contour.contour.segments) {
    starts.push(length);
    length += segmentLength(segment);
  }
  const whole = contourLength(contour.contour);
  const between = (a: Corner | undefined, b: Corner | undefined): number => {
    const way = (starts[b?.index ?? 0] ?? 0) - (starts[a?.index ?? 0] ?? 0);
    return way > 0 ? way : way + whole;
  };
  return corners.map((corner, i) => {
    const { point: finished, incoming, outgoing, fillet, index } = corner;
    const angle = Math.min(2 * Math.PI - spike, Math.max(spike, corner.angle));
    const point = cornerOfPath({ point: finished, incoming, outgoing, angle }, cut.kerfWidth);
    return {
      id: `c${contour.id}-${index}`,
      contour,
      corner,
      onPath: { point, incoming, outgoing, angle },
      // beside a notch the path's arc is the smaller one
      drawnRound: fillet && corner.convex ? fillet.radius + cut.kerfWidth / 2 : undefined,
      room: {
        before: between(corners[(i + corners.length - 1) % corners.length], corner) / 2,
        after: between(corner, corners[(i + 1) % corners.length]) / 2,
      },
    };
  });
}

/** Whether the rules would have a corner treated when it is too hot. */
export const treated = (corner: Corner, belowAngle: number): boolean =>
  corner.convex && corner.angle < belowAngle && !doublesBack(corner);

/** A spike or a slit without width. */
export const doublesBack = ({ angle }: Corner): boolean => angle < spike || angle > 2 * Math.PI - spike;

/** Way to the nearer of the corners beside it, m, when that is less than the kerf is wide; otherwise null: one kerf takes both. */
export function tooNear({ room }: Prospect, kerfWidth: number): number | null {
  const way = 2 * Math.min(room.before, room.after);
  return way < kerfWidth ? way : null;
}

/** The path cut before a corner: back along the contour for `countedPath`, but not into the second edge, which is still to be cut. */
export function pathBefore({ segments }: Contour, corner: Corner, onPath: Point): Segment[] {
  const shift = pointSubtract(onPath, corner.point);
  const before: Segment[] = [];
  let length = 0;
  const { fillet } = corner;
  if (fillet) {
    // the edges are taken to where they would meet; what rounds them is cut off again
    const edge = lineBetween(fillet.start, corner.point);
    length += segmentLength(edge);
    if (length > 0) before.push(segmentShift(edge, shift));
  }
  const [first, pieces] = [fillet?.first ?? corner.index, fillet?.pieces ?? 0];
  for (let back = 1; back < segments.length - pieces && length < countedPath; back++) {
    const segment = segments[(first + segments.length - back) % segments.length];
    if (!segment) break;
    const own = segmentLength(segment);
    if (own > 0) before.unshift(segmentShift(segment, shift));
    length += own;
  }
  return before;
}

/** The path behind a corner for at least `wanted` m, or until the first edge comes again. */
export function pathAfter({ segments }: Contour, corner: Corner, onPath: Point, wanted: number): Segment[] {
  const shift = pointSubtract(onPath, corner.point);
  const [first, own] = [corner.fillet?.first ?? corner.index, corner.fillet?.pieces ?? 0];
  const after: Segment[] = [];
  let length = 0;
  for (let i = own; i < segments.length - 1 && length < wanted; i++) {
    const segment = segments[(first + i) % segments.length];
    if (!segment) break;
    after.push(segmentShift(segment, shift));
    length += segmentLength(segment);
  }
  return after;
}

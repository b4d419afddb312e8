import type { Contour } from '../contour.ts';
import { cornerOfPath } from '../corner.ts';
import type { Point } from '../point.ts';
import { pointAdd, pointCross, pointDistance, pointDot, pointLeft, pointScale } from '../point.ts';
import type { Segment } from '../segment.ts';
import {
  arcOf,
  lineBetween,
  segmentEnd,
  segmentFromBulge,
  segmentShift,
  segmentStart,
  segmentTangentAt,
} from '../segment.ts';

/** What the path does outside a corner: run round it at an even distance, or straight on until both edges' lines meet. */
export type OutsideCorner =
  | { readonly kind: 'arc' }
  /** Run round it all the same where the meeting place would lie farther from the corner than `limit` times the distance of the path. */
  | { readonly kind: 'sharp'; readonly limit: number };

/** Where a piece of the path comes from: beside a segment of the contour, or around the corner at a segment's start. */
export type PathSource = { readonly kind: 'edge' | 'corner'; readonly index: number };

export type ParallelPiece = { readonly segment: Segment; readonly source: PathSource };

/** Steel that a sharp corner takes beyond the even distance: finished corner, end of one edge's parallel, meeting place, start of the other's. */
export type Kite = { readonly index: number; readonly points: readonly [Point, Point, Point, Point] };

export type Parallels = {
  readonly pieces: readonly ParallelPiece[];
  readonly kites: readonly Kite[];
};

/** Joints that turn less than this are smooth: at a kerf's width their ends part by less than a nanometre, rad. */
const smooth = 1e-7;

/** Near a full turn back the sign of the turn is rounding: the path runs round such a corner, which does no harm where it is a notch, rad. */
const cusp = 1e-6;

/**
 * All parallels of a contour's segments at `distance` m on the right of travel, and what goes round its outside corners, in order of travel. Beside inside
 * corners the parallels cross, and an arc no wider than the distance has none: the pieces are not a path yet.
 */
export function contourParallels(
  segments: readonly Segment[],
  distance: number,
  outside: OutsideCorner,
  sharpAt?: ReadonlySet<number>,
): Parallels {
  const pieces: ParallelPiece[] = [];
  const kites: Kite[] = [];
  for (let index = 0; index < segments.length; index++) {
    const after = segments[index];
    const before = segments[(index + segments.length - 1) % segments.length];
    if (!after || !before) continue;
    goRound(index, before, after);
    const segment = parallelOf(after, distance);
    if (segment) pieces.push({ segment, source: { kind: 'edge', index } });
  }
  return { pieces, kites };

  function goRound(index: number, before: Segment, after: Segment): void {
    const incoming = segmentTangentAt(before, 1);
    const outgoing = segmentTangentAt(after, 0);
    const turn = Math.atan2(pointCross(incoming, outgoing), pointDot(incoming, outgoing));
    const back = Math.abs(turn) > Math.PI - cusp;
    if (turn < smooth && !back) return;
    const point = segmentStart(after);
    const from = pointAdd(point, pointScale(pointLeft(incoming), -distance));
    const to = pointAdd(point, pointScale(pointLeft(outgoing), -distance));
    const source: PathSource = { kind: 'corner', index };
    // how far the meeting place lies from the corner, in distances of the path
    const reach = 1 / Math.cos(turn / 2);
    if (!back && (sharpAt?.has(index) || (outside.kind === 'sharp' && reach <= outside.limit))) {
      const tip = cornerOfPath({ point, incoming, outgoing, angle: Math.PI - turn }, 2 * distance);
      pieces.push({ segment: lineBetween(from, tip), source }, { segment: lineBetween(tip, to), source });
      kites.push({ index, points: [point, from, tip, to] });
      return;
    }
    const sweep = back ? Math.PI : turn;
    pieces.push({
      segment: arcOf(point, distance, Math.atan2(from.y - point.y, from.x - point.x), sweep),
      source,
    });
  }
}

/** The parallel of a segment at `distance` m on its right, or null for an arc that turns right and is no wider than that. */
export function parallelOf(segment: Segment, distance: number): Segment | null {
  if (segment.kind === 'line') {
    return segmentShift(segment, pointScale(pointLeft(segmentTangentAt(segment, 0)), -distance));
  }
  const radius = segment.radius + Math.sign(segment.sweep) * distance;
  return radius > 1e-6 * distance ? { ...segment, radius } : null;
}

/**
 * The segments of a contour with joints that meet to the last bit of rounding: ends that lie `slack` m or less beside the next start are brought there.
 * Throws RangeError where a joint is wider open or a segment has no length.
 */
export function joinedSegments({ segments }: Contour, slack: number): readonly Segment[] {
  return segments.map((segment, i) => {
    const next = segments[(i + 1) % segments.length];
    if (!next) return segment;
    const end = segmentEnd(segment);
    const to = segmentStart(next);
    const gap = pointDistance(end, to);
    if (!(gap <= slack)) {
      throw new RangeError(`the contour is open by ${gap} m after segment ${i}, more than ${slack} m`);
    }
    if (segment.kind === 'line') return gap === 0 ? segment : lineBetween(segment.start, to);
    // only a joint that shows is worth an arc's digits
    return gap <= slack * 1e-5 ? segment : segmentFromBulge(segmentStart(segment), to, Math.tan(segment.sweep / 4));
  });
}

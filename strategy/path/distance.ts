import type { Point } from './point.ts';
import { pointAdd, pointCross, pointDistance, pointDot, pointLength, pointScale, pointSubtract } from './point.ts';
import type { Arc, Line, Segment } from './segment.ts';
import { arcCovers, arcPointAtAngle, segmentEnd, segmentStart } from './segment.ts';

/** A least distance and the two places where it is taken, m. */
export type Nearest = { readonly distance: number; readonly onFirst: Point; readonly onSecond: Point };

/** The place of the segment nearest to a point, m. */
export function segmentNearestPoint(segment: Segment, p: Point): Point {
  if (segment.kind === 'line') {
    const along = pointSubtract(segment.end, segment.start);
    const square = pointDot(along, along);
    if (square === 0) return segment.start;
    const t = pointDot(pointSubtract(p, segment.start), along) / square;
    return pointAdd(segment.start, pointScale(along, Math.min(1, Math.max(0, t))));
  }
  const out = pointSubtract(p, segment.centre);
  const angle = pointLength(out) > 0 ? Math.atan2(out.y, out.x) : segment.startAngle;
  if (arcCovers(segment, angle)) return arcPointAtAngle(segment, angle);
  const a = segmentStart(segment);
  const b = segmentEnd(segment);
  return pointDistance(a, p) <= pointDistance(b, p) ? a : b;
}

/** Distance of a point from a segment, m. */
export const segmentPointDistance = (segment: Segment, p: Point): number =>
  pointDistance(segmentNearestPoint(segment, p), p);

/** Places where two segments meet; overlapping collinear or concentric pieces give none (their ends are found by distance). */
export function segmentMeetings(a: Segment, b: Segment): Point[] {
  if (a.kind === 'line' && b.kind === 'line') return lineMeetsLine(a, b);
  if (a.kind === 'line' && b.kind === 'arc') return lineMeetsArc(a, b);
  if (a.kind === 'arc' && b.kind === 'line') return lineMeetsArc(b, a);
  if (a.kind === 'arc' && b.kind === 'arc') return arcMeetsArc(a, b);
  return [];
}

/**
 * Least distance between two segments, m, exact for lines and arcs: 0 where they meet, otherwise taken at an end of one of
 * them or, with an arc, along a line through its centre.
 */
export function segmentDistance(a: Segment, b: Segment): Nearest {
  const meeting = segmentMeetings(a, b)[0];
  if (meeting) return { distance: 0, onFirst: meeting, onSecond: meeting };
  let best: Nearest = { distance: Infinity, onFirst: segmentStart(a), onSecond: segmentStart(b) };
  for (const p of [segmentStart(a), segmentEnd(a)]) best = nearer(best, p, segmentNearestPoint(b, p));
  for (const p of [segmentStart(b), segmentEnd(b)]) best = nearer(best, segmentNearestPoint(a, p), p);
  // the common normal passes through the centre of every arc involved
  if (a.kind === 'arc') {
    for (const { onArc, onOther } of throughCentre(a, b)) best = nearer(best, onArc, onOther);
  }
  if (b.kind === 'arc') {
    for (const { onArc, onOther } of throughCentre(b, a)) best = nearer(best, onOther, onArc);
  }
  return best;
}

/** The nearer of the best pair so far and another. No function of each call's own: this runs millions of times. */
function nearer(best: Nearest, onFirst: Point, onSecond: Point): Nearest {
  const distance = pointDistance(onFirst, onSecond);
  return distance < best.distance ? { distance, onFirst, onSecond } : best;
}

function throughCentre(arc: Arc, other: Segment): { readonly onArc: Point; readonly onOther: Point }[] {
  const towards = pointSubtract(
    other.kind === 'line' ? segmentNearestPoint(other, arc.centre) : other.centre,
    arc.centre,
  );
  // concentric? Then the ends, which are tried already, are as near as anything
  if (other.kind === 'arc' && pointLength(towards) === 0) return [];
  const direction = Math.atan2(towards.y, towards.x);
  const found: { onArc: Point; onOther: Point }[] = [];
  for (const angle of [direction, direction + Math.PI]) {
    if (!arcCovers(arc, angle)) continue;
    const onArc = arcPointAtAngle(arc, angle);
    found.push({ onArc, onOther: segmentNearestPoint(other, onArc) });
  }
  return found;
}

function lineMeetsLine(a: Line, b: Line): Point[] {
  const u = pointSubtract(a.end, a.start);
  const w = pointSubtract(b.end, b.start);
  const denominator = pointCross(u, w);
  // parallel but for rounding? Then the quotients below mean nothing, and the ends are as near as anything
  if (Math.abs(denominator) <= 1e-12 * pointLength(u) * pointLength(w)) return [];
  const between = pointSubtract(b.start, a.start);
  const s = pointCross(between, w) / denominator;
  const t = pointCross(between, u) / denominator;
  return s >= 0 && s <= 1 && t >= 0 && t <= 1 ? [pointAdd(a.start, pointScale(u, s))] : [];
}

function lineMeetsArc(line: Line, arc: Arc): Point[] {
  const u = pointSubtract(line.end, line.start);
  const f = pointSubtract(line.start, arc.centre);
  const a = pointDot(u, u);
  if (a === 0) return [];
  const b = pointDot(f, u) / a;
  const foot = pointSubtract(f, pointScale(u, b)); // from the centre, square to the line: no cancellation
  const inside = (arc.radius * arc.radius - pointDot(foot, foot)) / a;
  if (inside < 0) return [];
  const root = Math.sqrt(inside);
  const found: Point[] = [];
  for (const s of root === 0 ? [-b] : [-b - root, -b + root]) {
    if (s < 0 || s > 1) continue;
    const p = pointAdd(line.start, pointScale(u, s));
    if (arcCovers(arc, Math.atan2(p.y - arc.centre.y, p.x - arc.centre.x))) found.push(p);
  }
  return found;
}

function arcMeetsArc(a: Arc, b: Arc): Point[] {
  const between = pointSubtract(b.centre, a.centre);
  const d = pointLength(between);
  if (d === 0 || d > a.radius + b.radius || d < Math.abs(a.radius - b.radius)) return [];
  const along = (d * d + a.radius * a.radius - b.radius * b.radius) / (2 * d);
  const height = Math.sqrt(Math.max(0, a.radius * a.radius - along * along));
  const e = pointScale(between, 1 / d);
  const found: Point[] = [];
  for (const side of height === 0 ? [0] : [-height, height]) {
    const p = {
      x: a.centre.x + along * e.x - side * e.y,
      y: a.centre.y + along * e.y + side * e.x,
    };
    const covers = (arc: Arc) => arcCovers(arc, Math.atan2(p.y - arc.centre.y, p.x - arc.centre.x));
    if (covers(a) && covers(b)) found.push(p);
  }
  return found;
}

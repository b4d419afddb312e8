import type { LoopCorner } from '../../strategy/path/loop.ts';
import type { Point } from '../../strategy/path/point.ts';
import { pointAdd, pointDot, pointLeft, pointScale, pointSubtract } from '../../strategy/path/point.ts';
import type { Segment } from '../../strategy/path/segment.ts';
import { lineBetween, segmentLength, segmentPointAt, segmentTangentAt } from '../../strategy/path/segment.ts';
import { arcRound, roundTangent } from '../../strategy/path/round.ts';
import type { CornerCase } from './corners.ts';
import { loopOf } from './corners.ts';

/** A piece of the beam's way and the length travelled before it, m. */
export type WayPiece = { readonly segment: Segment; readonly start: number; readonly length: number };

/** The beam's way past one corner: a straight edge in, what the treatment adds, the second edge. Stations are lengths travelled, m. */
export type Way = {
  readonly corner: LoopCorner;
  readonly pieces: readonly WayPiece[];
  /** Station at which cutting along the second edge begins. */
  readonly arrival: number;
  readonly end: number;
};

/** The corner in its own place: the path's corner in the origin, the first edge along x, the part on the left. */
export function cornerOf(angle: number): LoopCorner {
  const turn = Math.PI - angle;
  return {
    point: { x: 0, y: 0 },
    incoming: { x: 1, y: 0 },
    // a straight edge leaves exactly as it came
    outgoing: turn === 0 ? { x: 1, y: 0 } : { x: Math.cos(turn), y: Math.sin(turn) },
    angle,
  };
}

/** The way of a case with `run` m of first edge and `after` m of second edge. Lines that continue each other are one piece. */
export function wayOf(one: CornerCase, run: number, after: number): Way {
  const corner = cornerOf(one.angle);
  const { incoming, outgoing, point } = corner;
  const start = pointSubtract(point, pointScale(incoming, run));
  const end = pointAdd(point, pointScale(outgoing, after));
  let segments: Segment[];
  let arrival = run;
  if (one.treatment.kind === 'loop') {
    const loop = loopOf(one.treatment, corner);
    const [first, ...rest] = loop.segments;
    const turns = rest.slice(0, -1);
    const back = rest.at(-1);
    if (!back || back.kind !== 'line') throw new RangeError('a loop comes back on a line');
    segments = [lineBetween(start, first.end), ...turns, lineBetween(back.start, end)];
    arrival = run + loop.length;
  } else if (one.round !== undefined) {
    const tangent = roundTangent(one.round, one.angle);
    const arc = arcRound(corner, one.round);
    const [from, to] = [
      pointSubtract(point, pointScale(incoming, tangent)),
      pointAdd(point, pointScale(outgoing, tangent)),
    ];
    segments = [lineBetween(start, from), arc, lineBetween(to, end)];
    arrival = run - tangent + segmentLength(arc);
  } else if (one.angle === Math.PI) {
    segments = [lineBetween(start, end)];
  } else {
    segments = [lineBetween(start, point), lineBetween(point, end)];
  }
  const pieces: WayPiece[] = [];
  let station = 0;
  for (const segment of segments) {
    const length = segmentLength(segment);
    pieces.push({ segment, start: station, length });
    station += length;
  }
  return { corner, pieces, arrival, end: station };
}

/** Index of the piece on which a station lies; a station between two belongs to the earlier one. */
export function pieceAt(way: Way, station: number): number {
  for (let i = 0; i < way.pieces.length; i++) {
    const piece = way.pieces[i];
    if (piece && station <= piece.start + piece.length) return i;
  }
  return way.pieces.length - 1;
}

/** Where the beam's axis is at a station, m. */
export function wayPoint(way: Way, station: number): Point {
  const piece = way.pieces[pieceAt(way, station)];
  if (!piece) throw new RangeError('a way has pieces');
  return segmentPointAt(piece.segment, Math.min(1, Math.max(0, (station - piece.start) / piece.length)));
}

/** A place beside a piece at a share of its length: `aside` m to the left of travel, m. */
export function besidePiece(segment: Segment, share: number, aside: number): Point {
  return pointAdd(segmentPointAt(segment, share), pointScale(pointLeft(segmentTangentAt(segment, share)), aside));
}

/** Distance of a place from a piece of way, m. */
export function distanceToPiece({ segment, length }: WayPiece, at: Point): number {
  if (segment.kind === 'line') {
    const from = pointSubtract(at, segment.start);
    const along = pointDot(from, segmentTangentAt(segment, 0));
    const inside = Math.min(length, Math.max(0, along));
    const square = pointDot(from, from) - along * along + (along - inside) ** 2;
    return Math.sqrt(Math.max(0, square));
  }
  const out = pointSubtract(at, segment.centre);
  const turned = turnedOn(segment.startAngle, segment.sweep, Math.atan2(out.y, out.x));
  if (turned <= Math.abs(segment.sweep)) return Math.abs(Math.hypot(out.x, out.y) - segment.radius);
  const ends = [segmentPointAt(segment, 0), segmentPointAt(segment, 1)];
  return Math.min(...ends.map((p) => Math.hypot(p.x - at.x, p.y - at.y)));
}

/** Station of a piece straight beside a place, m. */
export function stationBeside({ segment, start, length }: WayPiece, at: Point): number {
  if (segment.kind === 'line') {
    const along = pointDot(pointSubtract(at, segment.start), segmentTangentAt(segment, 0));
    return start + Math.min(length, Math.max(0, along));
  }
  const out = pointSubtract(at, segment.centre);
  const turned = turnedOn(segment.startAngle, segment.sweep, Math.atan2(out.y, out.x));
  const sweep = Math.abs(segment.sweep);
  if (turned <= sweep) return start + turned * segment.radius;
  return turned - sweep < 2 * Math.PI - turned ? start + length : start;
}

/** Angle travelled on an arc until it points in a direction, 0..2π. */
function turnedOn(startAngle: number, sweep: number, direction: number): number {
  const turn = 2 * Math.PI;
  return ((((direction - startAngle) * Math.sign(sweep)) % turn) + turn) % turn;
}

/**
 * Station at which a beam of radius `radius` m first covers a place, m, or Infinity when it never does: the kerf is all that lies within half its width of
 * the way travelled.
 */
export function opensAt(way: Way, at: Point, radius: number): number {
  for (const { segment, start, length } of way.pieces) {
    if (segment.kind === 'line') {
      const from = pointSubtract(at, segment.start);
      const along = pointDot(from, segmentTangentAt(segment, 0));
      const asideSquare = pointDot(from, from) - along * along;
      if (asideSquare > radius * radius) continue;
      const lead = Math.sqrt(radius * radius - asideSquare);
      if (along + lead < 0 || along - lead > length) continue;
      return start + Math.max(0, along - lead);
    }
    const out = pointSubtract(at, segment.centre);
    const far = Math.hypot(out.x, out.y);
    if (far === 0) continue;
    const cosine = (segment.radius ** 2 + far ** 2 - radius ** 2) / (2 * segment.radius * far);
    if (cosine > 1) continue;
    const lead = Math.acos(Math.max(-1, cosine));
    const turned = turnedOn(segment.startAngle, segment.sweep, Math.atan2(out.y, out.x));
    const whole = Math.abs(segment.sweep);
    // ahead of the arc's start counts as a small negative turn
    const signed = turned > whole + lead && turned > Math.PI ? turned - 2 * Math.PI : turned;
    if (signed + lead < 0 || signed - lead > whole) continue;
    return start + Math.max(0, signed - lead) * segment.radius;
  }
  return Infinity;
}

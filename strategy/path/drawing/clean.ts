import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import type { Segment } from '../segment.ts';
import { pathLength, segmentEnd, segmentFromBulge, segmentLength, segmentPointAt, segmentStart } from '../segment.ts';
import type { Piece } from './piece.ts';
import { pieceEnds } from './piece.ts';
import { firstOfEach, placeKey } from './soup.ts';

/** Something put right, and where, m. */
export type Repair = {
  readonly what:
    | 'zero-length piece dropped'
    | 'duplicate dropped'
    | 'duplicate drawn the other way dropped'
    | 'overlapping piece dropped'
    | 'edge drawn twice, kept for the outline on either side'
    | 'outline that encloses nothing dropped'
    | 'gap closed';
  readonly at: Point;
  /** Width of a gap, length of what was dropped, m. */
  readonly size?: number;
};

/** Pieces without their copies; what is said of the copies of piece i, if it has any. */
export type Cleaned = {
  readonly kept: readonly Piece[];
  readonly copies: ReadonlyMap<number, readonly Repair[]>;
  readonly repaired: readonly Repair[];
};

/** Pieces without those of no length (at most `tolerance` m), and with second copies of the same piece, whichever way it is drawn, put with the first. */
export function cleanPieces(pieces: readonly Piece[], tolerance: number): Cleaned {
  const repaired: Repair[] = [];
  const solid: Piece[] = [];
  for (const piece of pieces) {
    const { segments } = piece;
    const short = hasShort(segments, tolerance);
    const long = short ? segments.filter((s) => segmentLength(s) > tolerance) : segments;
    const first = segments[0];
    if (long.length > 0) solid.push(short ? { ...piece, segments: long } : piece);
    else if (first) repaired.push({ what: 'zero-length piece dropped', at: segmentStart(first) });
  }
  const keys = new Float64Array(solid.length);
  for (let i = 0; i < solid.length; i++) keys[i] = keyOf(solid[i]?.segments ?? []);
  const firsts = firstOfEach(keys, 16 * tolerance, (a, b) => isSame(solid[a], solid[b], tolerance));
  const copies = new Map<number, Repair[]>();
  if (!firsts) return { kept: solid, copies, repaired };
  const kept: Piece[] = [];
  const places = new Int32Array(solid.length);
  for (let i = 0; i < solid.length; i++) {
    const first = firsts[i] ?? i;
    const [piece, original] = [solid[i], solid[first]];
    if (!piece || !original) continue;
    if (i === first) {
      places[i] = kept.length;
      kept.push(piece);
      continue;
    }
    const at = pieceEnds(piece)[0];
    const sameWay = pointDistance(at, pieceEnds(original)[0]) <= 2 * tolerance;
    const said: Repair = {
      what: sameWay ? 'duplicate dropped' : 'duplicate drawn the other way dropped',
      at: piece.segments[0] ? segmentPointAt(piece.segments[0], 0.5) : at,
      size: pathLength(piece.segments),
    };
    const place = places[first] ?? 0;
    const others = copies.get(place);
    if (others) others.push(said);
    else copies.set(place, [said]);
  }
  return { kept, copies, repaired };
}

function hasShort(segments: readonly Segment[], tolerance: number): boolean {
  for (const segment of segments) if (segmentLength(segment) <= tolerance) return true;
  return false;
}

/** The same for a piece whichever way and from whichever of its corners it is drawn. */
function keyOf(segments: readonly Segment[]): number {
  let sum = 0;
  for (const segment of segments) sum += segmentKey(segment);
  return sum / segments.length;
}

/** A number for a segment that does not change with its sense. */
export function segmentKey(segment: Segment): number {
  if (segment.kind === 'line') {
    const { start, end } = segment;
    return placeKey(start, end, { x: (start.x + end.x) / 2, y: (start.y + end.y) / 2 });
  }
  const { centre, radius } = segment;
  // a full circle has no ends of its own
  if (isCircle(segment)) return placeKey(centre, centre, { x: centre.x + radius, y: centre.y });
  return placeKey(segmentStart(segment), segmentEnd(segment), segmentPointAt(segment, 0.5));
}

type Circle = Extract<Segment, { kind: 'arc' }>;

export const isCircle = (segment: Segment): segment is Circle =>
  segment.kind === 'arc' && Math.abs(segment.sweep) > 2 * Math.PI - 1e-9;

/** Whether two segments are the same, whichever way they are drawn, within `tolerance` m at their ends and middles. */
export function isSameSegment(a: Segment, b: Segment, tolerance: number): boolean {
  if (isCircle(a) || isCircle(b)) {
    if (!isCircle(a) || !isCircle(b)) return false;
    return pointDistance(a.centre, b.centre) <= tolerance && Math.abs(a.radius - b.radius) <= tolerance;
  }
  const [a0, a1, b0, b1] = [segmentStart(a), segmentEnd(a), segmentStart(b), segmentEnd(b)];
  const near = (p: Point, q: Point) => pointDistance(p, q) <= tolerance;
  if (!((near(a0, b0) && near(a1, b1)) || (near(a0, b1) && near(a1, b0)))) return false;
  return near(segmentPointAt(a, 0.5), segmentPointAt(b, 0.5));
}

function isSame(a: Piece | undefined, b: Piece | undefined, tolerance: number): boolean {
  const count = a?.segments.length ?? 0;
  const head = a?.segments[0];
  if (!a || !b || !head || count !== b.segments.length) return false;
  for (let shift = 0; shift < count; shift++) {
    const to = b.segments[shift];
    if (!to || !isSameSegment(head, to, tolerance)) continue;
    for (const step of count === 1 ? [1] : [1, -1]) {
      const matches = a.segments.every((segment, i) => {
        const other = b.segments[(((shift + step * i) % count) + count) % count];
        return other !== undefined && isSameSegment(segment, other, tolerance);
      });
      if (matches) return true;
    }
  }
  return false;
}

/** Gaps below this are rounding of the file's decimals and stay as they are, m. */
const exact = 1e-9;

/**
 * The segments of a closed chain with every joint brought to one point, and the gaps that were wider than `mention` m. A moved piece keeps its bulge, so
 * an arc stays an arc of the same sweep.
 */
export function closeJoints(
  segments: readonly Segment[],
  mention: number,
): { segments: readonly Segment[]; repaired: Repair[] } {
  const repaired: Repair[] = [];
  if (segments.length < 2 && pathLength(segments) > 0) {
    const only = segments[0];
    if (only && only.kind === 'arc' && Math.abs(only.sweep) < 2 * Math.PI) {
      // an arc that all but closes on itself becomes the circle it stands for
      const size = pointDistance(segmentStart(only), segmentEnd(only));
      if (size > mention) repaired.push({ what: 'gap closed', at: segmentStart(only), size });
      return { segments: [{ ...only, sweep: Math.sign(only.sweep) * 2 * Math.PI }], repaired };
    }
    return { segments, repaired };
  }
  const count = segments.length;
  const sizeAt = (i: number): number => {
    const before = segments[i === 0 ? count - 1 : i - 1];
    const segment = segments[i];
    return before && segment ? pointDistance(segmentEnd(before), segmentStart(segment)) : 0;
  };
  let widest = 0;
  for (let i = 0; i < count; i++) widest = Math.max(widest, sizeAt(i));
  if (widest <= exact) return { segments, repaired };
  const sizes = Float64Array.from(segments, (segment, i) => {
    const size = sizeAt(i);
    if (size > mention) repaired.push({ what: 'gap closed', at: segmentStart(segment), size });
    return size;
  });
  const points = segments.map((segment, i): Point => {
    const b = segmentStart(segment);
    const before = segments[i === 0 ? count - 1 : i - 1] ?? segment;
    if ((sizes[i] ?? 0) <= exact) return b;
    const a = segmentEnd(before);
    return { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
  });
  const joined = segments.map((segment, i): Segment => {
    const next = (i + 1) % count;
    const [start, end] = [points[i], points[next]];
    if (!start || !end || Math.max(sizes[i] ?? 0, sizes[next] ?? 0) <= exact) return segment;
    return segmentFromBulge(start, end, segment.kind === 'arc' ? Math.tan(segment.sweep / 4) : 0);
  });
  return { segments: joined, repaired };
}

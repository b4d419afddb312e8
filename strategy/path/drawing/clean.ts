import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import type { Segment } from '../segment.ts';
import { pathLength, segmentEnd, segmentFromBulge, segmentLength, segmentPointAt, segmentStart } from '../segment.ts';
import type { Piece } from './chain.ts';
import { pieceEnds } from './chain.ts';

/** Something put right, and where, m. */
export type Repair = {
  readonly what:
    'zero-length piece dropped' | 'duplicate dropped' | 'duplicate drawn the other way dropped' | 'gap closed';
  readonly at: Point;
  readonly size?: number;
};

/** Pieces without those of no length (at most `tolerance` m) and without second copies of the same piece, whichever way it is drawn. */
export function cleanPieces(pieces: readonly Piece[], tolerance: number): { kept: Piece[]; repaired: Repair[] } {
  const kept: Piece[] = [];
  const repaired: Repair[] = [];
  const seen = new Map<string, Set<string>>();
  for (const piece of pieces) {
    const segments = piece.segments.filter((s) => segmentLength(s) > tolerance);
    if (segments.length === 0) {
      const first = piece.segments[0];
      if (first) repaired.push({ what: 'zero-length piece dropped', at: segmentStart(first) });
      continue;
    }
    const key = keyOf({ ...piece, segments }, tolerance);
    const at = pieceEnds({ ...piece, segments })[0];
    const startsAt = `${Math.round(at.x / tolerance)},${Math.round(at.y / tolerance)}`;
    const starts = seen.get(key);
    if (starts) {
      const sameWay = starts.has(startsAt);
      repaired.push({ what: sameWay ? 'duplicate dropped' : 'duplicate drawn the other way dropped', at });
      starts.add(startsAt);
      continue;
    }
    seen.set(key, new Set([startsAt]));
    kept.push({ ...piece, segments });
  }
  return { kept, repaired };
}

function keyOf({ segments }: Piece, tolerance: number): string {
  const round = (p: Point) => `${Math.round(p.x / tolerance)},${Math.round(p.y / tolerance)}`;
  return segments
    .map((s) => {
      // a full circle has no ends of its own
      if (s.kind === 'arc' && Math.abs(s.sweep) > 2 * Math.PI - 1e-9)
        return `o${round(s.centre)},${Math.round(s.radius / tolerance)}`;
      const ends = [round(segmentStart(s)), round(segmentEnd(s))].sort();
      return `${ends.join(' ')} ${round(segmentPointAt(s, 0.5))}`;
    })
    .sort()
    .join('|');
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
): { segments: Segment[]; repaired: Repair[] } {
  const repaired: Repair[] = [];
  if (segments.length < 2 && pathLength(segments) > 0) {
    const only = segments[0];
    if (only && only.kind === 'arc' && Math.abs(only.sweep) < 2 * Math.PI) {
      // an arc that all but closes on itself becomes the circle it stands for
      const size = pointDistance(segmentStart(only), segmentEnd(only));
      if (size > mention) repaired.push({ what: 'gap closed', at: segmentStart(only), size });
      return { segments: [{ ...only, sweep: Math.sign(only.sweep) * 2 * Math.PI }], repaired };
    }
    return { segments: [...segments], repaired };
  }
  const joints = segments.map((segment, i) => {
    const before = segments[(i + segments.length - 1) % segments.length] ?? segment;
    const [a, b] = [segmentEnd(before), segmentStart(segment)];
    const size = pointDistance(a, b);
    if (size > mention) repaired.push({ what: 'gap closed', at: b, size });
    return { point: size > exact ? { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 } : b, size };
  });
  const joined = segments.map((segment, i): Segment => {
    const start = joints[i];
    const end = joints[(i + 1) % segments.length];
    if (!start || !end || Math.max(start.size, end.size) <= exact) return segment;
    return segmentFromBulge(start.point, end.point, segment.kind === 'arc' ? Math.tan(segment.sweep / 4) : 0);
  });
  return { segments: joined, repaired };
}

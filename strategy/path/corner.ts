import type { Contour } from './contour.ts';
import type { Point } from './point.ts';
import { pointAdd, pointCross, pointDot, pointLeft, pointScale, pointSubtract } from './point.ts';
import type { Segment } from './segment.ts';
import { segmentEnd, segmentLength, segmentStart, segmentTangentAt } from './segment.ts';

/** The rounding that the drawing itself gives a corner. */
export type Fillet = {
  readonly radius: number; // m, of its arc, or length over turn where it is drawn in pieces
  /** The segments of the contour that make it up: the first, and how many. */
  readonly first: number;
  readonly pieces: number;
  readonly start: Point; // m
  readonly end: Point; // m
};

/** A break of direction on a finished contour whose part lies on the left, or a fillet so small that heat takes it for one. */
export type Corner = {
  /**
   * The corner stands at the start of this segment of the contour, unlike any other; a fillet begins there, or ends there where it begins in a
   * sharp corner.
   */
  readonly index: number;
  /** Where the two finished edges meet, m; with a fillet where their tangents do. */
  readonly point: Point;
  /** Angle inside the part, rad, 0..2π. */
  readonly angle: number;
  /** True for a tip of the part (angle below π), whether on its outside or poking into a hole. */
  readonly convex: boolean;
  readonly incoming: Point; // unit vector of travel into the corner
  readonly outgoing: Point; // unit vector of travel out of it
  readonly fillet?: Fillet;
};

/** Breaks of direction below this are a curve drawn in pieces, not a corner, rad (15°; common practice, no source). */
export const smallestBreak = (15 * Math.PI) / 180;

/**
 * Fillets with a smaller radius count as corners, m. As deep as the return temperature is measured: heat that has come so far takes a smaller
 * rounding for a sharp tip. Own choice, no source.
 */
export const largestFillet = 1.5e-3;

/** A fillet that turns back further than this has no two edges that could meet: a slot's end, a pin's head, a small hole. rad */
const mostTurn = (175 * Math.PI) / 180;

const turnBetween = (from: Point, to: Point): number => Math.atan2(pointCross(from, to), pointDot(from, to));

/**
 * Corners of a contour in the order of travel: breaks of direction of at least `leastBreak` rad, and fillets of a radius below `filletBelow` m that turn
 * by as much, drawn as an arc, as arcs or in short straight pieces (a chamfer is one). The contour must have the part on its left: outer contours
 * counter-clockwise, holes clockwise, as a drawing reading leaves them; then the angle inside the part is π minus the turn, whatever the role.
 */
export function contourCorners(
  contour: Contour,
  leastBreak: number = smallestBreak,
  filletBelow: number = largestFillet,
): Corner[] {
  const pieces = piecesOf(contour);
  const count = pieces.length;
  const corners: Corner[] = [];
  const at = (i: number): Piece => {
    const piece = pieces[((i % count) + count) % count];
    if (!piece) throw new RangeError(`piece ${i} is none of ${count}`);
    return piece;
  };
  const tight = pieces.map((piece, i) => tightness(piece, at(i + 1).turnBefore, filletBelow));
  const tightAt = (i: number): number => tight[((i % count) + count) % count] ?? 0;
  /** Whether two neighbours belong to one fillet: arcs are not joined over a sharp corner, facets are. */
  const joined = (i: number): boolean =>
    tightAt(i) !== 0 &&
    tightAt(i - 1) === tightAt(i) &&
    (Math.abs(at(i).turnBefore) < leastBreak || bothLines(at(i - 1), at(i)));
  const inFillet = new Set<number>();
  const fillets = new Map<number, Corner>();
  for (let first = 0; first < count; first++) {
    if (tightAt(first) === 0 || joined(first)) continue;
    let last = first;
    while (last - first < count - 1 && joined(last + 1)) last++;
    const run = Array.from({ length: last - first + 1 }, (_, i) => at(first + i));
    const corner = filletOf(run, at(first - 1), at(last + 1), leastBreak);
    if (!corner) continue;
    fillets.set(first, corner.corner);
    for (let i = first + (corner.startsSharp ? 1 : 0); i <= last + (corner.endsSharp ? 0 : 1); i++)
      inFillet.add(i % count);
  }
  pieces.forEach((piece, i) => {
    if (Math.abs(piece.turnBefore) >= leastBreak && !inFillet.has(i)) {
      corners.push(
        cornerOf(piece.index, segmentStart(piece.segment), piece.turnBefore, at(i - 1).endTangent, piece.startTangent),
      );
    }
    const fillet = fillets.get(i);
    if (fillet) corners.push(fillet);
  });
  return corners;
}

/** A segment that has a length, with its place in the contour and its directions. */
type Piece = {
  readonly index: number;
  readonly segment: Segment;
  readonly length: number;
  readonly startTangent: Point;
  readonly endTangent: Point;
  /** Turn from the end of the piece before to its start, and along it, rad. */
  readonly turnBefore: number;
  readonly sweep: number;
};

function piecesOf({ segments }: Contour): Piece[] {
  const pieces = segments.flatMap((segment, index) => {
    const length = segmentLength(segment);
    if (length === 0) return [];
    const [startTangent, endTangent] = [segmentTangentAt(segment, 0), segmentTangentAt(segment, 1)];
    return [{ index, segment, length, startTangent, endTangent, sweep: segment.kind === 'arc' ? segment.sweep : 0 }];
  });
  return pieces.map((piece, i) => {
    const before = pieces[(i + pieces.length - 1) % pieces.length] ?? piece;
    return { ...piece, turnBefore: turnBetween(before.endTangent, piece.startTangent) };
  });
}

const bothLines = (a: Piece, b: Piece): boolean => a.segment.kind === 'line' && b.segment.kind === 'line';

/** Facets of a fillet share its turn; one whose breaks differ more is the edge beside a corner. */
const leastShare = 0.25;

/** The sign of a piece's turn when it turns as tightly as a fillet, otherwise 0. Of a break between two pieces each has half. */
function tightness({ segment, length, turnBefore, sweep }: Piece, turnAfter: number, filletBelow: number): number {
  if (segment.kind === 'arc') return segment.radius < filletBelow ? Math.sign(sweep) : 0;
  const [less, more] = [
    Math.min(Math.abs(turnBefore), Math.abs(turnAfter)),
    Math.max(Math.abs(turnBefore), Math.abs(turnAfter)),
  ];
  if (turnBefore * turnAfter <= 0 || less < leastShare * more) return 0;
  return length < (filletBelow * (less + more)) / 2 ? Math.sign(turnBefore) : 0;
}

/** The corner that a run of tight pieces rounds, or null when they turn too little or too far for one. */
function filletOf(run: readonly Piece[], before: Piece, after: Piece, leastBreak: number) {
  const [first, last] = [run[0], run[run.length - 1]];
  if (!first || !last) return null;
  // an arc that begins or ends in a sharp corner leaves that corner to itself; between two of them it is no third
  const startsSharp = first.segment.kind === 'arc' && Math.abs(first.turnBefore) >= leastBreak;
  const endsSharp = last.segment.kind === 'arc' && Math.abs(after.turnBefore) >= leastBreak;
  if (startsSharp && endsSharp) return null;
  const incoming = startsSharp ? first.startTangent : before.endTangent;
  const outgoing = endsSharp ? last.endTangent : after.startTangent;
  const turn =
    run.reduce((sum, piece, i) => sum + piece.sweep + (i > 0 ? piece.turnBefore : 0), 0) +
    (startsSharp ? 0 : first.turnBefore) +
    (endsSharp ? 0 : after.turnBefore);
  if (Math.abs(turn) < leastBreak || Math.abs(turn) > mostTurn) return null;
  const [start, end] = [segmentStart(first.segment), segmentEnd(last.segment)];
  // where the tangents meet
  const along = pointCross(pointSubtract(end, start), outgoing) / pointCross(incoming, outgoing);
  const point = pointAdd(start, pointScale(incoming, along));
  const length = run.reduce((sum, piece) => sum + piece.length, 0);
  const radius = run.length === 1 && first.segment.kind === 'arc' ? first.segment.radius : length / Math.abs(turn);
  const fillet: Fillet = { radius, first: first.index, pieces: run.length, start, end };
  const corner: Corner = {
    ...cornerOf(startsSharp ? after.index : first.index, point, turn, incoming, outgoing),
    fillet,
  };
  return { corner, startsSharp, endsSharp };
}

function cornerOf(index: number, point: Point, turn: number, incoming: Point, outgoing: Point): Corner {
  const angle = Math.PI - turn;
  return { index, point, angle, convex: angle < Math.PI, incoming, outgoing };
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

/**
 * Where the path waits at a tip before the second edge begins, m: in its corner, or where the arc beside a drawn fillet ends, half a kerf outside it.
 */
export function cornerWait(corner: Corner, kerfWidth: number): Point {
  const point = cornerOfPath(corner, kerfWidth);
  if (!corner.fillet) return point;
  return pointAdd(
    point,
    pointScale(corner.outgoing, (corner.fillet.radius + kerfWidth / 2) / Math.tan(corner.angle / 2)),
  );
}

import { segmentMeetings, segmentPointDistance } from '../distance.ts';
import type { Point } from '../point.ts';
import { pointCross, pointDistance, pointDot, pointScale, pointSubtract, pointUnit } from '../point.ts';
import type { Arc, Line, Segment } from '../segment.ts';
import {
  pathLength,
  segmentEnd,
  segmentLength,
  segmentPart,
  segmentPointAt,
  segmentStart,
  segmentTangentAt,
} from '../segment.ts';
import type { Cleaned, Repair } from './clean.ts';
import { isCircle, isSameSegment, segmentKey } from './clean.ts';
import { closingPieces } from './copies.ts';
import type { Joints } from './join.ts';
import type { Piece } from './piece.ts';
import { pieceEnds } from './piece.ts';
import { firstOfEach, segmentBoxes, touchingPairs } from './soup.ts';

/** Pieces that are not closed in themselves, and how each may be used. */
export type Loose = {
  readonly pieces: readonly Piece[];
  /** Places in the list of what was drawn. */
  readonly order: Int32Array;
  /** How often each must and may be used: the second time by the outline on its other side. */
  readonly least: Uint8Array;
  readonly most: Uint8Array;
  /** What is said of each copy that is not used; the piece itself last, where it need not be used either. */
  readonly unused: ReadonlyMap<number, readonly Repair[]>;
  /** Parts of longer pieces, cut where others begin to lie on them, and the places of the pieces that lie there. */
  readonly cut: ReadonlyMap<number, readonly number[]>;
};

/** Two pieces meet there, neither ending, m. */
export type Meeting = { readonly at: Point; readonly first: number; readonly second: number };

export type Sorted = {
  /** Places in the list of what was drawn of the pieces that are closed in themselves. */
  readonly closed: readonly number[];
  readonly loose: Loose;
  /** By the pieces' places in the list. */
  readonly meetings: readonly Meeting[];
  readonly repaired: readonly Repair[];
  /** So many pieces touch that not all could be looked at. */
  readonly tooDense: boolean;
};

/**
 * Pieces closed in themselves, and loose ones cut where they lie on each other along a line or a circle, so that what is drawn twice can be used once or for both
 * sides; `join` tells which ends meet. Lengths below `tolerance` m are rounding; ends nearer than `slack` m to where two pieces meet are about to be joined, which
 * is no crossing.
 */
export function sortPieces(
  { kept: pieces, copies }: Cleaned,
  tolerance: number,
  slack: number,
  join: (pieces: readonly Piece[]) => Joints,
): Sorted {
  const segments: Segment[] = [];
  const owner: number[] = [];
  for (let i = 0; i < pieces.length; i++) {
    for (const segment of pieces[i]?.segments ?? []) {
      segments.push(segment);
      owner.push(i);
    }
  }
  const meetings: Meeting[] = [];
  // shares of the length at which a segment is to be cut; an entry without any lies wholly on another
  const cuts = new Map<number, number[]>();
  const cutAt = (i: number, shares: readonly number[]) => {
    const known = cuts.get(i);
    if (known) known.push(...shares);
    else cuts.set(i, [...shares]);
  };
  let shares = 0;
  const whole = touchingPairs(segmentBoxes(segments), tolerance, (i, k) => {
    const [a, b] = [segments[i], segments[k]];
    const [first, second] = [owner[i] ?? 0, owner[k] ?? 0];
    if (!a || !b || (first === second && k === i + 1 && a.kind === 'line' && b.kind === 'line')) return;
    if (a.kind === 'line' && b.kind === 'line' && (liesAside(a, b, tolerance) || liesAside(b, a, tolerance))) return;
    const shared = first === second ? null : overlapOf(a, b, tolerance);
    if (shared) {
      shares += shared.onFirst.length + shared.onSecond.length;
      if (shares > mostCuts) return;
      cutAt(i, shared.onFirst);
      cutAt(k, shared.onSecond);
    } else if (meetings.length < mostMeetings) {
      for (const at of segmentMeetings(a, b)) {
        if (isCrossing(a, b, at, slack)) meetings.push({ at, first, second });
      }
    }
  });

  const isOwn = new Uint8Array(pieces.length);
  const closed: number[] = [];
  const repaired: Repair[] = [];
  for (let i = 0; i < pieces.length; i++) {
    const piece = pieces[i];
    if (!piece || !isClosed(piece, tolerance)) continue;
    isOwn[i] = 1;
    closed.push(i);
    // a second copy of what is closed in itself bounds nothing
    for (const copy of copies.get(i) ?? []) repaired.push(copy);
  }
  let loose = looseOf(pieces, copies, (i) => isOwn[i] === 0);
  // lines that lie on each other by ten thousands are no outline: they stay as they were drawn
  if (cuts.size > 0 && shares <= mostCuts) {
    const cutUp = cutPieces(pieces, copies, isOwn, segments, owner, cuts, tolerance);
    const mended = restored(pieces, copies, cutUp, join);
    loose = mended.loose;
    for (const repair of mended.repaired) repaired.push(repair);
  }
  return { closed, loose, meetings, repaired, tooDense: !whole || shares > mostCuts };
}

function looseOf(pieces: readonly Piece[], copies: Cleaned['copies'], take: (i: number) => boolean): Loose {
  const taken: Piece[] = [];
  const order: number[] = [];
  for (let i = 0; i < pieces.length; i++) {
    const piece = pieces[i];
    if (!piece || !take(i)) continue;
    taken.push(piece);
    order.push(i);
  }
  const unused = new Map<number, readonly Repair[]>();
  const most = new Uint8Array(taken.length).fill(1);
  if (copies.size > 0) {
    for (let k = 0; k < taken.length; k++) {
      const own = copies.get(order[k] ?? 0);
      if (!own) continue;
      unused.set(k, own);
      most[k] = 2;
    }
  }
  const least = new Uint8Array(taken.length).fill(1);
  return { pieces: taken, order: Int32Array.from(order), least, most, unused, cut: new Map() };
}

/**
 * Pieces that were cut and lead to nothing closed, as they were drawn; left out where they lie wholly on what is closed. Only outlines gain by the cutting.
 */
function restored(
  pieces: readonly Piece[],
  copies: Cleaned['copies'],
  cutUp: Loose,
  join: (pieces: readonly Piece[]) => Joints,
): { loose: Loose; repaired: Repair[] } {
  const alive = closingPieces(cutUp, join(cutUp.pieces));
  const live = new Set<number>();
  const bare = new Set<number>();
  for (const [k, members] of cutUp.cut) {
    for (const member of members) {
      if (alive[k]) live.add(member);
      if (cutUp.least[k] === 1) bare.add(member);
    }
  }
  const repaired: Repair[] = [];
  const back = new Set<number>();
  for (const member of new Set([...cutUp.cut.values()].flat())) {
    const piece = pieces[member];
    if (!piece || live.has(member)) continue;
    if (bare.has(member)) {
      back.add(member);
      continue;
    }
    repaired.push(...(copies.get(member) ?? []));
    repaired.push({ what: 'overlapping piece dropped', at: pieceEnds(piece)[0], size: pathLength(piece.segments) });
  }
  const stays = (k: number): boolean => cutUp.cut.get(k)?.some((member) => live.has(member)) ?? true;
  return {
    loose: looseJoined(
      looseFilter(cutUp, stays),
      looseOf(pieces, copies, (i) => back.has(i)),
    ),
    repaired,
  };
}

function looseFilter(loose: Loose, stays: (k: number) => boolean): Loose {
  const kept = Array.from(loose.pieces, (_, k) => k).filter(stays);
  const part = <T>(map: ReadonlyMap<number, T>): Map<number, T> => {
    const found = new Map<number, T>();
    for (const [to, k] of kept.entries()) {
      const value = map.get(k);
      if (value !== undefined) found.set(to, value);
    }
    return found;
  };
  return {
    pieces: kept.flatMap((k) => loose.pieces[k] ?? []),
    order: Int32Array.from(kept, (k) => loose.order[k] ?? 0),
    least: Uint8Array.from(kept, (k) => loose.least[k] ?? 1),
    most: Uint8Array.from(kept, (k) => loose.most[k] ?? 1),
    unused: part(loose.unused),
    cut: part(loose.cut),
  };
}

function looseJoined(a: Loose, b: Loose): Loose {
  const shifted = <T>(one: ReadonlyMap<number, T>, other: ReadonlyMap<number, T>): Map<number, T> =>
    new Map([...one, ...[...other].map(([k, value]): [number, T] => [k + a.pieces.length, value])]);
  return {
    pieces: [...a.pieces, ...b.pieces],
    order: Int32Array.from([...a.order, ...b.order]),
    least: Uint8Array.from([...a.least, ...b.least]),
    most: Uint8Array.from([...a.most, ...b.most]),
    unused: shifted(a.unused, b.unused),
    cut: shifted(a.cut, b.cut),
  };
}

/** Cuts made at most. */
const mostCuts = 50_000;

/** Meetings kept: those of pieces that are no contour are left out later. */
const mostMeetings = 5000;

function isClosed(piece: Piece, tolerance: number): boolean {
  const only = piece.segments[0];
  if (piece.segments.length === 1 && only?.kind === 'line') return false;
  const [start, end] = pieceEnds(piece);
  if (pointDistance(start, end) > tolerance) return false;
  return piece.segments.length > 1 || (only?.kind === 'arc' && segmentLength(only) > 4 * tolerance);
}

type Shared = { readonly onFirst: readonly number[]; readonly onSecond: readonly number[] };

/** Where two segments lie on each other over more than a rounding: the shares of each at which the other begins or ends. Null when they don't. */
export function overlapOf(a: Segment, b: Segment, tolerance: number): Shared | null {
  if (a.kind === 'line' && b.kind === 'line') return overlapOfLines(a, b, tolerance);
  if (a.kind === 'arc' && b.kind === 'arc') return overlapOfArcs(a, b, tolerance);
  return null;
}

/** Whether all of one line lies to one side of the other's, by more than the tolerance: the quick answer for most pairs. */
function liesAside({ start, end }: Line, from: Line, tolerance: number): boolean {
  const dx = from.end.x - from.start.x;
  const dy = from.end.y - from.start.y;
  const first = dx * (start.y - from.start.y) - dy * (start.x - from.start.x);
  const second = dx * (end.y - from.start.y) - dy * (end.x - from.start.x);
  if (first > 0 !== second > 0) return false;
  const least = Math.min(Math.abs(first), Math.abs(second));
  return least * least > tolerance * tolerance * (dx * dx + dy * dy);
}

/** Least length of an overlap in tolerances: shorter ones are ends that all but meet. */
const leastOverlap = 4;

function overlapOfLines(a: Line, b: Line, tolerance: number): Shared | null {
  const [lengthA, lengthB] = [segmentLength(a), segmentLength(b)];
  if (lengthB > lengthA) {
    const turned = overlapOfLines(b, a, tolerance);
    return turned && { onFirst: turned.onSecond, onSecond: turned.onFirst };
  }
  const u = pointUnit(pointSubtract(a.end, a.start));
  const [from, to] = [pointSubtract(b.start, a.start), pointSubtract(b.end, a.start)];
  if (Math.abs(pointCross(u, from)) > tolerance || Math.abs(pointCross(u, to)) > tolerance) return null;
  const [s0, s1] = [pointDot(u, from), pointDot(u, to)];
  const [low, high] = [Math.max(0, Math.min(s0, s1)), Math.min(lengthA, Math.max(s0, s1))];
  if (high - low <= leastOverlap * tolerance) return null;
  const onSecond = [(0 - s0) / (s1 - s0), (lengthA - s0) / (s1 - s0)];
  return {
    onFirst: inner([s0 / lengthA, s1 / lengthA], lengthA, tolerance),
    onSecond: inner(onSecond, lengthB, tolerance),
  };
}

function overlapOfArcs(a: Arc, b: Arc, tolerance: number): Shared | null {
  const [lengthA, lengthB] = [segmentLength(a), segmentLength(b)];
  if (lengthB > lengthA) {
    const turned = overlapOfArcs(b, a, tolerance);
    return turned && { onFirst: turned.onSecond, onSecond: turned.onFirst };
  }
  // arcs of one circle have their centres near each other, and so the middle of one lies on the other
  for (const t of [0.5, 0, 1]) {
    if (Math.abs(pointDistance(segmentPointAt(b, t), a.centre) - a.radius) > tolerance) return null;
  }
  const on = (arc: Arc, p: Point) => segmentPointDistance(arc, p) <= 2 * tolerance;
  const sharesOf = (arc: Arc, points: readonly Point[]) =>
    points.filter((p) => on(arc, p)).map((p) => arcShare(arc, p));
  const onFirst = inner(sharesOf(a, [segmentStart(b), segmentEnd(b)]), lengthA, tolerance);
  const onSecond = inner(sharesOf(b, [segmentStart(a), segmentEnd(a)]), lengthB, tolerance);
  const stops = [0, ...[...onSecond].sort((x, y) => x - y), 1];
  const lies = stops.some((stop, i) => {
    const before = stops[i - 1];
    if (before === undefined || (stop - before) * lengthB <= leastOverlap * tolerance) return false;
    return on(a, segmentPointAt(b, (before + stop) / 2));
  });
  return lies ? { onFirst, onSecond } : null;
}

function arcShare(arc: Arc, p: Point): number {
  const full = 2 * Math.PI;
  const angle = Math.atan2(p.y - arc.centre.y, p.x - arc.centre.x);
  const turn = (((angle - arc.startAngle) * Math.sign(arc.sweep)) % full) + full;
  return (turn % full) / Math.abs(arc.sweep);
}

/** Shares that are not at an end, within a rounding. */
const inner = (shares: readonly number[], length: number, tolerance: number): number[] =>
  shares.filter((t) => t * length > 2 * tolerance && (1 - t) * length > 2 * tolerance);

/** Whether two segments cross there: away from their ends, and by more than that where they are tangent to each other. */
function isCrossing(a: Segment, b: Segment, at: Point, slack: number): boolean {
  const ends = [segmentStart(a), segmentEnd(a), segmentStart(b), segmentEnd(b)];
  if (ends.some((end, i) => !isCircle(i < 2 ? a : b) && pointDistance(end, at) <= slack)) return false;
  const angle = Math.abs(pointCross(tangentNear(a, at), tangentNear(b, at)));
  const bend = bendBetween(a, b, at);
  // curves that cross at a small angle reach this far past each other before they cross back
  return bend === 0 || (angle * angle) / (2 * bend) > slack;
}

function tangentNear(segment: Segment, at: Point): Point {
  if (segment.kind === 'line') return segmentTangentAt(segment, 0);
  const out = pointSubtract(at, segment.centre);
  return pointScale({ x: -out.y, y: out.x }, 1 / segment.radius);
}

/** By how much the curvatures differ, seen from a common tangent, 1/m. */
function bendBetween(a: Segment, b: Segment, at: Point): number {
  const [ka, kb] = [a, b].map((s) => (s.kind === 'arc' ? 1 / s.radius : 0));
  const opposite =
    a.kind === 'arc' && b.kind === 'arc' && pointDot(pointSubtract(a.centre, at), pointSubtract(b.centre, at)) < 0;
  return opposite ? (ka ?? 0) + (kb ?? 0) : Math.abs((ka ?? 0) - (kb ?? 0));
}

/** A part of a segment, between the places where others begin or end on it. */
type Atom = {
  readonly segment: Segment;
  readonly piece: number;
  /** On a piece that is closed in itself: stays there whatever becomes of the others. */
  readonly fixed: boolean;
};

function cutPieces(
  pieces: readonly Piece[],
  copies: Cleaned['copies'],
  isOwn: Uint8Array,
  segments: readonly Segment[],
  owner: readonly number[],
  cuts: ReadonlyMap<number, readonly number[]>,
  tolerance: number,
): Loose {
  const taken = new Set([...cuts.keys()].map((i) => owner[i] ?? 0));
  const whole = looseOf(pieces, copies, (i) => isOwn[i] === 0 && !taken.has(i));

  const atoms: Atom[] = [];
  for (const [i, segment] of segments.entries()) {
    const piece = owner[i] ?? 0;
    const fixed = isOwn[piece] === 1;
    const shares = cuts.get(i);
    // of what is closed in itself only what others lie on matters
    if (!taken.has(piece) || (fixed && !shares)) continue;
    const stops = stopsOf(shares ?? [], segmentLength(segment), tolerance);
    for (let k = 1; k < stops.length; k++) {
      const part = stops.length > 2 ? segmentPart(segment, stops[k - 1] ?? 0, stops[k] ?? 1) : segment;
      atoms.push({ segment: part, piece, fixed });
    }
  }
  const near = 8 * tolerance;
  const keys = Float64Array.from(atoms, ({ segment }) => segmentKey(segment));
  const firsts = firstOfEach(keys, 8 * near, (a, b) => {
    const [one, other] = [atoms[a], atoms[b]];
    return one !== undefined && other !== undefined && isSameSegment(one.segment, other.segment, near);
  });
  const groups = new Map<number, Atom[]>();
  for (const [i, atom] of atoms.entries()) {
    const first = firsts?.[i] ?? i;
    const group = groups.get(first);
    if (group) group.push(atom);
    else groups.set(first, [atom]);
  }
  const parts: Piece[] = [];
  const order: number[] = [];
  const least: number[] = [];
  const most: number[] = [];
  const unused = new Map<number, readonly Repair[]>();
  const cut = new Map<number, readonly number[]>();
  for (const group of groups.values()) {
    const own = group.filter(({ fixed }) => !fixed);
    const [first] = own;
    if (!first) continue;
    const covered = own.length < group.length;
    const said = own.flatMap(({ segment, piece }, i): Repair[] => {
      const itself: Repair = {
        what: 'overlapping piece dropped',
        at: segmentPointAt(segment, 0.5),
        size: segmentLength(segment),
      };
      // the first is the one that is used, unless something closed lies there
      return [...(copies.get(piece) ?? []), ...(i > 0 || covered ? [itself] : [])];
    });
    const place = parts.length;
    parts.push({ segments: [first.segment], layer: pieces[first.piece]?.layer ?? '0' });
    order.push(first.piece);
    least.push(covered ? 0 : 1);
    most.push(said.length > (covered ? 1 : 0) ? 2 : 1);
    if (said.length > 0) unused.set(place, said);
    cut.set(
      place,
      own.map(({ piece }) => piece),
    );
  }
  const cutUp: Loose = {
    pieces: parts,
    order: Int32Array.from(order),
    least: Uint8Array.from(least),
    most: Uint8Array.from(most),
    unused,
    cut,
  };
  return looseJoined(cutUp, whole);
}

function stopsOf(shares: readonly number[], length: number, tolerance: number): number[] {
  const stops = [0];
  for (const share of [...shares].sort((a, b) => a - b)) {
    if ((share - (stops.at(-1) ?? 0)) * length > 2 * tolerance) stops.push(share);
  }
  stops.push(1);
  return stops;
}

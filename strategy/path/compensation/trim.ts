import Flatbush from 'flatbush';
import { segmentCrossesRay } from '../contour.ts';
import { segmentMeetings, segmentPointDistance } from '../distance.ts';
import type { Box, Point } from '../point.ts';
import { pointAdd, pointCross, pointDistance, pointDot, pointLeft, pointScale, pointSubtract } from '../point.ts';
import type { Segment } from '../segment.ts';
import {
  segmentBox,
  segmentEnd,
  segmentLength,
  segmentPart,
  segmentPointAt,
  segmentStart,
  segmentTangentAt,
} from '../segment.ts';
import { shareAt } from './share.ts';
import type { Kite, ParallelPiece, Parallels, PathSource } from './parallel.ts';

/** A stretch of a parallel between two places where parallels meet. */
type Stretch = {
  readonly piece: number;
  readonly t0: number;
  readonly t1: number;
  readonly from: number;
  readonly to: number;
  readonly length: number;
};

/** A closed run of pieces of the path. */
export type TrimmedLoop = { readonly pieces: readonly ParallelPiece[] };

/** Places nearer than this share of the distance are one; a parallel with less free scrap on its right than half of it is none. */
const nearness = 1e-7;

/**
 * The parallels of a contour without whatever lies nearer to it than `distance` m, inside the part or behind a sharp corner, joined to closed loops; or null
 * when rounding leaves ends without a partner. Exact: parallels are cut where they meet, and each stretch stays or goes by the distance of a place on it
 * from the whole contour and by the side of the contour it lies on.
 */
export function trimParallels(
  contour: readonly Segment[],
  partIsInside: boolean,
  { pieces, kites }: Parallels,
  distance: number,
): TrimmedLoop[] | null {
  if (pieces.length === 0) return [];
  const tolerance = nearness * distance;
  const { stretches, nodes } = cutAtMeetings(pieces, tolerance);
  const isFree = freeSpace(contour, partIsInside, kites, distance, tolerance);
  const kept = keepFree(stretches, nodes, pieces, isFree, tolerance);
  return joinLoops(kept, pieces, tolerance);
}

function cutAtMeetings(pieces: readonly ParallelPiece[], tolerance: number): { stretches: Stretch[]; nodes: number } {
  const boxes = pieces.map(({ segment }) => segmentBox(segment));
  const index = new Flatbush(pieces.length);
  for (const box of boxes) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();
  const ends = pieces.map(({ segment }) => [segmentStart(segment), segmentEnd(segment)] as const);
  const lengths = pieces.map(({ segment }) => segmentLength(segment));

  // each piece's start and end, then every meeting
  const places = new Places(2 * pieces.length);
  /** Between the two ends: share of the length and number of the place. */
  const cuts: { t: number; place: number }[][] = pieces.map(() => []);
  const cut = (i: number, at: Point, place: number): void => {
    const piece = pieces[i];
    const length = lengths[i] ?? 0;
    if (!piece) return;
    const t = shareAt(piece.segment, at);
    if (t * length <= tolerance) places.join(place, 2 * i);
    else if ((1 - t) * length <= tolerance) places.join(place, 2 * i + 1);
    else cuts[i]?.push({ t, place });
  };
  // an end that touches another piece: coinciding pieces meet nowhere else, and rounding may hide a touch
  const touch = (end: Point, place: number, segment: Segment, box: Box, i: number): void => {
    if (boxHolds(box, end, tolerance) && segmentPointDistance(segment, end) <= tolerance) cut(i, end, place);
  };
  for (let i = 0; i < pieces.length; i++) {
    const a = pieces[i];
    const box = boxes[i];
    const endsOfA = ends[i];
    if (!a || !box || !endsOfA) continue;
    if (pointDistance(endsOfA[0], endsOfA[1]) <= tolerance) places.join(2 * i, 2 * i + 1);
    const near = index.search(
      box.minX - tolerance,
      box.minY - tolerance,
      box.maxX + tolerance,
      box.maxY + tolerance,
      (other) => other > i,
    );
    for (const k of near) {
      const b = pieces[k];
      const other = boxes[k];
      const endsOfB = ends[k];
      if (!b || !other || !endsOfB) continue;
      for (const at of segmentMeetings(a.segment, b.segment)) {
        const place = places.add();
        cut(i, at, place);
        cut(k, at, place);
      }
      touch(endsOfB[0], 2 * k, a.segment, box, i);
      touch(endsOfB[1], 2 * k + 1, a.segment, box, i);
      touch(endsOfA[0], 2 * i, b.segment, other, k);
      touch(endsOfA[1], 2 * i + 1, b.segment, other, k);
    }
  }
  const inOrder = cuts.map((own, piece) => {
    own.sort((a, b) => a.t - b.t);
    own.forEach(({ t, place }, k) => {
      const before = own[k - 1];
      if (before && (t - before.t) * (lengths[piece] ?? 0) <= tolerance) places.join(before.place, place);
    });
    return own;
  });
  const stretches: Stretch[] = [];
  inOrder.forEach((own, piece) => {
    const length = lengths[piece] ?? 0;
    let a = { t: 0, place: 2 * piece };
    for (let s = 0; s <= own.length; s++) {
      const before = a;
      const b = own[s] ?? { t: 1, place: 2 * piece + 1 };
      a = b;
      const from = places.of(before.place);
      const to = places.of(b.place);
      const stretch = { piece, t0: before.t, t1: b.t, from, to, length: (b.t - before.t) * length };
      // too short to be seen: its two ends are one place
      if (from === to && stretch.length <= 4 * tolerance) continue;
      stretches.push(stretch);
    }
  });
  return { stretches, nodes: places.count };
}

/** Whether a place lies in a box or beside it by no more than `slack` m. */
const boxHolds = (box: Box, { x, y }: Point, slack: number): boolean =>
  x >= box.minX - slack && x <= box.maxX + slack && y >= box.minY - slack && y <= box.maxY + slack;

/** Numbers of places that turn out to be one: each stands for the lowest of those joined with it. */
class Places {
  private readonly parent: number[];

  constructor(count: number) {
    this.parent = Array.from({ length: count }, (_, i) => i);
  }

  get count(): number {
    return this.parent.length;
  }

  /** A new place's number. */
  add(): number {
    return this.parent.push(this.parent.length) - 1;
  }

  of(place: number): number {
    let at = place;
    for (let up = this.parent[at] ?? at; up !== at; up = this.parent[at] ?? at) at = up;
    this.parent[place] = at;
    return at;
  }

  join(one: number, other: number): void {
    const a = this.of(one);
    const b = this.of(other);
    if (a === b) return;
    this.parent[Math.max(a, b)] = Math.min(a, b);
  }
}

/**
 * Whether a place is scrap that the path may bound: outside the part, the distance away from it, behind no sharp corner. A place on a straight way to a
 * sharp corner's tip lies `beyond` the distance.
 */
function freeSpace(
  contour: readonly Segment[],
  partIsInside: boolean,
  kites: readonly Kite[],
  distance: number,
  tolerance: number,
): (place: Point, beyond: boolean) => boolean {
  const edges = new Flatbush(contour.length);
  for (const segment of contour) {
    const box = segmentBox(segment);
    edges.add(box.minX, box.minY, box.maxX, box.maxY);
  }
  edges.finish();
  const starts = contour.map(segmentStart);
  const corners = kites.length > 0 ? new Flatbush(kites.length) : null;
  for (const { points } of kites) {
    const [x, y] = [points.map((p) => p.x), points.map((p) => p.y)];
    corners?.add(Math.min(...x), Math.min(...y), Math.max(...x), Math.max(...y));
  }
  corners?.finish();

  const least = distance + tolerance / 4;
  return (place, beyond) => {
    const { x, y } = place;
    const near = edges.search(x - distance, y - distance, x + distance, y + distance);
    for (const i of near) {
      const segment = contour[i];
      if (segment && segmentPointDistance(segment, place) < least) return false;
    }
    for (const i of corners?.search(x, y, x, y) ?? []) {
      const kite = kites[i];
      if (kite && kiteContains(kite, place)) return false;
    }
    // no edge is nearer than the one that the place belongs to? Then it lies on that edge's side, which is the scrap's
    if (!beyond) return true;
    let inside = false;
    // a little higher than the ray: an arc's end is where the next segment starts, up to rounding outside its own box
    for (const i of edges.search(x, y - tolerance, Infinity, y + tolerance)) {
      const segment = contour[i];
      const to = starts[(i + 1) % starts.length];
      if (segment && to && segmentCrossesRay(segment, to, place)) inside = !inside;
    }
    return inside !== partIsInside;
  };
}

const kiteContains = ({ points }: Kite, place: Point): boolean =>
  points.every((a, i) => {
    const b = points[(i + 1) % points.length] ?? a;
    return pointCross(pointSubtract(b, a), pointSubtract(place, a)) > 0;
  });

/**
 * The stretches that stay, each followed by its successors as far as nothing meets them. What follows without a meeting shares the fate of its longest
 * stretch, where a place in the middle is farthest from doubt.
 */
function keepFree(
  stretches: readonly Stretch[],
  nodes: number,
  pieces: readonly ParallelPiece[],
  isFree: (place: Point, beyond: boolean) => boolean,
  tolerance: number,
): Stretch[][] {
  const arrivals = new Int32Array(nodes);
  const departures = new Int32Array(nodes);
  for (const { from, to } of stretches) {
    departures[from] = (departures[from] ?? 0) + 1;
    arrivals[to] = (arrivals[to] ?? 0) + 1;
  }
  const chains: Stretch[][] = [];
  for (const stretch of stretches) {
    const chain = chains.at(-1);
    const follows =
      chain?.at(-1)?.to === stretch.from && departures[stretch.from] === 1 && arrivals[stretch.from] === 1;
    if (follows) chain?.push(stretch);
    else chains.push([stretch]);
  }
  return chains.filter((chain) => {
    const longest = chain.reduce((best, s) => (s.length > best.length ? s : best));
    const piece = pieces[longest.piece];
    if (!piece) return false;
    const t = (longest.t0 + longest.t1) / 2;
    const right = pointScale(pointLeft(segmentTangentAt(piece.segment, t)), -tolerance / 2);
    const beyond = piece.source.kind === 'corner' && piece.segment.kind === 'line';
    return isFree(pointAdd(segmentPointAt(piece.segment, t), right), beyond);
  });
}

function joinLoops(
  chains: readonly Stretch[][],
  pieces: readonly ParallelPiece[],
  tolerance: number,
): TrimmedLoop[] | null {
  const departing = new Map<number, Stretch[][]>();
  for (const chain of withoutDoubles(chains, pieces, tolerance)) {
    const from = chain[0]?.from ?? 0;
    const there = departing.get(from);
    if (there) there.push(chain);
    else departing.set(from, [chain]);
  }
  const loops: TrimmedLoop[] = [];
  for (const chain of chains) {
    const there = departing.get(chain[0]?.from ?? 0);
    if (!there?.includes(chain)) continue;
    const loop = [...chain];
    there.splice(there.indexOf(chain), 1);
    for (let end = chain.at(-1); end && end.to !== chain[0]?.from; end = loop.at(-1)) {
      const next = mostToTheRight(end, departing.get(end.to) ?? [], pieces);
      if (!next) return null;
      loop.push(...next);
    }
    loops.push({ pieces: mergedPieces(loop, pieces, tolerance) });
  }
  return loops;
}

/** Where parallels of edges that lie on each other coincide, one is enough. */
function withoutDoubles(
  chains: readonly Stretch[][],
  pieces: readonly ParallelPiece[],
  tolerance: number,
): readonly Stretch[][] {
  const seen = new Map<string, Point[]>();
  return chains.filter((chain) => {
    const [first, last] = [chain[0], chain.at(-1)];
    const segment = first && pieces[first.piece]?.segment;
    if (!first || !last || !segment) return false;
    const key = `${first.from} ${last.to}`;
    const middle = segmentPointAt(segment, (first.t0 + first.t1) / 2);
    const same = seen.get(key) ?? [];
    if (same.some((p) => pointDistance(p, middle) <= tolerance)) return false;
    seen.set(key, [...same, middle]);
    return true;
  });
}

/** Takes, of the ways on, the one that turns most to the right: loops that touch in a place come out one by one. */
function mostToTheRight(
  end: Stretch,
  ways: Stretch[][],
  pieces: readonly ParallelPiece[],
): readonly Stretch[] | undefined {
  const arriving = pieces[end.piece]?.segment;
  if (ways.length <= 1 || !arriving) return ways.pop();
  const incoming = segmentTangentAt(arriving, end.t1);
  const turns = ways.map((way) => {
    const leaving = way[0] && pieces[way[0].piece]?.segment;
    if (!leaving) return Infinity;
    const outgoing = segmentTangentAt(leaving, way[0]?.t0 ?? 0);
    return Math.atan2(pointCross(incoming, outgoing), pointDot(incoming, outgoing));
  });
  return ways.splice(turns.indexOf(Math.min(...turns)), 1)[0];
}

/** The stretches as whole pieces again: what was cut and goes on is one piece, and so are a straight edge and its way to a sharp corner. */
function mergedPieces(loop: readonly Stretch[], pieces: readonly ParallelPiece[], tolerance: number): ParallelPiece[] {
  const runs: Stretch[] = [];
  for (const stretch of loop) {
    const last = runs.at(-1);
    if (last && last.piece === stretch.piece && last.t1 === stretch.t0) {
      runs[runs.length - 1] = { ...last, t1: stretch.t1, to: stretch.to };
    } else runs.push(stretch);
  }
  const [first, last] = [runs[0], runs.at(-1)];
  if (runs.length > 1 && first && last && first.piece === last.piece && first.t0 === last.t1) {
    runs[0] = { ...last, t1: first.t1, to: first.to };
    runs.pop();
  }
  const merged: ParallelPiece[] = [];
  for (const { piece, t0, t1 } of runs) {
    const whole = pieces[piece];
    if (!whole) continue;
    const part = t0 === 0 && t1 === 1 ? whole : { segment: segmentPart(whole.segment, t0, t1), source: whole.source };
    const before = merged.at(-1);
    const line = before && straightOn(before, part, tolerance);
    if (line) merged[merged.length - 1] = line;
    else merged.push(part);
  }
  const [head, tail] = [merged[0], merged.at(-1)];
  const closing = merged.length > 1 && head && tail && straightOn(tail, head, tolerance);
  if (closing) {
    merged[0] = closing;
    merged.pop();
  }
  return merged.map((part, i) => welded(part, merged.at(i - 1) ?? part, merged[(i + 1) % merged.length] ?? part));
}

/** A line whose ends are brought to those of its neighbours: an arc's exactly, and another line's start exactly. */
function welded(part: ParallelPiece, before: ParallelPiece, after: ParallelPiece): ParallelPiece {
  if (part.segment.kind === 'arc' || before === part) return part;
  const start = before.segment.kind === 'arc' ? segmentEnd(before.segment) : part.segment.start;
  return { ...part, segment: { kind: 'line', start, end: segmentStart(after.segment) } };
}

/** Two lines of which the second goes straight on, as one; null for anything else, and for two different edges that happen to be in line. */
function straightOn(a: ParallelPiece, b: ParallelPiece, tolerance: number): ParallelPiece | null {
  if (a.segment.kind !== 'line' || b.segment.kind !== 'line') return null;
  if (a.source.kind === b.source.kind) return null;
  const [u, w] = [segmentTangentAt(a.segment, 0), segmentTangentAt(b.segment, 0)];
  if (pointDot(u, w) < 0) return null;
  const aside = Math.abs(pointCross(u, pointSubtract(b.segment.end, a.segment.start)));
  if (aside > tolerance * 1e-2 || Math.abs(pointCross(u, w)) > 1e-6) return null;
  const source: PathSource = a.source.kind === 'edge' ? a.source : b.source;
  return { segment: { kind: 'line', start: a.segment.start, end: b.segment.end }, source };
}

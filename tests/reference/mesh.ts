import Delaunator from 'delaunator';
import type { Point } from '../../strategy/path/point.ts';
import { pointDistance, pointLeft, pointScale, pointAdd } from '../../strategy/path/point.ts';
import { segmentTangentAt } from '../../strategy/path/segment.ts';
import { besidePiece, distanceToPiece, wayPoint, type Way } from './way.ts';

/** A node on a wall and the station abreast of which it lies, m. */
export type WallNode = { readonly node: number; readonly station: number };

/** Triangles over the plate whose edges follow the walls the kerf will have. */
export type Mesh = {
  readonly x: Float64Array;
  readonly y: Float64Array;
  /** Three nodes a triangle, counter-clockwise. */
  readonly triangles: Uint32Array;
  /** Nodes of the left and of the right wall of each piece of way, by station. */
  readonly walls: readonly { readonly left: readonly WallNode[]; readonly right: readonly WallNode[] }[];
};

/** How fine: `finest` m near the corner, growing by `growth` m a metre of distance, at most `coarsest`. */
export type Sizes = {
  readonly finest: number;
  readonly growth: number;
  readonly coarsest: number;
  /** Centre and radius of the finest zone, m. */
  readonly centre: Point;
  readonly zone: number;
};

/** Wished length of an edge at a place, m. */
export const sizeAt = ({ finest, growth, coarsest, centre, zone }: Sizes, at: Point): number =>
  Math.min(coarsest, finest + growth * Math.max(0, pointDistance(at, centre) - zone));

/** Wished length of an edge at a station of the way, m: also short against an arc's radius. */
export function sizeOnWay(sizes: Sizes, way: Way, station: number): number {
  const piece = way.pieces.find(({ start, length }) => station <= start + length) ?? way.pieces.at(-1);
  const size = sizeAt(sizes, wayPoint(way, station));
  return piece?.segment.kind === 'arc' ? Math.min(size, 0.4 * piece.segment.radius) : size;
}

type Node = { x: number; y: number; fixed: boolean };

const smoothings = 12;

/**
 * The mesh of a way in a round plate of `radius` m about the sizes' centre: nodes on the walls (where both walls have them abreast of each other), on rings
 * between, evened out by moving each free node to the weighted middle of its triangles. Where Delaunay's triangulation leaves out an edge of a wall, free nodes
 * in the way are dropped or the edge is halved, until it follows all walls. `exact` are places that get a node. RangeError when that does not end.
 */
export function meshOf(way: Way, kerfWidth: number, sizes: Sizes, radius: number, exact: readonly Point[]): Mesh {
  const half = kerfWidth / 2;
  const nodes: Node[] = [];
  const place = (p: Point, fixed: boolean): number => nodes.push({ x: p.x, y: p.y, fixed }) - 1;
  const { walls, edges } = wallNodes(way, half, sizes, (p) => place(p, true));
  const clear = (p: Point, least: number): boolean =>
    way.pieces.every((piece) => Math.abs(distanceToPiece(piece, p) - half) > least);
  for (const p of exact) if (clear(p, 0.5 * sizeAt(sizes, p))) place(p, true);
  const wallCount = nodes.length;
  for (const { at, onRim } of ringPlaces(sizes, radius)) {
    const size = sizeAt(sizes, at);
    if (!onRim && !clear(at, 0.55 * size)) continue;
    if (nodes.slice(0, wallCount).some((n) => Math.hypot(n.x - at.x, n.y - at.y) < 0.7 * size)) continue;
    place(at, onRim);
  }
  smooth(nodes, sizes, (p) => clear(p, 0.45 * sizeAt(sizes, p)));
  return conforming(nodes, walls, edges);
}

/** Rings about the centre, each as far from the last as its nodes from each other; the outermost is the plate's rim. */
function* ringPlaces(sizes: Sizes, radius: number): Generator<{ at: Point; onRim: boolean }> {
  const { centre } = sizes;
  let r = 0;
  for (let ring = 0; ; ring++) {
    const size = sizeAt(sizes, { x: centre.x + r, y: centre.y });
    const onRim = radius - r < 0.6 * size;
    if (onRim) r = radius;
    const count = r === 0 ? 1 : Math.max(6, Math.round((2 * Math.PI * r) / size));
    for (let i = 0; i < count; i++) {
      const angle = (2 * Math.PI * (i + (ring % 2) / 2)) / count;
      yield { at: { x: centre.x + r * Math.cos(angle), y: centre.y + r * Math.sin(angle) }, onRim };
    }
    if (onRim) return;
    r += 0.87 * size;
  }
}

type Edge = { a: number; b: number; wall: WallNode[] | null };

/** Nodes along all walls, and the edges that the triangulation has to follow. */
function wallNodes(way: Way, half: number, sizes: Sizes, place: (p: Point) => number) {
  const crossings = wallCrossings(way, half);
  const edges: Edge[] = [];
  const last = way.pieces.length - 1;
  /** Crossings are shared: a node a pair of walls. */
  const shared = new Map<number, number>();
  const ends: Record<'left' | 'right', number | null> = { left: null, right: null };
  const [cornerIn, cornerOut] = [way.pieces[0], way.pieces[last]];
  const sharp = last === 1;
  const walls = way.pieces.map((piece, i) => {
    const { segment, start, length } = piece;
    const sides = (['left', 'right'] as const).map((side) => {
      const aside = side === 'left' ? half : -half;
      const own = crossings.filter((c) => (i === 0 && c.first === side) || (i === last && c.last === side));
      const stationOf = (c: Crossing) => (i === 0 ? c.onFirst : c.onLast);
      // behind the tip the second edge's left wall lies in the first edge's kerf: no wall
      const from = sharp && i === last && side === 'left' && own[0] ? stationOf(own[0]) - start : 0;
      const breaks = [from, length, ...own.map((c) => stationOf(c) - start)];
      for (const c of crossings) {
        // beyond the crossings both walls have their nodes abreast
        if (i !== 0 && i !== last) continue;
        for (const away of [-c.clearOf, c.clearOf]) {
          const s = (i === 0 ? c.cornerOnFirst : c.cornerOnLast) + away - start;
          if (s > from && s < length) breaks.push(s);
        }
      }
      const stations = spread(uniqueSorted(breaks), (s) => sizeOnWay(sizes, way, start + s));
      const nodes: WallNode[] = [];
      for (const s of stations) {
        const crossing = own.find((c) => Math.abs(stationOf(c) - start - s) < 1e-12);
        let node: number;
        const known = crossing && shared.get(crossing.id);
        const joined = s === 0 && i > 0 && !(sharp && i === last) ? ends[side] : null;
        const at = besidePiece(segment, s / length, aside);
        if (known !== undefined) node = known;
        else if (joined !== null) node = joined;
        else {
          // past the tip the first edge's left wall runs close along the second edge's right one
          const pastTip = sharp && i === 0 && side === 'left' && own[0] && s > stationOf(own[0]) - start + 1e-12;
          if (pastTip && cornerOut && besideLine(cornerOut.segment, at) < -half + 0.6 * sizeAt(sizes, at)) continue;
          node = place(at);
        }
        if (crossing) shared.set(crossing.id, node);
        const before = nodes.at(-1);
        if (before) edges.push({ a: before.node, b: node, wall: nodes });
        nodes.push({ node, station: start + s });
      }
      ends[side] = nodes.at(-1)?.node ?? null;
      return nodes;
    });
    const [left, right] = sides;
    return { left: left ?? [], right: right ?? [] };
  });
  if (sharp && cornerIn && cornerOut) {
    // the round end of the first edge's kerf, on the side away from the part
    const [from, to] = [walls[0]?.right.at(-1)?.node, walls[1]?.right[0]?.node];
    const corner = way.corner.point;
    const turn = Math.PI - way.corner.angle;
    const count = Math.max(2, Math.ceil((turn * half) / sizeAt(sizes, corner)));
    const right = pointScale(pointLeft(way.corner.incoming), -half);
    let before = from;
    for (let k = 1; k <= count; k++) {
      const a = (turn * k) / count;
      const out = {
        x: right.x * Math.cos(a) - right.y * Math.sin(a),
        y: right.x * Math.sin(a) + right.y * Math.cos(a),
      };
      const node = k === count ? to : place(pointAdd(corner, out));
      if (before !== undefined && node !== undefined) edges.push({ a: before, b: node, wall: null });
      before = node;
    }
  }
  return { walls, edges };
}

/** Signed distance of a place from a line's course, positive on its left, m. */
function besideLine(segment: Way['pieces'][number]['segment'], at: Point): number {
  if (segment.kind !== 'line') throw new RangeError('a sharp corner has straight edges');
  const left = pointLeft(segmentTangentAt(segment, 0));
  return (at.x - segment.start.x) * left.x + (at.y - segment.start.y) * left.y;
}

type Side = 'left' | 'right';
type Crossing = {
  readonly id: number;
  readonly first: Side;
  readonly last: Side;
  /** Stations of the crossing on the first and on the last piece, and of the corner itself, m. */
  readonly onFirst: number;
  readonly onLast: number;
  readonly cornerOnFirst: number;
  readonly cornerOnLast: number;
  /** Length from the corner beyond which no wall crosses, m. */
  readonly clearOf: number;
};

/** Where walls of the first and of the last piece meet: the finished tip of a sharp turn, four places where a loop comes back. */
function wallCrossings(way: Way, half: number): Crossing[] {
  const { pieces, corner } = way;
  const [first, last] = [pieces[0], pieces.at(-1)];
  const looped = pieces.length > 3 || (pieces.length === 3 && way.arrival > (last?.start ?? 0) + 1e-9);
  if (!first || !last || first === last || (pieces.length === 3 && !looped)) return [];
  const cornerOnFirst = looped ? lengthTo(first, corner.point) : first.length;
  const cornerOnLast = way.arrival;
  const turn = Math.PI - corner.angle;
  const sides: readonly Side[] = ['left', 'right'];
  const clearOf = 1.3 * (half / Math.tan(corner.angle / 2) + half * Math.tan(corner.angle / 2)) + 2 * half;
  return sides.flatMap((a, i) =>
    sides.flatMap((b, j): Crossing[] => {
      if (!looped && !(a === 'left' && b === 'left')) return [];
      const [oa, ob] = [a === 'left' ? half : -half, b === 'left' ? half : -half];
      // incoming along x, outgoing turned by `turn`: (s, oa) = t·out + ob·left(out)
      const t = (oa - ob * Math.cos(turn)) / Math.sin(turn);
      const s = t * Math.cos(turn) - ob * Math.sin(turn);
      return [
        {
          id: 2 * i + j,
          first: a,
          last: b,
          onFirst: cornerOnFirst + s,
          onLast: cornerOnLast + t,
          cornerOnFirst,
          cornerOnLast,
          clearOf,
        },
      ];
    }),
  );
}

const lengthTo = ({ segment }: Way['pieces'][number], at: Point): number =>
  segment.kind === 'line' ? pointDistance(segment.start, at) : 0;

function uniqueSorted(values: readonly number[]): number[] {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted.filter((v, i) => i === 0 || v - (sorted[i - 1] ?? 0) > 1e-9);
}

/** Stations from break to break, in steps about as long as wished. */
function spread(breaks: readonly number[], size: (s: number) => number): number[] {
  const stations: number[] = breaks.slice(0, 1);
  for (let i = 1; i < breaks.length; i++) {
    const [from, to] = [breaks[i - 1] ?? 0, breaks[i] ?? 0];
    const samples = 400;
    const sums = [0];
    for (let k = 0; k < samples; k++) {
      const s = from + ((to - from) * (k + 0.5)) / samples;
      sums.push((sums[k] ?? 0) + (to - from) / samples / size(s));
    }
    const whole = sums[samples] ?? 0;
    const count = Math.max(1, Math.round(whole));
    let k = 0;
    for (let n = 1; n < count; n++) {
      const wanted = (whole * n) / count;
      while ((sums[k + 1] ?? Infinity) < wanted) k++;
      const [low, high] = [sums[k] ?? 0, sums[k + 1] ?? 1];
      stations.push(from + ((to - from) * (k + (wanted - low) / (high - low))) / samples);
    }
    stations.push(to);
  }
  return stations;
}

function trianglesOf(nodes: readonly Node[]): Uint32Array {
  const coordinates = new Float64Array(2 * nodes.length);
  nodes.forEach((n, i) => {
    coordinates[2 * i] = n.x;
    coordinates[2 * i + 1] = n.y;
  });
  return new Delaunator(coordinates).triangles;
}

function smooth(nodes: Node[], sizes: Sizes, allowed: (p: Point) => boolean): void {
  const count = nodes.length;
  for (let round = 0; round < smoothings; round++) {
    const triangles = trianglesOf(nodes);
    const weight = new Float64Array(count);
    const [sumX, sumY] = [new Float64Array(count), new Float64Array(count)];
    for (let t = 0; t < triangles.length; t += 3) {
      const ids = [triangles[t] ?? 0, triangles[t + 1] ?? 0, triangles[t + 2] ?? 0];
      const [a, b, c] = ids.map((i) => nodes[i]);
      if (!a || !b || !c) continue;
      const middle = { x: (a.x + b.x + c.x) / 3, y: (a.y + b.y + c.y) / 3 };
      const area = Math.abs((b.x - a.x) * (c.y - a.y) - (c.x - a.x) * (b.y - a.y)) / 2;
      const w = area / sizeAt(sizes, middle) ** 3;
      for (const i of ids) {
        weight[i] = (weight[i] ?? 0) + w;
        sumX[i] = (sumX[i] ?? 0) + w * middle.x;
        sumY[i] = (sumY[i] ?? 0) + w * middle.y;
      }
    }
    nodes.forEach((n, i) => {
      const w = weight[i] ?? 0;
      if (n.fixed || w === 0) return;
      const to = { x: (sumX[i] ?? 0) / w, y: (sumY[i] ?? 0) / w };
      if (allowed(to)) Object.assign(n, to);
    });
  }
}

function conforming(nodes: Node[], walls: Mesh['walls'], edges: Edge[]): Mesh {
  const gone = new Set<number>();
  for (let round = 0; round < 40; round++) {
    const kept = nodes.map((_, i) => i).filter((i) => !gone.has(i));
    const local = trianglesOf(kept.flatMap((i) => nodes[i] ?? []));
    const present = new Set<number>();
    const key = (a: number, b: number): number => Math.min(a, b) * 1e7 + Math.max(a, b);
    for (let t = 0; t < local.length; t += 3) {
      for (let k = 0; k < 3; k++) {
        present.add(key(kept[local[t + k] ?? 0] ?? 0, kept[local[t + ((k + 1) % 3)] ?? 0] ?? 0));
      }
    }
    const missing = edges.filter(({ a, b }) => !present.has(key(a, b)));
    if (missing.length === 0) return compact(nodes, kept, local, walls);
    for (const edge of missing) {
      const [a, b] = [nodes[edge.a], nodes[edge.b]];
      if (!a || !b) continue;
      const middle = { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
      const reach = pointDistance(a, b) / 2;
      const inside = kept.filter((i) => {
        const n = nodes[i];
        return n && i !== edge.a && i !== edge.b && pointDistance(n, middle) < reach * (1 + 1e-9);
      });
      const free = inside.filter((i) => !nodes[i]?.fixed);
      if (free.length > 0) {
        for (const i of free) gone.add(i);
        continue;
      }
      const node = nodes.push({ ...middle, fixed: true }) - 1;
      const { a: from, b: to, wall } = edge;
      edges.push({ a: node, b: to, wall });
      edge.b = node;
      if (!wall) continue;
      const at = wall.findIndex((n) => n.node === to);
      const [before, after] = [wall.find((n) => n.node === from), wall[at]];
      if (before && after) wall.splice(at, 0, { node, station: (before.station + after.station) / 2 });
    }
  }
  throw new RangeError('the mesh does not come to follow the walls');
}

function compact(nodes: readonly Node[], kept: readonly number[], local: Uint32Array, walls: Mesh['walls']): Mesh {
  const numbers = new Map(kept.map((old, i) => [old, i]));
  const x = Float64Array.from(kept, (i) => nodes[i]?.x ?? 0);
  const y = Float64Array.from(kept, (i) => nodes[i]?.y ?? 0);
  const triangles: number[] = [];
  for (let t = 0; t < local.length; t += 3) {
    const [a, b, c] = [local[t] ?? 0, local[t + 1] ?? 0, local[t + 2] ?? 0];
    const area = twiceArea(x, y, a, b, c);
    // three nodes of one wall in a line enclose nothing
    if (Math.abs(area) < 1e-16) continue;
    triangles.push(...(area > 0 ? [a, b, c] : [a, c, b]));
  }
  const renumbered = (wall: readonly WallNode[]) =>
    wall.map(({ node, station }) => ({ node: numbers.get(node) ?? 0, station }));
  return {
    x,
    y,
    triangles: Uint32Array.from(triangles),
    walls: walls.map(({ left, right }) => ({ left: renumbered(left), right: renumbered(right) })),
  };
}

/** Twice a triangle's area, positive counter-clockwise, m². */
export function twiceArea(x: Float64Array, y: Float64Array, a: number, b: number, c: number): number {
  const [ax, ay] = [x[a] ?? 0, y[a] ?? 0];
  return ((x[b] ?? 0) - ax) * ((y[c] ?? 0) - ay) - ((x[c] ?? 0) - ax) * ((y[b] ?? 0) - ay);
}

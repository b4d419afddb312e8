import Flatbush from 'flatbush';
import type { Point } from '../point.ts';
import { pointCross, pointDistance, pointDot } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentEnd, segmentReverse, segmentStart, segmentTangentAt } from '../segment.ts';

/** A connected piece of drawing. */
export type Piece = { readonly segments: readonly Segment[]; readonly layer: string };

/** Pieces put together. `order` is the place in the file of its first piece. */
export type Chain = { readonly segments: Segment[]; readonly layer: string; readonly order: number };

export type Chains = { readonly closed: Chain[]; readonly open: Chain[]; readonly branches: Point[] };

/** First and last point of a piece. */
export function pieceEnds({ segments }: Piece): [Point, Point] {
  const first = segments[0];
  const last = segments.at(-1);
  if (!first || !last) throw new RangeError('a piece without segments has no ends');
  return [segmentStart(first), segmentEnd(last)];
}

/** One piece as an edge between two clusters of ends. */
type Edge = { readonly index: number; readonly piece: Piece; readonly nodes: readonly [number, number] };

/**
 * Pieces joined where their ends lie within `tolerance` m of each other. Pieces that end nowhere are taken off first, so that a line which only touches an
 * outline does not open it. Where more than two ends meet, the way that stays on the layer is taken, and among those the one that turns most to the
 * left, so that contours which touch in a point come out one by one; such places are returned as branches.
 */
export function chainPieces(pieces: readonly Piece[], tolerance: number): Chains {
  const nodes = clusterEnds(pieces, tolerance);
  const edges = pieces.map((piece, index): Edge => ({
    index,
    piece,
    nodes: [nodes[2 * index] ?? 0, nodes[2 * index + 1] ?? 0],
  }));
  const closed: Chain[] = [];
  const open: Chain[] = [];

  const rest = edges.filter((edge) => {
    if (edge.nodes[0] !== edge.nodes[1]) return true;
    closed.push({ segments: [...edge.piece.segments], layer: edge.piece.layer, order: edge.index });
    return false;
  });
  const { core, dangling } = peel(rest);
  walk(core, closed, open);
  walk(dangling, closed, open);
  const branches = [...incidence(core)].filter(([, at]) => at.length > 2).map(([, at]) => endPoint(at[0]));
  const byOrder = (a: Chain, b: Chain) => a.order - b.order;
  return { closed: closed.sort(byOrder), open: open.sort(byOrder), branches };
}

function endPoint(at: { edge: Edge; end: 0 | 1 } | undefined): Point {
  if (!at) throw new RangeError('a node without ends');
  return pieceEnds(at.edge.piece)[at.end];
}

/** Cluster number of every end (two a piece): ends within the tolerance of each other share one. */
function clusterEnds(pieces: readonly Piece[], tolerance: number): number[] {
  const ends = pieces.flatMap(pieceEnds);
  const parent = ends.map((_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (parent[at] !== at) {
      const up = parent[at] ?? at;
      parent[at] = parent[up] ?? up;
      at = up;
    }
    return at;
  };
  if (ends.length > 0) {
    const index = new Flatbush(ends.length);
    for (const p of ends) index.add(p.x, p.y, p.x, p.y);
    index.finish();
    ends.forEach((p, i) => {
      for (const k of index.search(p.x - tolerance, p.y - tolerance, p.x + tolerance, p.y + tolerance)) {
        const q = ends[k];
        if (k > i && q && pointDistance(p, q) <= tolerance) parent[root(k)] = root(i);
      }
    });
  }
  return ends.map((_, i) => root(i));
}

function incidence(edges: readonly Edge[]): Map<number, { edge: Edge; end: 0 | 1 }[]> {
  const at = new Map<number, { edge: Edge; end: 0 | 1 }[]>();
  for (const edge of edges) {
    for (const end of [0, 1] as const) {
      const node = edge.nodes[end];
      const list = at.get(node);
      if (list) list.push({ edge, end });
      else at.set(node, [{ edge, end }]);
    }
  }
  return at;
}

/** Takes off, again and again, the edges that end alone. */
function peel(edges: readonly Edge[]): { core: Edge[]; dangling: Edge[] } {
  const at = incidence(edges);
  const degree = new Map([...at].map(([node, list]) => [node, list.length]));
  const gone = new Set<Edge>();
  const alone = [...degree].filter(([, n]) => n === 1).map(([node]) => node);
  for (let node = alone.pop(); node !== undefined; node = alone.pop()) {
    for (const { edge, end } of at.get(node) ?? []) {
      if (gone.has(edge)) continue;
      gone.add(edge);
      const other = edge.nodes[end === 0 ? 1 : 0];
      const left = (degree.get(other) ?? 0) - 1;
      degree.set(other, left);
      if (left === 1) alone.push(other);
    }
  }
  return { core: edges.filter((e) => !gone.has(e)), dangling: edges.filter((e) => gone.has(e)) };
}

type Step = { readonly edge: Edge; readonly reversed: boolean };

function walk(edges: readonly Edge[], closed: Chain[], open: Chain[]): void {
  const at = incidence(edges);
  const used = new Set<Edge>();
  const starts = [...edges].sort((a, b) => ends(b) - ends(a) || a.index - b.index);
  // from the loose ends first, so that an open chain comes out whole
  function ends(edge: Edge): number {
    return edge.nodes.some((node) => at.get(node)?.length === 1) ? 1 : 0;
  }
  for (const start of starts) {
    if (used.has(start)) continue;
    const reversed = at.get(start.nodes[1])?.length === 1 && at.get(start.nodes[0])?.length !== 1;
    let steps: Step[] = [{ edge: start, reversed }];
    used.add(start);
    const visited = [tail({ edge: start, reversed })];
    for (;;) {
      const last = steps.at(-1);
      if (!last) break;
      const node = head(last);
      // back at a place passed before? What lies between is a contour of its own
      const back = visited.indexOf(node);
      if (back >= 0) {
        closed.push(chainOf(steps.slice(back)));
        steps = steps.slice(0, back);
        visited.length = back + 1;
        if (steps.length === 0) break;
      } else visited.push(node);
      const from = steps.at(-1);
      const next = from ? choose(from, at.get(node) ?? [], used) : null;
      if (!next) break;
      used.add(next.edge);
      steps.push(next);
    }
    if (steps.length > 0) open.push(chainOf(steps));
  }
}

const tail = ({ edge, reversed }: Step): number => edge.nodes[reversed ? 1 : 0];
const head = ({ edge, reversed }: Step): number => edge.nodes[reversed ? 0 : 1];

function stepSegments({ edge, reversed }: Step): Segment[] {
  return reversed ? edge.piece.segments.map(segmentReverse).reverse() : [...edge.piece.segments];
}

function choose(from: Step, ways: readonly { edge: Edge; end: 0 | 1 }[], used: ReadonlySet<Edge>): Step | null {
  const free = ways.filter(({ edge }) => !used.has(edge));
  const sameLayer = free.filter(({ edge }) => edge.piece.layer === from.edge.piece.layer);
  const candidates = (sameLayer.length > 0 ? sameLayer : free).map(({ edge, end }): Step => ({
    edge,
    reversed: end === 1,
  }));
  if (candidates.length <= 1) return candidates[0] ?? null;
  const last = stepSegments(from).at(-1);
  if (!last) return null;
  const incoming = segmentTangentAt(last, 1);
  const turnOf = (step: Step): number => {
    const first = stepSegments(step)[0];
    if (!first) return -Infinity;
    const outgoing = segmentTangentAt(first, 0);
    return Math.atan2(pointCross(incoming, outgoing), pointDot(incoming, outgoing));
  };
  return candidates.reduce((best, step) => (turnOf(step) > turnOf(best) ? step : best));
}

function chainOf(steps: readonly Step[]): Chain {
  const first = steps[0];
  if (!first) throw new RangeError('a chain without steps');
  return {
    segments: steps.flatMap(stepSegments),
    layer: first.edge.piece.layer,
    order: Math.min(...steps.map((step) => step.edge.index)),
  };
}

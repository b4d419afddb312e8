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

/** Cluster number of every end (two a piece): ends within the tolerance of each other share one, and so do chains of such ends. */
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
  // in cells this small all ends are within the tolerance of each other, so that thousands of ends in one place cost no more than others
  const cell = tolerance > 0 ? tolerance / Math.SQRT2 : 1;
  const column = (value: number) => (tolerance > 0 ? Math.floor(value / cell) : value);
  const keyOf = cellKeys(ends.map((p) => ({ x: column(p.x), y: column(p.y) })));
  const cells = new Map<string | number, number[]>();
  ends.forEach((p, i) => {
    const key = keyOf(column(p.x), column(p.y));
    const here = cells.get(key);
    if (here) {
      parent[i] = root(here[0] ?? i);
      here.push(i);
    } else cells.set(key, [i]);
  });
  if (tolerance === 0) return ends.map((_, i) => root(i));
  for (const here of cells.values()) {
    const first = ends[here[0] ?? 0];
    if (!first) continue;
    const [cx, cy] = [column(first.x), column(first.y)];
    // each pair of cells once
    for (const [dx, dy] of neighbourCells) {
      const there = cells.get(keyOf(cx + dx, cy + dy));
      if (there && root(here[0] ?? 0) !== root(there[0] ?? 0) && anyWithin(ends, here, there, tolerance)) {
        parent[root(there[0] ?? 0)] = root(here[0] ?? 0);
      }
    }
  }
  return ends.map((_, i) => root(i));
}

/** A key of its own for every cell: one number where all columns and rows fit into one, which is far cheaper than text. */
function cellKeys(cells: readonly Point[]): (column: number, row: number) => string | number {
  let [minX, maxX, minY, maxY] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x, y } of cells) {
    minX = Math.min(minX, x);
    maxX = Math.max(maxX, x);
    minY = Math.min(minY, y);
    maxY = Math.max(maxY, y);
  }
  // two cells of margin all round for the neighbours
  const [columns, rows] = [maxX - minX + 5, maxY - minY + 5];
  const whole = cells.every(({ x, y }) => Number.isInteger(x) && Number.isInteger(y));
  if (!whole || !(columns * rows < Number.MAX_SAFE_INTEGER)) return (column, row) => `${column},${row}`;
  return (column, row) => (column - minX + 2) * rows + (row - minY + 2);
}

/** Cells of half the plane that can hold an end within the tolerance, up to two away. */
const neighbourCells: readonly (readonly [number, number])[] = [
  [1, 0],
  [2, 0],
  [-2, 1],
  [-1, 1],
  [0, 1],
  [1, 1],
  [2, 1],
  [-2, 2],
  [-1, 2],
  [0, 2],
  [1, 2],
  [2, 2],
];

function anyWithin(
  ends: readonly Point[],
  here: readonly number[],
  there: readonly number[],
  tolerance: number,
): boolean {
  return here.some((i) => {
    const p = ends[i];
    return there.some((k) => {
      const q = ends[k];
      return p !== undefined && q !== undefined && pointDistance(p, q) <= tolerance;
    });
  });
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
    const steps: Step[] = [{ edge: start, reversed }];
    used.add(start);
    // how many steps lead to each place passed
    const passed = new Map([[tail({ edge: start, reversed }), 0]]);
    for (;;) {
      const last = steps.at(-1);
      if (!last) break;
      const node = head(last);
      // back at a place passed before? What lies between is a contour of its own
      const back = passed.get(node);
      if (back !== undefined) {
        const contour = steps.splice(back);
        closed.push(chainOf(contour));
        for (const step of contour.slice(0, -1)) passed.delete(head(step));
        if (steps.length === 0) break;
      } else passed.set(node, steps.length);
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

/** Where more than this many ends meet, no way on is better than another: the first free one is taken. */
const crowd = 32;

function choose(from: Step, ways: { edge: Edge; end: 0 | 1 }[], used: ReadonlySet<Edge>): Step | null {
  if (ways.length > crowd) {
    for (let way = ways.pop(); way; way = ways.pop()) {
      if (!used.has(way.edge)) return { edge: way.edge, reversed: way.end === 1 };
    }
    return null;
  }
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
    order: steps.reduce((least, step) => Math.min(least, step.edge.index), first.edge.index),
  };
}

import Flatbush from 'flatbush';
import { quantityText } from '../../units/text.ts';
import { contourContains } from '../contour.ts';
import { segmentDistance } from '../distance.ts';
import type { Box, Point } from '../point.ts';
import { boxGrow } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentBox, segmentStart } from '../segment.ts';
import type { PlateOutline } from './outline.ts';
import type { PlacedPart } from './placement.ts';

/** What must stay free around each piece, m. */
export type LayoutRoom = {
  readonly kerfWidth: number;
  /** Steel that stays between two kerfs. */
  readonly clearance: number;
  /** Steel that stays between a kerf and the plate's edge. */
  readonly edgeMargin: number;
};

/** Something wrong with a layout, and where, m. */
export type LayoutProblem = {
  readonly kind: 'overlap' | 'near' | 'outside' | 'edge';
  /** Numbers of the placements it is about, the lower one first. */
  readonly placements: readonly number[];
  readonly at: Point;
  readonly why: string;
};

export type LayoutProblems = {
  readonly problems: readonly LayoutProblem[];
  /** There are more than are listed. */ readonly more: boolean;
};

/** Problems listed at most: whoever has mended these looks again. */
export const mostProblems = 60;

/** Shorter by less than this is rounding of what was typed, m. */
const slack = 1e-6;

/**
 * What is wrong with a layout: pieces that overlap or leave less than two kerfs and the clearance between them, pieces that reach over the plate's
 * edge or leave less than a kerf and the margin beside it. One problem a pair and one a piece at the edge, each at its nearest place; judged on
 * exact distances of lines and arcs. A piece that lies in another's hole is no overlap. Throws RangeError for a room below 0.
 */
export function layoutProblems(parts: readonly PlacedPart[], plate: PlateOutline, room: LayoutRoom): LayoutProblems {
  const { kerfWidth, clearance, edgeMargin } = room;
  for (const [what, value] of Object.entries({ kerfWidth, clearance, edgeMargin })) {
    if (!(value >= 0)) throw new RangeError(`${what} ${value} m is outside [0, ∞)`);
  }
  const problems: LayoutProblem[] = [];
  const edge = edgesOf([plate.edge, ...plate.openings].flatMap(({ segments }) => segments));
  const pieces = parts.map((part) => ({
    part,
    edges: edgesOf(part.contours.flatMap(({ contour }) => contour.segments)),
  }));
  for (const piece of pieces) {
    if (problems.length >= mostProblems) return { problems, more: true };
    const found = atEdge(piece, plate, edge, room);
    if (found) problems.push(found);
  }
  const needed = 2 * kerfWidth + clearance;
  for (const [a, b] of neighbours(parts, needed)) {
    const [first, second] = [pieces[a], pieces[b]];
    if (!first || !second) continue;
    if (problems.length >= mostProblems) return { problems, more: true };
    const found = between(first, second, needed, room);
    if (found) problems.push(found);
  }
  return { problems, more: false };
}

type Edges = { readonly segments: readonly Segment[]; readonly index: Flatbush };
type Piece = { readonly part: PlacedPart; readonly edges: Edges };

function edgesOf(segments: readonly Segment[]): Edges {
  const index = new Flatbush(segments.length);
  for (const segment of segments) addBox(index, segmentBox(segment));
  index.finish();
  return { segments, index };
}

const addBox = (index: Flatbush, { minX, minY, maxX, maxY }: Box) => index.add(minX, minY, maxX, maxY);

/** Pairs of parts whose boxes come nearer than `needed`, by their places in the list, the first one first. */
function neighbours(parts: readonly PlacedPart[], needed: number): [number, number][] {
  if (parts.length === 0) return [];
  const index = new Flatbush(parts.length);
  for (const { box } of parts) addBox(index, box);
  index.finish();
  return parts.flatMap(({ box }, i) => {
    const { minX, minY, maxX, maxY } = boxGrow(box, needed);
    return index
      .search(minX, minY, maxX, maxY, (k) => k > i)
      .sort((a, b) => a - b)
      .map((k): [number, number] => [i, k]);
  });
}

function between(a: Piece, b: Piece, needed: number, room: LayoutRoom): LayoutProblem | null {
  const nearest = nearestOf(a.edges, b.edges, needed - slack, b.part.box);
  const placements = [a.part.number, b.part.number].sort((m, n) => m - n);
  const at = nearest?.distance === 0 ? nearest.at : (lyingIn(a.part, b.part) ?? lyingIn(b.part, a.part));
  if (at) {
    return { kind: 'overlap', placements, at, why: `${a.part.name}, and ${b.part.name}, overlap or touch` };
  }
  if (!nearest) return null;
  return {
    kind: 'near',
    placements,
    at: nearest.at,
    why:
      `only ${length(nearest.distance)} stay between ${a.part.name}, and ${b.part.name}: ` +
      `two kerfs and the clearance take ${length(2 * room.kerfWidth + room.clearance)}`,
  };
}

function atEdge({ part, edges }: Piece, plate: PlateOutline, edge: Edges, room: LayoutRoom): LayoutProblem | null {
  const needed = room.kerfWidth + room.edgeMargin;
  const nearest = nearestOf(edges, edge, needed - slack, null);
  const placements = [part.number];
  const out = nearest?.distance === 0 ? nearest.at : lyingOff(part, plate);
  if (out) return { kind: 'outside', placements, at: out, why: `${part.name}, reaches over the plate's edge` };
  if (!nearest) return null;
  return {
    kind: 'edge',
    placements,
    at: nearest.at,
    why:
      `only ${length(nearest.distance)} stay between ${part.name}, and the plate's edge: ` +
      `the kerf and the margin take ${length(needed)}`,
  };
}

/** The least distance below `within`, and the place halfway between; 0 where edges meet. Only edges of `a` near `box` are asked when one is given. */
function nearestOf(a: Edges, b: Edges, within: number, box: Box | null): { distance: number; at: Point } | null {
  let best: { distance: number; at: Point } | null = null;
  const asked = box && boxGrow(box, Math.max(within, 0));
  const some = asked ? a.index.search(asked.minX, asked.minY, asked.maxX, asked.maxY).sort((m, n) => m - n) : null;
  for (let i = 0; i < (some ?? a.segments).length; i++) {
    const segment = a.segments[some ? (some[i] ?? 0) : i];
    if (!segment) continue;
    const { minX, minY, maxX, maxY } = boxGrow(segmentBox(segment), Math.max(best?.distance ?? within, 0));
    for (const k of b.index.search(minX, minY, maxX, maxY)) {
      const other = b.segments[k];
      if (!other) continue;
      const { distance, onFirst, onSecond } = segmentDistance(segment, other);
      // touching but for rounding is touching
      const counted = distance <= slack ? 0 : distance;
      if (counted >= (best?.distance ?? within) && counted > 0) continue;
      best = { distance: counted, at: { x: (onFirst.x + onSecond.x) / 2, y: (onFirst.y + onSecond.y) / 2 } };
      if (counted === 0) return best;
    }
  }
  return best;
}

/** A place of `part` that lies in the other's steel, when edges don't meet: then each contour lies in one region of the other as a whole. */
function lyingIn(part: PlacedPart, other: PlacedPart): Point | null {
  for (const { contour } of part.contours) {
    const first = contour.segments[0];
    if (!first) continue;
    const p = segmentStart(first);
    const around = other.contours.filter(
      (one) =>
        p.x >= one.box.minX &&
        p.x <= one.box.maxX &&
        p.y >= one.box.minY &&
        p.y <= one.box.maxY &&
        contourContains(one.contour, p),
    );
    if (around.length % 2 === 1) return p;
  }
  return null;
}

/** A place of the part that is not on the plate, when edges don't meet. */
function lyingOff(part: PlacedPart, { edge, openings }: PlateOutline): Point | null {
  for (const { contour } of part.contours) {
    const first = contour.segments[0];
    if (!first) continue;
    const p = segmentStart(first);
    if (!contourContains(edge, p) || openings.some((opening) => contourContains(opening, p))) return p;
  }
  // does an opening lie within the part's steel?
  for (const opening of openings) {
    const first = opening.segments[0];
    if (!first) continue;
    const p = segmentStart(first);
    if (part.contours.filter(({ contour }) => contourContains(contour, p)).length % 2 === 1) return p;
  }
  return null;
}

const length = (metres: number): string => quantityText(metres, 'length', 'metric').text;

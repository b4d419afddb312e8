import { millimetres } from '../../units/said.ts';
import type { Contour } from '../contour.ts';
import { contourContains } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Box, Point } from '../point.ts';
import type { Segment } from '../segment.ts';
import { lineBetween, segmentPointAt } from '../segment.ts';
import { placeText } from './narrow-said.ts';
import type { CutPlate } from './pierce-place.ts';
import type { SegmentIndex } from './segment-index.ts';
import { nearestWithin, segmentIndex } from './segment-index.ts';

type Named = { readonly id: string; readonly name: string; readonly contour: Contour; readonly parent: string | null };

/** An edge of the plate: its own, or that of an opening in it. */
type PlateEdge = { readonly name: string; readonly contour: Contour; readonly isOpening: boolean };

/** How far a finished edge reaches over an edge of the plate, m; below 0 as much as it keeps away from it. */
type Reach = { readonly over: number; readonly at: Point; readonly edge: PlateEdge };

/** Places looked at along an arc that reaches over the edge; its farthest lies within a hundredth of its radius of one of them. */
const alongArc = [0, 1 / 8, 2 / 8, 3 / 8, 4 / 8, 5 / 8, 6 / 8, 7 / 8];
/** Nearer to the edge than this is on it: rounding of what was typed, m. */
const onEdge = 1e-6;

/**
 * Where the path beside a finished edge runs outside the plate: contours nearer than half a kerf (m) to its edge or to an opening, and those that reach over it; each
 * once an edge, at the worst place, with how far in m. What lies within a contour that is told already is not told again. Nothing without a plate.
 */
export function besidePlate(contours: readonly Named[], plate: CutPlate | null, kerfWidth: number) {
  if (plate === null) return [];
  const edges = edgesOf(plate);
  const index = segmentIndex(edges.flatMap((edge) => edge.contour.segments.map((segment) => ({ segment, of: edge }))));
  const half = kerfWidth / 2;
  const found = new Map<string, Map<PlateEdge, Reach>>();
  for (const one of contours) found.set(one.id, reaches(one.contour, edges, index, half));
  return contours.flatMap(({ id, name, parent }) =>
    [...(found.get(id)?.values() ?? [])].flatMap((reach) => {
      const told = parent === null ? undefined : found.get(parent)?.get(reach.edge);
      if (told) return [];
      const why = sentenceOf(name, reach, half);
      return [{ contourId: id, kind: 'plate' as const, at: reach.at, why, leftOut: false }];
    }),
  );
}

function sentenceOf(name: string, { over, at, edge }: Reach, half: number): string {
  const outside = `its cut runs outside the plate by ${millimetres(over + half)}`;
  if (over > onEdge) return `${name} reaches ${millimetres(over)} over ${edge.name} at ${placeText(at)}: ${outside}`;
  if (over >= -onEdge) return `${name} lies on ${edge.name} at ${placeText(at)}: ${outside}`;
  return `${name} is ${millimetres(-over)} from ${edge.name} at ${placeText(at)}, nearer than half a kerf: ${outside}`;
}

function edgesOf(plate: CutPlate): PlateEdge[] {
  const own = (contour: Contour): PlateEdge => ({ name: "the plate's edge", contour, isOpening: false });
  if ('minX' in plate) return [own(rectangle(plate))];
  if ('segments' in plate) return [own(plate)];
  return [
    own(plate.edge),
    ...plate.openings.map((contour) => ({ name: 'an opening in the plate', contour, isOpening: true })),
  ];
}

function rectangle({ minX, minY, maxX, maxY }: Box): Contour {
  const corners = [
    { x: minX, y: minY },
    { x: maxX, y: minY },
    { x: maxX, y: maxY },
    { x: minX, y: maxY },
  ];
  return { segments: corners.map((corner, i) => lineBetween(corner, corners[(i + 1) % 4] ?? corner)) };
}

function reaches(
  { segments }: Contour,
  edges: readonly PlateEdge[],
  index: SegmentIndex<PlateEdge>,
  half: number,
): Map<PlateEdge, Reach> {
  const worst = new Map<PlateEdge, Reach>();
  const offer = (reach: Reach): void => {
    if (reach.over > (worst.get(reach.edge)?.over ?? -Infinity)) worst.set(reach.edge, reach);
  };
  const nearer = half * (1 - 1e-6);
  for (const edge of edges) {
    let meets = false;
    for (const segment of segments) {
      const near = nearestWithin(index, segment, nearer, (of) => of === edge);
      if (!near) continue;
      offer({ over: -near.distance, at: near.onFirst, edge });
      if (near.distance <= onEdge) meets = true;
    }
    // a contour that never meets the edge lies on one side of it with all it has
    const looked = meets ? segments : segments.slice(0, 1);
    if (!looked.some((segment) => isOver(segment, edge))) continue;
    for (const segment of segments) {
      for (const at of placesOf(segment)) {
        if (contourContains(edge.contour, at) !== edge.isOpening) continue;
        const over = edge.contour.segments.reduce((least, s) => Math.min(least, segmentPointDistance(s, at)), Infinity);
        if (over > onEdge) offer({ over, at, edge });
      }
    }
  }
  return worst;
}

const placesOf = (segment: Segment): Point[] =>
  segment.kind === 'line' ? [segmentPointAt(segment, 0)] : alongArc.map((share) => segmentPointAt(segment, share));

const isOver = (segment: Segment, edge: PlateEdge): boolean =>
  placesOf(segment).some((at) => contourContains(edge.contour, at) === edge.isOpening);

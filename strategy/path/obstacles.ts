import Flatbush from 'flatbush';
import type { Contour } from './contour.ts';
import { contourBox, contourContains } from './contour.ts';
import type { Box, Point } from './point.ts';
import { boxGrow } from './point.ts';
import type { Segment } from './segment.ts';
import { segmentBox } from './segment.ts';

/** Something a loop must stay clear of. */
export type Obstacle = {
  /** A finished edge, a cut or crater of a lead-in, or the plate's own edge. */
  readonly kind: 'edge' | 'lead-in' | 'crater' | 'plate';
  /** Number of the contour it belongs to in the cut order; −1 for the plate. */
  readonly order: number;
  readonly name: string;
  /** Of a crater its centre, as a line without length. */
  readonly segment: Segment;
  /** What it is thick by around the segment, m: a crater's radius, otherwise 0. */
  readonly radius: number;
  readonly box: Box;
};

/** A contour of the plate, in the cut order. */
export type FieldContour = { readonly id: string; readonly name: string; readonly contour: Contour };

/** How a contour's cut begins: the lead-in from the middle of the pierce to the contour, and the pierce's crater. m */
export type FieldLeadIn = {
  readonly contourId: string;
  readonly segments: readonly Segment[];
  readonly crater?: { readonly at: Point; readonly radius: number };
};

/** What there is to cut from: a rectangle, an outline, or an outline with openings. m */
export type FieldPlate = Box | Contour | { readonly edge: Contour; readonly openings: readonly Contour[] };

/** All that stands in loops' way on a plate, with indices of the boxes of all pieces and of all contours. */
export type ObstacleField = {
  readonly contours: readonly (FieldContour & { readonly box: Box })[];
  readonly orderOf: ReadonlyMap<string, number>;
  readonly obstacles: readonly Obstacle[];
  readonly index: Flatbush | null;
  readonly contourIndex: Flatbush | null;
  readonly plate: FieldPlate | null;
};

/**
 * The field of contours in the order in which they are cut; `name` is how a sentence calls a contour ("hole 3"). With the lead-ins that are known, and the plate
 * or null when loops need not keep to one.
 */
export function obstacleField(
  contours: readonly FieldContour[],
  {
    leadIns = [],
    plate = null,
  }: { readonly leadIns?: readonly FieldLeadIn[]; readonly plate?: FieldPlate | null } = {},
): ObstacleField {
  const orderOf = new Map(contours.map(({ id }, order) => [id, order]));
  const named = contours.map((contour) => ({ ...contour, box: contourBox(contour.contour) }));
  const obstacles: Obstacle[] = [];
  const add = (kind: Obstacle['kind'], order: number, name: string, segment: Segment, radius = 0) =>
    obstacles.push({ kind, order, name, segment, radius, box: boxGrow(segmentBox(segment), radius) });
  named.forEach(({ name, contour }, order) => {
    for (const segment of contour.segments) add('edge', order, name, segment);
  });
  for (const { contourId, segments, crater } of leadIns) {
    const order = orderOf.get(contourId);
    if (order === undefined) throw new RangeError(`the lead-in of contour ${contourId}: there is no such contour`);
    const name = named[order]?.name ?? contourId;
    for (const segment of segments) add('lead-in', order, `the lead-in of ${name}`, segment);
    if (crater) {
      const place: Segment = { kind: 'line', start: crater.at, end: crater.at };
      add('crater', order, `the pierce of ${name}`, place, crater.radius);
    }
  }
  for (const outline of plateOutlines(plate)) {
    for (const segment of outline.segments) add('plate', -1, "the plate's edge", segment);
  }
  return {
    contours: named,
    orderOf,
    obstacles,
    index: indexOf(obstacles),
    contourIndex: indexOf(named),
    plate,
  };
}

function indexOf(items: readonly { readonly box: Box }[]): Flatbush | null {
  if (items.length === 0) return null;
  const index = new Flatbush(items.length);
  for (const { box } of items) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();
  return index;
}

function plateOutlines(plate: FieldPlate | null): readonly Contour[] {
  if (plate === null || 'minX' in plate) return [];
  return 'edge' in plate ? [plate.edge, ...plate.openings] : [plate];
}

/** Whether a place lies on the plate: within its edge and in none of its openings. Always when there is no plate to keep to. */
export function onPlate({ plate }: ObstacleField, p: Point): boolean {
  if (plate === null) return true;
  if ('minX' in plate) return p.x >= plate.minX && p.x <= plate.maxX && p.y >= plate.minY && p.y <= plate.maxY;
  if ('segments' in plate) return contourContains(plate, p);
  return contourContains(plate.edge, p) && !plate.openings.some((opening) => contourContains(opening, p));
}

/** Numbers of the contours around a place, in the cut order, the outermost not before the innermost. */
export function contoursAround({ contours, contourIndex }: ObstacleField, p: Point): number[] {
  const found = contourIndex?.search(p.x, p.y, p.x, p.y) ?? [];
  return found
    .filter((order) => {
      const one = contours[order];
      return one !== undefined && contourContains(one.contour, p);
    })
    .sort((a, b) => a - b);
}

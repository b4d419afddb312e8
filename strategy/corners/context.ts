import Flatbush from 'flatbush';
import { straightEdgeReturn } from '../heat/return-temperature.ts';
import type { PlacedLoop } from '../path/loop-fit.ts';
import type { FieldPlate } from '../path/obstacles.ts';
import { obstacleField } from '../path/obstacles.ts';
import type { Point } from '../path/point.ts';
import type { Context, CornerPlanRequest } from './case.ts';

const roleName = { outer: 'outline', hole: 'hole', island: 'island' } as const;

/** What all corners of a plan share. Throws RangeError for two contours of the same id. */
export function contextOf(request: CornerPlanRequest, loopsNear: Context['loopsNear']): Context {
  const { contours, cut, plateTemperature, properties, rules, leadIns } = request;
  if (new Set(contours.map(({ id }) => id)).size < contours.length)
    throw new RangeError('two contours of the plan have the same id');
  const straightEdge = straightEdgeReturn(cut, plateTemperature, properties);
  const named = contours.map(({ id, contour, role, name }) => ({
    id,
    contour,
    name: name ?? `${roleName[role]} ${id}`,
  }));
  return {
    request,
    field: obstacleField(named, { leadIns, plate: plateOf(request.plate) }),
    straightEdge,
    limit: straightEdge + rules.returnExcessLimit,
    loopsNear,
  };
}

function plateOf(plate: CornerPlanRequest['plate']): FieldPlate | null {
  if (plate === null || !('min' in plate)) return plate;
  return { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };
}

/** Loops placed so far, found by an index of how far any loop of each corner can reach. */
export function loopPlaces(places: readonly { readonly at: Point; readonly reach: number }[]): {
  readonly put: (corner: number, loop: PlacedLoop) => void;
  readonly near: Context['loopsNear'];
} {
  const placed = new Map<number, PlacedLoop>();
  if (places.length === 0) return { put: () => undefined, near: () => [] };
  const index = new Flatbush(places.length);
  for (const { at, reach } of places) index.add(at.x - reach, at.y - reach, at.x + reach, at.y + reach);
  index.finish();
  return {
    put: (corner, loop) => placed.set(corner, loop),
    near: ({ x, y }, reach) =>
      index
        .search(x - reach, y - reach, x + reach, y + reach, (i) => placed.has(i))
        .sort((a, b) => a - b)
        .flatMap((i) => placed.get(i) ?? []),
  };
}

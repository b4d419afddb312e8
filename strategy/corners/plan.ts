import { returnOf, straightEdgeReturn } from '../heat/return-temperature.ts';
import type { Contour } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import { contourCorners, cornerOfPath } from '../path/corner.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import { loopSlug } from '../path/loop.ts';
import { obstacleField } from '../path/loop-fit.ts';
import type { Box, Point } from '../path/point.ts';
import { pointSubtract } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { segmentLength, segmentShift } from '../path/segment.ts';
import type {
  Candidate,
  Case,
  Context,
  CornerOption,
  CornerPlanRequest,
  CornerTreatment,
  PlanContour,
} from './case.ts';
import { decide } from './decide.ts';
import { dwellOption, leaveOption, loopOption } from './options.ts';

export type PlannedLoop = {
  readonly radius: number; // m
  readonly extension: number; // m
  readonly length: number; // m
  readonly reach: number; // m
  readonly segments: readonly Segment[];
  /** What falls: its outline and area, m²; null when the kerf takes it all. */
  readonly slug: { readonly contour: Contour; readonly area: number } | null;
};

export type PlannedCorner = {
  /** `c{contour}-{segment}`: the same drawing gives the same ids. */
  readonly id: string;
  readonly contourId: string;
  readonly point: Point; // m, finished corner
  readonly pathPoint: Point; // m, corner of the path
  readonly angle: number; // rad, inside the part
  readonly convex: boolean;
  readonly returnWithout: number; // K
  readonly straightEdge: number; // K
  readonly treatment: CornerTreatment;
  readonly why: string;
  readonly returnWith: number; // K
  readonly excess: number; // K over the straight edge
  readonly addedTime: number; // s
  readonly loop?: PlannedLoop;
  readonly dwell?: { readonly duration: number }; // s
  readonly options: readonly CornerOption[];
  /** Something the programmer must look at. */
  readonly problem?: string;
};

export type CornerPlanTotals = {
  readonly corners: number;
  readonly treated: number;
  readonly loops: number;
  readonly dwells: number;
  readonly problems: number;
  readonly addedTime: number; // s
  readonly addedLength: number; // m of cut
  readonly addedHeat: number; // J into plate and slugs
  /** K; null when there is no corner. */
  readonly hottestReturn: number | null;
  readonly hottestUntreated: number | null;
};

export type CornerPlan = {
  /** A straight edge's return temperature and the excess allowed over it, K. */
  readonly limit: number;
  readonly corners: readonly PlannedCorner[];
  readonly totals: CornerPlanTotals;
};

/** Path before a corner whose heat is counted, m. */
const countedPath = 0.3;

/**
 * The corner plan: for every corner of the contours the treatment it gets, why, the return temperatures (K) and the added time (s).
 *
 * A tip below the rules' angle that returns hotter than a straight edge by more than the rules' excess is treated; of what fits and stays under the limit, the least added time wins.
 * What the programmer asked for is followed when it fits; a loop that does not fit stays refused, with the reason. Corners are taken in the order of the
 * contours, and each loop placed is an obstacle to the next. Throws RangeError for a thickness, feed or temperature that is not positive.
 */
export function cornerPlan(request: CornerPlanRequest): CornerPlan {
  const { contours, cut, plateTemperature, thickness } = request;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const straightEdge = straightEdgeReturn(cut, plateTemperature, request.properties);
  const context: Context = {
    request,
    field: obstacleField(contours.map(({ id, contour, role }) => ({ id, contour, name: `${roleName[role]} ${id}` }))),
    plate: plateOf(request.plate),
    straightEdge,
    limit: straightEdge + request.rules.returnExcessLimit,
    placed: [],
  };
  const corners = contours.flatMap((contour) =>
    contourCorners(contour.contour).map((corner) => planCorner(contour, corner, context)),
  );
  return { limit: context.limit, corners, totals: totalsOf(corners, request) };
}

const roleName = { outer: 'outline', hole: 'hole', island: 'island' } as const;

function plateOf(plate: CornerPlanRequest['plate']): Box | Contour | null {
  if (plate === null || 'segments' in plate) return plate;
  return { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };
}

function planCorner(contour: PlanContour, corner: Corner, context: Context): PlannedCorner {
  const { cut, plateTemperature, properties, rules, overrides } = context.request;
  const id = `c${contour.id}-${corner.index}`;
  const point = cornerOfPath(corner, cut.kerfWidth);
  const onPath: LoopCorner = { point, incoming: corner.incoming, outgoing: corner.outgoing, angle: corner.angle };
  const before = pathBefore(contour.contour, corner, point);
  const without = returnOf({ corner: onPath, before, treatment: { kind: 'leave' }, cut, plateTemperature, properties });
  const found: Case = { id, contourId: contour.id, corner, onPath, before, without };

  const asked = overrides?.[id];
  const sharp = corner.convex && corner.angle < rules.treatBelowAngle;
  const candidates: Candidate[] = [leaveOption(found, context.limit)];
  if (sharp || (asked && asked !== 'leave')) candidates.push(loopOption(found, context), dwellOption(found, context));
  const { chosen, why, problem } = decide(found, candidates, asked, sharp, rules, context.limit);
  if (chosen.loop) context.placed.push({ name: `the loop of corner ${id}`, loop: chosen.loop });

  const returnWith = chosen.returnWith ?? without;
  const planned: PlannedCorner = {
    id,
    contourId: contour.id,
    point: corner.point,
    pathPoint: point,
    angle: corner.angle,
    convex: corner.convex,
    returnWithout: without,
    straightEdge: context.straightEdge,
    treatment: chosen.treatment,
    why,
    returnWith,
    excess: returnWith - context.straightEdge,
    addedTime: chosen.addedTime ?? 0,
    options: candidates.map(({ treatment, fits, returnWith: kelvin, addedTime, why: reason, at }) => ({
      treatment,
      fits,
      returnWith: kelvin,
      addedTime,
      why: reason,
      ...(at ? { at } : {}),
    })),
  };
  return {
    ...planned,
    ...(chosen.loop ? { loop: plannedLoop(onPath, chosen.loop, cut.kerfWidth) } : {}),
    ...(chosen.dwell === undefined ? {} : { dwell: { duration: chosen.dwell } }),
    ...(problem ? { problem } : {}),
  };
}

/** The path cut before a corner: back along the contour for `countedPath`, but not into the second edge, which is still to be cut. */
function pathBefore(contour: Contour, corner: Corner, onPath: Point): Segment[] {
  const { segments } = contour;
  const shift = pointSubtract(onPath, corner.point);
  const before: Segment[] = [];
  let length = 0;
  for (let back = 1; back < segments.length && length < countedPath; back++) {
    const segment = segments[(corner.index + segments.length - back) % segments.length];
    if (!segment) break;
    before.unshift(segmentShift(segment, shift));
    length += segmentLength(segment);
  }
  return before;
}

function plannedLoop(corner: LoopCorner, loop: Loop, kerfWidth: number): PlannedLoop {
  const { radius, extension, length, reach, segments } = loop;
  return { radius, extension, length, reach, segments, slug: loopSlug(corner, loop, kerfWidth) };
}

function totalsOf(corners: readonly PlannedCorner[], { cut, thickness }: CornerPlanRequest): CornerPlanTotals {
  const of = (treatment: CornerTreatment) => corners.filter((c) => c.treatment === treatment).length;
  const sum = (measure: (c: PlannedCorner) => number) => corners.reduce((total, c) => total + measure(c), 0);
  const hottest = (measure: (c: PlannedCorner) => number) =>
    corners.reduce<number | null>((most, c) => (most === null ? measure(c) : Math.max(most, measure(c))), null);
  const addedLength = sum((c) => c.loop?.length ?? 0);
  return {
    corners: corners.length,
    treated: of('loop') + of('dwell'),
    loops: of('loop'),
    dwells: of('dwell'),
    problems: corners.filter((c) => c.problem).length,
    addedTime: sum((c) => c.addedTime),
    addedLength,
    addedHeat: cut.heatIntoPlate * addedLength * thickness,
    hottestReturn: hottest((c) => c.returnWith),
    hottestUntreated: hottest((c) => c.returnWithout),
  };
}

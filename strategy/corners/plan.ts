import Flatbush from 'flatbush';
import { returnOf, straightEdgeReturn } from '../heat/return-temperature.ts';
import type { Contour } from '../path/contour.ts';
import { contourLength } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import { contourCorners, cornerOfPath } from '../path/corner.ts';
import { easedShare } from '../path/ease.ts';
import type { Loop, LoopCorner, Slug } from '../path/loop.ts';
import { loopSlug } from '../path/loop.ts';
import type { PlacedLoop } from '../path/loop-fit.ts';
import type { FieldPlate } from '../path/obstacles.ts';
import { obstacleField } from '../path/obstacles.ts';
import type { Point } from '../path/point.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { roundTangent } from '../path/round.ts';
import type { Arc, Segment } from '../path/segment.ts';
import { lineBetween, segmentLength, segmentShift } from '../path/segment.ts';
import { millimetres } from '../units/said.ts';
import type {
  Candidate,
  Case,
  Context,
  CornerOption,
  CornerPlanRequest,
  CornerTreatment,
  EasedPath,
  PlanContour,
} from './case.ts';
import type { Decision } from './decide.ts';
import { decide } from './decide.ts';
import { loopOption, mostReach } from './loop-option.ts';
import { dwellOption, easeOption, leaveOption, roundOption } from './options.ts';
import { slugRise } from './slug-tip.ts';

export type PlannedLoop = {
  readonly shape: Loop['shape'];
  readonly radius: number; // m
  readonly extension: number; // m
  readonly length: number; // m
  readonly reach: number; // m
  readonly segments: readonly Segment[];
  /** What falls: its outline, area, m², and greatest width, m; null when the kerf takes it all. */
  readonly slug: Slug | null;
};

export type PlannedRound = {
  readonly radius: number; // m, of the finished edge
  /** How far the rounded corner is off the drawn one, m. */
  readonly deviation: number;
  /** The finished edge, and the path beside it. */
  readonly finished: Arc;
  readonly onPath: Arc;
};

export type PlannedCorner = {
  /** `c{contour}-{segment}`: the same drawing gives the same ids. */
  readonly id: string;
  readonly contourId: string;
  /** The segment of the contour at whose start the corner stands. */
  readonly index: number;
  readonly point: Point; // m, finished corner
  readonly pathPoint: Point; // m, corner of the path
  readonly angle: number; // rad, inside the part
  readonly convex: boolean;
  /** Radius that the drawing gives the corner, m, and where the path's arc around it begins and ends; null where it is sharp. */
  readonly drawn: { readonly radius: number; readonly from: Point; readonly to: Point } | null;
  readonly returnWithout: number; // K
  readonly straightEdge: number; // K
  readonly treatment: CornerTreatment;
  readonly why: string;
  readonly returnWith: number; // K
  readonly excess: number; // K over the straight edge
  readonly addedTime: number; // s
  readonly loop?: PlannedLoop;
  readonly dwell?: { readonly duration: number }; // s
  readonly ease?: EasedPath;
  readonly round?: PlannedRound;
  readonly options: readonly CornerOption[];
  /** Something the programmer must look at. */
  readonly problem?: string;
  /** What may happen although the treatment is as good as any: the slug can tip. */
  readonly caution?: string;
};

export type CornerPlanTotals = {
  readonly corners: number;
  readonly treated: number;
  readonly loops: number;
  readonly dwells: number;
  readonly eases: number;
  readonly rounds: number;
  readonly problems: number;
  readonly addedTime: number; // s
  readonly addedLength: number; // m of cut; rounds take some off
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
 * What the programmer asked for is followed when it fits; a loop that does not fit stays refused, with the reason. Contours are taken as cut in the order
 * given: each loop placed is an obstacle to the next, and what lies within a contour cut before has dropped out. Throws RangeError for a thickness, feed or
 * temperature that is not positive, and for two contours of the same id.
 */
export function cornerPlan(request: CornerPlanRequest): CornerPlan {
  const { contours, thickness, rules, overrides } = request;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const prospects = contours.flatMap((contour) => prospectsOf(contour, request));
  const places = loopPlaces(
    prospects.map(({ onPath, corner, id }) => {
      const tried = treated(corner, rules.treatBelowAngle) || (overrides?.[id] === 'loop' && !doublesBack(corner));
      return { at: onPath.point, reach: tried ? mostReach(corner, request) : 0 };
    }),
  );
  const context = contextOf(request, places.near);
  const corners = prospects.map((prospect, i) => {
    const { planned, loop } = planCorner(prospect, context);
    if (loop) places.put(i, { name: `the loop of corner ${planned.id}`, loop });
    return planned;
  });
  return { limit: context.limit, corners, totals: totalsOf(corners, request) };
}

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

const treated = (corner: Corner, belowAngle: number): boolean =>
  corner.convex && corner.angle < belowAngle && !doublesBack(corner);

const doublesBack = ({ angle }: Corner): boolean => angle < spike || angle > 2 * Math.PI - spike;

/** A corner with its place on the path, before anything is known of its heat. */
export type Prospect = Omit<Case, 'without' | 'before'>;

/** Sharper than this a tip, or a notch, is a spike of no use: within any kerf for centimetres, rad (about 2°). */
const spike = 0.04;

/** The corners of a contour in the order of travel. */
export function prospectsOf(contour: PlanContour, { cut }: Pick<CornerPlanRequest, 'cut'>): Prospect[] {
  const corners = contourCorners(contour.contour);
  if (corners.length === 0) return [];
  const starts: number[] = [];
  let length = 0;
  for (const segment of contour.contour.segments) {
    starts.push(length);
    length += segmentLength(segment);
  }
  const whole = contourLength(contour.contour);
  const between = (a: Corner | undefined, b: Corner | undefined): number => {
    const way = (starts[b?.index ?? 0] ?? 0) - (starts[a?.index ?? 0] ?? 0);
    return way > 0 ? way : way + whole;
  };
  return corners.map((corner, i) => {
    const { point: finished, incoming, outgoing, fillet, index } = corner;
    const angle = Math.min(2 * Math.PI - spike, Math.max(spike, corner.angle));
    const point = cornerOfPath({ point: finished, incoming, outgoing, angle }, cut.kerfWidth);
    return {
      id: `c${contour.id}-${index}`,
      contour,
      corner,
      onPath: { point, incoming, outgoing, angle },
      // beside a notch the path's arc is the smaller one
      drawnRound: fillet && corner.convex ? fillet.radius + cut.kerfWidth / 2 : undefined,
      room: {
        before: between(corners[(i + corners.length - 1) % corners.length], corner) / 2,
        after: between(corner, corners[(i + 1) % corners.length]) / 2,
      },
    };
  });
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

function planCorner(prospect: Prospect, context: Context): { planned: PlannedCorner; loop: Loop | undefined } {
  const { cut, plateTemperature, properties, rules, overrides, thickness } = context.request;
  const { id, contour, corner, onPath, drawnRound } = prospect;
  const before = pathBefore(contour.contour, corner, onPath.point);
  const treatment = { kind: 'leave' } as const;
  const without = returnOf({ corner: onPath, before, round: drawnRound, treatment, cut, plateTemperature, properties });
  const found: Case = { ...prospect, before, without };

  const asked = overrides?.[id];
  const sharp = treated(corner, rules.treatBelowAngle);
  const candidates: Candidate[] = [leaveOption(found, context.limit)];
  const usable = !doublesBack(corner);
  if (usable && (sharp || (asked && asked !== 'leave'))) {
    candidates.push(
      loopOption(found, context),
      dwellOption(found, context),
      easeOption(found, pathAfter(contour.contour, corner, onPath.point, found.room.after), context),
      roundOption(found, context),
    );
  }
  const { chosen, why, problem } = usable
    ? decide(found, candidates, asked, sharp, rules, context.limit)
    : doubledBack(corner, candidates[0] ?? leaveOption(found, context.limit));

  const returnWith = chosen.returnWith ?? without;
  const loop = chosen.loop ? plannedLoop(onPath, chosen.loop, cut.kerfWidth) : undefined;
  const caution = loop?.slug ? tipCaution(loop.slug, thickness, cut) : null;
  const planned: PlannedCorner = {
    id,
    contourId: contour.id,
    index: corner.index,
    point: corner.point,
    pathPoint: onPath.point,
    angle: corner.angle,
    convex: corner.convex,
    drawn: drawnOf(prospect),
    returnWithout: without,
    straightEdge: context.straightEdge,
    treatment: chosen.treatment,
    why,
    returnWith,
    excess: returnWith - context.straightEdge,
    addedTime: chosen.addedTime ?? 0,
    options: candidates.map(({ treatment: kind, fits, returnWith: kelvin, addedTime, why: reason, at }) => ({
      treatment: kind,
      fits,
      returnWith: kelvin,
      addedTime,
      why: reason,
      ...(at ? { at } : {}),
    })),
    ...(loop ? { loop } : {}),
    ...(chosen.dwell === undefined ? {} : { dwell: { duration: chosen.dwell } }),
    ...(chosen.ease ? { ease: chosen.ease } : {}),
    ...(chosen.round ? { round: plannedRound(chosen.round, cut.kerfWidth) } : {}),
    ...(problem ? { problem } : {}),
    ...(caution ? { caution } : {}),
  };
  return { planned, loop: chosen.loop };
}

function doubledBack({ convex }: Corner, leave: Candidate): Decision {
  const why = convex
    ? 'the contour doubles back in a spike without width'
    : 'the contour doubles back in a slit without width';
  return {
    chosen: leave,
    why,
    problem: `${why}: no path goes round it, and nothing can be said of its heat; mend the drawing`,
  };
}

function drawnOf({ corner, onPath, drawnRound }: Prospect): PlannedCorner['drawn'] {
  if (!corner.fillet) return null;
  const { radius } = corner.fillet;
  const taken = roundTangent(drawnRound ?? radius, corner.angle);
  return {
    radius,
    from: pointSubtract(onPath.point, pointScale(corner.incoming, taken)),
    to: pointAdd(onPath.point, pointScale(corner.outgoing, taken)),
  };
}

/** The path cut before a corner: back along the contour for `countedPath`, but not into the second edge, which is still to be cut. */
function pathBefore({ segments }: Contour, corner: Corner, onPath: Point): Segment[] {
  const shift = pointSubtract(onPath, corner.point);
  const before: Segment[] = [];
  let length = 0;
  const { fillet } = corner;
  if (fillet) {
    // the edges are taken to where they would meet; what rounds them is cut off again
    const edge = lineBetween(fillet.start, corner.point);
    length += segmentLength(edge);
    if (length > 0) before.push(segmentShift(edge, shift));
  }
  const [first, own] = [fillet?.first ?? corner.index, fillet?.pieces ?? 0];
  for (let back = 1; back < segments.length - own && length < countedPath; back++) {
    const segment = segments[(first + segments.length - back) % segments.length];
    if (!segment) break;
    before.unshift(segmentShift(segment, shift));
    length += segmentLength(segment);
  }
  return before;
}

/** The path behind a corner for at least `wanted` m, or until the first edge comes again. */
function pathAfter({ segments }: Contour, corner: Corner, onPath: Point, wanted: number): Segment[] {
  const shift = pointSubtract(onPath, corner.point);
  const [first, own] = [corner.fillet?.first ?? corner.index, corner.fillet?.pieces ?? 0];
  const after: Segment[] = [];
  let length = 0;
  for (let i = own; i < segments.length - 1 && length < wanted; i++) {
    const segment = segments[(first + i) % segments.length];
    if (!segment) break;
    after.push(segmentShift(segment, shift));
    length += segmentLength(segment);
  }
  return after;
}

function plannedLoop(corner: LoopCorner, loop: Loop, kerfWidth: number): PlannedLoop {
  const { shape, radius, extension, length, reach, segments } = loop;
  return { shape, radius, extension, length, reach, segments, slug: loopSlug(corner, loop, kerfWidth) };
}

function plannedRound({ radius, deviation, arc }: NonNullable<Candidate['round']>, kerfWidth: number): PlannedRound {
  return { radius, deviation, finished: arc, onPath: { ...arc, radius: radius + kerfWidth / 2 } };
}

function tipCaution(slug: Slug, thickness: number, { kerfWidth, standoff }: CornerPlanRequest['cut']): string | null {
  const rise = slugRise(slug, thickness, kerfWidth);
  if (rise <= standoff) return null;
  return `the slug, ${millimetres(slug.extent)} wide, can tip on a slat: its edge may stand ${millimetres(rise)} above the plate before the kerf holds it, and the nozzle runs ${millimetres(standoff)} above`;
}

function totalsOf(corners: readonly PlannedCorner[], { cut, thickness }: CornerPlanRequest): CornerPlanTotals {
  const of = (treatment: CornerTreatment) => corners.filter((c) => c.treatment === treatment).length;
  const sum = (measure: (c: PlannedCorner) => number) => corners.reduce((total, c) => total + measure(c), 0);
  const hottest = (measure: (c: PlannedCorner) => number) =>
    corners.reduce<number | null>((most, c) => (most === null ? measure(c) : Math.max(most, measure(c))), null);
  const addedLength = sum(addedLengthOf);
  return {
    corners: corners.length,
    treated: corners.length - of('leave'),
    loops: of('loop'),
    dwells: of('dwell'),
    eases: of('ease'),
    rounds: of('round'),
    problems: corners.filter((c) => c.problem).length,
    addedTime: sum((c) => c.addedTime),
    addedLength,
    addedHeat: cut.heatIntoPlate * thickness * (addedLength + sum(({ ease }) => (ease ? easedLength(ease) : 0))),
    hottestReturn: hottest((c) => c.returnWith),
    hottestUntreated: hottest((c) => c.returnWithout),
  };
}

/** Path that a treatment adds, m: a loop with what a drawn fillet spares, and a round less the two straight pieces it replaces. */
function addedLengthOf({ loop, round, drawn, angle, pathPoint }: PlannedCorner): number {
  const rounded = (radius: number) => radius * (Math.PI - angle) - 2 * roundTangent(radius, angle);
  if (loop) {
    const taken = drawn ? Math.hypot(drawn.from.x - pathPoint.x, drawn.from.y - pathPoint.y) : 0;
    return loop.length - (drawn ? rounded(taken * Math.tan(angle / 2)) : 0);
  }
  return round ? rounded(round.onPath.radius) : 0;
}

/** Length of straight cut that would leave as much heat as an ease adds, m; below 0 where the power falls more than the feed. */
const easedLength = ({ pieces, feedShare, powerShare }: EasedPath): number =>
  pieces.reduce(
    (sum, { segment, eased }) =>
      sum + segmentLength(segment) * (easedShare(eased, powerShare) / easedShare(eased, feedShare) - 1),
    0,
  );

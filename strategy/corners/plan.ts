import type { MachineProfile } from '../machine.ts';
import { returnOf, straightEdgeReturn } from '../heat/return-temperature.ts';
import type { PlateProperties } from '../heat/properties.ts';
import { pathTime } from '../motion/path-time.ts';
import type { Contour } from '../path/contour.ts';
import type { Corner } from '../path/corner.ts';
import { contourCorners, cornerOfPath } from '../path/corner.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import { loopAt, loopSlug } from '../path/loop.ts';
import type { ObstacleField } from '../path/loop-fit.ts';
import { loopFits, obstacleField } from '../path/loop-fit.ts';
import { loopRadii } from '../path/loop-radius.ts';
import type { Box, Point } from '../path/point.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentLength, segmentShift } from '../path/segment.ts';
import { leastDwell } from './dwell.ts';
import type { CornerRules, CutConditions } from './rules.ts';

export type CornerTreatment = 'loop' | 'dwell' | 'leave';

/** A finished contour of the plan: outer contours and islands counter-clockwise, holes clockwise. */
export type PlanContour = {
  readonly id: string;
  readonly contour: Contour;
  readonly role: 'outer' | 'hole' | 'island';
};

export type CornerPlanRequest = {
  readonly contours: readonly PlanContour[];
  /** The plate's outline, m, or null when loops need not keep to one. */
  readonly plate: { readonly min: Point; readonly max: Point } | Contour | null;
  readonly rules: CornerRules;
  readonly cut: CutConditions;
  readonly profile: Pick<MachineProfile, 'axes' | 'smallestArc'>;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
  readonly properties?: PlateProperties;
  /** Treatments the programmer asked for, by corner id. */
  readonly overrides?: Readonly<Record<string, CornerTreatment>>;
};

/** What one treatment would give at a corner. */
export type CornerOption = {
  readonly treatment: CornerTreatment;
  readonly fits: boolean;
  readonly returnWith: number | null; // K; null when it does not fit
  readonly addedTime: number | null; // s
  readonly why: string;
  /** Where the thing in the way is, m. */
  readonly at?: Point;
};

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

export type CornerPlan = { readonly corners: readonly PlannedCorner[]; readonly totals: CornerPlanTotals };

/** Path before a corner whose heat is counted, m. */
const countedPath = 0.3;

/**
 * The corner plan: for every corner of the contours the treatment it gets, why, the return temperatures (K) and the added time (s).
 *
 * A tip below the rules' angle whose return temperature is above the limit is treated; of what fits and stays under the limit, the least added time wins.
 * What the programmer asked for is followed when it fits; a loop that does not fit stays refused, with the reason. Corners are taken in the order of the
 * contours, and each loop placed is an obstacle to the next. Throws RangeError for a thickness, feed or temperature that is not positive.
 */
export function cornerPlan(request: CornerPlanRequest): CornerPlan {
  const { contours, cut, plateTemperature, thickness } = request;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const context: Context = {
    request,
    field: obstacleField(contours.map(({ id, contour, role }) => ({ id, contour, name: `${roleName[role]} ${id}` }))),
    plate: plateOf(request.plate),
    straightEdge: straightEdgeReturn(cut, plateTemperature, request.properties),
    placed: [],
  };
  const corners = contours.flatMap((contour) =>
    contourCorners(contour.contour).map((corner) => planCorner(contour, corner, context)),
  );
  return { corners, totals: totalsOf(corners, request) };
}

const roleName = { outer: 'outline', hole: 'hole', island: 'island' } as const;

type Context = {
  readonly request: CornerPlanRequest;
  readonly field: ObstacleField;
  readonly plate: Box | Contour | null;
  readonly straightEdge: number;
  readonly placed: { name: string; loop: Loop }[];
};

function plateOf(plate: CornerPlanRequest['plate']): Box | Contour | null {
  if (plate === null || 'segments' in plate) return plate;
  return { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };
}

/** What is known of a corner before anything is decided. */
type Case = {
  readonly id: string;
  readonly contourId: string;
  readonly corner: Corner;
  readonly onPath: LoopCorner;
  readonly before: readonly Segment[];
  readonly without: number; // K
};

/** An option with what it would put on the plate. */
type Candidate = CornerOption & { readonly loop?: Loop; readonly dwell?: number };

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
  const candidates: Candidate[] = [leaveOption(found, rules)];
  if (sharp || (asked && asked !== 'leave')) candidates.push(loopOption(found, context), dwellOption(found, context));
  const { chosen, why, problem } = decide(found, candidates, asked, sharp, rules);
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

function leaveOption({ without }: Case, rules: CornerRules): Candidate {
  const under = without <= rules.returnTemperatureLimit;
  return {
    treatment: 'leave',
    fits: true,
    returnWith: without,
    addedTime: 0,
    why: `untreated the tip returns at ${celsius(without)}, ${under ? 'under' : 'over'} the limit of ${celsius(rules.returnTemperatureLimit)}`,
  };
}

const refused = (treatment: CornerTreatment, why: string, at?: Point): Candidate => ({
  treatment,
  fits: false,
  returnWith: null,
  addedTime: null,
  why,
  ...(at ? { at } : {}),
});

function loopOption(found: Case, context: Context): Candidate {
  const { rules, cut, profile, plateTemperature, properties } = context.request;
  const { corner, onPath, before } = found;
  if (!rules.loop.allowed) return refused('loop', 'the corner rules of this strategy allow no loops');
  if (!corner.convex) return refused('loop', 'the corner is concave: a loop would run through the part');
  const sizes = loopRadii(corner.angle, { ...rules.loop, smallestArc: profile.smallestArc });
  if (sizes.kind === 'none') return refused('loop', sizes.why);
  let first: Candidate | null = null;
  for (const radius of sizes.radii) {
    const loop = loopAt(onPath, radius);
    const fit = loopFits(loop, {
      field: context.field,
      contourId: found.contourId,
      kerfWidth: cut.kerfWidth,
      clearance: rules.loop.clearance,
      plate: context.plate,
      loops: context.placed,
    });
    if (fit.kind === 'none') {
      const tried =
        sizes.radii.length > 1
          ? `, and down to ${millimetres(sizes.radii.at(-1) ?? radius)} something is in the way`
          : '';
      first ??= refused('loop', `at ${millimetres(radius)} radius ${fit.why}${tried}`, fit.at);
      continue;
    }
    const returnWith = returnOf({
      corner: onPath,
      before,
      treatment: { kind: 'loop', loop },
      cut,
      plateTemperature,
      properties,
    });
    const smaller = first
      ? `, smaller than the design's ${millimetres(sizes.radii[0] ?? radius)} because ${reasonOf(first)}`
      : '';
    return {
      treatment: 'loop',
      fits: true,
      returnWith,
      addedTime: loopAddedTime(onPath, loop, context.request),
      why: `a loop of ${millimetres(radius)} radius fits${smaller}; the tip returns at ${celsius(returnWith)}`,
      loop,
    };
  }
  return first ?? refused('loop', 'no radius is allowed');
}

/** The middle of the first refusal: what was in the way. */
const reasonOf = (refusal: Candidate): string =>
  refusal.why.replace(/^at [^ ]+ mm radius /, '').replace(/, and down to .*$/, '');

/** Time a loop costs against a sharp turn, s, on straight edges long enough for the feed to be reached. */
function loopAddedTime(corner: LoopCorner, loop: Loop, { cut, profile }: CornerPlanRequest): number {
  const run = 0.05;
  const edgeIn = lineBetween(pointSubtract(corner.point, pointScale(corner.incoming, run)), corner.point);
  const edgeOut = lineBetween(corner.point, pointAdd(corner.point, pointScale(corner.outgoing, run)));
  const drive = {
    feed: Math.min(cut.feed, profile.axes.maxFeed),
    acceleration: profile.axes.acceleration,
    jerk: profile.axes.jerk,
  };
  return pathTime([edgeIn, ...loop.segments, edgeOut], drive).time - pathTime([edgeIn, edgeOut], drive).time;
}

function dwellOption(found: Case, context: Context): Candidate {
  const { rules, cut, plateTemperature, properties } = context.request;
  if (!rules.dwell.allowed) return refused('dwell', 'the corner rules of this strategy allow no dwell');
  const { onPath, before } = found;
  const after = (duration: number) =>
    returnOf({ corner: onPath, before, treatment: { kind: 'dwell', duration }, cut, plateTemperature, properties });
  const duration = leastDwell(after, rules.returnTemperatureLimit, rules.dwell.maxDuration);
  if (duration === 0) return refused('dwell', 'the tip is under the limit without waiting');
  const returnWith = after(duration);
  return {
    treatment: 'dwell',
    fits: true,
    returnWith,
    addedTime: duration,
    why:
      returnWith <= rules.returnTemperatureLimit
        ? `after waiting ${seconds(duration)} the tip is at ${celsius(returnWith)}`
        : `after ${seconds(duration)}, the longest wait allowed, the tip is still at ${celsius(returnWith)}`,
    dwell: duration,
  };
}

type Decision = { readonly chosen: Candidate; readonly why: string; readonly problem?: string };

function decide(
  found: Case,
  candidates: readonly Candidate[],
  asked: CornerTreatment | undefined,
  sharp: boolean,
  rules: CornerRules,
): Decision {
  const limit = rules.returnTemperatureLimit;
  const automatic = decideByRule(found, candidates, sharp, rules);
  if (!asked) return automatic;
  const wanted = candidates.find((c) => c.treatment === asked);
  if (!wanted?.fits) {
    return {
      ...automatic,
      why: `${asked} was asked for and does not fit; ${automatic.why}`,
      problem: `${asked} asked for by the programmer is refused: ${wanted?.why ?? 'it is not possible here'}`,
    };
  }
  const chosen = { chosen: wanted, why: `asked for by the programmer: ${wanted.why}` };
  if ((wanted.returnWith ?? 0) <= limit || !found.corner.convex) return chosen;
  return {
    ...chosen,
    problem: `with the treatment asked for the tip returns at ${celsius(wanted.returnWith ?? 0)}, over the limit of ${celsius(limit)}`,
  };
}

function decideByRule(found: Case, candidates: readonly Candidate[], sharp: boolean, rules: CornerRules): Decision {
  const limit = rules.returnTemperatureLimit;
  const leave = candidates.find((c) => c.treatment === 'leave') ?? leaveOption(found, rules);
  // concave? More steel than a straight edge carries the heat away
  if (!found.corner.convex)
    return { chosen: leave, why: 'the corner is concave: more steel than a straight edge carries the heat away' };
  if (found.without <= limit) return { chosen: leave, why: leave.why };
  if (!sharp) {
    return {
      chosen: leave,
      why: `${degrees(found.corner.angle)} is not below the ${degrees(rules.treatBelowAngle)} from which corners are treated`,
      problem: `${leave.why}, yet the angle is above the one from which corners are treated`,
    };
  }
  const under = candidates.filter((c) => c.fits && c.treatment !== 'leave' && (c.returnWith ?? Infinity) <= limit);
  const quickest = least(under, (c) => c.addedTime ?? Infinity);
  if (quickest)
    return { chosen: quickest, why: `${leave.why}; ${quickest.why}, for ${seconds(quickest.addedTime ?? 0)} more` };
  const coolest =
    least(
      candidates.filter((c) => c.fits),
      (c) => c.returnWith ?? Infinity,
    ) ?? leave;
  return {
    chosen: coolest,
    why:
      coolest.treatment === 'leave'
        ? `${leave.why}, and neither a loop nor a dwell is possible here`
        : `nothing that fits stays under the limit; the ${coolest.treatment} leaves the coolest tip`,
    problem: `the tip returns at ${celsius(coolest.returnWith ?? found.without)}, over the limit of ${celsius(limit)}: ${candidates
      .filter((c) => c.treatment !== 'leave')
      .map((c) => c.why)
      .join('; ')}`,
  };
}

function least<T>(items: readonly T[], measure: (item: T) => number): T | undefined {
  return items.reduce<T | undefined>(
    (best, item) => (best === undefined || measure(item) < measure(best) ? item : best),
    undefined,
  );
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

const celsius = (kelvin: number): string => `${Math.round(kelvin - 273.15)} °C`;
const millimetres = (length: number): string => `${(length * 1000).toFixed(1)} mm`;
const seconds = (time: number): string => `${time.toFixed(1)} s`;
const degrees = (angle: number): string => `${Math.round((angle * 180) / Math.PI)}°`;

import Flatbush from 'flatbush';
import type { PlateProperties } from '../../heat/properties.ts';
import { midZoneProperties } from '../../heat/properties.ts';
import type { PlateDrive } from '../../motion/index.ts';
import { heatOfClock, plateClock } from '../../motion/index.ts';
import { contourBox } from '../../path/contour.ts';
import type { CutPath } from '../../path/cut-path.ts';
import type { PlacedLoop } from '../../path/loop-fit.ts';
import { pathPart } from '../../path/path-part.ts';
import type { Box } from '../../path/point.ts';
import { boxGrow, boxUnion, emptyBox, pointDistance } from '../../path/point.ts';
import type { Segment } from '../../path/segment.ts';
import { pathLength, segmentEnd } from '../../path/segment.ts';
import type { Candidate, Context, CornerPlanRequest, CornerTreatment, Prospect, Way } from '../case.ts';
import { contextOf } from '../context.ts';
import { doubledBackSaid } from '../decide.ts';
import { hundredths } from '../hundredths.ts';
import { loopWays, mostReach } from '../loop-option.ts';
import { easeWay, roundWay } from '../options.ts';
import { drawnOf } from '../planned.ts';
import { doublesBack, pathAfter, pathBefore, prospectsOf, tooNear, treated } from '../prospects.ts';
import { ruledOut } from '../refused.ts';
import type { CutLegs, Leg } from './legs.ts';
import { cutLegs } from './legs.ts';
import type { Approach, OwnHeat, PlateWay } from './own-ways.ts';
import { fittedWay, leaveWay, waitWay } from './own-ways.ts';
import type { OwnCorner, PlacedWay } from './plate-model.ts';
import type { TipPeaks } from './tip-peaks.ts';
import { tipPeaks } from './tip-peaks.ts';

export type PlatePlanRequest = CornerPlanRequest & {
  /** The untreated cut: what corners get is planned into it. */
  readonly cutPath: CutPath;
  readonly drive: PlateDrive;
  /** Heat that one pierce leaves in the plate, J. */
  readonly pierceHeat: number;
  /** Of the air, K, and what each face of the plate gives off, W/(m² K): as the plate's field takes them when left out. */
  readonly ambient?: number;
  readonly lossCoefficient?: number;
  /** False takes the plate as if no kerf kept heat on its side, as a plain sum of heat does; otherwise they do. */
  readonly kerfsStayOpen?: boolean;
};

/** A corner with the ways to treat it. */
export type PlateCorner = OwnCorner<PlateWay> & {
  readonly found: Prospect;
  /** Whether the rules would treat it. */
  readonly sharp: boolean;
  /** Why nothing can be said or done: it has no width, or shares a kerf with the next. */
  readonly useless: { readonly why: string; readonly problem: string } | null;
  /** Everything that was tried next to the loops placed so far: what fits as a way, what does not with its reason. Leaving is not among it. */
  readonly tried: (near: readonly PlacedWay<PlateWay>[]) => readonly (PlateWay | Candidate)[];
};

/** All about a plate's cut that does not change with what is decided. */
export type PreparedPlate = {
  readonly request: PlatePlanRequest;
  readonly context: Context;
  readonly properties: PlateProperties;
  readonly box: Box;
  readonly legs: CutLegs;
  readonly corners: readonly PlateCorner[];
  readonly peaks: TipPeaks;
  /** Duration of the untreated cut, s. */
  readonly duration: number;
};

/** Plate around parts that none is known of, m. */
const aroundParts = 0.1;
/** A path that ends farther from its corner than this does not end in it, m. */
const samePlace = 1e-6;

/** What a plate's cut is decided from: its clock, its heat corner by corner, and what fits each of them. Throws RangeError as `plateClock` and `cornerPlan`. */
export function preparedPlate(request: PlatePlanRequest): PreparedPlate {
  const { contours, cutPath, drive, cut, rules, thickness, pierceHeat, properties = midZoneProperties } = request;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const prospects = contours.flatMap((contour) => prospectsOf(contour, request));
  const clock = plateClock(cutPath, drive);
  const places = prospects.map((found) => ({
    contourId: found.contour.id,
    at: drawnOf(found)?.to ?? found.onPath.point,
  }));
  const heat = heatOfClock(clock, { heatIntoPlate: cut.heatIntoPlate, pierceHeat });
  const legs = cutLegs(clock, heat, places, thickness, properties);
  const context = contextOf(request, () => []);
  const near = reachingEachOther(prospects.map((found) => reachOf(found, request)));
  const own: (Leg | undefined)[] = [];
  for (const leg of legs.legs) own[leg.corner] = leg;
  const peaks = tipPeaks({ cut, rules, properties });
  const { burnBack } = rules;
  const ownHeat: OwnHeat = {
    cut,
    rules,
    properties,
    toPeak: burnBack?.judged ? (tip) => peaks.over(tip, burnBack.limit) : null,
  };
  const corners = prospects.map((found, i) => plateCorner(found, own[i], near[i] ?? none, context, ownHeat));
  return { request, context, properties, box: boxOf(request), legs, corners, peaks, duration: clock.duration };
}

const none: ReadonlySet<number> = new Set();

/** The same cut with other treatments asked for, and the numbers of the corners that this changes something for. All other corners stay the same objects. */
export function preparedAgain(
  prepared: PreparedPlate,
  overrides: PlatePlanRequest['overrides'],
): { readonly prepared: PreparedPlate; readonly changed: readonly number[] } {
  const { request: asked, corners: known } = prepared;
  const request: PlatePlanRequest = { ...asked, overrides };
  const otherwise = (id: string) => asked.overrides?.[id] !== overrides?.[id];
  const reachesOtherwise = known.some(
    ({ found }) => otherwise(found.id) && reachOf(found, asked).reach !== reachOf(found, request).reach,
  );
  const near = reachesOtherwise ? reachingEachOther(known.map(({ found }) => reachOf(found, request))) : null;
  const changed: number[] = [];
  const corners = known.map((corner, i) => {
    const nearNow = near?.[i] ?? corner.near;
    const sameNear = nearNow === corner.near || [...nearNow].join() === [...corner.near].join();
    if (sameNear && !otherwise(corner.found.id)) return corner;
    changed.push(i);
    return { ...corner, near: nearNow, asked: askedOf(corner, overrides?.[corner.found.id]) };
  });
  if (changed.length === 0) return { prepared, changed };
  return { prepared: { ...prepared, request, context: { ...prepared.context, request }, corners }, changed };
}

/** The way asked for at a corner, next to the loops placed so far. */
function askedOf(
  corner: Pick<PlateCorner, 'useless' | 'leave' | 'others'>,
  wanted: CornerTreatment | undefined,
): PlateCorner['asked'] {
  if (wanted === undefined || corner.useless) return null;
  if (wanted === 'leave') return () => corner.leave;
  return (near) => corner.others(near).find(({ treatment }) => treatment === wanted) ?? null;
}

function boxOf({ plate, contours }: PlatePlanRequest): Box {
  if (plate === null) {
    const box = contours.reduce((all, { contour }) => boxUnion(all, contourBox(contour)), emptyBox);
    return boxGrow(box, aroundParts);
  }
  if ('min' in plate) return { minX: plate.min.x, minY: plate.min.y, maxX: plate.max.x, maxY: plate.max.y };
  return contourBox('edge' in plate ? plate.edge : plate);
}

/** How far a loop of a corner may come to lie from its place, m; 0 where none is tried. */
function reachOf({ corner, onPath, id }: Prospect, request: PlatePlanRequest) {
  const { rules, overrides, cut } = request;
  const tried = treated(corner, rules.treatBelowAngle) || (overrides?.[id] === 'loop' && !doublesBack(corner));
  const reach = tried ? mostReach(corner, request) : 0;
  return { at: onPath.point, reach: reach > 0 ? reach + cut.kerfWidth + rules.loop.clearance : 0 };
}

/** For each corner with loops those others whose loops may come near. */
function reachingEachOther(places: readonly ReturnType<typeof reachOf>[]): Set<number>[] {
  const sets = places.map(() => new Set<number>());
  if (places.length === 0) return sets;
  const index = new Flatbush(places.length);
  for (const { at, reach } of places) index.add(at.x - reach, at.y - reach, at.x + reach, at.y + reach);
  index.finish();
  places.forEach(({ at, reach }, i) => {
    if (reach === 0) return;
    const found = index.search(
      at.x - reach,
      at.y - reach,
      at.x + reach,
      at.y + reach,
      (j) => j !== i && (places[j]?.reach ?? 0) > 0,
    );
    for (const j of found) sets[i]?.add(j);
  });
  return sets;
}

function plateCorner(
  found: Prospect,
  leg: Leg | undefined,
  near: ReadonlySet<number>,
  context: Context,
  heat: OwnHeat,
): PlateCorner {
  const { request } = context;
  const { corner, contour, onPath, id } = found;
  const usable = !doublesBack(corner) && tooNear(found, request.cut.kerfWidth) === null;
  const sharp = treated(corner, request.rules.treatBelowAngle);
  const along = pathBefore(contour.contour, corner, onPath.point);
  const at = approachOf(found, leg, along);
  const asWay = (one: Way | Candidate): PlateWay | Candidate => ('fits' in one ? one : fittedWay(at, heat, one));

  let apart: readonly (PlateWay | Candidate)[] | null = null;
  const withoutLoops = () =>
    (apart ??= [
      request.rules.dwell.allowed ? waitWay(at, heat) : ruledOut('dwell', 'dwell'),
      asWay(
        easeWay(
          { ...found, before: along },
          pathAfter(contour.contour, corner, onPath.point, found.room.after),
          request,
        ),
      ),
      asWay(roundWay(found, request)),
    ]);
  const loopsFor = new Map<string, readonly (PlateWay | Candidate)[]>();
  const loopsNextTo = (placed: readonly PlacedWay<PlateWay>[]) => {
    const key = placed
      .map(({ corner: other, way }) => `${other} ${way.fits?.loop?.radius} ${way.fits?.loop?.extension}`)
      .join();
    let known = loopsFor.get(key);
    if (!known) {
      const loops = placed.flatMap(({ way }): PlacedLoop[] =>
        way.fits?.loop ? [{ name: `the loop of corner ${way.of}`, loop: way.fits.loop }] : [],
      );
      const ways = loopWays(found, { ...context, loopsNear: () => loops });
      known = 'fits' in ways ? [ways] : ways.map(asWay);
      loopsFor.set(key, known);
    }
    return known;
  };
  const tried = (placed: readonly PlacedWay<PlateWay>[]) => [...loopsNextTo(placed), ...withoutLoops()];
  let left: PlateWay | null = null;
  const leave = () => (left ??= leaveWay(at, heat));
  const planned: PlateCorner = {
    found,
    sharp: usable && sharp,
    useless: usable ? null : uselessSaid(found, request.cut.kerfWidth),
    near,
    get leave() {
      return leave();
    },
    treatable: usable && sharp,
    counts: usable && corner.convex,
    tried,
    others: (placed) => tried(placed).filter(isWay),
    asked: null,
  };
  const wanted = request.overrides?.[id];
  // a copy would compute the leaving at once
  return wanted === undefined ? planned : { ...planned, asked: askedOf(planned, wanted) };
}

function uselessSaid(found: Prospect, kerfWidth: number): PlateCorner['useless'] {
  const way = tooNear(found, kerfWidth);
  if (way === null || doublesBack(found.corner)) return doubledBackSaid(found.corner);
  const why = `the next corner is ${hundredths(way)} away, less than the kerf is wide`;
  return {
    why,
    problem: `${why}: one kerf takes both, and no return temperature holds for either; draw them as one`,
  };
}

/** What fits is a way with its heat; what does not is a reason. */
export const isWay = (one: PlateWay | Candidate): one is PlateWay => 'rise' in one;

/** The path before a corner since the corner before or the lead-in, ending in the path's corner even where the cut goes round it; and what was cut right before. */
function approachOf(found: Prospect, leg: Leg | undefined, along: readonly Segment[]): Approach {
  if (!leg) return { found, before: along, earlier: [] };
  const { own, earlier } = leg;
  const last = own.at(-1);
  if (last && pointDistance(segmentEnd(last), found.onPath.point) < samePlace) return { found, before: own, earlier };
  const whole = pathLength(along);
  const begins = Math.max(0, whole - pathLength(own));
  const beginsEarlier = Math.max(0, begins - pathLength(earlier));
  return {
    found,
    before: pathPart(along, begins, Infinity),
    earlier: begins > beginsEarlier ? pathPart(along, beginsEarlier, begins) : [],
  };
}

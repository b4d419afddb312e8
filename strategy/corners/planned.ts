import type { Loop, LoopCorner, Slug } from '../path/loop.ts';
import { loopSlug } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { roundTangent } from '../path/round.ts';
import type { Arc, Segment } from '../path/segment.ts';
import { millimetres } from '../units/said.ts';
import type {
  Candidate,
  Context,
  CornerOption,
  CornerPlanRequest,
  CornerTreatment,
  EasedPath,
  OptionForm,
  Prospect,
} from './case.ts';
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

/** Where the path's arc around a corner that the drawing rounds begins and ends, m; null where it is sharp. */
export function drawnOf({ corner, onPath, drawnRound }: Prospect): PlannedCorner['drawn'] {
  if (!corner.fillet) return null;
  const { radius } = corner.fillet;
  const taken = roundTangent(drawnRound ?? radius, corner.angle);
  return {
    radius,
    from: pointSubtract(onPath.point, pointScale(corner.incoming, taken)),
    to: pointAdd(onPath.point, pointScale(corner.outgoing, taken)),
  };
}

/** What was decided at a corner. */
export type Decided = {
  readonly candidates: readonly Candidate[];
  readonly chosen: Candidate;
  readonly why: string;
  readonly problem: string | undefined;
  readonly without: number; // K
};

/** A corner with what was decided, as a plan holds it. */
export function plannedCorner(
  prospect: Prospect,
  { candidates, chosen, why, problem, without }: Decided,
  { request: { cut, thickness }, straightEdge }: Pick<Context, 'request' | 'straightEdge'>,
): PlannedCorner {
  const { id, contour, corner, onPath } = prospect;
  const returnWith = chosen.returnWith ?? without;
  const loop = chosen.loop ? plannedLoop(onPath, chosen.loop, cut.kerfWidth) : undefined;
  const caution = loop?.slug ? tipCaution(loop.slug, thickness, cut) : null;
  return {
    id,
    contourId: contour.id,
    index: corner.index,
    point: corner.point,
    pathPoint: onPath.point,
    angle: corner.angle,
    convex: corner.convex,
    drawn: drawnOf(prospect),
    returnWithout: without,
    straightEdge,
    treatment: chosen.treatment,
    why,
    returnWith,
    excess: returnWith - straightEdge,
    addedTime: chosen.addedTime ?? 0,
    options: candidates.map((candidate) => optionOf(candidate, cut.kerfWidth)),
    ...(loop ? { loop } : {}),
    ...(chosen.dwell === undefined ? {} : { dwell: { duration: chosen.dwell } }),
    ...(chosen.ease ? { ease: chosen.ease } : {}),
    ...(chosen.round ? { round: plannedRound(chosen.round, cut.kerfWidth) } : {}),
    ...(problem ? { problem } : {}),
    ...(caution ? { caution } : {}),
  };
}

function optionOf(candidate: Candidate, kerfWidth: number): CornerOption {
  const { treatment, fits, returnWith, addedTime, why, at } = candidate;
  const form = fits ? formOf(candidate, kerfWidth) : null;
  return { treatment, fits, returnWith, addedTime, why, ...(at ? { at } : {}), ...(form ? { form } : {}) };
}

function formOf({ loop, dwell, ease, round }: Candidate, kerfWidth: number): OptionForm | null {
  if (loop) return { loop: { shape: loop.shape, radius: loop.radius, extension: loop.extension } };
  if (ease) return { ease: { length: ease.before, feedShare: ease.feedShare, powerShare: ease.powerShare } };
  if (round) return { round: round.radius + kerfWidth / 2 };
  return dwell === undefined ? null : { dwell };
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

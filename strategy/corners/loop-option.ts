import type { Loop } from '../path/loop.ts';
import { flatLoopAt, flatLoopReach, loopAt, loopExtension, loopReach } from '../path/loop.ts';
import type { LoopRoom } from '../path/loop-fit.ts';
import { loopFitsIn, loopRoom } from '../path/loop-fit.ts';
import { flatExtensions, loopRadii } from '../path/loop-radius.ts';
import type { Corner } from '../path/corner.ts';
import type { Point } from '../path/point.ts';
import { roundDeviation } from '../path/round.ts';
import { millimetres } from '../units/said.ts';
import { loopAddedTime } from './added-time.ts';
import type { Candidate, Case, Context, CornerPlanRequest, Prospect, Way } from './case.ts';
import { hundredths } from './hundredths.ts';
import { heated } from './heated.ts';
import { refused, ruledOut } from './refused.ts';

/** The largest loops that fit a corner: of one arc, and flat where that one had to be smaller than designed or does not fit. */
export type FittingLoops = {
  /** The design number as far as the rules' bounds allow it at this angle, m. */
  readonly design: number;
  readonly smallest: number;
  readonly tangent: Loop | null;
  readonly flat: Loop | null;
  /** What stands in the way of the designed loop. */
  readonly inTheWay: { readonly why: string; readonly at: Point } | null;
};

type Bounds = Pick<CornerPlanRequest, 'rules' | 'profile'>;

const boundsOf = ({ rules, profile }: Bounds) => ({ ...rules.loop, smallestArc: profile.smallestArc });

/** How far any loop of a corner can reach from the path's corner, m; 0 where none is tried. */
export function mostReach({ convex, angle }: Corner, request: Bounds): number {
  if (!request.rules.loop.allowed || !convex) return 0;
  const sizes = loopRadii(angle, boundsOf(request));
  if (sizes.kind === 'none') return 0;
  const tangent = loopReach(loopExtension(Math.max(...sizes.radii), angle), angle);
  const flats = flatExtensions(angle, boundsOf(request));
  return flats.kind === 'none'
    ? tangent
    : Math.max(tangent, flatLoopReach(flats.radius, Math.max(...flats.extensions)));
}

/** The loops that fit, or why none is even tried. Clearance alone: no heat, no time. */
export function fittingLoops(
  { corner, contour, onPath }: Pick<Prospect, 'corner' | 'contour' | 'onPath'>,
  context: Pick<Context, 'request' | 'field' | 'loopsNear'>,
): FittingLoops | { readonly kind: 'none'; readonly why: string } {
  const { request, field, loopsNear } = context;
  const sizes = loopRadii(corner.angle, boundsOf(request));
  if (sizes.kind === 'none') return sizes;
  const [design, smallest] = [Math.max(...sizes.radii), Math.min(...sizes.radii)];
  const reach = mostReach(corner, request);
  const { kerfWidth } = request.cut;
  const { clearance } = request.rules.loop;
  const room = loopRoom(onPath.point, reach, {
    field,
    contourId: contour.id,
    kerfWidth,
    clearance,
    loops: loopsNear(onPath.point, reach + kerfWidth + clearance),
  });
  const tangents = firstFitting(sizes.radii, (radius) => loopAt(onPath, radius), room);
  const found = { design, smallest, tangent: tangents.loop, inTheWay: tangents.inTheWay };
  if (tangents.inTheWay === null || room.blocked) return { ...found, flat: null };
  const flats = flatExtensions(corner.angle, boundsOf(request));
  if (flats.kind === 'none') return { ...found, flat: null };
  const flat = firstFitting(flats.extensions, (extension) => flatLoopAt(onPath, flats.radius, extension), room).loop;
  return { ...found, flat };
}

/** The first of some sizes that fits, and what stood in the way of the very first. */
function firstFitting(sizes: readonly number[], loopOf: (size: number) => Loop, room: LoopRoom) {
  let inTheWay: FittingLoops['inTheWay'] = null;
  for (const size of sizes) {
    const loop = loopOf(size);
    const fit = loopFitsIn(loop, room);
    if (fit.kind === 'fits') return { loop, inTheWay };
    inTheWay ??= fit;
    if (room.blocked) break;
  }
  return { loop: null, inTheWay };
}

/**
 * The loop of one arc at the design number when it fits; otherwise the largest of one arc and the largest flat one that fit; or why none does. Clearance and
 * time, no heat.
 */
export function loopWays(
  found: Prospect,
  context: Pick<Context, 'request' | 'field' | 'loopsNear'>,
): readonly Way[] | Candidate {
  const { rules } = context.request;
  const { corner } = found;
  if (!rules.loop.allowed) return ruledOut('loop', 'loops');
  if (!corner.convex) return refused('loop', 'the corner is concave: a loop would run through the part');
  const leftSharp = filletLost(corner, rules.round?.tolerance ?? 0);
  if (leftSharp) return refused('loop', leftSharp);
  const loops = fittingLoops(found, context);
  if ('kind' in loops) return refused('loop', loops.why);
  const { design, smallest, tangent, flat, inTheWay } = loops;
  const ways = [tangent, flat].flatMap((loop) => (loop ? [wayOf(found, loop, loops, context.request)] : []));
  if (ways.length > 0) return ways;
  const tried = smallest < design ? `, and down to ${millimetres(smallest)} or flattened something is in the way` : '';
  return refused('loop', `at ${millimetres(design)} radius ${inTheWay?.why ?? 'nothing fits'}${tried}`, inTheWay?.at);
}

/** Of the loops that fit the quicker one that stays under the limit, or the one that leaves the cooler tip; or why none fits. */
export function loopOption(found: Case, context: Context): Candidate {
  const ways = loopWays(found, context);
  if ('fits' in ways) return ways;
  const [first, second] = ways.map((way) => heated(found, way, context));
  if (!first) throw new Error('there is a way or a reason why not');
  return second && better(second, first, context.limit) ? second : first;
}

/** Why a loop would leave a drawn fillet too sharp, or null where there is none or the tolerance allows it. */
function filletLost({ fillet, angle }: Corner, tolerance: number): string | null {
  if (!fillet) return null;
  const left = roundDeviation(fillet.radius, angle);
  if (left <= tolerance) return null;
  const allowed = tolerance > 0 ? `${hundredths(tolerance)} are allowed` : 'the rules allow nothing off the drawing';
  return `the drawing rounds this corner with ${hundredths(fillet.radius)}; a loop leaves it sharp, ${hundredths(left)} more steel than drawn, and ${allowed}`;
}

function wayOf(
  { onPath, drawnRound }: Prospect,
  loop: Loop,
  { design, inTheWay }: FittingLoops,
  request: CornerPlanRequest,
): Way {
  const said =
    loop.shape === 'flat'
      ? `a flat loop ${millimetres(loop.extension)} past the corner with arcs of ${millimetres(loop.radius)} fits`
      : `a loop of ${millimetres(loop.radius)} radius fits`;
  const instead = loop.shape === 'flat' ? 'in place of' : 'smaller than';
  const smaller = inTheWay ? `, ${instead} the design's ${millimetres(design)} because ${inTheWay.why}` : '';
  return {
    treatment: 'loop',
    addedTime: loopAddedTime(onPath, loop, drawnRound, request),
    asks: { treatment: { kind: 'loop', loop } },
    say: (returnsAt) => `${said}${smaller}; the tip returns at ${returnsAt}`,
    loop,
  };
}

/** Whether a is the better of two loops that fit: under the limit before over it, then the quicker, or over it the cooler. */
function better(a: Candidate, b: Candidate, limit: number): boolean {
  const [hotA, hotB] = [a.returnWith ?? Infinity, b.returnWith ?? Infinity];
  if (hotA <= limit !== hotB <= limit) return hotA <= limit;
  return hotA <= limit ? (a.addedTime ?? Infinity) < (b.addedTime ?? Infinity) : hotA < hotB;
}

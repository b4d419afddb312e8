import { returnOf } from '../heat/return-temperature.ts';
import { pathTime } from '../motion/path-time.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import { loopAt } from '../path/loop.ts';
import { loopFits } from '../path/loop-fit.ts';
import { loopRadii } from '../path/loop-radius.ts';
import type { Point } from '../path/point.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { lineBetween } from '../path/segment.ts';
import { celsius, millimetres, seconds } from '../units/said.ts';
import type { Candidate, Case, Context, CornerPlanRequest, CornerTreatment } from './case.ts';
import { leastDwell } from './dwell.ts';

/** Leaving the corner as it is. */
export function leaveOption({ without }: Case, limit: number): Candidate {
  const under = without <= limit;
  return {
    treatment: 'leave',
    fits: true,
    returnWith: without,
    addedTime: 0,
    why: `untreated the tip returns at ${celsius(without)}, ${under ? 'under' : 'over'} the limit of ${celsius(limit)}`,
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

/** The largest loop that fits, from the design number down; or why none does. */
export function loopOption(found: Case, context: Context): Candidate {
  const { rules, cut, profile, plateTemperature, properties } = context.request;
  const { corner, onPath, before } = found;
  if (!rules.loop.allowed) return refused('loop', 'the corner rules of this strategy allow no loops');
  if (!corner.convex) return refused('loop', 'the corner is concave: a loop would run through the part');
  const sizes = loopRadii(corner.angle, { ...rules.loop, smallestArc: profile.smallestArc });
  if (sizes.kind === 'none') return refused('loop', sizes.why);
  const [largest, smallest] = [Math.max(...sizes.radii), Math.min(...sizes.radii)];
  let inTheWay: { readonly why: string; readonly at: Point } | null = null;
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
      inTheWay ??= fit;
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
    const smaller = inTheWay ? `, smaller than the design's ${millimetres(largest)} because ${inTheWay.why}` : '';
    return {
      treatment: 'loop',
      fits: true,
      returnWith,
      addedTime: loopAddedTime(onPath, loop, context.request),
      why: `a loop of ${millimetres(radius)} radius fits${smaller}; the tip returns at ${celsius(returnWith)}`,
      loop,
    };
  }
  const tried = smallest < largest ? `, and down to ${millimetres(smallest)} something is in the way` : '';
  return refused('loop', `at ${millimetres(largest)} radius ${inTheWay?.why ?? 'nothing fits'}${tried}`, inTheWay?.at);
}

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

/** The least wait that brings the tip under the limit, or the longest allowed; the restart adds time, and its cooling is left out. */
export function dwellOption(found: Case, context: Context): Candidate {
  const { rules, cut, plateTemperature, properties } = context.request;
  if (!rules.dwell.allowed) return refused('dwell', 'the corner rules of this strategy allow no dwell');
  const { onPath, before } = found;
  const after = (duration: number) =>
    returnOf({ corner: onPath, before, treatment: { kind: 'dwell', duration }, cut, plateTemperature, properties });
  const duration = leastDwell(after, context.limit, rules.dwell.maxDuration);
  if (duration === 0) return refused('dwell', 'the tip is under the limit without waiting');
  const returnWith = after(duration);
  return {
    treatment: 'dwell',
    fits: true,
    returnWith,
    addedTime: duration + rules.dwell.restart,
    why:
      returnWith <= context.limit
        ? `after waiting ${seconds(duration)} the tip is at ${celsius(returnWith)}; ${seconds(rules.dwell.restart)} more get the cut going again`
        : `after ${seconds(duration)}, the longest wait allowed, the tip is still at ${celsius(returnWith)}`,
    dwell: duration,
  };
}

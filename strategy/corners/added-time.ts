import type { PathDrive } from '../motion/path-time.ts';
import { pathTime } from '../motion/path-time.ts';
import type { EasedPiece } from '../path/ease.ts';
import { easedShare } from '../path/ease.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import { pointAdd, pointScale, pointSubtract } from '../path/point.ts';
import { arcRound, roundTangent } from '../path/round.ts';
import type { Line, Segment } from '../path/segment.ts';
import { lineBetween } from '../path/segment.ts';
import type { CornerPlanRequest } from './case.ts';

/** Straight path on each side of a corner that its time is taken over, m: long enough to reach the feed. */
const straightRun = 0.05;

export type CornerDrive = Pick<CornerPlanRequest, 'cut' | 'profile'>;

const driveOf = ({ cut, profile }: CornerDrive): PathDrive => ({
  feed: Math.min(cut.feed, profile.axes.maxFeed),
  acceleration: profile.axes.acceleration,
  jerk: profile.axes.jerk,
});

/** What a loop adds to the time through a corner as it is drawn, s: sharp with a stop, or along the path's arc of `drawn` m. */
export function loopAddedTime(corner: LoopCorner, loop: Loop, drawn: number | undefined, drive: CornerDrive): number {
  const run = straightRun + tangentOf(corner, drawn);
  const [edgeIn, edgeOut] = edgesOf(corner, run, 0);
  return timeOf([edgeIn, ...loop.segments, edgeOut], drive) - timeOf(wayRound(corner, drawn, run), drive);
}

/** What an arc of `radius` m of the path adds to the time through a sharp corner, s: below 0 for the stop it spares. */
export function roundAddedTime(corner: LoopCorner, radius: number, drive: CornerDrive): number {
  const run = straightRun + tangentOf(corner, radius);
  return timeOf(wayRound(corner, radius, run), drive) - timeOf(wayRound(corner, undefined, run), drive);
}

/** What easing adds to the time along its pieces, s: steps of feed between the straight cut's and the corner's share of it. */
export function easeAddedTime(pieces: readonly EasedPiece[], feedShare: number, drive: CornerDrive): number {
  const limits = driveOf(drive);
  const path = pieces.map(({ segment }) => segment);
  const bounds = pieces.map(({ eased }) => limits.feed * easedShare(eased, feedShare));
  return pathTime(path, { ...limits, bounds }).time - pathTime(path, limits).time;
}

const timeOf = (path: readonly Segment[], drive: CornerDrive): number => pathTime(path, driveOf(drive)).time;

const tangentOf = (corner: LoopCorner, radius: number | undefined): number =>
  radius === undefined ? 0 : roundTangent(radius, corner.angle);

/** The straight edges into and out of a corner, from and to `run` m away, that end `short` m before it. */
function edgesOf({ point, incoming, outgoing }: LoopCorner, run: number, short: number): [Line, Line] {
  const into = (far: number) => pointSubtract(point, pointScale(incoming, far));
  const outOf = (far: number) => pointAdd(point, pointScale(outgoing, far));
  return [lineBetween(into(run), into(short)), lineBetween(outOf(short), outOf(run))];
}

function wayRound(corner: LoopCorner, radius: number | undefined, run: number): Segment[] {
  const [edgeIn, edgeOut] = edgesOf(corner, run, tangentOf(corner, radius));
  return radius === undefined ? [edgeIn, edgeOut] : [edgeIn, arcRound(corner, radius), edgeOut];
}

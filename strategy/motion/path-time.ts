import { pointCross, pointDot } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { segmentLength, segmentTangentAt } from '../path/segment.ts';
import { arcFeedLimit, junctionFeedLimit } from './limits.ts';
import type { DriveLimits } from './speed-change.ts';
import { speedChangeDistance, speedChangeTime, speedReached } from './speed-change.ts';

/** What bounds the speed along a path. */
export type PathDrive = DriveLimits & {
  readonly feed: number; // m/s
  /** How far the machine may leave the path at a break of direction, m; 0, the default, stops at each. */
  readonly junctionDeviation?: number;
  /** Bounds of single segments in the path's order, m/s, where something else holds the feed back. */
  readonly bounds?: readonly (number | undefined)[];
};

/** Time along a path, s, its length, m, and how often the machine comes to rest on the way. */
export type PathTime = { readonly time: number; readonly length: number; readonly stops: number };

/** Pieces below this are rounding, m: nothing moves along them. */
const nothing = 1e-12;

/** Breaks of direction below this are rounding, rad. */
const smoothBreak = 1e-3;

/**
 * Time, s, along a path from rest to rest. Each arc is bounded by √(a r), each break of direction by the junction limit, and the
 * speeds between them by acceleration and jerk, looking ahead over the whole path. Acceleration returns to 0 where the bound changes,
 * which is on the slow side by at most a/j a change. Throws RangeError for a feed that is not positive.
 */
export function pathTime(path: readonly Segment[], drive: PathDrive): PathTime {
  let time = 0;
  let length = 0;
  let stops = 0;
  drivenSpans(path, drive).forEach((span, i) => {
    time += spanTime(span, drive);
    length += span.length;
    if (i > 0 && span.from === 0) stops++;
  });
  return { time, length, stops };
}

/** A stretch of path under one bound: from one speed by its highest to another. */
export type DrivenSpan = {
  readonly length: number; // m
  readonly from: number; // m/s
  readonly peak: number; // m/s
  readonly to: number; // m/s
};

/** The spans of a path from rest to rest, each with its speeds, m/s. Throws RangeError for a feed that is not positive. */
export function drivenSpans(path: readonly Segment[], drive: PathDrive): DrivenSpan[] {
  if (!(drive.feed > 0 && drive.feed < Infinity)) throw new RangeError(`feed ${drive.feed} m/s is outside (0, ∞)`);
  const spans = spansOf(path, drive);
  const speeds = lookAhead(spans, drive);
  return spans.map((span, i) => {
    const from = speeds[i] ?? 0;
    const to = speeds[i + 1] ?? 0;
    return { length: span.length, from, peak: peakOf(span, from, to, drive), to };
  });
}

/** Time of a span, s: up to its highest speed, along at that, and down again. */
export function spanTime({ length, from, peak, to }: DrivenSpan, drive: DriveLimits): number {
  const changes = speedChangeDistance(from, peak, drive) + speedChangeDistance(peak, to, drive);
  const cruise = Math.max(0, length - changes);
  return speedChangeTime(peak - from, drive) + cruise / peak + speedChangeTime(to - peak, drive);
}

/** Neighbouring pieces under one bound with no break between them. `entry` is the bound at its start. */
type Span = { length: number; readonly limit: number; readonly entry: number };

function spansOf(path: readonly Segment[], drive: PathDrive): Span[] {
  const spans: Span[] = [];
  let before: Segment | null = null;
  path.forEach((segment, i) => {
    const length = segmentLength(segment);
    if (length < nothing) return;
    const feed = Math.min(drive.feed, drive.bounds?.[i] ?? Infinity);
    const limit = segment.kind === 'arc' ? Math.min(feed, arcFeedLimit(drive.acceleration, segment.radius)) : feed;
    const last = spans.at(-1);
    const entry = before ? junction(before, segment, drive) : 0;
    if (last && last.limit === limit && entry >= limit) last.length += length;
    else spans.push({ length, limit, entry: Math.min(entry, limit, last ? last.limit : 0) });
    before = segment;
  });
  return spans;
}

function junction(before: Segment, after: Segment, drive: PathDrive): number {
  const u = segmentTangentAt(before, 1);
  const w = segmentTangentAt(after, 0);
  const turn = Math.abs(Math.atan2(pointCross(u, w), pointDot(u, w)));
  if (turn < smoothBreak) return Infinity;
  return junctionFeedLimit(drive.acceleration, drive.junctionDeviation ?? 0, Math.PI - turn);
}

/** Speed at the start of each span and at the end of the last: forwards what can be reached, backwards what can be braked. */
function lookAhead(spans: readonly Span[], drive: DriveLimits): number[] {
  const speeds = [0];
  spans.forEach((span, i) => {
    const bound = spans[i + 1]?.entry ?? 0;
    speeds.push(Math.min(bound, speedReached(speeds[i] ?? 0, span.length, span.limit, drive)));
  });
  for (let i = spans.length - 1; i >= 0; i--) {
    const span = spans[i];
    if (!span) continue;
    speeds[i] = Math.min(speeds[i] ?? 0, speedReached(speeds[i + 1] ?? 0, span.length, span.limit, drive));
  }
  return speeds;
}

/** The highest speed within a span, m/s: its bound, or what leaves room to brake again. */
function peakOf(span: Span, from: number, to: number, drive: DriveLimits): number {
  const { length, limit } = span;
  const over = (peak: number) => speedChangeDistance(from, peak, drive) + speedChangeDistance(peak, to, drive) - length;
  if (over(limit) <= 0) return limit;
  // from rest to rest, or as it came: half the length each way
  if (from === to) return speedReached(from, length / 2, limit, drive);
  let [low, high] = [Math.max(from, to), limit];
  let [below, above] = [over(low), over(high)];
  if (below >= 0) return low;
  // false position; where one end stays put its weight is halved, so that both close in (the Illinois rule)
  let kept = 0;
  for (let i = 0; i < 60 && high - low > 1e-15 * high; i++) {
    const middle = i % 8 === 7 ? (low + high) / 2 : (low * above - high * below) / (above - below);
    const at = over(middle);
    if (at <= 0) {
      [low, below] = [middle, at];
      if (kept === 1) above /= 2;
      kept = 1;
    } else {
      [high, above] = [middle, at];
      if (kept === -1) below /= 2;
      kept = -1;
    }
  }
  return low;
}

import type { CornerPlan } from '@/shared/corner-plans.ts';
import { clockDistance, clockTime, pathClock, sCurveMove, type PathClock } from '@/strategy/motion/index.ts';
import {
  pointDistance,
  segmentEnd,
  segmentLength,
  segmentPointAt,
  segmentStart,
  type Point,
  type Segment,
} from '@/strategy/path/index.ts';
import type { CutPath, CutPiece } from '@/strategy/path/cut-path.ts';

export type CutPhase = 'travel' | 'pierce' | 'cut' | 'wait';

/** What happens between two times, s from the start of the first pierce's way. */
type CutStep = { readonly run: number; readonly start: number; readonly end: number } & (
  | { readonly phase: 'travel'; readonly from: Point; readonly to: Point }
  | { readonly phase: 'pierce' | 'wait'; readonly at: Point; readonly segment: number }
  /** From the run's segment `first` on; `reached` is the length at the end of each of its segments, m. */
  | { readonly phase: 'cut'; readonly first: number; readonly reached: Float64Array; readonly clock: PathClock }
);

/** A contour as it is cut, with when that is. */
export type TimedRun = {
  readonly contourId: string;
  readonly name: string;
  readonly segments: readonly Segment[];
  /** What each segment is a piece of. */
  readonly kinds: readonly CutPiece['kind'][];
  readonly start: number; // s
  readonly end: number; // s
};

/** The cut of a plate in time: every number of it in s, from where the head stands over the first pierce. */
export type CutTimeline = {
  readonly duration: number;
  readonly steps: readonly CutStep[];
  readonly runs: readonly TimedRun[];
};

/** Where the cut is at a time. */
export type CutMoment = {
  readonly phase: CutPhase;
  readonly at: Point; // m, the head
  /** The run being cut, and how many of its segments are whole; `share` is that of the next one's length. */
  readonly run: number;
  readonly segment: number;
  readonly share: number;
};

/**
 * The cut in time: to each pierce at the machine's greatest feed, its routine, and along the path between the waits under the bounds of feed, eased
 * where a corner is, acceleration and jerk. What the head does up and down isn't counted.
 */
export function cutTimeline({ runs }: CutPath, cutting: CornerPlan['cutting']): CutTimeline {
  const steps: CutStep[] = [];
  const timed: TimedRun[] = [];
  let now = 0;
  let head: Point | null = null;
  runs.forEach(({ contourId, name, pierce, pieces }, run) => {
    const start = now;
    if (head !== null) {
      const way = pointDistance(head, pierce);
      const { time } = sCurveMove(way, cutting.travel, cutting.acceleration, cutting.jerk);
      steps.push({ run, phase: 'travel', from: head, to: pierce, start: now, end: now + time });
      now += time;
    }
    steps.push({ run, phase: 'pierce', at: pierce, segment: 0, start: now, end: now + cutting.pierce });
    now += cutting.pierce;
    head = pierce;
    const segments: Segment[] = [];
    const kinds: CutPiece['kind'][] = [];
    const bounds: (number | undefined)[] = [];
    let first = 0;
    const cut = () => {
      const stretch = segments.slice(first);
      if (stretch.length === 0) return;
      const clock = pathClock(stretch, { ...cutting, bounds: bounds.slice(first) });
      let length = 0;
      const reached = Float64Array.from(stretch, (segment) => (length += segmentLength(segment)));
      const end = now + (clock.time.at(-1) ?? 0);
      steps.push({ run, phase: 'cut', first, reached, clock, start: now, end });
      now = end;
      first = segments.length;
      const last = stretch.at(-1);
      if (last) head = segmentEnd(last);
    };
    for (const piece of pieces) {
      if (piece.kind === 'dwell') {
        cut();
        const end = now + piece.duration;
        steps.push({ run, phase: 'wait', at: piece.at, segment: segments.length, start: now, end });
        now = end;
        continue;
      }
      for (const segment of piece.segments) {
        segments.push(segment);
        kinds.push(piece.kind);
        bounds.push(piece.feedShare === undefined ? undefined : piece.feedShare * cutting.feed);
      }
    }
    cut();
    timed.push({ contourId, name, segments, kinds, start, end: now });
  });
  return { duration: now, steps, runs: timed };
}

/** Where the cut is at a time, s; held at both ends. Null for a cut of nothing. */
export function cutMoment({ steps, runs }: CutTimeline, time: number): CutMoment | null {
  const step = steps[stepAt(steps, time)];
  if (!step) return null;
  const { phase, run } = step;
  const into = Math.min(Math.max(time, step.start), step.end) - step.start;
  if (phase === 'travel') {
    // the way is short beside the cut: its speeding up is not drawn
    const share = step.end > step.start ? into / (step.end - step.start) : 1;
    const { from, to } = step;
    const at = { x: from.x + share * (to.x - from.x), y: from.y + share * (to.y - from.y) };
    return { phase, at, run, segment: 0, share: 0 };
  }
  if (phase !== 'cut') return { phase, at: step.at, run, segment: step.segment, share: 0 };
  const length = clockDistance(step.clock, into);
  const place = firstAtLeast(step.reached, length);
  const segment = runs[run]?.segments[step.first + place];
  const from = place === 0 ? 0 : (step.reached[place - 1] ?? 0);
  const own = (step.reached[place] ?? 0) - from;
  const share = own > 0 ? Math.min(1, (length - from) / own) : 1;
  if (!segment) return null;
  return { phase, at: segmentPointAt(segment, share), run, segment: step.first + place, share };
}

/** When a run has cut so many of its segments, s; its own end when it never does. */
export function timeOfSegments({ steps, runs }: CutTimeline, run: number, count: number): number {
  for (const step of steps) {
    if (step.run !== run || step.phase !== 'cut' || count > step.first + step.reached.length) continue;
    if (count <= step.first) return step.start;
    return step.start + clockTime(step.clock, step.reached[count - step.first - 1] ?? 0);
  }
  return runs[run]?.end ?? 0;
}

/** When the loop that begins at a place, m, has been cut, s; null when no piece of the path begins there. */
export function timeOfLoop(timeline: CutTimeline, contourId: string, start: Point, pieces: number): number | null {
  for (const [run, timed] of timeline.runs.entries()) {
    if (timed.contourId !== contourId) continue;
    const first = timed.segments.findIndex(
      (segment, i) => timed.kinds[i] === 'loop' && pointDistance(segmentStart(segment), start) < samePlace,
    );
    if (first >= 0) return timeOfSegments(timeline, run, first + pieces);
  }
  return null;
}

/** The path's corner and the plan's are computed from the same drawing, m. */
const samePlace = 1e-6;

/** The last step that has begun; the first before all. */
function stepAt(steps: readonly CutStep[], time: number): number {
  let low = 0;
  let high = steps.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((steps[middle]?.start ?? 0) <= time) low = middle;
    else high = middle - 1;
  }
  return low;
}

function firstAtLeast(rising: Float64Array, value: number): number {
  let low = 0;
  let high = rising.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((rising[middle] ?? 0) >= value) high = middle;
    else low = middle + 1;
  }
  return low;
}

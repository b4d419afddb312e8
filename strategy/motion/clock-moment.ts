import type { Point } from '../path/point.ts';
import { pointDistance } from '../path/point.ts';
import { segmentPointAt, segmentStart } from '../path/segment.ts';
import { clockDistance, clockTime } from './path-clock.ts';
import type { ClockPhase, ClockStep, PlateClock } from './plate-clock.ts';

/** Where the cut is at a time. */
export type ClockMoment = {
  readonly phase: ClockPhase;
  readonly at: Point; // m, the head
  /** The run being cut, and how many of its segments are whole; `share` is that of the next one's length. */
  readonly run: number;
  readonly segment: number;
  readonly share: number;
};

/** Where the cut of a plate is at a time, s; held at both ends. Null for a cut of nothing. */
export function clockMoment({ steps, runs }: PlateClock, time: number): ClockMoment | null {
  const step = steps[stepAt(steps, time)];
  if (!step) return null;
  const { phase, run } = step;
  const into = Math.min(Math.max(time, step.start), step.end) - step.start;
  if (phase === 'rapid') {
    const { from, to, clock } = step;
    const whole = clock.distance.at(-1) ?? 0;
    const share = whole > 0 ? clockDistance(clock, into) / whole : 1;
    const at = { x: from.x + share * (to.x - from.x), y: from.y + share * (to.y - from.y) };
    return { phase, at, run, segment: 0, share: 0 };
  }
  if (phase !== 'cut') return { phase, at: step.at, run, segment: step.segment, share: 0 };
  const length = clockDistance(step.clock, into);
  const place = firstAtLeast(step.reached, length);
  const segment = runs[run]?.segments[step.first + place];
  if (!segment) return null;
  const from = place === 0 ? 0 : (step.reached[place - 1] ?? 0);
  const own = (step.reached[place] ?? 0) - from;
  const share = own > 0 ? Math.min(1, (length - from) / own) : 1;
  return { phase, at: segmentPointAt(segment, share), run, segment: step.first + place, share };
}

/** When a run has cut `count` of its segments and `share` of the length of the one after, s; its own end when it never does. */
export function timeOfSegments({ steps, runs }: PlateClock, run: number, count: number, share = 0): number {
  for (let i = firstOfRun(steps, run); i < steps.length; i++) {
    const step = steps[i];
    if (!step || step.run !== run) break;
    if (step.phase !== 'cut') continue;
    const own = count - step.first;
    if (own > step.ends.length || (own === step.ends.length && share > 0)) continue;
    if (own <= 0 && share === 0) return step.start;
    const before = own > 0 ? (step.reached[own - 1] ?? 0) : 0;
    if (share === 0) return step.start + (step.ends[own - 1] ?? 0);
    return step.start + clockTime(step.clock, before + share * ((step.reached[own] ?? before) - before));
  }
  return runs[run]?.end ?? 0;
}

/** When the loop that begins at a place, m, of a contour has been cut, s; null when no loop of its path begins there. */
export function timeOfLoop(clock: PlateClock, contourId: string, start: Point, pieces: number): number | null {
  for (const [run, timed] of clock.runs.entries()) {
    if (timed.contourId !== contourId) continue;
    const first = timed.segments.findIndex(
      (segment, i) => timed.kinds[i] === 'loop' && pointDistance(segmentStart(segment), start) < samePlace,
    );
    if (first >= 0) return timeOfSegments(clock, run, first + pieces);
  }
  return null;
}

/** A path's corner and its plan's are computed from the same drawing, m. */
const samePlace = 1e-6;

/** The last step that has begun; the first before all. */
function stepAt(steps: readonly ClockStep[], time: number): number {
  let low = 0;
  let high = steps.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((steps[middle]?.start ?? 0) <= time) low = middle;
    else high = middle - 1;
  }
  return low;
}

/** The first step of a run: steps stand in the order of their runs. */
function firstOfRun(steps: readonly ClockStep[], run: number): number {
  let low = 0;
  let high = steps.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((steps[middle]?.run ?? Infinity) >= run) high = middle;
    else low = middle + 1;
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

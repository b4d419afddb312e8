import type { Segment } from '../path/segment.ts';
import type { PathDrive } from './path-time.ts';
import { drivenSpans, spanTime } from './path-time.ts';
import type { DriveLimits } from './speed-change.ts';
import { speedChangeTime } from './speed-change.ts';

/** Where along a path the machine is at which time: distances, m, and the times, s, at which they are reached; both rise. */
export type PathClock = { readonly distance: Float64Array; readonly time: Float64Array };

/** Steps into which a change of speed is cut: between them the place is off by less than a hundredth of the change's own length. */
const stepsOfChange = 6;

/**
 * Table of distances, m, and times, s, along a path from rest to rest, under the same bounds as `pathTime`, whose time is its last. Exact at the ends
 * of each span and at the steps between. Throws RangeError for a feed that is not positive.
 */
export function pathClock(path: readonly Segment[], drive: PathDrive): PathClock {
  const spans = drivenSpans(path, drive);
  const distance: number[] = [0];
  const time: number[] = [0];
  let [atDistance, atTime] = [0, 0];
  for (const span of spans) {
    addChange(span.from, span.peak, atDistance, atTime);
    const whole = spanTime(span, drive);
    const down = speedChangeTime(span.peak - span.to, drive);
    const downFrom = span.length - ((span.peak + span.to) / 2) * down;
    addChange(span.peak, span.to, atDistance + downFrom, atTime + whole - down);
    atDistance += span.length;
    atTime += whole;
    distance.push(atDistance);
    time.push(atTime);
  }
  return { distance: Float64Array.from(distance), time: Float64Array.from(time) };

  function addChange(from: number, to: number, startDistance: number, startTime: number): void {
    const duration = speedChangeTime(to - from, drive);
    if (duration === 0) return;
    for (let i = 0; i <= stepsOfChange; i++) {
      const t = (i / stepsOfChange) * duration;
      distance.push(startDistance + changeDistance(from, to, t, drive));
      time.push(startTime + t);
    }
  }
}

/** Distance reached at a time, m; held at both ends. */
export const clockDistance = ({ distance, time }: PathClock, at: number): number => between(time, distance, at);

/** Time at which a distance is reached, s; held at both ends. */
export const clockTime = ({ distance, time }: PathClock, at: number): number => between(distance, time, at);

/** Distance, m, covered `t` s into a change of speed that begins and ends without acceleration: cubic while the jerk acts, else square. */
function changeDistance(from: number, to: number, t: number, drive: DriveLimits): number {
  const duration = speedChangeTime(to - from, drive);
  // the second half mirrors the first
  if (t > duration / 2) return ((from + to) / 2) * duration - changeDistance(to, from, duration - t, drive);
  const { acceleration, jerk = Infinity } = drive;
  const sign = Math.sign(to - from);
  const ramp = Math.min(acceleration / jerk, duration / 2);
  if (t <= ramp) return from * t + (sign * jerk * t ** 3) / 6;
  const after = t - ramp;
  const reached = jerk === Infinity ? 0 : (jerk * ramp ** 2) / 2;
  const onRamp = jerk === Infinity ? 0 : (jerk * ramp ** 3) / 6;
  return from * t + sign * (onRamp + reached * after + (acceleration * after * after) / 2);
}

/** Linear between the entries of two rising tables. */
function between(keys: Float64Array, values: Float64Array, at: number): number {
  let low = 0;
  let high = keys.length - 1;
  if (!(at > (keys[0] ?? 0))) return values[0] ?? 0;
  if (at >= (keys[high] ?? 0)) return values[high] ?? 0;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if ((keys[middle] ?? 0) <= at) low = middle;
    else high = middle;
  }
  const [a, b] = [keys[low] ?? 0, keys[high] ?? 0];
  const share = b > a ? (at - a) / (b - a) : 0;
  return (values[low] ?? 0) + share * ((values[high] ?? 0) - (values[low] ?? 0));
}

import type { CutPath, CutPiece, CutRun } from '../path/cut-path.ts';
import type { Point } from '../path/point.ts';
import { pointDistance } from '../path/point.ts';
import type { Segment } from '../path/segment.ts';
import { lineBetween, segmentEnd, segmentLength } from '../path/segment.ts';
import type { HeightMoves } from './height-moves.ts';
import { heightTime } from './height-moves.ts';
import type { PathClock } from './path-clock.ts';
import { clockTime, pathClock } from './path-clock.ts';

/** What bounds the cut of a plate in time. */
export type PlateDrive = {
  /** Of the straight cut, m/s; a piece with a share of it goes at that. */
  readonly feed: number;
  readonly acceleration: number; // m/s²
  readonly jerk: number; // m/s³; infinite for the trapezoid
  /** How far the machine may leave the path at a break of direction, m; 0, the default, stops at each. */
  readonly junctionDeviation?: number;
  /** Rapid feed between two cuts, m/s. */
  readonly travel: number;
  /** Routine of one pierce, s. */
  readonly pierce: number;
  /** What getting the cut going again after a wait costs beside it, s; 0 when left out. */
  readonly restart?: number;
  /** The head's way up and down; none is counted when left out. */
  readonly heights?: HeightMoves;
};

export type ClockPhase = 'rapid' | 'lower' | 'raise' | 'pierce' | 'cut' | 'wait';

/** What happens between two times, s from the start. `run` is the cut it belongs to: a rapid and what follows it to the next one's pierce. */
export type ClockStep = { readonly run: number; readonly start: number; readonly end: number } & (
  | { readonly phase: 'rapid'; readonly from: Point; readonly to: Point; readonly clock: PathClock }
  /** Over a place; so many of the run's segments are cut by then. */
  | { readonly phase: 'lower' | 'raise' | 'pierce'; readonly at: Point; readonly segment: number }
  /** Of its time the last `restart` s get the cut going again. */
  | { readonly phase: 'wait'; readonly at: Point; readonly segment: number; readonly restart: number }
  /**
   * From the run's segment `first` on: for each of its segments the length, m, and the time, s, both from the step's beginning, at its end.
   */
  | {
      readonly phase: 'cut';
      readonly first: number;
      readonly reached: Float64Array;
      readonly ends: Float64Array;
      readonly clock: PathClock;
    }
);

/** A contour as it is cut, with when that is. */
export type TimedRun = {
  readonly contourId: string;
  readonly name: string;
  readonly segments: readonly Segment[];
  /** What each segment is a piece of, and its shares of the cut's feed and mean power. */
  readonly kinds: readonly Exclude<CutPiece['kind'], 'dwell'>[];
  readonly feedShares: Float64Array;
  readonly powerShares: Float64Array;
  /** From where the head leaves for its pierce to where the beam goes off, s. */
  readonly start: number;
  readonly end: number;
};

/** The cut of a plate in time: every number of it in s, from where the head stands raised over the first pierce to where it stands raised over the last cut's end. */
export type PlateClock = {
  readonly duration: number;
  readonly steps: readonly ClockStep[];
  readonly runs: readonly TimedRun[];
};

/**
 * The whole cut of a plate in time, s: rapids from rest to rest, the head's way down and up, each pierce's routine, the path between the waits under feed,
 * shares of it, acceleration, jerk and the centripetal limit with look-ahead, and the waits with what the restart costs. Loading is not in it: see `loadingCost`. Throws
 * RangeError, with a sentence, for a feed, acceleration or jerk that is not positive and for times below 0.
 */
export function plateClock({ runs }: CutPath, drive: PlateDrive): PlateClock {
  mustBeGood(drive);
  const steps: ClockStep[] = [];
  const timed: TimedRun[] = [];
  const heights = drive.heights;
  let now = 0;
  let head: Point | null = null;

  const put = (duration: number, step: (start: number, end: number) => ClockStep): void => {
    if (!(duration > 0)) return;
    steps.push(step(now, now + duration));
    now += duration;
  };
  const lift = (run: number, at: Point, segment: number, from: number, to: number): void => {
    if (!heights) return;
    const phase = to > from ? 'raise' : 'lower';
    put(heightTime(from, to, heights), (start, end) => ({ run, phase, at, segment, start, end }));
  };

  runs.forEach((cut, run) => {
    const start = now;
    const { pierce: place } = cut;
    if (head !== null) {
      if (heights) lift(run - 1, head, timed.at(-1)?.segments.length ?? 0, heights.cut, heights.travel);
      const from = head;
      if (pointDistance(from, place) > 0) {
        const clock = pathClock([lineBetween(from, place)], { ...drive, feed: drive.travel });
        put(clock.time.at(-1) ?? 0, (begins, ends) => ({
          run,
          phase: 'rapid',
          from,
          to: place,
          clock,
          start: begins,
          end: ends,
        }));
      }
    }
    if (heights) lift(run, place, 0, heights.travel, heights.pierceFrom);
    put(drive.pierce, (begins, ends) => ({ run, phase: 'pierce', at: place, segment: 0, start: begins, end: ends }));
    if (heights) lift(run, place, 0, heights.pierceTo, heights.cut);
    head = place;

    const { segments, kinds, feedShares, powerShares, stops } = spreadOut(cut);
    let first = 0;
    for (const stop of [...stops, null]) {
      const stretch = segments.slice(first, stop?.segment ?? segments.length);
      if (stretch.length > 0) {
        const bounds = Array.from(feedShares.subarray(first, first + stretch.length), (share) =>
          share === 1 ? undefined : share * drive.feed,
        );
        const clock = pathClock(stretch, { ...drive, bounds });
        const { reached, ends } = endsOf(stretch, clock);
        const from = first;
        put(clock.time.at(-1) ?? 0, (begins, done) => ({
          run,
          phase: 'cut',
          first: from,
          reached,
          ends,
          clock,
          start: begins,
          end: done,
        }));
        const last = stretch.at(-1);
        if (last) head = segmentEnd(last);
        first += stretch.length;
      }
      if (!stop) continue;
      const { at, duration } = stop;
      const restart = drive.restart ?? 0;
      const segment = first;
      put(duration + restart, (begins, done) => ({
        run,
        phase: 'wait',
        at,
        segment,
        restart,
        start: begins,
        end: done,
      }));
    }
    timed.push({ contourId: cut.contourId, name: cut.name, segments, kinds, feedShares, powerShares, start, end: now });
  });
  if (head !== null && heights) {
    lift(runs.length - 1, head, timed.at(-1)?.segments.length ?? 0, heights.cut, heights.travel);
  }
  return { duration: now, steps, runs: timed };
}

function mustBeGood({ feed, travel, acceleration, jerk, pierce, restart = 0 }: PlateDrive): void {
  const positive = { 'the feed of the cut': feed, 'the rapid feed': travel };
  for (const [name, value] of Object.entries(positive)) {
    if (!(value > 0 && value < Infinity)) {
      throw new RangeError(`${name} is ${value} m/s: the cut would never end; it must be above 0`);
    }
  }
  if (!(acceleration > 0 && jerk > 0)) {
    throw new RangeError(`acceleration ${acceleration} m/s² and jerk ${jerk} m/s³ must be above 0: nothing would move`);
  }
  if (!(pierce >= 0 && restart >= 0 && pierce < Infinity && restart < Infinity)) {
    throw new RangeError(`a pierce of ${pierce} s and a restart of ${restart} s must not be below 0`);
  }
}

type SpreadOut = Pick<TimedRun, 'segments' | 'kinds' | 'feedShares' | 'powerShares'> & {
  /** Waits, each before a segment. */
  readonly stops: readonly { readonly segment: number; readonly at: Point; readonly duration: number }[];
};

/** A run's pieces segment by segment. Throws RangeError for a share outside (0, 1] or a wait below 0. */
function spreadOut({ pieces, name }: CutRun): SpreadOut {
  const segments: Segment[] = [];
  const kinds: TimedRun['kinds'][number][] = [];
  const feed: number[] = [];
  const power: number[] = [];
  const stops: SpreadOut['stops'][number][] = [];
  for (const piece of pieces) {
    if (piece.kind === 'dwell') {
      if (!(piece.duration >= 0)) throw new RangeError(`a wait of ${piece.duration} s at ${name} is below 0`);
      stops.push({ segment: segments.length, at: piece.at, duration: piece.duration });
      continue;
    }
    const { feedShare = 1, powerShare = 1 } = piece;
    if (!(feedShare > 0 && feedShare <= 1 && powerShare > 0 && powerShare <= 1)) {
      throw new RangeError(`shares of feed ${feedShare} and power ${powerShare} at ${name} are outside (0, 1]`);
    }
    for (const segment of piece.segments) {
      segments.push(segment);
      kinds.push(piece.kind);
      feed.push(feedShare);
      power.push(powerShare);
    }
  }
  return { segments, kinds, feedShares: Float64Array.from(feed), powerShares: Float64Array.from(power), stops };
}

function endsOf(stretch: readonly Segment[], clock: PathClock): { reached: Float64Array; ends: Float64Array } {
  const reached = new Float64Array(stretch.length);
  const ends = new Float64Array(stretch.length);
  let length = 0;
  stretch.forEach((segment, i) => {
    length += segmentLength(segment);
    reached[i] = length;
    ends[i] = clockTime(clock, length);
  });
  return { reached, ends };
}

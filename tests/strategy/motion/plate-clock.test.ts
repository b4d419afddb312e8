import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  arcFeedLimit,
  clockMoment,
  heatOfClock,
  heightTime,
  pathTime,
  plateClock,
  sCurveMove,
  timeOfLoop,
  timeOfSegments,
  type HeightMoves,
  type PlateDrive,
} from '../../../strategy/motion/index.ts';
import type { CutPath, CutPiece } from '../../../strategy/path/cut-path.ts';
import { arcOf, circleOf, lineBetween, pathLength, pointDistance, type Segment } from '../../../strategy/path/index.ts';
import { runs } from '../../support/runs.ts';

const drive: PlateDrive = { feed: 0.02, acceleration: 2, jerk: 50, travel: 1, pierce: 1.5 };
const heights: HeightMoves = {
  travel: 0.015,
  pierceFrom: 0.01,
  pierceTo: 0.004,
  cut: 0.001,
  speed: 0.15,
  acceleration: 2,
  jerk: 50,
};

const line = (ax: number, ay: number, bx: number, by: number) => lineBetween({ x: ax, y: ay }, { x: bx, y: by });
const along = (length: number) => pathTime([line(0, 0, length, 0)], drive).time;

/** One cut from one pierce, of some pieces. */
const oneCut = (pieces: readonly CutPiece[], pierce = { x: 0, y: 0 }): CutPath => ({
  runs: [{ contourId: 'a', name: 'outline a', pierce, pieces }],
});

/** A hole with a wait in it, and an outline a metre away. */
const path: CutPath = {
  runs: [
    {
      contourId: 'a',
      name: 'hole a',
      pierce: { x: 0, y: 0 },
      pieces: [
        { kind: 'contour', segments: [line(0, 0, 0.1, 0)] },
        { kind: 'dwell', at: { x: 0.1, y: 0 }, duration: 2 },
        { kind: 'contour', segments: [line(0.1, 0, 0.1, 0.05)] },
      ],
    },
    {
      contourId: 'b',
      name: 'outline b',
      pierce: { x: 1.1, y: 0.05 },
      pieces: [{ kind: 'contour', segments: [line(1.1, 0.05, 1.2, 0.05)] }],
    },
  ],
};

describe('the cut of a plate in time', () => {
  it('is the rapids from rest to rest, the pierces, the paths between the waits, and the waits', () => {
    const clock = plateClock(path, drive);
    const rapid = sCurveMove(1, 1, 2, 50).time;
    expect(clock.duration).toBeCloseTo(2 * 1.5 + along(0.1) + 2 + along(0.05) + rapid + along(0.1), 9);
    expect(clock.steps.map(({ phase }) => phase)).toEqual(['pierce', 'cut', 'wait', 'cut', 'rapid', 'pierce', 'cut']);
    const [first, second] = clock.runs;
    expect(second?.start).toBe(first?.end);
  });

  it('adds what getting the cut going again costs to each wait', () => {
    const clock = plateClock(path, { ...drive, restart: 0.7 });
    expect(clock.duration - plateClock(path, drive).duration).toBeCloseTo(0.7, 12);
    expect(clock.steps[2]).toMatchObject({ phase: 'wait', restart: 0.7 });
  });

  it('lowers the head before a pierce and after it, and raises it when the cut ends', () => {
    const clock = plateClock(path, { ...drive, heights });
    const each =
      heightTime(0.015, 0.01, heights) + heightTime(0.004, 0.001, heights) + heightTime(0.001, 0.015, heights);
    expect(clock.duration - plateClock(path, drive).duration).toBeCloseTo(2 * each, 12);
    const of = (run: number) => clock.steps.filter((step) => step.run === run).map(({ phase }) => phase);
    expect(of(0)).toEqual(['lower', 'pierce', 'lower', 'cut', 'wait', 'cut', 'raise']);
    expect(of(1)).toEqual(['rapid', 'lower', 'pierce', 'lower', 'cut', 'raise']);
    expect(clock.duration - (clock.runs.at(-1)?.end ?? 0)).toBeCloseTo(heightTime(0.001, 0.015, heights), 12);
  });

  it('moves the head up and down as any other move from rest to rest', () => {
    expect(heightTime(0.002, 0.012, heights)).toBeCloseTo(sCurveMove(0.01, 0.15, 2, 50).time, 12);
    expect(heightTime(0.012, 0.002, heights)).toBe(heightTime(0.002, 0.012, heights));
    expect(heightTime(0.002, 0.002, heights)).toBe(0);
    expect(() => heightTime(0, 0.01, { ...heights, speed: 0 })).toThrow(/feed 0/);
  });

  it('goes along loops and eased pieces at their share of the feed', () => {
    const pieces = [line(0, 0, 0.1, 0), line(0.1, 0, 0.2, 0), line(0.2, 0, 0.3, 0)];
    for (const kind of ['contour', 'loop'] as const) {
      const clock = plateClock(
        oneCut(
          pieces.map((segment, i) =>
            i === 1 ? { kind, segments: [segment], feedShare: 0.25 } : { kind: 'contour', segments: [segment] },
          ),
        ),
        drive,
      );
      const bounds = [undefined, 0.25 * drive.feed, undefined];
      expect(clock.duration).toBeCloseTo(1.5 + pathTime(pieces, { ...drive, bounds }).time, 9);
    }
  });

  it('is bounded by the acceleration towards the centre on a small circle', () => {
    const slow = { ...drive, acceleration: 0.01, jerk: 10 };
    const circle = circleOf({ x: 0, y: 0 }, 1e-3);
    const clock = plateClock(oneCut([{ kind: 'contour', segments: [circle] }], { x: 1e-3, y: 0 }), slow);
    const limit = arcFeedLimit(0.01, 1e-3);
    expect(limit).toBeLessThan(drive.feed);
    expect(clock.duration - 1.5).toBeGreaterThan((2 * Math.PI * 1e-3) / limit);
  });

  it('spends no time on a piece that is only rounding', () => {
    const pieces: CutPiece[] = [{ kind: 'contour', segments: [line(0, 0, 1.6e-162, 0), line(0, 0, 0.1, 0)] }];
    expect(plateClock(oneCut(pieces), drive).duration).toBeCloseTo(1.5 + along(0.1), 12);
    expect(plateClock(oneCut([{ kind: 'loop', segments: [line(0, 0, 1e-20, 0)] }]), drive).duration).toBe(1.5);
  });

  it('of nothing is no time, and the head nowhere', () => {
    const empty = plateClock({ runs: [] }, { ...drive, heights });
    expect(empty.duration).toBe(0);
    expect(clockMoment(empty, 3)).toBeNull();
  });

  it('refuses a feed of zero and everything else that would never end, in a sentence', () => {
    expect(() => plateClock(path, { ...drive, feed: 0 })).toThrow(/feed of the cut is 0 m\/s.*must be above 0/);
    expect(() => plateClock(path, { ...drive, travel: -1 })).toThrow(/rapid feed is -1 m\/s/);
    expect(() => plateClock(path, { ...drive, acceleration: Number.NaN })).toThrow(/acceleration NaN/);
    expect(() => plateClock(path, { ...drive, pierce: -2 })).toThrow(/pierce of -2 s/);
    const dwell = oneCut([{ kind: 'dwell', at: { x: 0, y: 0 }, duration: -1 }]);
    expect(() => plateClock(dwell, drive)).toThrow(/wait of -1 s at outline a/);
    const still = oneCut([{ kind: 'loop', segments: [line(0, 0, 1, 0)], feedShare: 0 }]);
    expect(() => plateClock(still, drive)).toThrow(/shares of feed 0/);
  });
});

describe('laws of a plate’s time', () => {
  // in tenths of a millimetre, never 0
  const piece = fc.record({
    x: fc.integer({ min: 1, max: 2000 }).map((tenths) => tenths * 1e-4),
    y: fc.integer({ min: -2000, max: 2000 }).map((tenths) => tenths * 1e-4),
    share: fc.constantFrom(1, 0.4, 0.7),
    dwell: fc.option(fc.double({ min: 0, max: 3, noNaN: true }), { nil: undefined }),
  });
  const anyRun = fc.array(piece, { minLength: 1, maxLength: 6 });
  const anyPath = fc.array(anyRun, { minLength: 1, maxLength: 4 }).map((cuts): CutPath => {
    return {
      runs: cuts.map((steps, run) => {
        let at = { x: run, y: 0 };
        const pierce = at;
        const pieces = steps.flatMap(({ x, y, share, dwell }): CutPiece[] => {
          const next = { x: at.x + x, y: at.y + y };
          const segments: Segment[] = [lineBetween(at, next)];
          at = next;
          return [
            { kind: 'contour', segments, feedShare: share },
            ...(dwell === undefined ? [] : [{ kind: 'dwell' as const, at, duration: dwell }]),
          ];
        });
        return { contourId: `${run}`, name: `cut ${run}`, pierce, pieces };
      }),
    };
  });
  const all = { numRuns: runs(80, 1000) };

  it('a line drawn in two costs the same as the whole', () => {
    const parted = (cut: CutPath): CutPath => ({
      runs: cut.runs.map((run) => ({
        ...run,
        pieces: run.pieces.map((one) =>
          one.kind === 'dwell'
            ? one
            : {
                ...one,
                segments: one.segments.flatMap((segment): Segment[] => {
                  if (segment.kind !== 'line') return [segment];
                  const { start, end } = segment;
                  const middle = { x: 0.3 * start.x + 0.7 * end.x, y: 0.3 * start.y + 0.7 * end.y };
                  return [lineBetween(start, middle), lineBetween(middle, end)];
                }),
              },
        ),
      })),
    });
    fc.assert(
      fc.property(anyPath, (cut) => {
        expect(plateClock(parted(cut), drive).duration).toBeCloseTo(plateClock(cut, drive).duration, 8);
      }),
      all,
    );
  });

  it('no cut is shorter than its length over its feed, with the pierces and waits', () => {
    fc.assert(
      fc.property(anyPath, (cut) => {
        const least = cut.runs.reduce(
          (sum, { pieces }) =>
            sum +
            1.5 +
            pieces.reduce(
              (own, one) =>
                own +
                (one.kind === 'dwell' ? one.duration : pathLength(one.segments) / (drive.feed * (one.feedShare ?? 1))),
              0,
            ),
          0,
        );
        expect(plateClock(cut, drive).duration).toBeGreaterThanOrEqual(least - 1e-9);
      }),
      all,
    );
  });

  it('a stronger or quicker drive never takes longer', () => {
    fc.assert(
      fc.property(anyPath, fc.constantFrom('acceleration', 'jerk', 'travel'), (cut, what) => {
        const { duration } = plateClock(cut, { ...drive, heights });
        const better = { ...drive, heights, [what]: drive[what] * 2 };
        expect(plateClock(cut, better).duration).toBeLessThanOrEqual(duration * (1 + 1e-9));
      }),
      all,
    );
  });

  it('steps follow one another without a gap, and their sum is the whole', () => {
    fc.assert(
      fc.property(anyPath, (cut) => {
        const { steps, duration } = plateClock(cut, { ...drive, heights, restart: 0.3 });
        let now = 0;
        for (const { start, end } of steps) {
          expect(start).toBe(now);
          expect(end).toBeGreaterThan(start);
          now = end;
        }
        expect(now).toBe(duration);
      }),
      all,
    );
  });

  it('has no step where the feed is just reached, nor where the acceleration just is', () => {
    const at = (length: number) =>
      plateClock(oneCut([{ kind: 'contour', segments: [line(0, 0, length, 0)] }]), quick).duration;
    const quick = { ...drive, feed: 0.5 };
    // L = v(v/a + a/j), and 2a³/j² below which the full acceleration is not reached
    for (const length of [0.5 * (0.5 / 2 + 2 / 50), (2 * 2 ** 3) / 50 ** 2]) {
      expect(at(length * (1 + 1e-9))).toBeCloseTo(at(length * (1 - 1e-9)), 7);
    }
    // without a jerk L = v²/a
    const sudden = { ...quick, jerk: Infinity };
    const trapezoid = (length: number) =>
      plateClock(oneCut([{ kind: 'contour', segments: [line(0, 0, length, 0)] }]), sudden).duration;
    expect(trapezoid(0.125 * (1 + 1e-9))).toBeCloseTo(trapezoid(0.125 * (1 - 1e-9)), 7);
    // v = a²/j: from there on the full acceleration is reached on the way to the feed
    const upTo = (feed: number) =>
      plateClock(oneCut([{ kind: 'contour', segments: [line(0, 0, 1, 0)] }]), { ...quick, feed }).duration;
    expect(upTo(0.08 * (1 + 1e-9))).toBeCloseTo(upTo(0.08 * (1 - 1e-9)), 6);
  });

  describe('its heat', () => {
    const left = { heatIntoPlate: 6.5e6, pierceHeat: 6000 };
    const sum = (pieces: readonly { from: number; to: number; powerPerLength: number }[]) =>
      pieces.reduce((heat, { from, to, powerPerLength }) => heat + powerPerLength * (to - from), 0);

    it('is the same for a metre of cut however slowly the axes let it be cut', () => {
      fc.assert(
        fc.property(anyPath, fc.double({ min: 0.02, max: 5, noNaN: true }), (cut, acceleration) => {
          const even: CutPath = {
            runs: cut.runs.map((run) => ({
              ...run,
              pieces: run.pieces.map((one) => (one.kind === 'dwell' ? one : { ...one, feedShare: 1 })),
            })),
          };
          const { heat, pierces } = heatOfClock(plateClock(even, { ...drive, acceleration }), left);
          const length = even.runs.reduce(
            (whole, { pieces }) =>
              whole + pathLength(pieces.flatMap((one) => (one.kind === 'dwell' ? [] : one.segments))),
            0,
          );
          expect(sum(heat)).toBeCloseTo(6.5e6 * length, 3);
          expect(pierces.map(({ heat: joules }) => joules)).toEqual(even.runs.map(() => 6000));
        }),
        all,
      );
    });

    it('goes as mean power over feed where the cut is eased', () => {
      const heatOf = (feedShare: number, powerShare: number) =>
        sum(
          heatOfClock(
            plateClock(oneCut([{ kind: 'contour', segments: [line(0, 0, 0.2, 0)], feedShare, powerShare }]), drive),
            left,
          ).heat,
        );
      expect(heatOf(0.4, 0.4)).toBeCloseTo(6.5e6 * 0.2, 3);
      expect(heatOf(0.5, 0.25)).toBeCloseTo((6.5e6 * 0.2) / 2, 3);
      expect(heatOf(0.5, 1)).toBeCloseTo(6.5e6 * 0.2 * 2, 3);
    });

    it('is given off where the cut is at the time, to a fifth of a millimetre', () => {
      // a feed that takes centimetres to be reached: a source of even speed would run ahead by as much
      const fast = { ...drive, feed: 0.5, acceleration: 2, jerk: 50 };
      const clock = plateClock(
        oneCut([
          { kind: 'contour', segments: [line(0, 0, 0.4, 0), arcOf({ x: 0.4, y: 0.05 }, 0.05, -Math.PI / 2, 3)] },
        ]),
        fast,
      );
      const { heat } = heatOfClock(clock, left);
      expect(heat.length).toBeGreaterThan(4);
      for (const { segment, from, to } of heat) {
        for (const share of [0, 0.3, 0.5, 0.8, 1]) {
          const source =
            segment.kind === 'line'
              ? { x: segment.start.x + share * (segment.end.x - segment.start.x), y: segment.start.y }
              : {
                  x: segment.centre.x + segment.radius * Math.cos(segment.startAngle + share * segment.sweep),
                  y: segment.centre.y + segment.radius * Math.sin(segment.startAngle + share * segment.sweep),
                };
          const head = clockMoment(clock, from + share * (to - from));
          expect(pointDistance(source, head?.at ?? { x: 9, y: 9 })).toBeLessThan(0.25e-3);
        }
      }
    });

    it('of a pierce is there when its routine is over, and none is left while the cut waits', () => {
      const clock = plateClock(path, { ...drive, heights, restart: 0.5 });
      const { heat, pierces } = heatOfClock(clock, left);
      const routines = clock.steps.filter(({ phase }) => phase === 'pierce');
      expect(pierces.map(({ time }) => time)).toEqual(routines.map(({ end }) => end));
      for (const { start, end } of clock.steps.filter(({ phase }) => phase !== 'cut')) {
        expect(heat.filter(({ from, to }) => from < end - 1e-9 && to > start + 1e-9)).toEqual([]);
      }
    });

    it('is refused below 0', () => {
      expect(() => heatOfClock(plateClock(path, drive), { ...left, pierceHeat: -1 })).toThrow(/pierce -1 J/);
    });
  });
});

describe('a moment of the cut', () => {
  const clock = plateClock(path, drive);
  const at = (time: number) => clockMoment(clock, time);

  it('pierces, cuts, waits and travels, and the head never leaves its path', () => {
    expect(at(0)).toMatchObject({ phase: 'pierce', at: { x: 0, y: 0 } });
    const middle = at(1.5 + along(0.1) / 2);
    expect(middle).toMatchObject({ phase: 'cut', run: 0, segment: 0 });
    expect(middle?.at.x).toBeCloseTo(0.05, 4);
    expect(at(1.5 + along(0.1) + 1)).toMatchObject({ phase: 'wait', segment: 1, at: { x: 0.1, y: 0 } });
    expect(at((clock.runs[0]?.end ?? 0) + 0.5)).toMatchObject({ phase: 'rapid', run: 1 });
    expect(at(1e9)?.at).toEqual({ x: 1.2, y: 0.05 });
    let before = at(0)?.at;
    for (let time = 0; time <= clock.duration; time += 0.01) {
      const now = at(time)?.at;
      // no faster than it travels
      if (before && now) expect(pointDistance(before, now)).toBeLessThan(0.0101);
      before = now;
    }
  });

  it('keeps all of a contour cut while the head is raised from its end', () => {
    const raised = plateClock(path, { ...drive, heights });
    expect(clockMoment(raised, (raised.runs[0]?.end ?? 0) + 0.01)).toMatchObject({
      phase: 'raise',
      run: 0,
      segment: 2,
    });
    expect(clockMoment(raised, raised.duration)).toMatchObject({ phase: 'raise', run: 1, segment: 1 });
  });

  it('tells when so many pieces of a contour are cut, and a share of the next', () => {
    expect(timeOfSegments(clock, 0, 1)).toBeCloseTo(1.5 + along(0.1), 9);
    expect(timeOfSegments(clock, 0, 0, 0.5)).toBeCloseTo(1.5 + along(0.1) / 2, 6);
    expect(timeOfSegments(clock, 0, 1, 0.5)).toBeCloseTo(1.5 + along(0.1) + 2 + along(0.05) / 2, 6);
    expect(timeOfSegments(clock, 0, 2)).toBeCloseTo(clock.runs[0]?.end ?? 0, 9);
    expect(timeOfSegments(clock, 1, 0, 0.5)).toBeCloseTo((clock.runs[1]?.end ?? 0) - along(0.1) / 2, 6);
  });

  it('tells when a loop has been cut, and that there is none where none begins', () => {
    const looped = plateClock(
      oneCut([
        { kind: 'contour', segments: [line(0, 0, 0.1, 0)] },
        { kind: 'loop', segments: [line(0.1, 0, 0.105, 0), line(0.105, 0, 0.1, 0)] },
        { kind: 'contour', segments: [line(0.1, 0, 0.1, 0.1)] },
      ]),
      drive,
    );
    expect(timeOfLoop(looped, 'a', { x: 0.1, y: 0 }, 2)).toBeCloseTo(timeOfSegments(looped, 0, 3), 12);
    expect(timeOfLoop(looped, 'a', { x: 0, y: 0 }, 2)).toBeNull();
    expect(timeOfLoop(looped, 'b', { x: 0.1, y: 0 }, 2)).toBeNull();
  });
});

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  arcFeedLimit,
  junctionFeedLimit,
  pathTime,
  sCurveMove,
  speedChangeDistance,
  speedChangeTime,
  speedReached,
  trapezoidMove,
} from '../../../strategy/motion/index.ts';
import { arcOf, lineBetween, loopAt, segmentRotate, segmentShift } from '../../../strategy/path/index.ts';

const length = fc.double({ min: 1e-5, max: 2, noNaN: true });
const feed = fc.double({ min: 1e-3, max: 1.5, noNaN: true });
const acceleration = fc.double({ min: 0.2, max: 15, noNaN: true });
const jerk = fc.double({ min: 5, max: 500, noNaN: true });

/** Distance of a rest-to-rest move by stepping through its jerk, as an independent check of the closed forms. */
function steppedDistance(peak: number, total: number, a: number, j: number): number {
  const ramp = Math.min(a / j, Math.sqrt(peak / j)); // of the acceleration
  const rise = peak >= (a * a) / j ? peak / a + a / j : 2 * Math.sqrt(peak / j);
  const accelerationAt = (t: number) => Math.max(0, Math.min(j * t, j * ramp, j * (rise - t)));
  const steps = 4000;
  let [speed, distance] = [0, 0];
  const dt = rise / steps;
  for (let i = 0; i < steps; i++) {
    const gain = accelerationAt((i + 0.5) * dt) * dt;
    distance += (speed + gain / 2) * dt;
    speed += gain;
  }
  expect(Math.abs(speed - peak)).toBeLessThan(1e-3 * peak);
  return 2 * distance + peak * (total - 2 * rise);
}

describe('a move from rest to rest', () => {
  it('with bounded jerk covers its length, found by stepping through it', () => {
    fc.assert(
      fc.property(length, feed, acceleration, jerk, (l, v, a, j) => {
        const { time, peakSpeed } = sCurveMove(l, v, a, j);
        expect(peakSpeed).toBeLessThanOrEqual(v * (1 + 1e-12));
        const covered = steppedDistance(peakSpeed, time, a, j);
        // the steps blur the ends of a short ramp of acceleration
        expect(Math.abs(covered - l)).toBeLessThan(1e-3 * l + 1e-9);
      }),
      { numRuns: 200 },
    );
  });

  it('takes longer the longer it is, and with a jerk that hardly bounds it is the trapezoid', () => {
    fc.assert(
      fc.property(length, feed, acceleration, jerk, (l, v, a, j) => {
        expect(sCurveMove(l * 1.01, v, a, j).time).toBeGreaterThan(sCurveMove(l, v, a, j).time);
        expect(sCurveMove(l, v, a, j).time).toBeGreaterThanOrEqual(trapezoidMove(l, v, a).time * (1 - 1e-12));
        expect(sCurveMove(l, v, a, 1e12).time).toBeCloseTo(trapezoidMove(l, v, a).time, 5);
      }),
    );
  });

  it('has no step where the feed is just reached, nor where the acceleration just is', () => {
    const at = (l: number) => sCurveMove(l, 0.5, 2, 50).time;
    for (const l of [0.5 * (0.25 + 0.04), (2 * 2 ** 3) / 50 ** 2])
      expect(at(l * (1 + 1e-9))).toBeCloseTo(at(l * (1 - 1e-9)), 8);
    const trapezoid = (l: number) => trapezoidMove(l, 0.5, 2).time;
    expect(trapezoid(0.125 * (1 + 1e-9))).toBeCloseTo(trapezoid(0.125 * (1 - 1e-9)), 8);
    const change = (v: number) => speedChangeTime(v, { acceleration: 2, jerk: 50 });
    expect(change(0.08 * (1 + 1e-9))).toBeCloseTo(change(0.08 * (1 - 1e-9)), 8);
  });

  it('refuses limits that are not positive, naming them', () => {
    expect(() => trapezoidMove(1, 0, 1)).toThrow(/feed 0/);
    expect(() => sCurveMove(1, 1, 1, -3)).toThrow(/jerk -3/);
    expect(() => sCurveMove(-1, 1, 1, 1)).toThrow(/length -1 m/);
  });
});

describe('a change of speed', () => {
  it('reaches what its distance allows and no more', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 1, noNaN: true }),
        length,
        feed,
        acceleration,
        jerk,
        (from, l, limit, a, j) => {
          const drive = { acceleration: a, jerk: j };
          const reached = speedReached(from, l, limit, drive);
          expect(reached).toBeGreaterThanOrEqual(from);
          if (reached > from) expect(speedChangeDistance(from, reached, drive)).toBeLessThanOrEqual(l * (1 + 1e-9));
          if (reached < limit && reached > from)
            expect(speedChangeDistance(from, reached * (1 + 1e-6), drive)).toBeGreaterThan(l * (1 - 1e-9));
        },
      ),
    );
  });
});

describe('time along a path', () => {
  const drive = { feed: 0.2, acceleration: 2, jerk: 50 };
  const line = lineBetween({ x: 0, y: 0 }, { x: 0.3, y: 0.1 });

  it('of one line is that of the move from rest to rest', () => {
    const l = Math.hypot(0.3, 0.1);
    expect(pathTime([line], drive).time).toBeCloseTo(sCurveMove(l, 0.2, 2, 50).time, 10);
    expect(pathTime([line], { feed: 0.2, acceleration: 2 }).time).toBeCloseTo(trapezoidMove(l, 0.2, 2).time, 12);
  });

  it('does not change when a line is drawn in pieces, and adds up when it is stopped at a corner', () => {
    const middle = lineBetween({ x: 0, y: 0 }, { x: 0.15, y: 0.05 });
    const rest = lineBetween({ x: 0.15, y: 0.05 }, { x: 0.3, y: 0.1 });
    expect(pathTime([middle, rest], drive).time).toBeCloseTo(pathTime([line], drive).time, 12);
    const away = lineBetween({ x: 0.3, y: 0.1 }, { x: 0.3, y: 0.4 });
    const both = pathTime([line, away], drive);
    expect(both.time).toBeCloseTo(pathTime([line], drive).time + pathTime([away], drive).time, 12);
    expect(both.stops).toBe(1);
  });

  it('is shorter through a corner that may be left by a little, and never shorter than length over feed', () => {
    const away = lineBetween({ x: 0.3, y: 0.1 }, { x: 0.3, y: 0.4 });
    const stopped = pathTime([line, away], drive);
    const rounded = pathTime([line, away], { ...drive, junctionDeviation: 1e-4 });
    expect(rounded.stops).toBe(0);
    expect(rounded.time).toBeLessThan(stopped.time);
    expect(rounded.time).toBeGreaterThan(stopped.length / drive.feed);
  });

  it('does not stop in a loop, and is the same wherever the loop lies and however it is turned', () => {
    const corner = { point: { x: 0, y: 0 }, incoming: { x: 1, y: 0 }, outgoing: { x: 0, y: 1 }, angle: Math.PI / 2 };
    const loop = loopAt(corner, 5e-3);
    const path = [
      lineBetween({ x: -0.1, y: 0 }, { x: 0, y: 0 }),
      ...loop.segments,
      lineBetween({ x: 0, y: 0 }, { x: 0, y: 0.1 }),
    ];
    const found = pathTime(path, drive);
    expect(found.stops).toBe(0);
    const moved = path.map((s) => segmentShift(segmentRotate(s, 1.1), { x: 3, y: -2 }));
    expect(pathTime(moved, drive).time).toBeCloseTo(found.time, 9);
  });

  it('slows down on an arc too tight for the feed, before it begins', () => {
    const tight = arcOf({ x: 0.1, y: 1e-3 }, 1e-3, -Math.PI / 2, Math.PI);
    const path = [
      lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0 }),
      tight,
      lineBetween({ x: 0.1, y: 2e-3 }, { x: 0, y: 2e-3 }),
    ];
    const limit = arcFeedLimit(2, 1e-3);
    expect(limit).toBeLessThan(drive.feed);
    const alone = (Math.PI * 1e-3) / limit;
    const slowing =
      speedChangeTime(drive.feed - limit, drive) - speedChangeDistance(drive.feed, limit, drive) / drive.feed;
    const straight = trapezoidMove(0.2, 0.2, 2); // rest to rest without the arc
    const expected = straight.time + drive.acceleration / drive.jerk + alone + 2 * slowing;
    expect(pathTime(path, drive).time).toBeCloseTo(expected, 6);
  });

  it('is held back on single pieces by bounds of their own, and by none that lies above the feed', () => {
    const piece = (from: number, to: number) => lineBetween({ x: from, y: 0 }, { x: to, y: 0 });
    const path = [piece(0, 0.1), piece(0.1, 0.2), piece(0.2, 0.3)];
    const drive = { feed: 0.02, acceleration: 2, jerk: 50 };
    const free = pathTime(path, drive).time;
    expect(pathTime(path, { ...drive, bounds: [undefined, 0.5, undefined] }).time).toBe(free);
    // the middle at half the feed takes as long again, but for the two changes of speed
    const held = pathTime(path, { ...drive, bounds: [undefined, 0.01, undefined] }).time;
    expect(held).toBeCloseTo(free + 0.1 / 0.02, 1);
    expect(held).toBeGreaterThan(free + 0.1 / 0.02);
  });

  it('obeys acceleration on every stretch of a random path: never faster than the same path with a better drive', () => {
    const turns = fc.array(
      fc.record({
        l: fc.double({ min: 1e-3, max: 0.1, noNaN: true }),
        turn: fc.double({ min: -3, max: 3, noNaN: true }),
      }),
      { minLength: 1, maxLength: 8 },
    );
    fc.assert(
      fc.property(turns, (steps) => {
        let [at, heading] = [{ x: 0, y: 0 }, 0];
        const path = steps.map(({ l, turn }) => {
          heading += turn;
          const next = { x: at.x + l * Math.cos(heading), y: at.y + l * Math.sin(heading) };
          const piece = lineBetween(at, next);
          at = next;
          return piece;
        });
        const { time, length: l } = pathTime(path, drive);
        expect(time).toBeGreaterThanOrEqual(l / drive.feed);
        expect(time).toBeLessThanOrEqual(
          path.reduce((sum, piece) => sum + pathTime([piece], drive).time, 0) * (1 + 1e-9),
        );
        expect(pathTime(path, { ...drive, acceleration: 4, jerk: 100 }).time).toBeLessThanOrEqual(time);
      }),
    );
  });
});

describe('the limit at a break of direction', () => {
  it('is none straight on and a full stop on a turn back', () => {
    expect(junctionFeedLimit(2, 1e-4, Math.PI)).toBe(Infinity);
    expect(junctionFeedLimit(2, 1e-4, 0)).toBe(0);
    expect(junctionFeedLimit(2, 0, 1)).toBe(0);
  });

  it('is the feed on the arc that touches both pieces and passes the corner at the deviation', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.1, max: 3, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e-3, noNaN: true }),
        (angle, deviation) => {
          const v = junctionFeedLimit(2, deviation, angle);
          const radius = (v * v) / 2;
          // the inscribed arc's centre stands r/sin(θ/2) from the corner
          expect(radius / Math.sin(angle / 2) - radius).toBeCloseTo(deviation, 9);
        },
      ),
    );
  });
});

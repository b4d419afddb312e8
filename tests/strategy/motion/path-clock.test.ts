import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clockDistance, clockTime, pathClock, pathTime } from '../../../strategy/motion/index.ts';
import { arcOf, lineBetween, pathLength, type Segment } from '../../../strategy/path/index.ts';

const drive = { feed: 0.04, acceleration: 3, jerk: 40 };

/** A zigzag of lines with a half circle at its end. */
const path = fc
  .array(fc.double({ min: 1e-4, max: 0.3, noNaN: true }), { minLength: 1, maxLength: 12 })
  .map((lengths) => {
    const segments: Segment[] = [];
    let at = { x: 0, y: 0 };
    lengths.forEach((length, i) => {
      const end = i % 2 ? { x: at.x, y: at.y + length } : { x: at.x + length, y: at.y };
      segments.push(lineBetween(at, end));
      at = end;
    });
    segments.push(arcOf({ x: at.x, y: at.y + 0.004 }, 0.004, -Math.PI / 2, Math.PI));
    return segments;
  });

describe('the clock of a path', () => {
  it('ends at the time and length that the path takes as a whole', () => {
    fc.assert(
      fc.property(path, fc.boolean(), (segments, jerky) => {
        const limits = jerky ? drive : { feed: drive.feed, acceleration: drive.acceleration };
        const clock = pathClock(segments, limits);
        expect(clock.time.at(-1)).toBeCloseTo(pathTime(segments, limits).time, 9);
        expect(clock.distance.at(-1)).toBeCloseTo(pathLength(segments), 12);
      }),
    );
  });

  it('never goes back, and nowhere faster than the feed', () => {
    fc.assert(
      fc.property(path, (segments) => {
        const { distance, time } = pathClock(segments, drive);
        for (let i = 1; i < time.length; i++) {
          const step = (distance[i] ?? 0) - (distance[i - 1] ?? 0);
          const wait = (time[i] ?? 0) - (time[i - 1] ?? 0);
          expect(wait).toBeGreaterThan(-1e-12);
          expect(step).toBeGreaterThan(-1e-12);
          expect(step).toBeLessThanOrEqual(drive.feed * wait + 1e-9);
        }
      }),
    );
  });

  it('is half way through a straight move after half its time, and has gone s = j t³/6 while the jerk acts', () => {
    const line = [lineBetween({ x: 0, y: 0 }, { x: 0.2, y: 0 })];
    const clock = pathClock(line, drive);
    const { time } = pathTime(line, drive);
    expect(clockDistance(clock, time / 2)).toBeCloseTo(0.1, 6);
    // 0.04 m/s at 40 m/s³ takes 2√(v/j); the first entry of the table is a sixth of it
    const first = (2 * Math.sqrt(drive.feed / drive.jerk)) / 6;
    expect(clockDistance(clock, first)).toBeCloseTo((drive.jerk * first ** 3) / 6, 12);
  });

  it('tells the time of a distance and the distance of a time alike', () => {
    fc.assert(
      fc.property(path, fc.double({ min: 0, max: 1, noNaN: true }), (segments, share) => {
        const clock = pathClock(segments, drive);
        const at = share * (clock.time.at(-1) ?? 0);
        expect(clockTime(clock, clockDistance(clock, at))).toBeCloseTo(at, 6);
      }),
    );
    expect(clockDistance(pathClock([], drive), 3)).toBe(0);
  });
});

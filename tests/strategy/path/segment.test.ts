import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Segment } from '../../../strategy/path/index.ts';
import {
  arcOf,
  circleOf,
  lineBetween,
  pointDistance,
  segmentBox,
  segmentDistance,
  segmentEnd,
  segmentFromBulge,
  segmentLength,
  segmentPart,
  segmentPointAt,
  segmentReverse,
  segmentRotate,
  segmentStart,
  segmentTangentAt,
} from '../../../strategy/path/index.ts';

const place = fc.record({
  x: fc.double({ min: -0.2, max: 0.2, noNaN: true }),
  y: fc.double({ min: -0.2, max: 0.2, noNaN: true }),
});
const line = fc
  .tuple(place, place)
  .filter(([a, b]) => pointDistance(a, b) > 1e-4)
  .map(([a, b]): Segment => lineBetween(a, b));
const arc = fc
  .record({
    centre: place,
    radius: fc.double({ min: 1e-3, max: 0.1, noNaN: true }),
    start: fc.double({ min: -7, max: 7, noNaN: true }),
    sweep: fc.double({ min: 0.05, max: 2 * Math.PI, noNaN: true }),
    left: fc.boolean(),
  })
  .map(({ centre, radius, start, sweep, left }): Segment => arcOf(centre, radius, start, left ? sweep : -sweep));
const segment = fc.oneof(line, arc);

describe('a piece of path', () => {
  it('is as long as its chords are when it is cut fine enough', () => {
    fc.assert(
      fc.property(segment, (s) => {
        let chords = 0;
        for (let i = 0; i < 2000; i++)
          chords += pointDistance(segmentPointAt(s, i / 2000), segmentPointAt(s, (i + 1) / 2000));
        expect(chords).toBeCloseTo(segmentLength(s), 6);
      }),
      { numRuns: 60 },
    );
  });

  it('runs backwards over the same places with the opposite direction', () => {
    fc.assert(
      fc.property(segment, fc.double({ min: 0, max: 1, noNaN: true }), (s, t) => {
        const back = segmentReverse(s);
        expect(pointDistance(segmentPointAt(back, 1 - t), segmentPointAt(s, t))).toBeLessThan(1e-12);
        const [u, w] = [segmentTangentAt(s, t), segmentTangentAt(back, 1 - t)];
        expect(Math.hypot(u.x + w.x, u.y + w.y)).toBeLessThan(1e-9);
      }),
    );
  });

  it('lies in its box, and touches all four sides of it', () => {
    fc.assert(
      fc.property(segment, (s) => {
        const box = segmentBox(s);
        const seen = { minX: Infinity, minY: Infinity, maxX: -Infinity, maxY: -Infinity };
        for (let i = 0; i <= 4000; i++) {
          const p = segmentPointAt(s, i / 4000);
          seen.minX = Math.min(seen.minX, p.x);
          seen.maxX = Math.max(seen.maxX, p.x);
          seen.minY = Math.min(seen.minY, p.y);
          seen.maxY = Math.max(seen.maxY, p.y);
        }
        for (const side of ['minX', 'minY', 'maxX', 'maxY'] as const)
          expect(Math.abs(seen[side] - box[side])).toBeLessThan(1e-6);
        expect(seen.minX).toBeGreaterThanOrEqual(box.minX - 1e-12);
        expect(seen.maxY).toBeLessThanOrEqual(box.maxY + 1e-12);
      }),
      { numRuns: 60 },
    );
  });

  it('is the sum of its parts', () => {
    fc.assert(
      fc.property(segment, fc.double({ min: 0.01, max: 0.99, noNaN: true }), (s, t) => {
        const [a, b] = [segmentPart(s, 0, t), segmentPart(s, t, 1)];
        expect(segmentLength(a) + segmentLength(b)).toBeCloseTo(segmentLength(s), 12);
        expect(pointDistance(segmentEnd(a), segmentStart(b))).toBeLessThan(1e-12);
      }),
    );
  });

  it('turns a bulge of 1 into a half circle, and of tan(22.5°) into a quarter, left of the chord when positive', () => {
    const half = segmentFromBulge({ x: 0, y: 0 }, { x: 0.02, y: 0 }, 1);
    expect(half.kind === 'arc' && half.sweep).toBeCloseTo(Math.PI, 12);
    // counter-clockwise from left to right passes below
    expect(segmentPointAt(half, 0.5).y).toBeCloseTo(-0.01, 12);
    const quarter = segmentFromBulge({ x: 0.02, y: 0 }, { x: 0, y: 0.02 }, Math.tan(Math.PI / 8));
    expect(quarter.kind === 'arc' && quarter.radius).toBeCloseTo(0.02, 12);
    expect(quarter.kind === 'arc' && pointDistance(quarter.centre, { x: 0, y: 0 })).toBeLessThan(1e-12);
  });

  it('refuses an arc without radius or sweep, naming the value', () => {
    expect(() => arcOf({ x: 0, y: 0 }, 0, 0, 1)).toThrow(/radius 0 m/);
    expect(() => arcOf({ x: 0, y: 0 }, 1, 0, 0)).toThrow(/sweep 0 rad/);
    expect(() => arcOf({ x: 0, y: 0 }, 1, 0, 7)).toThrow(RangeError);
  });
});

describe('the distance between two pieces', () => {
  it('is the least over places sampled on both, never more', () => {
    fc.assert(
      fc.property(segment, segment, (a, b) => {
        const found = segmentDistance(a, b);
        let least = Infinity;
        const n = 150;
        for (let i = 0; i <= n; i++) {
          for (let k = 0; k <= n; k++)
            least = Math.min(least, pointDistance(segmentPointAt(a, i / n), segmentPointAt(b, k / n)));
        }
        const mesh = (segmentLength(a) + segmentLength(b)) / n;
        expect(found.distance).toBeLessThanOrEqual(least + 1e-12);
        expect(found.distance).toBeGreaterThanOrEqual(least - mesh);
        expect(pointDistance(found.onFirst, found.onSecond)).toBeCloseTo(found.distance, 12);
      }),
      { numRuns: 150 },
    );
  });

  it('does not change when both are turned, nor which comes first', () => {
    fc.assert(
      fc.property(segment, segment, fc.double({ min: -4, max: 4, noNaN: true }), (a, b, angle) => {
        const d = segmentDistance(a, b).distance;
        expect(segmentDistance(b, a).distance).toBeCloseTo(d, 10);
        // a touch may turn into a miss of the size of rounding, not more
        expect(Math.abs(segmentDistance(segmentRotate(a, angle), segmentRotate(b, angle)).distance - d)).toBeLessThan(
          1e-8,
        );
      }),
    );
  });

  // the legs of two loops on one edge's line: rounding made them meet where neither is
  it('of two lines on one line that do not overlap is the gap between them', () => {
    const a = lineBetween({ x: 0.0283, y: -0.004330127018922195 }, { x: 0.0208, y: -2.2204460492503136e-19 });
    const b = lineBetween(
      { x: -0.010399999999999994, y: 0.018013328398716326 },
      { x: -0.017899999999999992, y: 0.02234345541763852 },
    );
    const gap = Math.hypot(0.0208 + 0.0104, 0.018013328398716326);
    expect(segmentDistance(a, b).distance).toBeCloseTo(gap, 12);
    expect(segmentDistance(b, a).distance).toBeCloseTo(gap, 12);
  });

  it('between a circle and a circle inside it is the ring between them', () => {
    const outer = circleOf({ x: 0, y: 0 }, 0.05);
    expect(segmentDistance(outer, circleOf({ x: 0.01, y: 0 }, 0.02)).distance).toBeCloseTo(0.02, 12);
    expect(segmentDistance(outer, circleOf({ x: 0, y: 0 }, 0.02)).distance).toBeCloseTo(0.03, 12);
  });
});

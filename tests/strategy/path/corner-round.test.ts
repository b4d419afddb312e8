import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contour, Corner, Point } from '../../../strategy/path/index.ts';
import {
  arcOf,
  contourArea,
  contourCorners,
  contourRotate,
  contourRounded,
  contourShift,
  cornerRound,
  lineBetween,
  pointDistance,
  roundDeviation,
  roundRadius,
  roundTangent,
  segmentEnd,
  segmentPointAt,
  segmentPointDistance,
  segmentStart,
  segmentTangentAt,
} from '../../../strategy/path/index.ts';

const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const cornerAt = (contour: Contour, index: number): Corner => {
  const corner = contourCorners(contour).find((one) => one.index === index);
  if (!corner) throw new Error(`no corner ${index}`);
  return corner;
};
const smooth = ({ segments }: Contour): boolean =>
  segments.every((segment, i) => {
    const next = segments[(i + 1) % segments.length];
    return next !== undefined && pointDistance(segmentEnd(segment), segmentStart(next)) < 1e-9;
  });

/** A triangle with a tip of `angle` at the origin and edges of 50 mm. */
const wedge = (angle: number): Contour =>
  polygon([
    { x: 0, y: 0 },
    { x: 0.05 * Math.cos(angle / 2), y: -0.05 * Math.sin(angle / 2) },
    { x: 0.05 * Math.cos(angle / 2), y: 0.05 * Math.sin(angle / 2) },
  ]);

describe('a round', () => {
  const angles = fc.double({ min: 0.3, max: 2.8, noNaN: true });
  const radii = fc.double({ min: 1e-4, max: 4e-3, noNaN: true });

  it('between straight edges is off the drawn corner by r(1/sin(β/2) − 1), and takes r/tan(β/2) from each', () => {
    fc.assert(
      fc.property(angles, radii, (angle, r) => {
        const contour = wedge(angle);
        const round = cornerRound(contour, cornerAt(contour, 0), r);
        if (!round) {
          expect(roundTangent(r, angle)).toBeGreaterThan(0.05 * (1 - 1e-6));
          return;
        }
        expect(round.deviation).toBeCloseTo(roundDeviation(r, angle), 12);
        expect((1 - round.from) * 0.05).toBeCloseTo(roundTangent(r, angle), 10);
        expect(round.to * 0.05).toBeCloseTo(roundTangent(r, angle), 10);
        expect(round.arc.sweep).toBeCloseTo(Math.PI - angle, 9);
        // the deviation is that of the nearest place of the arc
        expect(segmentPointDistance(round.arc, { x: 0, y: 0 })).toBeCloseTo(round.deviation, 12);
      }),
    );
  });

  it('has the radius that a deviation allows', () => {
    fc.assert(
      fc.property(angles, radii, (angle, r) => {
        expect(roundRadius(roundDeviation(r, angle), angle)).toBeCloseTo(r, 12);
      }),
    );
  });

  it('joins its edges without gap or kink, straight or curved, and takes area off a tip', () => {
    const bulge = fc.double({ min: -0.25, max: 0.25, noNaN: true });
    fc.assert(
      fc.property(fc.double({ min: 0.5, max: 2.4, noNaN: true }), radii, bulge, bulge, (angle, r, a, b) => {
        const straight = wedge(angle);
        const bowed = (i: number, by: number) => {
          const segment = straight.segments[i];
          if (!segment || Math.abs(by) < 1e-3) return segment ?? lineBetween({ x: 0, y: 0 }, { x: 0, y: 0 });
          const [from, to] = [segmentStart(segment), segmentEnd(segment)];
          const sweep = 4 * Math.atan(by);
          const chord = pointDistance(from, to);
          const radius = chord / 2 / Math.abs(Math.sin(sweep / 2));
          const left = { x: -(to.y - from.y) / chord, y: (to.x - from.x) / chord };
          const deep = Math.sign(by) * radius * Math.cos(sweep / 2);
          const centre = { x: (from.x + to.x) / 2 + left.x * deep, y: (from.y + to.y) / 2 + left.y * deep };
          return arcOf(centre, radius, Math.atan2(from.y - centre.y, from.x - centre.x), sweep);
        };
        const contour = { segments: [bowed(0, a), bowed(1, 0), bowed(2, b)] };
        const corner = contourCorners(contour).find(({ index }) => index === 0);
        if (!corner?.convex || corner.angle < 0.2 || corner.angle > 2.9) return;
        const round = cornerRound(contour, corner, r);
        if (!round) return;
        const rounded = contourRounded(contour, [{ index: 0, round }]);
        expect(smooth(rounded)).toBe(true);
        const tangents = (i: number, j: number) => {
          const [before, after] = [rounded.segments.at(i), rounded.segments.at(j)];
          if (!before || !after) throw new Error('the round has neighbours');
          return pointDistance(segmentTangentAt(before, 1), segmentTangentAt(after, 0));
        };
        expect(tangents(-1, 0)).toBeLessThan(1e-6);
        expect(tangents(0, 1)).toBeLessThan(1e-6);
        expect(contourArea(rounded)).toBeLessThan(contourArea(contour));
        expect(segmentPointDistance(round.arc, corner.point)).toBeCloseTo(round.deviation, 10);
      }),
    );
  });

  it('is none where an edge is shorter than the arc takes', () => {
    const contour = wedge(0.5);
    expect(cornerRound(contour, cornerAt(contour, 0), 0.012)).not.toBeNull();
    expect(cornerRound(contour, cornerAt(contour, 0), 0.013)).toBeNull();
  });

  it('turns and moves with its contour', () => {
    const contour = wedge(1.2);
    const still = cornerRound(contour, cornerAt(contour, 0), 1e-3);
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -1, max: 1, noNaN: true }),
        (turn, by) => {
          const moved = contourShift(contourRotate(contour, turn), { x: by, y: by });
          const round = cornerRound(moved, cornerAt(moved, 0), 1e-3);
          expect(round?.deviation).toBeCloseTo(still?.deviation ?? NaN, 10);
          expect(round?.from).toBeCloseTo(still?.from ?? NaN, 8);
          expect(round?.to).toBeCloseTo(still?.to ?? NaN, 8);
        },
      ),
      { numRuns: 40 },
    );
  });

  it('of several corners of a contour leaves the rest of it as it was', () => {
    const contour = wedge(1);
    const rounds = contourCorners(contour).map((corner) => {
      const round = cornerRound(contour, corner, 1e-3);
      if (!round) throw new Error('there is room');
      return { index: corner.index, round };
    });
    const rounded = contourRounded(contour, rounds);
    expect(rounded.segments.map(({ kind }) => kind)).toEqual(['arc', 'line', 'arc', 'line', 'arc', 'line']);
    expect(smooth(rounded)).toBe(true);
    for (const segment of rounded.segments.filter(({ kind }) => kind === 'line')) {
      const middle = segmentPointAt(segment, 0.5);
      expect(Math.min(...contour.segments.map((s) => segmentPointDistance(s, middle)))).toBeLessThan(1e-12);
    }
  });

  it('is refused on a notch, on a corner the drawing rounds, and without a radius', () => {
    const notch = polygon([
      { x: 0, y: 0 },
      { x: 0.05, y: 0 },
      { x: 0.02, y: 0.02 },
      { x: 0, y: 0.05 },
    ]);
    expect(() => cornerRound(notch, cornerAt(notch, 2), 1e-3)).toThrow(/sharp tip/);
    expect(() =>
      cornerRound(
        notch,
        {
          ...cornerAt(notch, 1),
          fillet: { radius: 1e-3, first: 1, pieces: 1, start: { x: 0, y: 0 }, end: { x: 0, y: 0 } },
        },
        1e-3,
      ),
    ).toThrow(/sharp tip/);
    expect(() => cornerRound(notch, cornerAt(notch, 1), 0)).toThrow(/radius 0 m/);
  });
});

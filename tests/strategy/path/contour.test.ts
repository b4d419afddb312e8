import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import {
  circleOf,
  contourArea,
  contourBox,
  contourContains,
  contourCorners,
  contourLength,
  contourReverse,
  contourRotate,
  contourShift,
  cornerInward,
  cornerOfPath,
  lineBetween,
  pointRotate,
  segmentFromBulge,
  segmentPointDistance,
  svgContourData,
  svgPathData,
} from '../../../strategy/path/index.ts';

const polygon = (points: readonly Point[], bulges: readonly number[] = []): Contour => ({
  segments: points.map((p, i) => segmentFromBulge(p, points[(i + 1) % points.length] ?? p, bulges[i] ?? 0)),
});
const rectangle = polygon([
  { x: 0, y: 0 },
  { x: 0.3, y: 0 },
  { x: 0.3, y: 0.2 },
  { x: 0, y: 0.2 },
]);

/** Star-shaped contours of lines and shallow arcs about the origin. */
const star = fc
  .array(
    fc.record({
      r: fc.double({ min: 0.05, max: 0.1, noNaN: true }),
      bulge: fc.double({ min: -0.1, max: 0.1, noNaN: true }),
    }),
    {
      minLength: 5,
      maxLength: 14,
    },
  )
  .map((spokes) =>
    polygon(
      spokes.map(({ r }, i) => pointRotate({ x: r, y: 0 }, (2 * Math.PI * i) / spokes.length)),
      spokes.map(({ bulge }) => bulge),
    ),
  );
const place = fc.record({
  x: fc.double({ min: -0.15, max: 0.15, noNaN: true }),
  y: fc.double({ min: -0.15, max: 0.15, noNaN: true }),
});

describe('a contour', () => {
  it('has the area and length of the shapes everybody knows', () => {
    expect(contourArea(rectangle)).toBeCloseTo(0.06, 14);
    expect(contourLength(rectangle)).toBeCloseTo(1, 14);
    const disc = { segments: [circleOf({ x: 5, y: 3 }, 0.1)] };
    expect(contourArea(disc)).toBeCloseTo(Math.PI * 0.01, 14);
    // two half discs on a square: a slot
    const slot = polygon(
      [
        { x: 0, y: 0 },
        { x: 0.06, y: 0 },
        { x: 0.06, y: 0.02 },
        { x: 0, y: 0.02 },
      ],
      [0, 1, 0, 1],
    );
    expect(contourArea(slot)).toBeCloseTo(0.06 * 0.02 + Math.PI * 0.01 ** 2, 14);
  });

  it('changes the sign of its area when reversed, and keeps it when shifted or turned', () => {
    fc.assert(
      fc.property(star, place, fc.double({ min: -4, max: 4, noNaN: true }), (contour, by, angle) => {
        const area = contourArea(contour);
        expect(contourArea(contourReverse(contour))).toBeCloseTo(-area, 12);
        expect(contourArea(contourRotate(contourShift(contour, by), angle))).toBeCloseTo(area, 12);
      }),
    );
  });

  it('contains the same places after a turn, and a reversed contour contains what it did', () => {
    fc.assert(
      fc.property(star, place, fc.double({ min: -4, max: 4, noNaN: true }), (contour, p, angle) => {
        fc.pre(contour.segments.every((s) => segmentPointDistance(s, p) > 1e-9));
        const inside = contourContains(contour, p);
        expect(contourContains(contourReverse(contour), p)).toBe(inside);
        expect(contourContains(contourRotate(contour, angle), pointRotate(p, angle))).toBe(inside);
      }),
      { numRuns: 500 },
    );
  });

  it('contains as large a share of its box as its area is of the box', () => {
    const slot = polygon(
      [
        { x: 0, y: 0 },
        { x: 0.06, y: 0.01 },
        { x: 0.05, y: 0.04 },
        { x: 0, y: 0.03 },
      ],
      [-0.2, 1, 0.3, 0],
    );
    const box = contourBox(slot);
    const n = 400;
    let inside = 0;
    for (let i = 0; i < n; i++) {
      for (let k = 0; k < n; k++) {
        const p = {
          x: box.minX + ((box.maxX - box.minX) * (i + 0.5)) / n,
          y: box.minY + ((box.maxY - box.minY) * (k + 0.5)) / n,
        };
        if (contourContains(slot, p)) inside++;
      }
    }
    const boxArea = (box.maxX - box.minX) * (box.maxY - box.minY);
    expect((inside / n / n) * boxArea).toBeCloseTo(contourArea(slot), 5);
  });

  it('counts a ray through its vertices once', () => {
    const diamond = polygon([
      { x: 0, y: -1 },
      { x: 1, y: 0 },
      { x: 0, y: 1 },
      { x: -1, y: 0 },
    ]);
    expect(contourContains(diamond, { x: -0.5, y: 0 })).toBe(true);
    expect(contourContains(diamond, { x: -2, y: 0 })).toBe(false);
    expect(contourContains(diamond, { x: -2, y: 1 })).toBe(false);
    const disc = { segments: [circleOf({ x: 0, y: 0 }, 1)] };
    expect(contourContains(disc, { x: -0.3, y: 0 })).toBe(true);
    expect(contourContains(disc, { x: -2, y: 0 })).toBe(false);
    expect(contourContains(disc, { x: -2, y: 1 })).toBe(false);
  });
});

describe('corners of a contour', () => {
  it('are 90° inside a rectangle, and 270° on a hole of the same shape', () => {
    for (const corner of contourCorners(rectangle)) expect([corner.angle, corner.convex]).toEqual([Math.PI / 2, true]);
    const hole = contourCorners(contourReverse(rectangle));
    expect(hole).toHaveLength(4);
    for (const corner of hole) expect([corner.angle, corner.convex]).toEqual([(3 * Math.PI) / 2, false]);
  });

  it('turn once round in all when the contour has no arcs', () => {
    fc.assert(
      fc.property(star, (contour) => {
        const straight = polygon(contour.segments.map((s) => (s.kind === 'line' ? s.start : segmentFromStart(s))));
        const turned = contourCorners(straight, 0).reduce((sum, corner) => sum + Math.PI - corner.angle, 0);
        expect(turned).toBeCloseTo(2 * Math.PI, 9);
      }),
    );
  });

  it('are not found where an arc leaves a line smoothly or a curve is drawn in small pieces', () => {
    const slot = polygon(
      [
        { x: 0, y: 0 },
        { x: 0.06, y: 0 },
        { x: 0.06, y: 0.02 },
        { x: 0, y: 0.02 },
      ],
      [0, 1, 0, 1],
    );
    expect(contourCorners(slot)).toEqual([]);
    const faceted = polygon(
      Array.from({ length: 60 }, (_, i) => pointRotate({ x: 0.05, y: 0 }, (2 * Math.PI * i) / 60)),
    );
    expect(contourCorners(faceted)).toEqual([]);
  });

  it('look along the bisector into the part, for a tip as for a notch', () => {
    const notched = polygon([
      { x: 0, y: 0 },
      { x: 0.1, y: 0 },
      { x: 0.05, y: 0.03 },
      { x: 0.1, y: 0.1 },
      { x: 0, y: 0.1 },
    ]);
    for (const corner of contourCorners(notched)) {
      const inward = cornerInward(corner);
      const p = { x: corner.point.x + 1e-4 * inward.x, y: corner.point.y + 1e-4 * inward.y };
      expect(contourContains(notched, p)).toBe(true);
    }
  });

  it('of the path lie half a kerf outside both finished edges', () => {
    const part = polygon([
      { x: 0, y: 0 },
      { x: 0.1, y: 0 },
      { x: 0.02, y: 0.05 },
    ]);
    for (const corner of contourCorners(part)) {
      const p = cornerOfPath(corner, 8e-4);
      const before = part.segments[(corner.index + 2) % 3];
      const after = part.segments[corner.index];
      if (before?.kind !== 'line' || after?.kind !== 'line') throw new Error('the part is made of lines');
      for (const edge of [before, after]) {
        const long = lineBetween(
          { x: 11 * edge.start.x - 10 * edge.end.x, y: 11 * edge.start.y - 10 * edge.end.y },
          { x: 11 * edge.end.x - 10 * edge.start.x, y: 11 * edge.end.y - 10 * edge.start.y },
        );
        expect(segmentPointDistance(long, p)).toBeCloseTo(4e-4, 12);
      }
      expect(contourContains(part, p)).toBe(false);
    }
  });
});

describe('a path written for a picture', () => {
  it('flips y, scales to millimetres and writes lines and arcs', () => {
    expect(svgContourData(rectangle, { scale: 1000 })).toBe('M0 0L300 0L300 -200L0 -200L0 0Z');
    const arc = segmentFromBulge({ x: 0, y: 0 }, { x: 0.02, y: 0 }, 1);
    // below in the drawing is below in the picture: counter-clockwise stays so for the eye, which SVG calls 0
    expect(svgPathData([arc], { scale: 1000 })).toBe('M0 0A10 10 0 0 0 20 0');
    expect(svgPathData([arc], { scale: 1000, flipY: false })).toBe('M0 0A10 10 0 0 1 20 0');
  });

  it('writes a full circle as two arcs', () => {
    expect(svgContourData({ segments: [circleOf({ x: 0.01, y: 0 }, 0.01)] }, { scale: 1000 })).toBe(
      'M20 0A10 10 0 0 0 0 0A10 10 0 0 0 20 0Z',
    );
  });

  it('takes an origin and the digits asked for, without -0', () => {
    const data = svgPathData([lineBetween({ x: 1 / 3, y: 0 }, { x: 0, y: 1e-9 })], {
      scale: 1,
      origin: { x: 1, y: 0 },
      digits: 2,
    });
    expect(data).toBe('M-0.67 0L-1 0');
  });
});

function segmentFromStart(s: Contour['segments'][number]): Point {
  return s.kind === 'line'
    ? s.start
    : { x: s.centre.x + s.radius * Math.cos(s.startAngle), y: s.centre.y + s.radius * Math.sin(s.startAngle) };
}

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contour, Corner, Point, Segment } from '../../../strategy/path/index.ts';
import {
  arcOf,
  circleOf,
  contourCorners,
  contourReverse,
  contourRotate,
  contourShift,
  cornerInward,
  lineBetween,
  pointAdd,
  pointDistance,
  pointScale,
  segmentPointAt,
} from '../../../strategy/path/index.ts';

const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const degrees = (angle: number) => (angle * 180) / Math.PI;
const only = (corners: readonly Corner[]): Corner => {
  const [corner, ...more] = corners;
  if (!corner || more.length > 0) throw new Error(`${corners.length} corners instead of one`);
  return corner;
};

/** A tip at the origin that points along +x with `angle`, cut off 60 mm behind, and its tip rounded by what is given. */
function tipWith(angle: number, rounding: (incoming: Point) => readonly Segment[]): Contour {
  const half = angle / 2;
  const incoming = { x: Math.cos(half), y: Math.sin(half) };
  const outgoing = { x: -Math.cos(half), y: Math.sin(half) };
  const middle = rounding(incoming);
  const start = segmentPointAt(middle[0] ?? lineBetween({ x: 0, y: 0 }, { x: 0, y: 0 }), 0);
  const end = segmentPointAt(middle.at(-1) ?? lineBetween({ x: 0, y: 0 }, { x: 0, y: 0 }), 1);
  const [first, last] = [pointScale(incoming, -0.06), pointScale(outgoing, 0.06)];
  return { segments: [lineBetween(first, start), ...middle, lineBetween(end, last), lineBetween(last, first)] };
}

/** Without the two corners of the cut-off end. */
const atTip = (contour: Contour): Corner[] =>
  contourCorners(contour).filter(({ point }) => Math.hypot(point.x, point.y) < 0.01);

describe('a fillet', () => {
  const radiusOf = (r: number, angle: number) => (incoming: Point) => {
    const taken = r / Math.tan(angle / 2);
    const start = pointScale(incoming, -taken);
    const centre = { x: -r / Math.sin(angle / 2), y: 0 };
    return [arcOf(centre, r, Math.atan2(start.y - centre.y, start.x - centre.x), Math.PI - angle)];
  };

  it('below the threshold is a corner where its edges would meet, with the angle between them and its radius', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 2.7, noNaN: true }),
        fc.double({ min: 1e-4, max: 1.45e-3, noNaN: true }),
        (angle, r) => {
          const corner = only(atTip(tipWith(angle, radiusOf(r, angle))));
          expect(corner.angle).toBeCloseTo(angle, 9);
          expect(corner.convex).toBe(true);
          expect(pointDistance(corner.point, { x: 0, y: 0 })).toBeLessThan(1e-9);
          expect(corner.fillet?.radius).toBeCloseTo(r, 12);
          expect(corner.fillet?.pieces).toBe(1);
          expect(corner.index).toBe(1);
        },
      ),
    );
  });

  it('of a larger radius is a curve and no corner', () => {
    expect(atTip(tipWith(1, radiusOf(1.6e-3, 1)))).toEqual([]);
    expect(contourCorners(tipWith(1, radiusOf(1.6e-3, 1)), undefined, 2e-3).some(({ fillet }) => fillet)).toBe(true);
  });

  it('drawn as arcs, as facets or as a chamfer is the same corner', () => {
    const r = 8e-4;
    const angle = Math.PI / 2;
    const whole = radiusOf(r, angle)({ x: Math.SQRT1_2, y: Math.SQRT1_2 });
    const arc = whole[0];
    if (!arc) throw new Error('there is an arc');
    const pieces: readonly Segment[][] = [
      [0, 1, 2].map((i) => ({ ...arc, startAngle: arc.startAngle + (i * arc.sweep) / 3, sweep: arc.sweep / 3 })),
      // facets of 30° break by more than a curve drawn in pieces would
      Array.from({ length: 3 }, (_, i) => lineBetween(segmentPointAt(arc, i / 3), segmentPointAt(arc, (i + 1) / 3))),
      Array.from({ length: 12 }, (_, i) => lineBetween(segmentPointAt(arc, i / 12), segmentPointAt(arc, (i + 1) / 12))),
      [lineBetween(segmentPointAt(arc, 0), segmentPointAt(arc, 1))],
    ];
    for (const drawn of pieces) {
      const corner = only(atTip(tipWith(angle, () => drawn)));
      expect(degrees(corner.angle)).toBeCloseTo(90, 6);
      expect(pointDistance(corner.point, { x: 0, y: 0 })).toBeLessThan(1e-9);
      expect(corner.fillet?.pieces).toBe(drawn.length);
      expect(Math.abs((corner.fillet?.radius ?? 0) / r - 1)).toBeLessThan(0.12);
    }
  });

  it('in a notch is a concave corner', () => {
    const cut = 5e-4;
    const notched: Contour = {
      segments: [
        lineBetween({ x: 0, y: 0 }, { x: 0.05, y: 0 }),
        lineBetween({ x: 0.05, y: 0 }, { x: 0.05, y: 0.05 }),
        lineBetween({ x: 0.05, y: 0.05 }, { x: 0.025, y: 0.05 }),
        lineBetween({ x: 0.025, y: 0.05 }, { x: 0.025, y: 0.025 + cut }),
        arcOf({ x: 0.025 - cut, y: 0.025 + cut }, cut, 0, -Math.PI / 2),
        lineBetween({ x: 0.025 - cut, y: 0.025 }, { x: 0, y: 0.025 }),
        lineBetween({ x: 0, y: 0.025 }, { x: 0, y: 0 }),
      ],
    };
    const corner = only(contourCorners(notched).filter(({ fillet }) => fillet));
    expect(degrees(corner.angle)).toBeCloseTo(270, 9);
    expect(corner.convex).toBe(false);
    expect(pointDistance(corner.point, { x: 0.025, y: 0.025 })).toBeLessThan(1e-12);
  });

  it('is none at the end of a slot, around a small hole and on a narrow tongue, whose two corners stay two', () => {
    expect(contourCorners({ segments: [circleOf({ x: 0, y: 0 }, 1e-3)] })).toEqual([]);
    const halves = [0, 1, 2, 3].map((i) => arcOf({ x: 0, y: 0 }, 1e-3, (i * Math.PI) / 2, Math.PI / 2));
    expect(contourCorners({ segments: halves })).toEqual([]);
    const slot: Contour = {
      segments: [
        lineBetween({ x: 0, y: -1e-3 }, { x: 0.02, y: -1e-3 }),
        arcOf({ x: 0.02, y: 0 }, 1e-3, -Math.PI / 2, Math.PI),
        lineBetween({ x: 0.02, y: 1e-3 }, { x: 0, y: 1e-3 }),
        arcOf({ x: 0, y: 0 }, 1e-3, Math.PI / 2, Math.PI),
      ],
    };
    expect(contourCorners(contourReverse(slot))).toEqual([]);
    const tongue = polygon([
      { x: 0, y: 0 },
      { x: 0.02, y: 0 },
      { x: 0.02, y: 1e-3 },
      { x: 0, y: 1e-3 },
    ]);
    expect(contourCorners(tongue).map(({ angle }) => Math.round(degrees(angle)))).toEqual([90, 90, 90, 90]);
  });

  it('beside a sharp corner leaves that one to itself', () => {
    const r = 1e-3;
    const part: Contour = {
      segments: [
        lineBetween({ x: 0, y: 0 }, { x: 0.05, y: 0 }),
        arcOf({ x: 0.05, y: r }, r, -Math.PI / 2, Math.PI / 2),
        lineBetween({ x: 0.05 + r, y: r }, { x: 0.05 + r, y: 0.05 }),
        lineBetween({ x: 0.05 + r, y: 0.05 }, { x: 0, y: 0.05 }),
        lineBetween({ x: 0, y: 0.05 }, { x: 0, y: 0 }),
      ],
    };
    const corners = contourCorners(part);
    expect(corners.map(({ index, fillet }) => [index, fillet !== undefined])).toEqual([
      [0, false],
      [1, true],
      [3, false],
      [4, false],
    ]);
  });

  it('that begins in a sharp corner stands where it ends, so that no two corners share a place', () => {
    const r = 1e-3;
    // the edge along y = 0 breaks by a right angle into a quarter arc that runs out upwards
    const part: Contour = {
      segments: [
        lineBetween({ x: 0, y: 0 }, { x: 0.05, y: 0 }),
        arcOf({ x: 0.05, y: r }, r, -Math.PI / 2, Math.PI / 3),
        lineBetween({ x: 0.05 + r * Math.cos(-Math.PI / 6), y: r + r * Math.sin(-Math.PI / 6) }, { x: 0.02, y: 0.06 }),
        lineBetween({ x: 0.02, y: 0.06 }, { x: 0, y: 0.05 }),
        lineBetween({ x: 0, y: 0.05 }, { x: 0, y: 0 }),
      ],
    };
    const corners = contourCorners(part);
    expect(new Set(corners.map(({ index }) => index)).size).toBe(corners.length);
    const reversed = contourCorners({ segments: contourReverse(part).segments });
    expect(new Set(reversed.map(({ index }) => index)).size).toBe(reversed.length);
    const fillet = corners.find((corner) => corner.fillet);
    expect(fillet).toMatchObject({ index: 1, fillet: { first: 1, pieces: 1 } });
  });

  it('turns and moves with its contour', () => {
    const contour = tipWith(1.1, radiusOf(7e-4, 1.1));
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -1, max: 1, noNaN: true }),
        (turn, by) => {
          const moved = contourShift(contourRotate(contour, turn), { x: by, y: 1 - by });
          const [before, after] = [contourCorners(contour), contourCorners(moved)];
          expect(after.map(({ angle }) => angle.toFixed(9))).toEqual(before.map(({ angle }) => angle.toFixed(9)));
          after.forEach((corner, i) => {
            const other = before[i];
            if (!other) throw new Error('as many corners');
            expect(corner.fillet?.radius).toBe(other.fillet?.radius);
            const inward = pointAdd(corner.point, pointScale(cornerInward(corner), 1e-3));
            expect(pointDistance(inward, corner.point)).toBeCloseTo(1e-3, 12);
          });
        },
      ),
      { numRuns: 40 },
    );
  });
});

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contour, LoopSurroundings, Point } from '../../../strategy/path/index.ts';
import {
  contourArea,
  contourContains,
  contourCorners,
  contourReverse,
  contourShift,
  cornerOfPath,
  lineBetween,
  loopAt,
  loopFits,
  loopRadii,
  loopSlug,
  obstacleField,
  pathLength,
  pointDistance,
  pointRotate,
  segmentEnd,
  segmentPointAt,
  segmentPointDistance,
  segmentStart,
  segmentTangentAt,
} from '../../../strategy/path/index.ts';

const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const kerf = 8e-4;
const clearance = 2e-3;

/** A tip of the given angle at the origin, first edge along x. */
const tip = (angle: number) => ({
  point: { x: 0, y: 0 },
  incoming: { x: 1, y: 0 },
  outgoing: { x: Math.cos(Math.PI - angle), y: Math.sin(Math.PI - angle) },
  angle,
});

const around = (contours: readonly Contour[], change: Partial<LoopSurroundings> = {}): LoopSurroundings => ({
  field: obstacleField(contours.map((contour, i) => ({ id: String(i + 1), name: `contour ${i + 1}`, contour }))),
  contourId: '1',
  kerfWidth: kerf,
  clearance,
  plate: null,
  loops: [],
  ...change,
});

describe('a loop', () => {
  const angle = fc.double({ min: 0.3, max: 2.4, noNaN: true });
  const radius = fc.double({ min: 1e-3, max: 1e-2, noNaN: true });

  it('begins and ends in the corner, runs without a kink, and enters along the first and leaves along the second edge', () => {
    fc.assert(
      fc.property(angle, radius, (beta, r) => {
        const corner = tip(beta);
        const { segments } = loopAt(corner, r);
        const [out, arc, back] = segments;
        expect(pointDistance(segmentStart(out), corner.point)).toBeLessThan(1e-12);
        expect(pointDistance(segmentEnd(back), corner.point)).toBeLessThan(1e-12);
        expect(pointDistance(segmentEnd(out), segmentStart(arc))).toBeLessThan(1e-12);
        expect(pointDistance(segmentEnd(arc), segmentStart(back))).toBeLessThan(1e-12);
        const same = (a: Point, b: Point) => expect(pointDistance(a, b)).toBeLessThan(1e-9);
        same(segmentTangentAt(out, 0), corner.incoming);
        same(segmentTangentAt(arc, 0), corner.incoming);
        same(segmentTangentAt(arc, 1), corner.outgoing);
        same(segmentTangentAt(back, 1), corner.outgoing);
      }),
    );
  });

  it('is as long as its segments, and reaches as far as its farthest place', () => {
    fc.assert(
      fc.property(angle, radius, (beta, r) => {
        const loop = loopAt(tip(beta), r);
        expect(loop.length).toBeCloseTo(pathLength(loop.segments), 12);
        const farthest = Math.max(
          ...Array.from({ length: 2001 }, (_, i) =>
            pointDistance(segmentPointAt(loop.segments[1], i / 2000), { x: 0, y: 0 }),
          ),
        );
        expect(farthest).toBeCloseTo(loop.reach, 7);
      }),
    );
  });

  it('cuts out a slug of the area between half kerfs, and none when the kerf takes it all', () => {
    const corner = tip(Math.PI / 2);
    const loop = loopAt(corner, 5e-3);
    const inner = 5e-3 - kerf / 2;
    // two right triangles r·e and a sector of 270°
    expect(loopSlug(corner, loop, kerf)?.area).toBeCloseTo(inner * inner + 0.75 * Math.PI * inner * inner, 12);
    expect(loopSlug(corner, loop, 0)?.area).toBeCloseTo(Math.abs(contourArea({ segments: loop.segments })), 12);
    expect(loopSlug(corner, loopAt(corner, 4e-4), kerf)).toBeNull();
  });

  it('is refused on a corner that is no tip', () => {
    expect(() => loopAt({ ...tip(1), angle: 3.5 }, 1e-3)).toThrow(/no tip/);
    expect(() => loopAt(tip(1), 0)).toThrow(/radius 0 m/);
  });
});

describe('the radius of a loop', () => {
  const bounds = { radius: 5e-3, minExtension: 3e-3, maxExtension: 1e-2, smallestArc: 1e-3 };

  it('is the design number where its extension is within bounds, and gives way where it is not', () => {
    const at = (degrees: number) => {
      const radii = loopRadii((degrees * Math.PI) / 180, bounds);
      return radii.kind === 'radii' ? radii.radii[0] : NaN;
    };
    expect(at(90)).toBeCloseTo(5e-3, 12);
    // at 30° the extension would be 18.7 mm: 10 mm leaves 2.68 mm of radius
    expect(at(30)).toBeCloseTo(1e-2 * Math.tan(Math.PI / 12), 12);
    // at 150° 3 mm of extension need 11.2 mm
    expect(at(150)).toBeCloseTo(3e-3 * Math.tan((75 * Math.PI) / 180), 12);
  });

  it('falls to the smallest arc of the machine or the least extension and no further', () => {
    const radii = loopRadii(Math.PI / 2, bounds);
    if (radii.kind !== 'radii') throw new Error(radii.why);
    expect(radii.radii.at(-1)).toBeCloseTo(3e-3, 12);
    expect([...radii.radii].sort((a, b) => b - a)).toEqual(radii.radii);
  });

  it('is refused with the numbers when the angle is too sharp for any', () => {
    const radii = loopRadii((8 * Math.PI) / 180, bounds);
    expect(radii).toMatchObject({ kind: 'none' });
    expect(radii.kind === 'none' && radii.why).toContain('14.3 mm');
  });
});

describe('whether a loop fits', () => {
  const square = polygon([
    { x: 0, y: 0 },
    { x: 0.1, y: 0 },
    { x: 0.1, y: 0.1 },
    { x: 0, y: 0.1 },
  ]);
  const corner = contourCorners(square)[2]; // top right, arriving upwards
  if (!corner) throw new Error('a square has corners');
  const loop = loopAt({ ...corner, point: cornerOfPath(corner, kerf) }, 5e-3);
  /** How far the loop's path stands beyond the part's right edge, m. */
  const beyond = 1e-2 + kerf / 2;

  it('is yes on a part that stands alone', () => {
    expect(loopFits(loop, around([square]))).toEqual({ kind: 'fits' });
  });

  it('is no when the neighbour is nearer than kerf and clearance, and yes just beyond', () => {
    const neighbour = (gap: number) => contourShift(square, { x: 0.1 + gap, y: 0.05 });
    const needed = beyond + kerf / 2 + clearance + kerf;
    expect(loopFits(loop, around([square, neighbour(needed + 1e-5)]))).toEqual({ kind: 'fits' });
    const blocked = loopFits(loop, around([square, neighbour(needed - 1e-5)]));
    expect(blocked).toMatchObject({ kind: 'none', what: 'contour' });
    expect(blocked.kind === 'none' && blocked.why).toContain('contour 2 is in the way: only 2.0 mm');
    const through = loopFits(loop, around([square, neighbour(5e-3)]));
    expect(through.kind === 'none' && through.why).toContain('cut into it');
  });

  it('is no at the edge of the plate, whether a rectangle or an outline', () => {
    const needed = beyond + kerf / 2 + clearance;
    const plate = (width: number) => ({ minX: -0.05, minY: -0.05, maxX: width, maxY: 0.2 });
    const outline = (width: number) =>
      polygon([
        { x: -0.05, y: -0.05 },
        { x: width, y: -0.05 },
        { x: width, y: 0.2 },
        { x: -0.05, y: 0.2 },
      ]);
    for (const shape of [plate, outline]) {
      expect(loopFits(loop, around([square], { plate: shape(0.1 + needed + 1e-5) }))).toEqual({ kind: 'fits' });
      const blocked = loopFits(loop, around([square], { plate: shape(0.1 + needed - 1e-5) }));
      expect(blocked).toMatchObject({ kind: 'none', what: 'plate' });
      expect(blocked.kind === 'none' && blocked.at.x).toBeCloseTo(0.1 + needed - 1e-5, 9);
    }
    expect(loopFits(loop, around([square], { plate: outline(0.08) }))).toMatchObject({ what: 'plate' });
  });

  it('is no where another loop lies already', () => {
    const other = { name: 'the loop of corner c2-0', loop };
    expect(loopFits(loop, around([square], { loops: [other] }))).toMatchObject({ kind: 'none', what: 'loop' });
  });

  it('is no when the own part comes back in front of the corner', () => {
    const hooked = polygon([
      { x: 0, y: 0 },
      { x: 0.2, y: 0 },
      { x: 0.2, y: 0.11 },
      { x: 0.11, y: 0.11 },
      { x: 0.11, y: 0.105 },
      { x: 0.19, y: 0.105 },
      { x: 0.19, y: 0.01 },
      { x: 0.1, y: 0.01 },
      { x: 0.1, y: 0.1 },
      { x: 0, y: 0.1 },
    ]);
    const found = contourCorners(hooked).find((c) => pointDistance(c.point, { x: 0.1, y: 0.1 }) < 1e-9);
    if (!found) throw new Error('the corner is there');
    const blocked = loopFits(loopAt({ ...found, point: cornerOfPath(found, kerf) }, 5e-3), around([hooked]));
    expect(blocked).toMatchObject({ kind: 'none', what: 'part' });
  });

  it('on a hole is yes only where the part pokes into it', () => {
    const window = contourReverse(
      polygon([
        { x: 0, y: 0 },
        { x: 0.03, y: 0 },
        { x: 0.05, y: 0.02 },
        { x: 0.07, y: 0 },
        { x: 0.1, y: 0 },
        { x: 0.1, y: 0.08 },
        { x: 0, y: 0.08 },
      ]),
    );
    const tips = contourCorners(window).filter((c) => c.convex);
    expect(tips).toHaveLength(1);
    const poke = tips[0];
    if (!poke) throw new Error('one tip');
    const inside = loopAt({ ...poke, point: cornerOfPath(poke, kerf) }, 4e-3);
    const outline = polygon([
      { x: -0.05, y: -0.05 },
      { x: 0.15, y: -0.05 },
      { x: 0.15, y: 0.13 },
      { x: -0.05, y: 0.13 },
    ]);
    expect(loopFits(inside, around([window, outline]))).toEqual({ kind: 'fits' });
    expect(loopFits(inside, around([window, contourShift(outline, { x: 0.12, y: 0 })]))).toMatchObject({
      why: 'the corner lies within contour 1',
    });
    for (const segment of inside.segments) expect(contourContains(window, segmentPointAt(segment, 0.5))).toBe(true);
  });

  it('is never yes for a loop that runs through a part, checked by places along it', () => {
    const spokes = fc.array(fc.double({ min: 0.02, max: 0.1, noNaN: true }), { minLength: 4, maxLength: 12 });
    let fitting = 0;
    fc.assert(
      fc.property(
        spokes,
        spokes,
        fc.double({ min: 0.08, max: 0.25, noNaN: true }),
        fc.double({ min: 1e-3, max: 8e-3, noNaN: true }),
        (a, b, apart, r) => {
          const shape = (radii: number[]) =>
            polygon(radii.map((radius, i) => pointRotate({ x: radius, y: 0 }, (2 * Math.PI * i) / radii.length)));
          const parts = [shape(a), contourShift(shape(b), { x: apart, y: 0 })];
          const [own] = parts;
          if (!own) return;
          for (const corner of contourCorners(own)) {
            if (!corner.convex || corner.angle > 2.2) continue;
            const candidate = loopAt({ ...corner, point: cornerOfPath(corner, kerf) }, r);
            if (loopFits(candidate, around(parts)).kind === 'none') continue;
            fitting++;
            for (const segment of candidate.segments) {
              for (let i = 0; i <= 60; i++) {
                const p = segmentPointAt(segment, i / 60);
                for (const part of parts) expect(contourContains(part, p)).toBe(false);
                const nearest = Math.min(
                  ...parts.flatMap((part) => part.segments.map((s) => segmentPointDistance(s, p))),
                );
                expect(nearest).toBeGreaterThan((kerf / 2) * 0.979);
              }
            }
          }
        },
      ),
      { numRuns: 200, seed: 7 },
    );
    // the property says something only when loops were found
    expect(fitting).toBeGreaterThan(100);
  });
});

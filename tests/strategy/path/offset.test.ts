import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { OffsetLoop, OffsetRule } from '../../../strategy/path/compensation/index.ts';
import { contourOffset, kerfOffset, narrowFeatures } from '../../../strategy/path/compensation/index.ts';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import {
  arcOf,
  circleOf,
  contourArea,
  contourCorners,
  contourLength,
  contourReverse,
  contourRotate,
  contourShift,
  cornerOfPath,
  lineBetween,
  pointDistance,
  pointRotate,
  segmentEnd,
  segmentPointAt,
  segmentPointDistance,
  segmentStart,
} from '../../../strategy/path/index.ts';
import { bulged, randomContour, randomKinds, seeded } from '../../support/random-contours.ts';
import { runs } from '../../support/runs.ts';

const round: OffsetRule = { outside: { kind: 'arc' } };
const sharp: OffsetRule = { outside: { kind: 'sharp', limit: 10 } };
const rectangle = bulged([
  { x: 0, y: 0 },
  { x: 0.3, y: 0 },
  { x: 0.3, y: 0.2 },
  { x: 0, y: 0.2 },
]);
const areaOf = (loops: readonly OffsetLoop[]): number =>
  loops.reduce((sum, { contour }) => sum + contourArea(contour), 0);
const only = (loops: readonly OffsetLoop[]): OffsetLoop => {
  expect(loops).toHaveLength(1);
  const [loop] = loops;
  if (!loop) throw new Error('no path');
  return loop;
};
const distanceFrom = ({ segments }: Contour, p: Point): number =>
  segments.reduce((least, segment) => Math.min(least, segmentPointDistance(segment, p)), Infinity);
const places = (contour: Contour): Point[] =>
  contour.segments.flatMap((segment) => [0, 0.21, 0.5, 0.83].map((t) => segmentPointAt(segment, t)));
const scaled = ({ segments }: Contour, by: number): Contour => ({
  segments: segments.map((segment) =>
    segment.kind === 'line'
      ? lineBetween(
          { x: segment.start.x * by, y: segment.start.y * by },
          { x: segment.end.x * by, y: segment.end.y * by },
        )
      : { ...segment, centre: { x: segment.centre.x * by, y: segment.centre.y * by }, radius: segment.radius * by },
  ),
});
/** Turned over about the y axis; the part stays on the left. */
const mirrored = ({ segments }: Contour): Contour =>
  contourReverse({
    segments: segments.map((segment) => {
      const over = ({ x, y }: Point): Point => ({ x: -x, y });
      return segment.kind === 'line'
        ? lineBetween(over(segment.start), over(segment.end))
        : arcOf(over(segment.centre), segment.radius, Math.PI - segment.startAngle, -segment.sweep);
    }),
  });

const seed = fc.integer({ min: 0, max: 1e9 });
const kind = fc.constantFrom(...randomKinds);
const distance = fc.double({ min: 2e-4, max: 3e-3, noNaN: true });

describe('the path beside a contour', () => {
  it('of a rectangle is a larger rectangle, with sharp corners or with quarters of circles', () => {
    const d = 1e-3;
    const larger = only(contourOffset(rectangle, d, sharp));
    expect(larger.contour.segments).toHaveLength(4);
    expect(contourArea(larger.contour)).toBeCloseTo(0.302 * 0.202, 15);
    const rounded = only(contourOffset(rectangle, d, round));
    expect(rounded.contour.segments.filter((s) => s.kind === 'arc').map((s) => s.radius)).toEqual([d, d, d, d]);
    expect(contourArea(rounded.contour)).toBeCloseTo(0.06 + 1 * d + Math.PI * d * d, 15);
    expect(contourLength(rounded.contour)).toBeCloseTo(1 + 2 * Math.PI * d, 14);
  });

  it('of a circle is a circle: larger around a pin, smaller in a hole, none in a hole no wider than the kerf', () => {
    const pin = { segments: [circleOf({ x: 1, y: 2 }, 0.01)] };
    const around = only(kerfOffset(pin, 1.6e-3, sharp)).contour.segments[0];
    expect(around?.kind === 'arc' && around.radius).toBeCloseTo(0.0108, 15);
    const within = only(kerfOffset(contourReverse(pin), 1.6e-3, sharp)).contour.segments[0];
    expect(within?.kind === 'arc' && within.radius).toBeCloseTo(0.0092, 15);
    expect(kerfOffset(contourReverse({ segments: [circleOf({ x: 1, y: 2 }, 8e-4)] }), 1.6e-3, sharp)).toEqual([]);
    expect(kerfOffset(contourReverse({ segments: [circleOf({ x: 1, y: 2 }, 7e-4)] }), 1.6e-3, sharp)).toEqual([]);
  });

  it('meets the corner that loops are put on, also where an edge is an arc', () => {
    const d = 8e-4;
    for (const bulge of [0, 0.2, -0.2]) {
      const contour = bulged(
        [
          { x: 0, y: 0 },
          { x: 0.1, y: 0 },
          { x: 0.06, y: 0.07 },
        ],
        [0, bulge, 0],
      );
      const { contour: path } = only(contourOffset(contour, d, sharp));
      for (const corner of contourCorners(contour, 0.2, 0)) {
        const expected = cornerOfPath(corner, 2 * d);
        const nearest = Math.min(...path.segments.map((s) => pointDistance(segmentStart(s), expected)));
        expect(nearest).toBeLessThan(1e-12);
      }
    }
  });

  it('runs round a tip that is sharper than the rule lets it go on to, unless something is put on it', () => {
    const spike = bulged([
      { x: 0, y: -2e-3 },
      { x: 0.1, y: 0 },
      { x: 0, y: 2e-3 },
    ]);
    const arcs = (rule: OffsetRule) =>
      only(contourOffset(spike, 8e-4, rule)).contour.segments.filter((s) => s.kind === 'arc').length;
    expect(arcs(sharp)).toBe(1);
    expect(arcs({ ...sharp, sharpAt: new Set([1]) })).toBe(0);
    expect(arcs(round)).toBe(3);
  });

  it('goes straight from edge to edge in an inside corner', () => {
    const angle = bulged([
      { x: 0, y: 0 },
      { x: 0.3, y: 0 },
      { x: 0.3, y: 0.1 },
      { x: 0.1, y: 0.1 },
      { x: 0.1, y: 0.3 },
      { x: 0, y: 0.3 },
    ]);
    const { contour, sources } = only(contourOffset(angle, 1e-3, sharp));
    expect(sources.map(({ index }) => index)).toHaveLength(6);
    const inside = contour.segments.map(segmentStart).find(({ x, y }) => x < 0.11 && x > 0.05 && y < 0.11 && y > 0.05);
    expect(inside && pointDistance(inside, { x: 0.101, y: 0.101 })).toBeLessThan(1e-15);
  });

  it('encloses L·d + π·d² more than a convex contour does when it runs round the corners', () => {
    const convex = fc
      .uniqueArray(fc.integer({ min: 0, max: 359 }), { minLength: 3, maxLength: 12 })
      .map((angles) => angles.sort((a, b) => a - b).map((a) => pointRotate({ x: 0.1, y: 0 }, (a * Math.PI) / 180)))
      .map((points) => bulged(points));
    fc.assert(
      fc.property(convex, distance, (contour, d) => {
        const grown = areaOf(contourOffset(contour, d, round)) - contourArea(contour);
        expect(Math.abs(grown - (contourLength(contour) * d + Math.PI * d * d))).toBeLessThan(1e-14);
      }),
      { numRuns: runs(50, 3000) },
    );
  });

  it('lies at the distance from the contour, nowhere nearer, and joins end to start', () => {
    fc.assert(
      fc.property(seed, kind, distance, fc.boolean(), (from, of, d, inward) => {
        const contour = randomContour(seeded(from), of);
        for (const loop of contourOffset(contour, inward ? -d : d, round)) {
          for (const p of places(loop.contour)) expect(Math.abs(distanceFrom(contour, p) - d)).toBeLessThan(1e-9);
          loop.contour.segments.forEach((segment, i, all) => {
            const next = all[(i + 1) % all.length] ?? segment;
            expect(pointDistance(segmentEnd(segment), segmentStart(next))).toBeLessThan(1e-9);
          });
        }
      }),
      { numRuns: runs(30, 5000) },
    );
  });

  it('with sharp corners is nowhere nearer than the distance either', () => {
    fc.assert(
      fc.property(seed, kind, distance, (from, of, d) => {
        const contour = randomContour(seeded(from), of);
        for (const loop of contourOffset(contour, d, sharp)) {
          for (const p of places(loop.contour)) expect(distanceFrom(contour, p)).toBeGreaterThan(d - 1e-9);
        }
      }),
      { numRuns: runs(25, 5000) },
    );
  });

  it('taken back by the same distance is the contour again where nothing vanished', () => {
    const far: OffsetRule = { outside: { kind: 'sharp', limit: 30 } };
    let compared = 0;
    fc.assert(
      fc.property(seed, fc.constantFrom('facets', 'rounded', 'squares'), distance, (from, of, d) => {
        const contour = randomContour(seeded(from), of);
        // an inside corner comes back sharp between straight edges only: beside an arc the way back goes straight on along its tangent
        const straight = of !== 'rounded';
        if (!straight && contourCorners(contour, 1e-3, 0).some(({ convex }) => !convex)) return;
        const [path, ...more] = contourOffset(contour, d, straight ? far : round);
        const beside = new Set(path?.sources.flatMap((s) => (s.kind === 'edge' ? s.index : [])));
        if (!path || more.length > 0 || beside.size < contour.segments.length) return;
        compared++;
        const back = only(contourOffset(path.contour, -d, straight ? far : round));
        for (const p of places(contour)) expect(distanceFrom(back.contour, p)).toBeLessThan(1e-9);
        for (const p of places(back.contour)) expect(distanceFrom(contour, p)).toBeLessThan(1e-9);
      }),
      { numRuns: runs(40, 3000) },
    );
    expect(compared).toBeGreaterThan(5);
  });

  it('is the same for a part that is moved, turned, mirrored, or drawn a million times larger or smaller', () => {
    fc.assert(
      fc.property(seed, kind, distance, fc.double({ min: -7, max: 7, noNaN: true }), (from, of, d, turn) => {
        const contour = randomContour(seeded(from), of);
        const rule = from % 2 === 0 ? round : sharp;
        const expected = contourOffset(contour, d, rule);
        const area = areaOf(expected);
        const moved = contourShift(contourRotate(contour, turn), { x: 3.1, y: -1.7 });
        const same = contourOffset(moved, d, rule);
        expect(same).toHaveLength(expected.length);
        expect(Math.abs(areaOf(same) - area)).toBeLessThan(1e-12);
        const over = contourOffset(mirrored(contour), d, rule);
        expect(over).toHaveLength(expected.length);
        expect(Math.abs(areaOf(over) - area)).toBeLessThan(1e-12);
        for (const by of [1e-6, 1e6]) {
          const other = contourOffset(scaled(contour, by), d * by, rule);
          expect(other).toHaveLength(expected.length);
          expect(Math.abs(areaOf(other) / (by * by) - area)).toBeLessThan(1e-12);
        }
      }),
      { numRuns: runs(25, 2000) },
    );
  });

  it('refuses what is no contour', () => {
    expect(() => contourOffset({ segments: [] }, 1e-3, round)).toThrow(RangeError);
    expect(() => contourOffset(rectangle, Number.NaN, round)).toThrow(RangeError);
    expect(() => contourOffset({ segments: rectangle.segments.slice(0, 3) }, 1e-3, round)).toThrow(/open by 0.2/);
    expect(() => kerfOffset(rectangle, 0, round)).toThrow(RangeError);
  });
});

describe('what is narrower than the kerf', () => {
  const kerf = 1.6e-3;
  const narrowOf = (contour: Contour) => narrowFeatures(contour, kerf, kerfOffset(contour, kerf, sharp));
  const slot = (width: number, bulge = 0, flare = 0): Contour =>
    bulged(
      [
        { x: 0, y: 0 },
        { x: 0.3, y: 0 },
        { x: 0.3, y: 0.2 },
        { x: 0.15 + width / 2 + flare, y: 0.2 },
        { x: 0.15 + width / 2, y: 0.1 },
        { x: 0.15 - width / 2, y: 0.1 },
        { x: 0.15 - width / 2 - flare, y: 0.2 },
        { x: 0, y: 0.2 },
      ],
      [0, 0, 0, 0, -bulge],
    );

  it('is a slot, named with its width and a place between its walls, whatever its end', () => {
    for (const bulge of [0, 1]) {
      const found = narrowOf(slot(1.2e-3, bulge));
      expect(found.map(({ kind: what }) => what)).toEqual(['gap']);
      const [gap] = found;
      expect(gap?.kind === 'gap' && gap.width).toBeCloseTo(1.2e-3, 12);
      expect(gap && pointDistance(gap.at, { x: 0.15, y: 0.15 })).toBeLessThan(1e-9);
    }
    expect(narrowOf(slot(1.7e-3, 1))).toEqual([]);
    expect(narrowOf(slot(kerf))).toHaveLength(1);
  });

  it('is the end of a slot that narrows, with how far before it the cut ends', () => {
    const [end, ...more] = narrowOf(slot(5e-4, 0, 3e-3));
    expect(more).toEqual([]);
    // the free width grows by 6 mm over 100 mm; between slanted walls the kerf fits where it is a little wider than itself
    const slope = Math.hypot(1, 0.03);
    const depth = (kerf / 2) * slope - 2.5e-4;
    expect(end?.kind === 'end' && end.unreached).toBeCloseTo(depth / 0.03 - kerf / 2, 9);
  });

  it('is a hole, told by the largest circle that fits into it', () => {
    const [bore] = narrowOf(contourReverse({ segments: [circleOf({ x: 0.2, y: 0.1 }, 6e-4)] }));
    expect(bore?.kind === 'hole' && bore.width).toBeCloseTo(1.2e-3, 9);
    expect(bore && pointDistance(bore.at, { x: 0.2, y: 0.1 })).toBeLessThan(1e-8);
    const [slit] = narrowOf(
      contourReverse(
        bulged([
          { x: 0, y: 0 },
          { x: 0.05, y: 0 },
          { x: 0.05, y: 1e-3 },
          { x: 0, y: 1e-3 },
        ]),
      ),
    );
    expect(slit?.kind === 'hole' && slit.width).toBeCloseTo(1e-3, 6);
  });

  it('is a neck that splits a hole in two: both halves keep a path of their own', () => {
    const dumbbell = contourReverse(
      bulged([
        { x: 0, y: 0 },
        { x: 0.1, y: 0 },
        { x: 0.1, y: 0.04 },
        { x: 0.2, y: 0.04 },
        { x: 0.2, y: 0 },
        { x: 0.3, y: 0 },
        { x: 0.3, y: 0.1 },
        { x: 0.2, y: 0.1 },
        { x: 0.2, y: 0.0413 },
        { x: 0.1, y: 0.0413 },
        { x: 0.1, y: 0.1 },
        { x: 0, y: 0.1 },
      ]),
    );
    expect(kerfOffset(dumbbell, kerf, sharp)).toHaveLength(2);
    const [neck, ...more] = narrowOf(dumbbell);
    expect(more).toEqual([]);
    expect(neck?.kind === 'gap' && neck.width).toBeCloseTo(1.3e-3, 12);
  });

  it('is no inside corner like any other', () => {
    const random = seeded(7);
    expect(narrowOf(rectangle)).toEqual([]);
    for (let i = 0; i < 20; i++) {
      const wide = randomContour(random, 'squares');
      expect(narrowOf(wide)).toEqual([]);
    }
  });
});

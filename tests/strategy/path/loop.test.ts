import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type {
  Contour,
  FieldLeadIn,
  FieldPlate,
  LoopSurroundings,
  Point,
  Segment,
} from '../../../strategy/path/index.ts';
import {
  arcOf,
  contourArea,
  contourContains,
  contourCorners,
  contourReverse,
  contourShift,
  cornerInward,
  cornerOfPath,
  flatExtensions,
  flatLoopAt,
  flatLoopDepth,
  lineBetween,
  loopAt,
  loopExtension,
  loopFits,
  loopRadii,
  loopSlug,
  obstacleField,
  pathLength,
  pointAdd,
  pointDistance,
  pointDot,
  pointRotate,
  pointScale,
  pointSubtract,
  segmentDistance,
  segmentEnd,
  segmentPointAt,
  segmentStart,
  segmentTangentAt,
} from '../../../strategy/path/index.ts';
import { areaInside, sweptOverlap } from '../../support/swept.ts';
import { runs } from '../../support/runs.ts';

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

type Change = Partial<LoopSurroundings> & { plate?: FieldPlate; leadIns?: readonly FieldLeadIn[] };

const around = (contours: readonly Contour[], { plate, leadIns, ...change }: Change = {}): LoopSurroundings => ({
  field: obstacleField(
    contours.map((contour, i) => ({ id: String(i + 1), name: `contour ${i + 1}`, contour })),
    { ...(plate ? { plate } : {}), ...(leadIns ? { leadIns } : {}) },
  ),
  contourId: '1',
  kerfWidth: kerf,
  clearance,
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

describe('a flat loop', () => {
  const angle = fc.double({ min: 0.3, max: 2.6, noNaN: true });
  const radius = fc.double({ min: 0.5e-3, max: 3e-3, noNaN: true });
  /** How much longer its extension is than the tangent loop's of the same arc. */
  const longer = fc.double({ min: 1.05, max: 6, noNaN: true });
  const flat = (beta: number, r: number, by: number) => flatLoopAt(tip(beta), r, loopExtension(r, beta) * by);

  it('runs from the corner back to it without a kink, in along the first and out along the second edge', () => {
    fc.assert(
      fc.property(angle, radius, longer, (beta, r, by) => {
        const { segments } = flat(beta, r, by);
        const ring = [...segments];
        ring.forEach((segment, i) => {
          const next = ring[i + 1];
          if (!next) return;
          expect(pointDistance(segmentEnd(segment), segmentStart(next))).toBeLessThan(1e-12);
          expect(pointDistance(segmentTangentAt(segment, 1), segmentTangentAt(next, 0))).toBeLessThan(1e-8);
        });
        expect(pointDistance(segmentStart(segments[0]), { x: 0, y: 0 })).toBe(0);
        expect(pointDistance(segmentEnd(segments[4]), { x: 0, y: 0 })).toBeLessThan(1e-12);
        expect(pointDistance(segmentTangentAt(segments[0], 0), tip(beta).incoming)).toBeLessThan(1e-9);
        expect(pointDistance(segmentTangentAt(segments[4], 1), tip(beta).outgoing)).toBeLessThan(1e-9);
      }),
    );
  });

  it('is as long as its segments, reaches as far and stands as deep as its farthest places', () => {
    fc.assert(
      fc.property(angle, radius, longer, (beta, r, by) => {
        const loop = flat(beta, r, by);
        expect(loop.length).toBeCloseTo(pathLength(loop.segments), 12);
        const places = loop.segments.flatMap((segment) =>
          Array.from({ length: 801 }, (_, i) => segmentPointAt(segment, i / 800)),
        );
        expect(Math.max(...places.map((p) => pointDistance(p, { x: 0, y: 0 })))).toBeCloseTo(loop.reach, 6);
        const inward = cornerInward(tip(beta));
        const depth = Math.max(...places.map((p) => -pointDot(p, inward)));
        expect(depth).toBeCloseTo(flatLoopDepth(loop.radius, loop.extension, beta), 8);
      }),
    );
  });

  it('is the tangent loop where its straight has no length, and at the same extension shorter and less far from the corner', () => {
    fc.assert(
      fc.property(angle, radius, longer, (beta, r, by) => {
        const e = loopExtension(r, beta) * by;
        const [flattened, whole] = [flatLoopAt(tip(beta), r, e), loopAt(tip(beta), e * Math.tan(beta / 2))];
        expect(flattened.length).toBeLessThan(whole.length);
        expect(flattened.reach).toBeLessThan(whole.reach);
        const nearly = flatLoopAt(tip(beta), r, loopExtension(r, beta) * (1 + 1e-9));
        expect(nearly.reach).toBeCloseTo(loopAt(tip(beta), r).reach, 9);
        expect(nearly.length).toBeCloseTo(loopAt(tip(beta), r).length, 9);
      }),
    );
  });

  it('lies on the scrap side: it never enters the wedge of the part, not even with half its kerf', () => {
    fc.assert(
      fc.property(angle, radius, longer, (beta, r, by) => {
        const corner = tip(beta);
        // the finished tip is where the path is half a kerf off both edges
        const finished = pointScale(cornerInward(corner), kerf / 2 / Math.sin(beta / 2));
        const wedge = [
          lineBetween(finished, pointSubtract(finished, pointScale(corner.incoming, 1))),
          lineBetween(finished, pointAdd(finished, pointScale(corner.outgoing, 1))),
        ];
        for (const segment of flat(beta, r, by).segments) {
          for (const edge of wedge) expect(segmentDistance(segment, edge).distance).toBeGreaterThan(kerf / 2 - 1e-9);
        }
      }),
    );
  });

  it('cuts out what its path encloses less half a kerf all round, as an independent offset has it', () => {
    fc.assert(
      fc.property(angle, fc.double({ min: 0.2e-3, max: 3e-3, noNaN: true }), longer, (beta, r, by) => {
        const corner = tip(beta);
        const loop = flatLoopAt(corner, r, loopExtension(r, beta) * by);
        const slug = loopSlug(corner, loop, kerf);
        const steps = { line: 1, arc: 50 };
        const outline = loop.segments.flatMap((s) =>
          Array.from({ length: steps[s.kind] }, (_, i) => segmentPointAt(s, i / steps[s.kind])),
        );
        const expected = areaInside(outline, kerf / 2);
        if (expected < 1e-9) return;
        expect(Math.abs((slug?.area ?? 0) - expected)).toBeLessThan(2e-3 * expected + 1e-10);
      }),
      { numRuns: runs(40, 400) },
    );
  });

  it('has a slug whose greatest width is that between its farthest places', () => {
    fc.assert(
      fc.property(angle, radius, longer, fc.boolean(), (beta, r, by, flattened) => {
        const corner = tip(beta);
        const slug = loopSlug(corner, flattened ? flat(beta, r, by) : loopAt(corner, r), kerf);
        if (!slug) return;
        const places = slug.contour.segments.flatMap((s) =>
          Array.from({ length: 60 }, (_, i) => segmentPointAt(s, i / 60)),
        );
        const widest = Math.max(...places.flatMap((a) => places.map((b) => pointDistance(a, b))));
        expect(widest).toBeLessThanOrEqual(slug.extent * (1 + 1e-9));
        expect(widest).toBeGreaterThan(slug.extent * 0.995);
      }),
      { numRuns: runs(30, 300) },
    );
  });

  it('is refused where its arcs alone would reach the extension', () => {
    expect(() => flatLoopAt(tip(Math.PI / 2), 2e-3, 2e-3)).toThrow(/extension 0.002 m/);
    expect(() => flatLoopAt(tip(Math.PI / 2), 0, 2e-3)).toThrow(/radius 0 m/);
  });
});

describe('the sizes of a flat loop', () => {
  const bounds = { radius: 5e-3, minExtension: 2e-3, maxExtension: 3e-2, smallestArc: 1e-3 };

  it('begin with a path as long as the designed loop’s and end at the least extension, on arcs as small as the machine follows', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.4, max: 2.4, noNaN: true }), (angle) => {
        const found = flatExtensions(angle, { ...bounds, maxExtension: 0.1 });
        const sizes = loopRadii(angle, { ...bounds, maxExtension: 0.1 });
        if (found.kind !== 'extensions' || sizes.kind !== 'radii') return;
        expect(found.radius).toBe(1e-3);
        const [first, last] = [found.extensions[0] ?? NaN, found.extensions.at(-1) ?? NaN];
        const [flattened, whole] = [flatLoopAt(tip(angle), 1e-3, first), loopAt(tip(angle), sizes.radii[0] ?? NaN)];
        expect(flattened.length).toBeCloseTo(whole.length, 12);
        expect(flatLoopDepth(1e-3, first, angle)).toBeLessThan(whole.reach);
        expect(last).toBeCloseTo(Math.max(2e-3, 1.05 * loopExtension(1e-3, angle)), 12);
      }),
    );
    const bounded = flatExtensions(Math.PI / 2, { ...bounds, maxExtension: 6e-3 });
    expect(bounded.kind === 'extensions' && bounded.extensions[0]).toBeCloseTo(6e-3, 12);
  });

  it('are none where the designed loop has the smallest arc already', () => {
    expect(flatExtensions(Math.PI / 2, { ...bounds, radius: 1e-3, minExtension: 0.5e-3 })).toMatchObject({
      kind: 'none',
    });
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

  it('is no in an opening of a remnant', () => {
    const edge = polygon([
      { x: -0.05, y: -0.05 },
      { x: 0.3, y: -0.05 },
      { x: 0.3, y: 0.3 },
      { x: -0.05, y: 0.3 },
    ]);
    const opening = (gap: number) => contourReverse(contourShift(square, { x: 0.1 + gap, y: 0.05 }));
    const needed = beyond + kerf / 2 + clearance;
    const plate = (gap: number) => ({ edge, openings: [opening(gap)] });
    expect(loopFits(loop, around([square], { plate: plate(needed + 1e-5) }))).toEqual({ kind: 'fits' });
    expect(loopFits(loop, around([square], { plate: plate(needed - 1e-5) }))).toMatchObject({ what: 'plate' });
    // the corner itself in the opening
    expect(loopFits(loop, around([square], { plate: plate(-0.06) }))).toMatchObject({ what: 'plate' });
  });

  it('is no where another loop lies already: its slug has dropped out, or too little stays between them', () => {
    const other = { name: 'the loop of corner c2-0', loop };
    const same = loopFits(loop, around([square], { loops: [other] }));
    expect(same).toMatchObject({ kind: 'none', what: 'dropped' });
    expect(same.kind === 'none' && same.why).toContain(
      'the loop of corner c2-0 is cut before and its slug has dropped',
    );
    // beside each other, with less than the clearance between the kerfs
    const shifted = loopAt({ ...corner, point: { x: 0.1 + kerf / 2 + 1e-2 + kerf + 1e-3, y: 0.1 + kerf / 2 } }, 5e-3);
    const near = loopFits(loop, around([square], { loops: [{ name: 'the loop of corner c2-0', loop: shifted }] }));
    expect(near).toMatchObject({ kind: 'none', what: 'loop' });
    expect(near.kind === 'none' && near.why).toContain('would stay between them');
  });

  it('is no at a lead-in nearer than kerf and clearance, and at a crater nearer than half a kerf and clearance', () => {
    const neighbour = contourShift(square, { x: 0.2, y: 0 });
    const leadIn = (gap: number): FieldLeadIn => ({
      contourId: '2',
      segments: [lineBetween({ x: 0.1 + beyond + gap, y: 0.12 }, { x: 0.1 + beyond + gap, y: 0.1 })],
    });
    const at = (gap: number) => loopFits(loop, around([square, neighbour], { leadIns: [leadIn(gap)] }));
    expect(at(kerf + clearance + 1e-4)).toEqual({ kind: 'fits' });
    const blocked = at(kerf + clearance - 1e-4);
    expect(blocked).toMatchObject({ kind: 'none', what: 'lead-in' });
    expect(blocked.kind === 'none' && blocked.why).toContain('the lead-in of contour 2 is in the way');

    const crater = (gap: number): FieldLeadIn => ({
      contourId: '2',
      segments: [],
      crater: { at: { x: 0.1 + beyond + gap, y: 0.1 + kerf / 2 + 5e-3 }, radius: 3e-3 },
    });
    const pierced = (gap: number) => loopFits(loop, around([square, neighbour], { leadIns: [crater(gap)] }));
    const free = 3e-3 + kerf / 2 + clearance;
    expect(pierced(free + 1e-6)).toEqual({ kind: 'fits' });
    expect(pierced(free - 1e-6)).toMatchObject({
      what: 'lead-in',
      why: expect.stringContaining('the pierce of contour 2') as string,
    });
  });

  it('is no over what was cut before: a part that has dropped out, and a hole that took the steel around the corner with it', () => {
    const neighbour = contourShift(square, { x: 0.1 + 5e-3, y: 0.05 });
    // the own contour is cut second: the neighbour is gone
    const gone = loopFits(loop, around([neighbour, square], { contourId: '2' }));
    expect(gone).toMatchObject({ kind: 'none', what: 'dropped' });
    expect(gone.kind === 'none' && gone.why).toContain('contour 1 is cut before and has dropped out');
    // still to be cut, it is only in the way
    expect(loopFits(loop, around([square, neighbour]))).toMatchObject({ what: 'contour' });

    const frame = polygon([
      { x: -0.2, y: -0.2 },
      { x: 0.3, y: -0.2 },
      { x: 0.3, y: 0.3 },
      { x: -0.2, y: 0.3 },
    ]);
    const hole = contourReverse(
      polygon([
        { x: -0.05, y: -0.05 },
        { x: 0.15, y: -0.05 },
        { x: 0.15, y: 0.15 },
        { x: -0.05, y: 0.15 },
      ]),
    );
    expect(loopFits(loop, around([square, hole, frame]))).toEqual({ kind: 'fits' });
    const late = loopFits(loop, around([hole, square, frame], { contourId: '2' }));
    expect(late).toMatchObject({ kind: 'none', what: 'dropped' });
    expect(late.kind === 'none' && late.why).toContain('contour 1, around this corner, is cut before');
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

  it('is never yes for a loop whose kerf cuts a part, by the swept kerf of an independent polygon package', () => {
    const spokes = fc.array(fc.double({ min: 0.02, max: 0.1, noNaN: true }), { minLength: 4, maxLength: 12 });
    let [fitting, flats] = [0, 0];
    fc.assert(
      fc.property(
        spokes,
        spokes,
        fc.double({ min: 0.08, max: 0.25, noNaN: true }),
        fc.double({ min: 1e-3, max: 8e-3, noNaN: true }),
        fc.boolean(),
        (a, b, apart, size, flattened) => {
          const shape = (radii: number[]) =>
            polygon(radii.map((radius, i) => pointRotate({ x: radius, y: 0 }, (2 * Math.PI * i) / radii.length)));
          const parts = [shape(a), contourShift(shape(b), { x: apart, y: 0 })];
          const [own] = parts;
          if (!own) return;
          const surroundings = around(parts);
          for (const found of contourCorners(own)) {
            if (!found.convex || found.angle > 2.2) continue;
            const onPath = { ...found, point: cornerOfPath(found, kerf) };
            const longest = 1.05 * loopExtension(1e-3, found.angle);
            const candidate = flattened ? flatLoopAt(onPath, 1e-3, longest + size) : loopAt(onPath, size);
            if (loopFits(candidate, surroundings).kind === 'none') continue;
            fitting++;
            if (flattened) flats++;
            // the corner's own tip touches the kerf along both edges: what overlaps is rounding of the sweep
            for (const part of parts) expect(sweptOverlap(candidate.segments, kerf, part)).toBeLessThan(1e-10);
          }
        },
      ),
      { numRuns: runs(120, 1500), seed: 7 },
    );
    // the property says something only when loops were found
    expect(fitting).toBeGreaterThan(100);
    expect(flats).toBeGreaterThan(30);
  });
});

describe('the judgement of a loop', () => {
  type Move = { readonly of: (p: Point) => Point; readonly scale: number; readonly mirrored: boolean };
  const segmentMoved = (segment: Segment, { of, scale, mirrored }: Move): Segment => {
    if (segment.kind === 'line') return lineBetween(of(segment.start), of(segment.end));
    const centre = of(segment.centre);
    const start = of(segmentStart(segment));
    const angle = Math.atan2(start.y - centre.y, start.x - centre.x);
    return arcOf(centre, segment.radius * scale, angle, mirrored ? -segment.sweep : segment.sweep);
  };
  const contourMoved = (contour: Contour, move: Move): Contour => {
    const segments = contour.segments.map((segment) => segmentMoved(segment, move));
    return move.mirrored ? contourReverse({ segments }) : { segments };
  };
  const part = polygon([
    { x: 0, y: 0 },
    { x: 0.1, y: -0.01 },
    { x: 0.06, y: 0.05 },
    { x: 0.08, y: 0.1 },
    { x: -0.01, y: 0.08 },
  ]);
  const neighbour: Contour = {
    segments: [
      lineBetween({ x: 0.115, y: -0.03 }, { x: 0.2, y: -0.03 }),
      lineBetween({ x: 0.2, y: -0.03 }, { x: 0.2, y: 0.1 }),
      lineBetween({ x: 0.2, y: 0.1 }, { x: 0.115, y: 0.1 }),
      arcOf(
        { x: 0.2775, y: 0.035 },
        Math.hypot(0.1625, 0.065),
        Math.PI - Math.atan2(0.065, 0.1625),
        2 * Math.atan2(0.065, 0.1625),
      ),
    ],
  };
  /** For every tip and some sizes whether a loop of one arc and a flat one fit, in the order of places. */
  const judged = (move: Move): string[] => {
    const { scale } = move;
    const [own, other] = [contourMoved(part, move), contourMoved(neighbour, move)];
    const surroundings = around([own, other], { kerfWidth: kerf * scale, clearance: clearance * scale });
    const tips = contourCorners(own, undefined, 1.5e-3 * scale).filter(({ convex, angle }) => convex && angle < 2.2);
    return tips
      .map((corner) => {
        const onPath = { ...corner, point: cornerOfPath(corner, kerf * scale) };
        const fits = [2, 3, 4, 5, 6, 8, 10].flatMap((mm) => {
          const flat = flatLoopAt(onPath, 1e-3 * scale, loopExtension(1e-3 * scale, corner.angle) + mm * 1e-3 * scale);
          return [loopAt(onPath, mm * 1e-3 * scale), flat].map((loop) => loopFits(loop, surroundings).kind);
        });
        return `${(corner.angle * 1e6).toFixed(0)}: ${fits.join(' ')}`;
      })
      .sort();
  };
  const still: Move = { of: (p) => p, scale: 1, mirrored: false };

  it('is the same wherever the plate lies, however it is turned, mirrored, and however large it is', () => {
    const expected = judged(still);
    // both answers are among them, or the law says nothing
    expect(expected.join(' ')).toContain('none');
    expect(expected.join(' ')).toContain('fits');
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        fc.boolean(),
        fc.constantFrom(1e-6, 1e-3, 1, 1e3, 1e6),
        (turn, by, mirrored, scale) => {
          const of = (p: Point): Point => {
            const turned = pointRotate({ x: mirrored ? -p.x : p.x, y: p.y }, turn);
            return { x: (turned.x + by) * scale, y: (turned.y - by) * scale };
          };
          expect(judged({ of, scale, mirrored })).toEqual(expected);
        },
      ),
      { numRuns: runs(30, 300) },
    );
  });
});

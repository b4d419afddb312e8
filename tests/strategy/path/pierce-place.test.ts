import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { CutContour, CutPathRequest, LeadInRule } from '../../../strategy/path/compensation/index.ts';
import {
  cutPathOf,
  largestCircleInside,
  leadInLength,
  straightLeadIn,
  tangentLeadIn,
} from '../../../strategy/path/compensation/index.ts';
import type { CutPath, CutRun } from '../../../strategy/path/cut-path.ts';
import type { Contour, Point, Segment } from '../../../strategy/path/index.ts';
import {
  circleOf,
  contourBox,
  contourContains,
  contourReverse,
  contourShift,
  lineBetween,
  pointAdd,
  pointDistance,
  pointDot,
  segmentDistance,
  segmentEnd,
  segmentPointAt,
  segmentPointDistance,
  segmentStart,
  segmentTangentAt,
} from '../../../strategy/path/index.ts';
import { bulged, randomContour, randomKinds, seeded } from '../../support/random-contours.ts';
import { runs } from '../../support/runs.ts';

const kerf = 1.6e-3;
const leadIn: LeadInRule = { shape: { kind: 'line' }, needed: 8e-3, craterRadius: 4e-3, clearance: 2e-3 };
const box = (width: number, height: number, at: Point = { x: 0, y: 0 }): Contour =>
  contourShift(
    bulged([
      { x: 0, y: 0 },
      { x: width, y: 0 },
      { x: width, y: height },
      { x: 0, y: height },
    ]),
    at,
  );
const outer = (id: string, contour: Contour): CutContour => ({
  id,
  name: `part ${id}`,
  contour,
  role: 'outer',
  parent: null,
});
const hole = (id: string, contour: Contour): CutContour => ({
  id,
  name: `hole ${id}`,
  contour: contourReverse(contour),
  role: 'hole',
  parent: null,
});
const planOf = (contours: readonly CutContour[], change: Partial<CutPathRequest> = {}) =>
  cutPathOf({
    contours,
    inserts: [],
    kerfWidth: kerf,
    outside: { kind: 'sharp', limit: 10 },
    leadIn,
    plate: null,
    ...change,
  });
const firstRun = ({ runs: all }: CutPath): CutRun => {
  const [run] = all;
  if (!run) throw new Error('nothing is cut');
  return run;
};
const leadInOf = (run: CutRun): readonly Segment[] => {
  const [first] = run.pieces;
  return first?.kind === 'lead-in' ? first.segments : [];
};
const from = (segments: readonly Segment[], p: Point) =>
  segments.reduce((least, s) => Math.min(least, segmentPointDistance(s, p)), Infinity);

describe('a lead-in', () => {
  const place = { segment: lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0 }), share: 0.5 };

  it('comes square or slanted from a pierce at the distance beside the path', () => {
    for (const slant of [0, 0.5, -0.5]) {
      const { pierce, segments } = straightLeadIn(place, 8e-3, slant);
      expect(pierce.y).toBeCloseTo(-8e-3, 15);
      expect(pierce.x).toBeCloseTo(0.05 - 8e-3 * Math.tan(slant), 15);
      expect(leadInLength({ pierce, segments })).toBeCloseTo(8e-3 / Math.cos(slant), 15);
      expect(pointDistance(segmentEnd(segments[0] ?? place.segment), { x: 0.05, y: 0 })).toBeLessThan(1e-15);
    }
    expect(() => straightLeadIn(place, 0, 0)).toThrow(RangeError);
    expect(() => straightLeadIn(place, 1e-3, 2)).toThrow(RangeError);
  });

  it('with an arc runs into the path without a kink', () => {
    const { pierce, segments } = tangentLeadIn(place, 8e-3, 3e-3);
    const [line, arc] = segments;
    if (line?.kind !== 'line' || arc?.kind !== 'arc') throw new Error('line and arc expected');
    expect(pierce.y).toBeCloseTo(-8e-3, 15);
    expect(pointDistance(line.end, segmentStart(arc))).toBeLessThan(1e-15);
    expect(pointDot(segmentTangentAt(line, 1), segmentTangentAt(arc, 0))).toBeCloseTo(1, 12);
    expect(pointDistance(segmentEnd(arc), { x: 0.05, y: 0 })).toBeLessThan(1e-15);
    expect(pointDot(segmentTangentAt(arc, 1), { x: 1, y: 0 })).toBeCloseTo(1, 12);
    // no room for the line: the arc alone
    expect(tangentLeadIn(place, 2e-3, 3e-3).segments).toHaveLength(1);
  });
});

describe('the place of a pierce', () => {
  it('lies in the middle of the longest edge, as far from the path as the pierce needs', () => {
    const run = firstRun(planOf([outer('1', box(0.3, 0.2))]).path);
    expect(run.pierce.x).toBeCloseTo(0.15, 12);
    expect(run.pierce.y).toBeCloseTo(-(kerf / 2 + 8e-3), 12);
  });

  it('is where the programmer wants it when it fits there', () => {
    const run = firstRun(planOf([outer('1', box(0.3, 0.2))], { starts: { 1: { x: 0.31, y: 0.03 } } }).path);
    expect(run.pierce.x).toBeCloseTo(0.3 + kerf / 2 + 8e-3, 12);
    expect(Math.abs(run.pierce.y - 0.03)).toBeLessThan(2e-3);
  });

  it('moves to another edge when the plate ends beside the first', () => {
    const plate = { minX: -0.05, minY: -5e-3, maxX: 0.35, maxY: 0.25 };
    const run = firstRun(planOf([outer('1', box(0.3, 0.2))], { plate }).path);
    expect(run.pierce.y).toBeGreaterThan(0.2);
  });

  it('is refused with the thing in the way when there is nowhere to go', () => {
    const tight = { minX: -5e-3, minY: -5e-3, maxX: 0.305, maxY: 0.205 };
    const { path, problems } = planOf([outer('1', box(0.3, 0.2))], { plate: tight });
    expect(path.runs).toEqual([]);
    expect(problems.map(({ kind, leftOut, why }) => ({ kind, leftOut, why }))).toEqual([
      {
        kind: 'pierce',
        leftOut: true,
        why: "part 1 has no room to be pierced: the plate's edge is nearer than the crater and 2.0 mm",
      },
    ]);
    const walls = [
      outer('2', box(0.5, 0.02, { x: -0.1, y: -0.025 })),
      outer('3', box(0.5, 0.02, { x: -0.1, y: 0.205 })),
      outer('4', box(0.02, 0.2, { x: -0.025, y: 0 })),
      outer('5', box(0.02, 0.2, { x: 0.305, y: 0 })),
    ];
    const among = planOf([outer('1', box(0.3, 0.2)), ...walls]);
    const refused = among.problems.find(({ contourId }) => contourId === '1');
    expect(refused?.why).toMatch(/^part 1 has no room to be pierced: part [2-5] is in the way/);
    expect(among.path.runs.map(({ name }) => name)).toEqual(['part 2', 'part 3', 'part 4', 'part 5']);
  });

  it('keeps off what was cut out of a remnant before', () => {
    const opening = box(0.28, 0.03, { x: 0.01, y: -0.04 });
    const plate = { edge: box(0.5, 0.4, { x: -0.1, y: -0.1 }), openings: [opening] };
    const run = firstRun(planOf([outer('1', box(0.3, 0.2))], { plate }).path);
    expect(contourContains(opening, run.pierce)).toBe(false);
    expect(from(opening.segments, run.pierce)).toBeGreaterThanOrEqual(6e-3 - 1e-9);
  });

  it('comes nearer in a hole too small for what is needed, and says so, but never into the crater', () => {
    const { path, problems } = planOf([hole('3', { segments: [circleOf({ x: 0, y: 0 }, 7e-3)] })]);
    const run = firstRun(path);
    const distance = 7e-3 - kerf / 2 - pointDistance(run.pierce, { x: 0, y: 0 });
    expect(distance).toBeGreaterThan(4e-3);
    expect(distance).toBeLessThan(7e-3 - kerf / 2);
    expect(problems.map(({ kind }) => kind)).toEqual(['lead-in']);
    expect(problems[0]?.why).toMatch(
      /^the lead-in of hole 3 is \d\.\d mm instead of 8\.0 mm: the hole has no room for more$/,
    );
    const small = planOf([hole('3', { segments: [circleOf({ x: 0, y: 0 }, 4e-3)] })]);
    expect(small.path.runs).toEqual([]);
    expect(small.problems[0]?.why).toBe(
      'hole 3 is too small to be pierced in: no place in it is farther than 3.2 mm from the cut, and the crater is 4.0 mm in radius',
    );
  });

  it('keeps the full lead-in and its arc in a hole that is wide enough', () => {
    const rule: LeadInRule = { ...leadIn, shape: { kind: 'line-and-arc', radius: 3e-3 } };
    const { path, problems } = planOf([hole('3', { segments: [circleOf({ x: 0, y: 0 }, 0.03)] })], { leadIn: rule });
    const run = firstRun(path);
    expect(problems).toEqual([]);
    expect(0.03 - kerf / 2 - pointDistance(run.pierce, { x: 0, y: 0 })).toBeCloseTo(8e-3, 12);
    expect(leadInOf(run).map(({ kind }) => kind)).toEqual(['line', 'arc']);
  });

  it('keeps clear of finished edges, other cuts, craters and the plate’s edge, whatever the parts', () => {
    let cut = 0;
    const rule = fc.record({ arc: fc.boolean(), needed: fc.double({ min: 3e-3, max: 1.2e-2, noNaN: true }) });
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 1e9 }), rule, (seed, { arc, needed }) => {
        const random = seeded(seed);
        const contours = Array.from({ length: 4 }, (_, i) => {
          const contour = randomContour(random, randomKinds[Math.floor(random() * randomKinds.length)] ?? 'star');
          const { minX, minY } = contourBox(contour);
          return outer(
            String(i + 1),
            contourShift(contour, { x: (i % 2) * 0.23 - minX, y: Math.floor(i / 2) * 0.23 - minY }),
          );
        });
        const plate = { minX: -0.02, minY: -0.02, maxX: 0.48, maxY: 0.48 };
        const shape = arc ? ({ kind: 'line-and-arc', radius: 3e-3 } as const) : ({ kind: 'line' } as const);
        const asked: LeadInRule = { shape, needed, craterRadius: 3e-3, clearance: 2e-3 };
        const plan = planOf(contours, { plate, leadIn: asked });
        expect(plan).toEqual(planOf(contours, { plate, leadIn: asked }));
        const edges = contours.flatMap(({ id, contour }) => contour.segments.map((segment) => ({ id, segment })));
        cut += plan.path.runs.length;
        plan.path.runs.forEach((run, i) => {
          const own = run.pieces.flatMap((piece) => (piece.kind === 'contour' ? piece.segments : []));
          const closedIn = run.name.includes('piece');
          const least = closedIn ? 3e-3 : Math.max(needed, 3e-3);
          expect(from(own, run.pierce)).toBeGreaterThanOrEqual(least - 1e-8);
          const lead = leadInOf(run);
          expect(pointDistance(segmentStart(lead[0] ?? own[0] ?? never()), run.pierce)).toBeLessThan(1e-12);
          for (const segment of lead) {
            for (const edge of edges) {
              const room = segmentDistance(segment, edge.segment).distance;
              expect(room).toBeGreaterThan(edge.id === run.contourId ? 0.97 * (kerf / 2) : 1.5 * kerf + 2e-3 - 1e-8);
            }
            for (const p of [0, 0.5, 1].map((t) => segmentPointAt(segment, t))) {
              expect(Math.min(p.x - plate.minX, plate.maxX - p.x, p.y - plate.minY, plate.maxY - p.y)).toBeGreaterThan(
                kerf / 2 + 2e-3 - 1e-8,
              );
            }
          }
          plan.path.runs.slice(0, i).forEach((other) => {
            expect(pointDistance(other.pierce, run.pierce)).toBeGreaterThanOrEqual(8e-3 - 1e-8);
          });
        });
      }),
      { numRuns: runs(12, 600) },
    );
    expect(cut).toBeGreaterThan(20);
  });
});

function never(): never {
  throw new Error('a run without segments');
}

describe('the largest circle in a contour', () => {
  it('is the one that touches three sides of a triangle, all of a circle, or two walls of a slit', () => {
    const triangle = bulged([
      { x: 0, y: 0 },
      { x: 0.04, y: 0 },
      { x: 0, y: 0.03 },
    ]);
    const inside = largestCircleInside(triangle, 1e-4);
    expect(inside.radius).toBeCloseTo(0.01, 6);
    expect(pointDistance(inside.centre, { x: 0.01, y: 0.01 })).toBeLessThan(1e-5);
    const centre = { x: 3, y: -2 };
    const whole = largestCircleInside({ segments: [circleOf(centre, 0.02)] }, 1e-4);
    expect(whole.radius).toBeCloseTo(0.02, 9);
    expect(pointDistance(whole.centre, centre)).toBeLessThan(1e-8);
    const slit = largestCircleInside(contourShift(box(0.2, 1e-3), pointAdd(centre, centre)), 1e-5);
    expect(slit.radius).toBeCloseTo(5e-4, 7);
    expect(() => largestCircleInside(triangle, 0)).toThrow(RangeError);
  });
});

import { readFileSync } from 'node:fs';
import path from 'node:path';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { straightEdgeReturn } from '../../../strategy/heat/index.ts';
import type {
  CornerPlan,
  CornerPlanRequest,
  CornerRules,
  CutConditions,
  PlannedCorner,
} from '../../../strategy/corners/index.ts';
import { cornerPlan, leastDwell } from '../../../strategy/corners/index.ts';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import {
  contourContains,
  contourReverse,
  contourRotate,
  contourShift,
  lineBetween,
  pointDistance,
  pointRotate,
  segmentDistance,
  segmentPointAt,
} from '../../../strategy/path/index.ts';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';

const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const square = polygon([
  { x: 0, y: 0 },
  { x: 0.2, y: 0 },
  { x: 0.2, y: 0.2 },
  { x: 0, y: 0.2 },
]);
const wedge = polygon([
  { x: 0, y: 0 },
  { x: 0.2, y: 0 },
  { x: 0.2, y: 0.1 },
]);

const degrees = (angle: number) => (angle * Math.PI) / 180;
const cut: CutConditions = {
  feed: 0.7 / 60,
  peakPower: 4000,
  duty: 1,
  pulseFrequency: null,
  oxygenPressure: 7e4,
  standoff: 1e-3,
  focusPosition: 5e-3,
  kerfWidth: 8e-4,
  heatIntoPlate: 1.1e7,
};
/** What the limits below are measured against, K. */
const straightEdge = straightEdgeReturn(cut, 293.15);
const limit = 273.15 + 160;
const rules: CornerRules = {
  treatBelowAngle: degrees(100),
  returnExcessLimit: limit - straightEdge,
  loop: { allowed: true, radius: 5e-3, minExtension: 2e-3, maxExtension: 1.2e-2, clearance: 2e-3 },
  dwell: { allowed: false, maxDuration: 4, restart: 0 },
};
const request: CornerPlanRequest = {
  contours: [{ id: '1', contour: square, role: 'outer' }],
  plate: null,
  rules,
  cut,
  profile: { axes: { maxFeed: 1, acceleration: 2, jerk: 50 }, smallestArc: 1e-3 },
  thickness: 0.019,
  plateTemperature: 293.15,
};
const plan = (change: Partial<CornerPlanRequest> = {}): CornerPlan => cornerPlan({ ...request, ...change });
const first = (p: CornerPlan): PlannedCorner => {
  const [corner] = p.corners;
  if (!corner) throw new Error('the plan has corners');
  return corner;
};

describe('the corner plan of a square', () => {
  it('gives each hot corner a loop, with what it cools, what it costs and what falls', () => {
    const { corners, totals } = plan();
    expect(corners.map((c) => c.id)).toEqual(['c1-0', 'c1-1', 'c1-2', 'c1-3']);
    for (const corner of corners) {
      expect(corner.treatment).toBe('loop');
      expect(corner.returnWithout).toBeGreaterThan(limit);
      expect(corner.returnWith).toBeLessThanOrEqual(limit);
      expect(corner.excess).toBeCloseTo(corner.returnWith - corner.straightEdge, 9);
      expect(corner.problem).toBeUndefined();
      expect(corner.loop?.radius).toBeCloseTo(5e-3, 12);
      // the loop's length at the feed, less the stop at the corner that it saves
      const length = 2 * 5e-3 + 5e-3 * 1.5 * Math.PI;
      expect(corner.loop?.length).toBeCloseTo(length, 12);
      expect(Math.abs(corner.addedTime - length / request.cut.feed)).toBeLessThan(0.1);
      const inner = 5e-3 - 4e-4;
      expect(corner.loop?.slug?.area).toBeCloseTo(inner ** 2 * (1 + 0.75 * Math.PI), 12);
    }
    expect(totals).toMatchObject({ corners: 4, treated: 4, loops: 4, dwells: 0, problems: 0 });
    expect(totals.addedLength).toBeCloseTo(4 * (first(plan()).loop?.length ?? NaN), 12);
    expect(totals.addedHeat).toBeCloseTo(1.1e7 * totals.addedLength * 0.019, 6);
    expect(totals.hottestReturn).toBe(Math.max(...corners.map((c) => c.returnWith)));
    expect(totals.hottestUntreated).toBe(Math.max(...corners.map((c) => c.returnWithout)));
  });

  it('leaves them when they stay under the limit, and says so', () => {
    const corner = first(plan({ rules: { ...rules, returnExcessLimit: 273.15 + 300 - straightEdge } }));
    expect([corner.treatment, corner.addedTime, corner.returnWith]).toEqual(['leave', 0, corner.returnWithout]);
    expect(corner.why).toContain('under the limit of 300 °C');
  });

  it('leaves a hot corner whose angle is not below the rule, and points it out', () => {
    const corner = first(plan({ rules: { ...rules, treatBelowAngle: degrees(80) } }));
    expect(corner.treatment).toBe('leave');
    expect(corner.problem).toContain('over the limit');
  });

  it('takes the wait when it costs less than the loop, and the loop when it costs less', () => {
    const waiting = first(plan({ rules: { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 0 } } }));
    expect(waiting.treatment).toBe('dwell');
    expect(waiting.returnWith).toBeLessThanOrEqual(limit);
    expect(waiting.addedTime).toBe(waiting.dwell?.duration);
    const strict = {
      ...rules,
      returnExcessLimit: 273.15 + 139 - straightEdge,
      dwell: { allowed: true, maxDuration: 4, restart: 0 },
      loop: { ...rules.loop, radius: 5e-3 },
    };
    const looped = first(
      plan({ rules: { ...strict, returnExcessLimit: first(plan()).returnWith + 0.5 - straightEdge } }),
    );
    const quickest = looped.options
      .filter((o) => o.fits && o.treatment !== 'leave')
      .sort((a, b) => (a.addedTime ?? 0) - (b.addedTime ?? 0))[0];
    expect(looped.treatment).toBe(quickest?.treatment);
  });

  it('counts what getting the cut going again costs: a short wait may then lose to a loop', () => {
    const quick = first(plan({ rules: { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 0 } } }));
    const slow = first(plan({ rules: { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 5 } } }));
    expect([quick.treatment, slow.treatment]).toEqual(['dwell', 'loop']);
    const waiting = slow.options.find(({ treatment }) => treatment === 'dwell');
    expect(waiting?.addedTime).toBeCloseTo(quick.addedTime + 5, 9);
  });

  it('judges by the excess over a straight edge: a hotter plate alone makes no corner worse', () => {
    const cold = plan();
    const hot = plan({ plateTemperature: 293.15 + 60 });
    expect(hot.limit - cold.limit).toBeCloseTo(60, 9);
    expect(hot.corners.map(({ treatment }) => treatment)).toEqual(cold.corners.map(({ treatment }) => treatment));
  });

  it('waits no longer than needed: a hundredth of a second less is too hot', () => {
    const { dwell } = first(plan({ rules: { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 0 } } }));
    const shorter = plan({
      rules: {
        ...rules,
        loop: { ...rules.loop, allowed: false },
        dwell: { allowed: true, maxDuration: (dwell?.duration ?? 0) - 0.01, restart: 0 },
      },
    });
    expect(first(shorter).problem).toContain('the longest wait allowed');
  });

  it('does not change when part and plate are turned and shifted, but for where things lie', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        (angle, by) => {
          const shift = { x: by, y: -by };
          const moved = plan({
            contours: [{ id: '1', contour: contourShift(contourRotate(wedge, angle), shift), role: 'outer' }],
          });
          const still = plan({ contours: [{ id: '1', contour: wedge, role: 'outer' }] });
          moved.corners.forEach((corner, i) => {
            const other = still.corners[i];
            if (!other) throw new Error('as many corners');
            expect(corner.treatment).toBe(other.treatment);
            expect(corner.returnWith).toBeCloseTo(other.returnWith, 5);
            expect(corner.addedTime).toBeCloseTo(other.addedTime, 6);
            const turned = pointRotate(other.point, angle);
            expect(pointDistance(corner.point, { x: turned.x + shift.x, y: turned.y + shift.y })).toBeLessThan(1e-9);
          });
        },
      ),
      { numRuns: 20 },
    );
  });

  it('is the same each time and survives being stored as JSON', () => {
    const once = plan();
    expect(plan()).toEqual(once);
    expect(JSON.parse(JSON.stringify(once))).toEqual(once);
  });
});

describe('room for a loop', () => {
  it('is refused at the edge of the plate with the place, and the corner is shown as a problem', () => {
    const tight = plan({ plate: { min: { x: -3e-3, y: -3e-3 }, max: { x: 0.203, y: 0.203 } } });
    const corner = first(tight);
    expect(corner.treatment).toBe('leave');
    expect(corner.problem).toContain("the plate's edge");
    const option = corner.options.find((o) => o.treatment === 'loop');
    expect(option).toMatchObject({ fits: false, returnWith: null, addedTime: null });
    // the first edge comes down the left side, so its extension meets the lower edge first
    expect(option?.at?.y).toBeCloseTo(-3e-3, 6);
    expect(tight.totals.problems).toBe(4);
  });

  it('is found with a smaller radius where the design number does not fit, and the sentence says why', () => {
    // 5 mm radius reaches 10 mm past the corner, and takes half a kerf twice and the clearance
    const plate = { min: { x: -0.1, y: -0.1 }, max: { x: 0.2 + 9e-3, y: 0.3 } };
    const corner = plan({ plate, rules: { ...rules, returnExcessLimit: 273.15 + 175 - straightEdge } }).corners.find(
      (c) => pointDistance(c.point, { x: 0.2, y: 0.2 }) < 1e-9,
    );
    expect(corner?.treatment).toBe('loop');
    expect(corner?.loop?.radius).toBeLessThan(5e-3);
    expect(corner?.loop?.radius).toBeGreaterThan(1e-3);
    expect(corner?.why).toContain(
      "smaller than the design's 5.0 mm because the loop would come within 2.0 mm of the plate's edge",
    );
  });

  it('is not shared: of two corners face to face the second gets a smaller loop or none', () => {
    // apart by less than two loops need, by more than one
    const across = contourShift(contourRotate(square, Math.PI), { x: 0.2 + 0.2 + 16e-3, y: 0.4 + 16e-3 });
    const { corners } = plan({
      contours: [
        { id: '1', contour: square, role: 'outer' },
        { id: '2', contour: across, role: 'outer' },
      ],
    });
    const near = corners.filter((c) => pointDistance(c.point, { x: 0.208, y: 0.208 }) < 0.012);
    expect(near).toHaveLength(2);
    expect(near[0]?.loop?.radius).toBeCloseTo(5e-3, 9);
    expect(near[1]?.loop?.radius ?? 0).toBeLessThan(5e-3);
    expect(near[1]?.options.find((o) => o.treatment === 'loop')?.why).toContain(`the loop of corner ${near[0]?.id}`);
  });

  it('on a hole is looked for only where the part pokes into it', () => {
    const window = contourReverse(
      polygon([
        { x: 0.05, y: 0.05 },
        { x: 0.09, y: 0.05 },
        { x: 0.1, y: 0.06 },
        { x: 0.11, y: 0.05 },
        { x: 0.15, y: 0.05 },
        { x: 0.15, y: 0.12 },
        { x: 0.05, y: 0.12 },
      ]),
    );
    const { corners } = plan({
      contours: [
        { id: '2', contour: window, role: 'hole' },
        { id: '1', contour: square, role: 'outer' },
      ],
    });
    const ofHole = corners.filter((c) => c.contourId === '2');
    expect(ofHole.filter((c) => c.treatment === 'loop').map((c) => c.convex)).toEqual([true]);
    for (const corner of ofHole.filter((c) => !c.convex)) expect(corner.why).toContain('concave');
    const loop = ofHole.find((c) => c.loop)?.loop;
    for (const segment of loop?.segments ?? [])
      expect(contourContains(window, segmentPointAt(segment, 0.6))).toBe(true);
  });
});

describe('what the programmer asks for', () => {
  it('is followed: left as it is, though too hot, and shown as a problem', () => {
    const corner = first(plan({ overrides: { 'c1-0': 'leave' } }));
    expect(corner.treatment).toBe('leave');
    expect(corner.why).toContain('asked for by the programmer');
    expect(corner.problem).toContain('over the limit');
    expect(plan({ overrides: { 'c1-0': 'leave' } }).corners[1]?.treatment).toBe('loop');
  });

  it('is followed: a loop on a corner that would need none', () => {
    const cool = { ...rules, returnExcessLimit: 273.15 + 300 - straightEdge };
    const corner = first(plan({ rules: cool, overrides: { 'c1-0': 'loop' } }));
    expect([corner.treatment, corner.problem]).toEqual(['loop', undefined]);
  });

  it('is refused where it does not fit, with the reason, and the rule decides', () => {
    const plate = { min: { x: -3e-3, y: -3e-3 }, max: { x: 0.203, y: 0.203 } };
    const dwelling = { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 0 } };
    const corner = first(plan({ plate, rules: dwelling, overrides: { 'c1-0': 'loop' } }));
    expect(corner.treatment).toBe('dwell');
    expect(corner.problem).toMatch(/^loop asked for by the programmer is refused: .*plate's edge/);
  });

  it('is refused where the rules of the strategy do not allow it', () => {
    expect(first(plan({ overrides: { 'c1-0': 'dwell' } })).problem).toContain('allow no dwell');
    const noLoops = { ...rules, loop: { ...rules.loop, allowed: false } };
    expect(first(plan({ rules: noLoops, overrides: { 'c1-0': 'loop' } })).problem).toContain('allow no loops');
  });
});

describe('a plan of a whole plate', () => {
  const folder = path.join(import.meta.dirname, '../../support/drawings');
  const contoursOf = (name: string) => {
    const r = drawingRead(new Uint8Array(readFileSync(path.join(folder, name))), { unit: 'mm' });
    if (r.kind === 'none') throw new Error(r.why);
    return r.contours;
  };

  it('treats the sharp feet of the lifting lug and none of its concave corners', () => {
    const { corners } = plan({ contours: contoursOf('lifting-lug.dxf') });
    expect(corners.filter((c) => c.treatment === 'loop').map((c) => Math.round((c.angle * 180) / Math.PI))).toEqual([
      45, 45,
    ]);
    expect(corners.filter((c) => !c.convex).map((c) => c.treatment)).toEqual(['leave', 'leave']);
  });

  it('has nothing to do for the bearing plate, which has no corners', () => {
    const { corners, totals } = plan({ contours: contoursOf('bearing-plate.dxf') });
    expect(corners).toEqual([]);
    expect(totals).toMatchObject({ corners: 0, addedTime: 0, hottestReturn: null, hottestUntreated: null });
  });

  it('keeps every loop clear of every part and of every other loop, however the parts lie', () => {
    const cell = fc.record({
      sides: fc.integer({ min: 3, max: 6 }),
      turn: fc.double({ min: 0, max: 6, noNaN: true }),
      size: fc.double({ min: 0.02, max: 0.045, noNaN: true }),
    });
    let loops = 0;
    fc.assert(
      fc.property(fc.array(cell, { minLength: 4, maxLength: 9 }), (cells) => {
        const contours = cells.map(({ sides, turn, size }, i) => ({
          id: String(i + 1),
          role: 'outer' as const,
          contour: contourShift(
            polygon(
              Array.from({ length: sides }, (_, k) => pointRotate({ x: size, y: 0 }, turn + (2 * Math.PI * k) / sides)),
            ),
            {
              x: 0.1 * (i % 3),
              y: 0.1 * Math.floor(i / 3),
            },
          ),
        }));
        const { corners } = plan({ contours });
        const placed = corners.flatMap((c) => (c.loop ? [c.loop] : []));
        loops += placed.length;
        placed.forEach((loop, i) => {
          for (const segment of loop.segments) {
            for (const { contour } of contours) {
              const nearest = Math.min(...contour.segments.map((s) => segmentDistance(segment, s).distance));
              expect(nearest).toBeGreaterThan(4e-4 * 0.979);
              expect(contourContains(contour, segmentPointAt(segment, 0.5))).toBe(false);
            }
            for (const other of placed.slice(i + 1)) {
              const nearest = Math.min(...other.segments.map((s) => segmentDistance(segment, s).distance));
              expect(nearest).toBeGreaterThan(8e-4 + 2e-3 - 1e-8);
            }
          }
        });
      }),
      { numRuns: 40 },
    );
    expect(loops).toBeGreaterThan(100);
  });

  it('of hundreds of corners has one entry a corner, with ids of their own', () => {
    const contours = Array.from({ length: 100 }, (_, i) => ({
      id: String(i + 1),
      role: 'outer' as const,
      contour: contourShift(square, { x: 0.25 * (i % 10), y: 0.25 * Math.floor(i / 10) }),
    }));
    const { corners, totals } = plan({ contours });
    expect(new Set(corners.map((c) => c.id)).size).toBe(400);
    expect(totals.loops).toBe(400);
  });

  it('refuses a plate without thickness', () => {
    expect(() => plan({ thickness: 0 })).toThrow(/thickness 0 m/);
  });
});

describe('the least wait', () => {
  it('is found behind the last time the temperature crosses the limit, though it rises first', () => {
    const after = (t: number) => 500 + 40 * t * Math.exp(-t) - 20 * t;
    const wait = leastDwell(after, 495, 8);
    expect(after(wait)).toBeLessThanOrEqual(495);
    expect(after(wait - 2e-3)).toBeGreaterThan(495);
    expect(wait).toBeGreaterThan(0.5);
  });

  it('is none when the tip is cool, and the longest allowed when that is not enough', () => {
    expect(leastDwell(() => 300, 400, 4)).toBe(0);
    expect(leastDwell(() => 500, 400, 4)).toBe(4);
    expect(() => leastDwell(() => 500, 400, 0)).toThrow(/longest dwell 0 s/);
  });
});

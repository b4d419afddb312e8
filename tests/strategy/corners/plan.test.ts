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
import { cornerInsert, cornerPlan, leastDwell, slugRise } from '../../../strategy/corners/index.ts';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import {
  arcOf,
  contourContains,
  contourCorners,
  contourReverse,
  contourRotate,
  contourShift,
  lineBetween,
  pointDistance,
  pointRotate,
  segmentDistance,
  segmentLength,
  segmentPointAt,
  segmentPointDistance,
} from '../../../strategy/path/index.ts';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';
import { runs } from '../../support/runs.ts';

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

describe('a narrow skeleton', () => {
  const diamond = contourRotate(square, Math.PI / 4);
  const far = 0.2 * Math.SQRT1_2;
  /** The diamond's right tip points at the plate's edge, which leaves `depth` beyond the path's corner and what clearance needs. */
  const before = (depth: number) => {
    const edge = far + (cut.kerfWidth / 2) * Math.SQRT2 + depth + cut.kerfWidth / 2 + rules.loop.clearance;
    return { min: { x: -0.5, y: -0.5 }, max: { x: edge, y: 0.5 } };
  };
  const cool = { ...rules, returnExcessLimit: 273.15 + 165 - straightEdge };
  const atTip = (change: Partial<CornerPlanRequest>) => {
    const { corners } = plan({ contours: [{ id: '1', contour: diamond, role: 'outer' }], rules: cool, ...change });
    const corner = corners.find((c) => pointDistance(c.point, { x: far, y: 0.1 * Math.SQRT2 }) < 1e-9);
    if (!corner) throw new Error('the diamond has a tip on the right');
    return corner;
  };

  it('gets a flat loop where the one arc would have to be too small to cool the tip', () => {
    const corner = atTip({ plate: before(8e-3) });
    expect([corner.treatment, corner.loop?.shape]).toEqual(['loop', 'flat']);
    expect(corner.returnWith).toBeLessThanOrEqual(273.15 + 165);
    expect(corner.why).toMatch(
      /a flat loop .* past the corner with arcs of 1.0 mm fits, in place of the design's 5.0 mm/,
    );
    // with a machine that follows no smaller arc than the design there is only the one arc, and it does not fit
    const coarse = atTip({ plate: before(8e-3), profile: { ...request.profile, smallestArc: 5e-3 } });
    expect(coarse.treatment).toBe('leave');
    expect(coarse.problem).toContain("the plate's edge");
  });

  it('is no reason for a flat loop where the designed one fits', () => {
    expect(atTip({ plate: before(0.02) }).loop).toMatchObject({ shape: 'tangent', radius: 5e-3 });
  });

  it('takes the quicker one when the smaller arc and the flat loop both cool enough', () => {
    const warm = { ...rules, returnExcessLimit: 273.15 + 180 - straightEdge };
    const { loop, why } = atTip({ plate: before(9e-3), rules: warm });
    // 9 mm hold an arc of 9/(1 + √2) mm, which is shorter than a flat loop as long as the designed one
    expect(loop?.shape).toBe('tangent');
    expect(loop?.radius).toBeLessThanOrEqual(9e-3 / (1 + Math.SQRT2));
    expect(loop?.radius).toBeGreaterThan(3e-3);
    expect(why).toContain("smaller than the design's 5.0 mm");
  });
});

describe('the cut order', () => {
  const hole = contourReverse(
    polygon([
      { x: -0.05, y: -0.05 },
      { x: 0.25, y: -0.05 },
      { x: 0.25, y: 0.25 },
      { x: -0.05, y: 0.25 },
    ]),
  );
  const frame = polygon([
    { x: -0.2, y: -0.2 },
    { x: 0.4, y: -0.2 },
    { x: 0.4, y: 0.4 },
    { x: -0.2, y: 0.4 },
  ]);
  const [island, around, outline] = [
    { id: '3', contour: square, role: 'island', name: 'the bracket in the frame' },
    { id: '2', contour: hole, role: 'hole', name: 'hole 1 of the frame' },
    { id: '1', contour: frame, role: 'outer' },
  ] as const;
  const islandsOf = (p: CornerPlan) => p.corners.filter(({ contourId }) => contourId === '3');

  it('gives a part in a hole its loops when it is cut before the hole', () => {
    const corners = islandsOf(plan({ contours: [island, around, outline] }));
    expect(corners.map(({ treatment }) => treatment)).toEqual(['loop', 'loop', 'loop', 'loop']);
  });

  it('refuses them when the hole has dropped out with the steel they would run in, and says so', () => {
    for (const corner of islandsOf(plan({ contours: [around, island, outline] }))) {
      expect(corner.treatment).toBe('leave');
      expect(corner.problem).toContain('hole 1 of the frame, around this corner, is cut before and has dropped out');
      expect(corner.options.find(({ treatment }) => treatment === 'loop')?.at).toEqual(corner.pathPoint);
    }
  });

  it('tells a neighbour that is gone from one that is still to be cut', () => {
    const beside = { id: '9', contour: contourShift(square, { x: 0.2 + 6e-3, y: 0.1 }), role: 'outer' } as const;
    const own = { id: '1', contour: square, role: 'outer' } as const;
    const whyOf = (p: CornerPlan) =>
      p.corners
        .find((c) => pointDistance(c.point, { x: 0.2, y: 0.2 }) < 1e-9)
        ?.options.find((o) => o.treatment === 'loop')?.why;
    expect(whyOf(plan({ contours: [own, beside] }))).toContain('outline 9 is in the way');
    expect(whyOf(plan({ contours: [beside, own] }))).toContain('outline 9 is cut before and has dropped out');
  });

  it('of two contours with the same id is none', () => {
    expect(() => plan({ contours: [outline, outline] })).toThrow(/same id/);
  });
});

describe('a lead-in that is placed already', () => {
  it('is in the way of a loop, with its place', () => {
    const at = { x: 0.2 + 4e-3, y: 0.2 + 5e-3 };
    const leadIns = [
      { contourId: '1', segments: [lineBetween(at, { x: 0.2, y: 0.15 })], crater: { at, radius: 3e-3 } },
    ];
    const corner = plan({ leadIns }).corners.find((c) => pointDistance(c.point, { x: 0.2, y: 0.2 }) < 1e-9);
    const option = corner?.options.find(({ treatment }) => treatment === 'loop');
    expect(option?.why).toMatch(/the (lead-in|pierce) of outline 1 is in the way/);
    expect(option?.at).toBeDefined();
    expect(corner?.loop?.radius ?? 0).toBeLessThan(5e-3);
  });
});

describe('a slug', () => {
  it('that can tip above the nozzle is cautioned about, with how far; one that the kerf holds is not', () => {
    const loose = first(plan({ thickness: 0.01 }));
    expect(loose.caution).toMatch(/the slug, \d+\.\d mm wide, can tip on a slat/);
    expect(first(plan({ thickness: 0.04 })).caution).toBeUndefined();
  });

  it('rises until the kerf holds it: as far as its tilted section fills the hole', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 3e-3, max: 0.06, noNaN: true }),
        fc.double({ min: 0.005, max: 0.04, noNaN: true }),
        fc.double({ min: 3e-4, max: 1.2e-3, noNaN: true }),
        (extent, thickness, kerfWidth) => {
          const rise = slugRise({ extent }, thickness, kerfWidth);
          const tilt = Math.asin(rise / extent);
          const across = extent * Math.cos(tilt) + thickness * Math.sin(tilt);
          if (rise < extent) expect(across).toBeCloseTo(extent + 2 * kerfWidth, 9);
          else expect(Math.hypot(extent, thickness)).toBeLessThanOrEqual(extent + 2 * kerfWidth);
          // half the kerf holds it sooner, twice the plate too
          expect(slugRise({ extent }, thickness, kerfWidth / 2)).toBeLessThanOrEqual(rise);
          expect(slugRise({ extent }, 2 * thickness, kerfWidth)).toBeLessThanOrEqual(rise);
        },
      ),
    );
    expect(() => slugRise({ extent: 0.01 }, 0, 1e-3)).toThrow(/thickness 0 m/);
  });
});

describe('an ease', () => {
  const easing: CornerRules = {
    ...rules,
    loop: { ...rules.loop, allowed: false },
    ease: { allowed: true, length: 6e-3, feedShare: 0.3, powerShare: 0.3 },
  };

  it('cools the tip by the time it takes, which is that of its lower feed', () => {
    const corner = first(
      plan({ rules: { ...easing, returnExcessLimit: 273.15 + 1000 - straightEdge }, overrides: { 'c1-0': 'ease' } }),
    );
    expect(corner.treatment).toBe('ease');
    expect(corner.returnWith).toBeLessThan(corner.returnWithout - 10);
    // 12 mm on which the feed falls evenly to 0.3 of itself and rises again: ∫ds/v = L·ln(1/0.3)/(0.7·v)
    const eased = (12e-3 * Math.log(1 / 0.3)) / 0.7 / cut.feed;
    expect(corner.addedTime).toBeCloseTo(eased - 12e-3 / cut.feed, 1);
    expect(corner.ease).toMatchObject({ before: 6e-3, after: 6e-3, feedShare: 0.3, powerShare: 0.3 });
    const pieces = corner.ease?.pieces ?? [];
    expect(pieces.reduce((sum, { segment }) => sum + segmentLength(segment), 0)).toBeCloseTo(12e-3, 12);
    // it leads through the path's corner, half a kerf beside the finished edges
    const edge = lineBetween({ x: 0, y: 0.2 }, { x: 0, y: 0 });
    const into = pieces[0];
    expect(into && segmentDistance(into.segment, edge).distance).toBeCloseTo(cut.kerfWidth / 2, 12);
    expect(pointDistance(segmentPointAt(pieces[7]?.segment ?? edge, 1), corner.pathPoint)).toBeLessThan(1e-12);
  });

  it('with more power than feed heats more, and never reaches past halfway to the next corner', () => {
    const at = (powerShare: number) =>
      first(
        plan({
          rules: { ...easing, ease: { allowed: true, length: 6e-3, feedShare: 0.5, powerShare } },
          overrides: { 'c1-0': 'ease' },
        }),
      ).returnWith;
    expect(at(0.7)).toBeGreaterThan(at(0.5));
    const long = { ...easing, ease: { allowed: true, length: 0.5, feedShare: 0.5, powerShare: 0.5 } };
    const corner = first(plan({ rules: long, overrides: { 'c1-0': 'ease' } }));
    expect(corner.ease?.before).toBeCloseTo(0.1, 12);
    expect(corner.ease?.after).toBeCloseTo(0.1, 12);
  });

  it('counts as heat what its power leaves beyond that of its length', () => {
    const heatOf = (powerShare: number) =>
      plan({
        rules: { ...easing, ease: { allowed: true, length: 6e-3, feedShare: 0.5, powerShare } },
        overrides: { 'c1-0': 'ease' },
      }).totals;
    expect(heatOf(0.5)).toMatchObject({ addedLength: 0 });
    expect(heatOf(0.5).addedHeat).toBeCloseTo(0, 9);
    expect(heatOf(0.8).addedHeat).toBeGreaterThan(0);
  });

  it('is refused where the rules do not name it, as in strategies from before there were eases', () => {
    const corner = first(plan({ overrides: { 'c1-0': 'ease' } }));
    expect(corner.problem).toContain('allow no ease');
  });
});

describe('a round', () => {
  const rounding: CornerRules = {
    ...rules,
    loop: { ...rules.loop, allowed: false },
    round: { allowed: true, radius: 2e-3, tolerance: 1e-3 },
  };
  const asked = { overrides: { 'c1-0': 'round' } } as const;

  it('has the designed radius where the tolerance allows it, states what it is off the drawing, and spares the stop', () => {
    const corner = first(plan({ rules: rounding, ...asked }));
    expect(corner.round?.radius).toBeCloseTo(2e-3, 12);
    expect(corner.round?.deviation).toBeCloseTo(2e-3 * (Math.SQRT2 - 1), 12);
    expect(corner.why).toContain('0.83 mm off the drawing, 1.00 mm are allowed');
    expect(corner.round?.onPath.radius).toBeCloseTo(2e-3 + cut.kerfWidth / 2, 12);
    expect(corner.addedTime).toBeLessThan(0);
  });

  it('is smaller where the tolerance is, and refused where the machine could not follow it', () => {
    const tight = (tolerance: number) =>
      first(plan({ rules: { ...rounding, round: { allowed: true, radius: 2e-3, tolerance } }, ...asked }));
    const corner = tight(4e-4);
    expect(corner.round?.deviation).toBeCloseTo(4e-4, 9);
    expect(corner.round?.radius).toBeCloseTo(4e-4 / (Math.SQRT2 - 1), 9);
    expect(tight(1e-4).problem).toMatch(/the path would turn on 0.64 mm, and the machine's smallest arc is 1.00 mm/);
  });

  it('of a spike shuts the heat of its own arc in: it returns hotter than the spike and is not taken unasked', () => {
    const spike = polygon([
      { x: 0, y: 0 },
      { x: 0.2 * Math.cos(degrees(10)), y: -0.2 * Math.sin(degrees(10)) },
      { x: 0.2 * Math.cos(degrees(10)), y: 0.2 * Math.sin(degrees(10)) },
    ]);
    const contours = [{ id: '1', contour: spike, role: 'outer' }] as const;
    const round = { allowed: true, radius: 7e-4, tolerance: 5e-3 };
    const tolerant = { ...rounding, round, returnExcessLimit: 1 };
    const hand = first(plan({ contours, rules: tolerant, ...asked }));
    expect(hand.treatment).toBe('round');
    expect(hand.returnWith).toBeGreaterThan(hand.returnWithout + 5);
    expect(first(plan({ contours, rules: tolerant })).treatment).not.toBe('round');
  });

  it('returns as hot as the same rounding in the drawing, left as it is', () => {
    const r = 1.2e-3;
    const sharp = first(
      plan({ rules: { ...rounding, round: { allowed: true, radius: r, tolerance: 1e-3 } }, ...asked }),
    );
    const drawn: Contour = {
      segments: [
        arcOf({ x: r, y: r }, r, Math.PI, Math.PI / 2),
        lineBetween({ x: r, y: 0 }, { x: 0.2, y: 0 }),
        lineBetween({ x: 0.2, y: 0 }, { x: 0.2, y: 0.2 }),
        lineBetween({ x: 0.2, y: 0.2 }, { x: 0, y: 0.2 }),
        lineBetween({ x: 0, y: 0.2 }, { x: 0, y: r }),
      ],
    };
    const corner = first(
      plan({ contours: [{ id: '1', contour: drawn, role: 'outer' }], overrides: { 'c1-0': 'leave' } }),
    );
    expect(corner.id).toBe('c1-0');
    expect(corner.returnWithout).toBeCloseTo(sharp.returnWith, 6);
  });

  it('keeps its finished edge within the tolerance of the drawing also beside curved edges', () => {
    const bowed: Contour = {
      segments: [
        arcOf({ x: 0.05, y: 0.0375 }, 0.0625, Math.atan2(-0.0375, -0.05), 2 * Math.atan2(0.05, 0.0375)),
        lineBetween({ x: 0.1, y: 0 }, { x: 0.1, y: 0.1 }),
        lineBetween({ x: 0.1, y: 0.1 }, { x: 0, y: 0.1 }),
        lineBetween({ x: 0, y: 0.1 }, { x: 0, y: 0 }),
      ],
    };
    for (const { id, point } of contourCorners(bowed).map((c) => ({ id: `c1-${c.index}`, point: c.point }))) {
      const { corners } = plan({
        contours: [{ id: '1', contour: bowed, role: 'outer' }],
        rules: { ...rounding, round: { allowed: true, radius: 5e-3, tolerance: 5e-4 } },
        overrides: { [id]: 'round' },
      });
      const corner = corners.find((c) => c.id === id);
      const { round } = corner ?? {};
      if (!round) throw new Error(corner?.problem ?? 'no round');
      expect(round.deviation).toBeLessThanOrEqual(5e-4 * (1 + 1e-9));
      expect(segmentPointDistance(round.finished, point)).toBeCloseTo(round.deviation, 10);
    }
  });
});

describe('a corner that the drawing rounds', () => {
  const r = 6e-4;
  const drawn: Contour = {
    segments: [
      arcOf({ x: r, y: r }, r, Math.PI, Math.PI / 2),
      lineBetween({ x: r, y: 0 }, { x: 0.2, y: 0 }),
      lineBetween({ x: 0.2, y: 0 }, { x: 0.2, y: 0.2 }),
      lineBetween({ x: 0.2, y: 0.2 }, { x: 0, y: 0.2 }),
      lineBetween({ x: 0, y: 0.2 }, { x: 0, y: r }),
    ],
  };
  const contours = [{ id: '1', contour: drawn, role: 'outer' }] as const;

  it('gets no loop unless the tolerance allows it to be left sharp', () => {
    const strict = first(plan({ contours }));
    expect(strict.treatment).toBe('leave');
    expect(strict.problem).toContain(
      'the drawing rounds this corner with 0.60 mm; a loop leaves it sharp, 0.25 mm more steel',
    );
    const tolerant = first(
      plan({ contours, rules: { ...rules, round: { allowed: false, radius: 1e-3, tolerance: 3e-4 } } }),
    );
    expect(tolerant.treatment).toBe('loop');
    const insert = cornerInsert(tolerant);
    if (insert?.kind !== 'path') throw new Error('a loop is a piece of path');
    // it leaves the path where the arc would begin and comes back where it would end
    const [from, to] = [insert.segments[0], insert.segments.at(-1)];
    const beside = r + cut.kerfWidth / 2;
    expect(
      from && pointDistance(segmentPointAt(from, 0), { x: -cut.kerfWidth / 2, y: -cut.kerfWidth / 2 + beside }),
    ).toBeLessThan(1e-12);
    expect(
      to && pointDistance(segmentPointAt(to, 1), { x: -cut.kerfWidth / 2 + beside, y: -cut.kerfWidth / 2 }),
    ).toBeLessThan(1e-12);
  });

  it('may wait or be eased like any other', () => {
    const dwelling = { ...rules, dwell: { allowed: true, maxDuration: 8, restart: 0 } };
    const corner = first(plan({ contours, rules: dwelling }));
    expect(corner.treatment).toBe('dwell');
    const insert = cornerInsert(corner);
    if (insert?.kind !== 'dwell') throw new Error('a dwell is a wait');
    const beside = r + cut.kerfWidth / 2;
    expect(pointDistance(insert.at, { x: -cut.kerfWidth / 2 + beside, y: -cut.kerfWidth / 2 })).toBeLessThan(1e-12);
    const eased = first(
      plan({
        contours,
        rules: { ...rules, ease: { allowed: true, length: 5e-3, feedShare: 0.4, powerShare: 0.4 } },
        overrides: { 'c1-0': 'ease' },
      }),
    );
    expect(eased.ease?.pieces.some(({ segment, eased: by }) => segment.kind === 'arc' && by === 1)).toBe(true);
    expect(eased.returnWith).toBeLessThan(eased.returnWithout);
  });
});

describe('what a corner puts into the path', () => {
  it('is a loop from the path’s corner back to it, a wait there, an arc for a round, and nothing for the rest', () => {
    const looped = first(plan());
    const insert = cornerInsert(looped);
    expect(insert).toMatchObject({
      kind: 'path',
      as: 'loop',
      contourId: '1',
      index: 0,
      name: 'the loop of corner c1-0',
    });
    if (insert?.kind !== 'path') throw new Error('a loop is a piece of path');
    const [from, to] = [insert.segments[0], insert.segments.at(-1)];
    expect(from && pointDistance(segmentPointAt(from, 0), looped.pathPoint)).toBe(0);
    expect(to && pointDistance(segmentPointAt(to, 1), looped.pathPoint)).toBe(0);

    const waits = first(plan({ rules: { ...rules, dwell: { allowed: true, maxDuration: 4, restart: 0 } } }));
    expect(cornerInsert(waits)).toMatchObject({ kind: 'dwell', duration: waits.dwell?.duration, at: waits.pathPoint });

    const rounded = first(
      plan({
        rules: { ...rules, round: { allowed: true, radius: 2e-3, tolerance: 1e-3 } },
        overrides: { 'c1-0': 'round' },
      }),
    );
    expect(cornerInsert(rounded)).toMatchObject({ kind: 'path', as: 'contour', segments: [rounded.round?.onPath] });
    expect(cornerInsert(first(plan({ overrides: { 'c1-0': 'leave' } })))).toBeNull();
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

describe('a contour that doubles back', () => {
  const rulesOfAll: CornerRules = {
    ...rules,
    dwell: { allowed: true, maxDuration: 4, restart: 0 },
    ease: { allowed: true, length: 5e-3, feedShare: 0.4, powerShare: 0.4 },
    round: { allowed: true, radius: 1e-3, tolerance: 3e-4 },
  };
  const spiked = polygon([
    { x: 0, y: 0 },
    { x: 0.1, y: 0 },
    { x: 0.05, y: 0 },
    { x: 0.05, y: 0.05 },
  ]);

  it('in a spike is named there, whatever is asked for, and the other corners are planned', () => {
    for (const asked of ['loop', 'dwell', 'ease', 'round', 'leave'] as const) {
      const { corners } = plan({
        contours: [{ id: '1', contour: spiked, role: 'outer' }],
        rules: rulesOfAll,
        overrides: { 'c1-1': asked },
      });
      const spike = corners.find(({ index }) => index === 1);
      expect(spike?.treatment).toBe('leave');
      expect(spike?.problem).toContain('doubles back in a spike without width');
      expect(corners.length).toBeGreaterThan(1);
      expect(JSON.stringify(corners)).not.toContain('null,"y"');
    }
  });

  it('or is otherwise of no use never stops a plan or leaves a number out of it', () => {
    const coordinate = fc.integer({ min: 0, max: 20 }).map((i) => i * 5e-3);
    const place = fc.record({ x: coordinate, y: coordinate });
    const treatments = ['loop', 'dwell', 'ease', 'round', 'leave'] as const;
    fc.assert(
      fc.property(fc.array(place, { minLength: 3, maxLength: 9 }), fc.constantFrom(...treatments), (points, asked) => {
        const contours = [{ id: '1', contour: polygon(points), role: 'outer' }] as const;
        const ids = plan({ contours, rules: rulesOfAll }).corners.map(({ id }) => id);
        const { corners } = plan({
          contours,
          rules: rulesOfAll,
          overrides: Object.fromEntries(ids.map((id) => [id, asked])),
        });
        // what JSON can't say it writes as null
        const numbers = JSON.stringify(
          corners.map(({ options: _options, drawn: _drawn, loop, ...rest }) => [rest, loop?.segments]),
        );
        expect(numbers).not.toMatch(/:null[,}]/);
        for (const corner of corners) cornerInsert(corner);
      }),
      { numRuns: runs(60, 1000) },
    );
  });
});

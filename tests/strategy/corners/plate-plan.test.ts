import { describe, expect, it } from 'vitest';
import { cornerPlan, platePlan, PlatePlanCancelled, platePlanWithOrders } from '../../../strategy/corners/index.ts';
import { choose, outcomeOf } from '../../../strategy/corners/plate/choose.ts';
import { decidedPlate } from '../../../strategy/corners/plate/passes.ts';
import { preparedPlate } from '../../../strategy/corners/plate/prepared.ts';
import { tipPeaks } from '../../../strategy/corners/plate/tip-peaks.ts';
import { burnBackDefaults } from '../../../strategy/corners/rules.ts';
import { burnBack, ignitionThreshold, midZoneProperties, peakAfter, returnOf } from '../../../strategy/heat/index.ts';
import type { Point } from '../../../strategy/path/index.ts';
import { lineBetween, loopAt, pathLength } from '../../../strategy/path/index.ts';
import { seededNumbers } from '../../bench/line.ts';
import { runs } from '../../support/runs.ts';
import { cutOf, randomCut, square } from './cuts.ts';
import { bruteForce, exactModel } from './exact-plate.ts';

describe('the plan of a small plate', () => {
  it('comes within 2 % of the best of all combinations, with no more corners over the limit', () => {
    const next = seededNumbers(20_261_201);
    const gaps: number[] = [];
    for (let n = 0; n < runs(6, 120); n++) {
      const prepared = preparedPlate(randomCut(next));
      const exact = exactModel(prepared);
      const best = bruteForce(exact, 0.06);
      const decided = decidedPlate(prepared);
      // judged by the direct sum of all heat, whatever the plan took the plate for
      let state = exact.start;
      const judged = decided.ways.map(({ way, wait }, k) => {
        const one = exact.exactly(k, state, way, wait);
        state = exact.then(k, state, one);
        return { way: one };
      });
      // the plan's field and puffs are within a kelvin of the sum, in one plate of a hundred within 4 K
      const plainlyOver = judged.filter(({ way }) => way.over > 4).length;
      expect(plainlyOver).toBeLessThanOrEqual(best.over);
      if (best.addedTime > 0.2) gaps.push(outcomeOf(judged).addedTime / best.addedTime - 1);
    }
    expect(Math.max(...gaps)).toBeLessThan(0.02);
    expect(gaps.reduce((sum, gap) => sum + gap, 0) / gaps.length).toBeLessThan(0.005);
  });

  it('decides as the best of all combinations where it sums up the heat directly itself', () => {
    const next = seededNumbers(77);
    for (let n = 0; n < runs(4, 60); n++) {
      const exact = exactModel(preparedPlate(randomCut(next)), { sacrifices: true });
      const best = bruteForce(exact, 0.06);
      const chosen = outcomeOf(choose(exact).ways.map((way) => ({ way })));
      expect(chosen.over).toBe(best.over);
      expect(chosen.addedTime).toBeLessThan(best.addedTime * 1.02 + 0.01);
    }
  });

  it('is the same each time, and survives being stored as JSON', () => {
    const request = randomCut(seededNumbers(5));
    const once = platePlan(request);
    expect(platePlan(request)).toEqual(once);
    expect(JSON.parse(JSON.stringify(once))).toEqual(once);
  });

  it('knows of each corner how warm the plate had become, when the cut is back, and the next best', () => {
    const plan = platePlan(cutOf([square(0, 0, 0.04), square(0.045, 0, 0.04), square(0.09, 0, 0.04)]));
    const times = plan.corners.map(({ returnTime }) => returnTime ?? -1);
    expect(Math.min(...times)).toBeGreaterThan(0);
    expect(Math.max(...times)).toBeLessThan(plan.totals.cutTime);
    // the first corner is on a plate that is cold but for its own pierce; those of later parts are not
    const warmth = (id: string) =>
      Math.max(...plan.corners.filter((c) => c.contourId === id).map((c) => c.background ?? 0));
    expect(plan.corners[0]?.background).toBeLessThan(warmth('3'));
    expect(warmth('3')).toBeGreaterThan(warmth('1'));
    expect(plan.totals.highestBackground).toBe(Math.max(warmth('1'), warmth('2'), warmth('3')));
    const treated = plan.corners.filter(({ treatment }) => treatment !== 'leave');
    expect(treated.length).toBeGreaterThan(0);
    for (const { returnWith, runnerUp, treatment, problem } of treated) {
      expect(problem === undefined).toBe(returnWith <= plan.limit + 1e-9);
      expect(runnerUp.treatment).not.toBe(treatment);
      if (runnerUp.treatment !== null) expect(runnerUp.costsMore).toBeGreaterThan(-1e-9);
      expect(runnerUp.why.length).toBeGreaterThan(10);
    }
    expect(plan.corners.some(({ why }) => /the plate there has warmed to \d+ °C by then/.test(why))).toBe(true);
  });

  it('judges against the plate as it comes: what the cut itself warms is not forgiven', () => {
    const request = cutOf([square(0, 0, 0.03), square(0.034, 0, 0.03), square(0.068, 0, 0.03), square(0.102, 0, 0.03)]);
    const cold = cornerPlan(request);
    const warm = platePlan(request);
    expect(warm.limit).toBeCloseTo(cold.limit, 9);
    expect(warm.totals.addedTime).toBeGreaterThan(cold.totals.addedTime);
  });

  it('loses to the plan on the cold plate nothing where nothing is warm yet', () => {
    const request = cutOf([square(0, 0, 0.3)]);
    const [cold, warm] = [cornerPlan(request), platePlan(request)];
    expect(warm.corners.map(({ treatment }) => treatment)).toEqual(cold.corners.map(({ treatment }) => treatment));
  });

  it('keeps to what the programmer asked for, and says when it does not fit', () => {
    const plain = platePlan(cutOf([square(0, 0, 0.05)]));
    const ids = plain.corners.map(({ id }) => id);
    const asked = { [ids[0] ?? '']: 'leave', [ids[1] ?? '']: 'loop', [ids[2] ?? '']: 'ease' } as const;
    const plan = platePlan(cutOf([square(0, 0, 0.05)], { overrides: asked }));
    expect(plan.corners.slice(0, 2).map(({ treatment }) => treatment)).toEqual(['leave', 'loop']);
    expect(plan.corners[0]?.why).toContain('asked for by the programmer');
    expect(plan.corners[0]?.problem).toContain('over the limit');
    expect(plan.corners[2]?.problem).toContain('ease asked for by the programmer is refused');
  });

  it('keeps loops of neighbouring parts clear of each other', () => {
    const gap = 0.012;
    const plan = platePlan(
      cutOf([square(0, 0, 0.05), square(0.05 + gap, 0.05 + gap, 0.05)], {
        overrides: { 'c1-2': 'loop', 'c2-0': 'loop' },
      }),
    );
    const [first, second] = ['c1-2', 'c2-0'].map((id) => plan.corners.find((c) => c.id === id));
    const largest = 4e-3;
    expect(Math.min(first?.loop?.radius ?? 0, second?.loop?.radius ?? 0)).toBeLessThan(largest - 1e-6);
  });
});

describe('another cut order', () => {
  const row = cutOf(Array.from({ length: 6 }, (_, i) => square(0.031 * i, 0, 0.028)));
  const question = { pieceOf: (id: string) => id, allowed: () => true };

  it('is suggested where it spares more than its ways take, and is then what it says', () => {
    const { plan, orders } = platePlanWithOrders(row, question);
    const [best] = orders;
    if (!best) throw new Error('a row of parts that warm each other has a better order');
    expect([...best.order].sort()).toEqual(['1', '2', '3', '4', '5', '6']);
    expect(best.order).not.toEqual(['1', '2', '3', '4', '5', '6']);
    const place = (id: string) => best.order.indexOf(id);
    const again = platePlan({
      ...row,
      contours: [...row.contours].sort((a, b) => place(a.id) - place(b.id)),
      cutPath: { runs: [...row.cutPath.runs].sort((a, b) => place(a.contourId) - place(b.contourId)) },
    });
    expect(plan.totals.addedTime - again.totals.addedTime).toBeCloseTo(best.addedTime, 6);
    const longer = again.totals.cutTime - again.totals.addedTime - (plan.totals.cutTime - plan.totals.addedTime);
    expect(longer).toBeCloseTo(best.rapidTime, 6);
    expect(best.overLimit > 0 || best.addedTime > best.rapidTime + 0.9).toBe(true);
    expect(best.why).toMatch(/is come back to on a plate of \d+ °C instead of \d+ °C/);
    for (const { why } of orders) expect(why).toContain('the order is set in the layout');
  });

  it('is none that may not be cut, and the same each time', () => {
    const keeps = (order: readonly string[]) =>
      order.indexOf('1') < order.indexOf('2') && order.indexOf('2') < order.indexOf('3');
    const { orders } = platePlanWithOrders(row, { ...question, allowed: keeps });
    for (const { order } of orders) expect(keeps(order)).toBe(true);
    expect(platePlanWithOrders(row, { ...question, allowed: keeps }).orders).toEqual(orders);
    expect(platePlanWithOrders(row, { ...question, allowed: () => false }).orders).toEqual([]);
  });
});

describe('burn-back in the plan', () => {
  const needle = [
    { x: 0, y: 0 },
    { x: 0.12, y: 0 },
    { x: 0.12, y: 0.035 },
  ];

  it('is judged with the peak at the depth allowed, beside the return temperature', () => {
    const rules = { ...cutOf([]).rules, returnExcessLimit: 1000 };
    const anchor = { limit: 0.3e-3, ignition: 1233 };
    const free = platePlan(cutOf([needle], { rules: { ...rules, burnBack: { ...anchor, judged: false } } }));
    const strict = platePlan(cutOf([needle], { rules: { ...rules, burnBack: { ...anchor, judged: true } } }));
    const tip = (plan: typeof free) => plan.corners.reduce((a, b) => (a.angle < b.angle ? a : b));
    expect(tip(free).treatment).toBe('leave');
    expect(tip(free).burnBack).toBeGreaterThan(0);
    expect(tip(strict).problem ?? tip(strict).why).toMatch(/burn back|for \d/);
    expect(tip(strict).burnBack ?? 1).toBeLessThanOrEqual((tip(free).burnBack ?? 0) + 1e-9);
  });

  it('starts from the threshold that the heat model starts from', () => {
    expect(burnBackDefaults.ignition).toBe(ignitionThreshold);
  });

  it('is told from values at steps as from the tip itself', () => {
    const next = seededNumbers(3);
    const { cut, rules } = cutOf([]);
    const peaks = tipPeaks({ cut, rules, properties: midZoneProperties });
    for (let n = 0; n < runs(6, 60); n++) {
      const angle = 0.3 + 2.5 * next();
      const turn = Math.PI - angle;
      const corner = {
        point: { x: 0, y: 0 },
        incoming: { x: 1, y: 0 },
        outgoing: { x: Math.cos(turn), y: Math.sin(turn) },
        angle,
      };
      const wait = n % 3 === 1 ? 4 * next() : 0;
      const loop = loopAt(corner, Math.min(4e-3, 0.02 * Math.tan(angle / 2)));
      const treatment =
        n % 3 === 2
          ? ({ kind: 'loop', loop } as const)
          : wait > 0
            ? ({ kind: 'dwell', duration: wait } as const)
            : ({ kind: 'leave' } as const);
      const length = 0.03 + 0.05 * next();
      const question = {
        corner,
        before: [lineBetween({ x: -length, y: 0 }, { x: 0, y: 0 })],
        treatment,
        cut,
        plateTemperature: 293.15 + 40 * next(),
      };
      const kind = { angle, wait, treatment: n % 3 === 2 ? 'loop' : 'plain' } as const;
      const returnsAt = returnOf(question);
      const { temperature } = peakAfter(question);
      expect(Math.abs(returnsAt + peaks.over(kind) - temperature)).toBeLessThan(0.02 * (temperature - 293.15) + 3);
      const deep = burnBack(question, 1300);
      if (deep > 1e-4) expect(Math.abs(peaks.burnBack(kind, returnsAt, 1300) - deep)).toBeLessThan(0.08 * deep + 3e-5);
    }
  });
});

describe('what is of no use to a plan', () => {
  it('is said in a sentence: no feed, no thickness, a plate smaller than heat spreads in a moment', () => {
    const request = cutOf([square(0, 0, 0.05)]);
    expect(() => platePlan({ ...request, drive: { ...request.drive, feed: 0 } })).toThrow(/feed/);
    expect(() => platePlan({ ...request, thickness: 0 })).toThrow(/thickness/);
    const tiny = cutOf([square(0, 0, 1.5e-3)], { plate: { min: { x: -1e-3, y: -1e-3 }, max: { x: 3e-3, y: 3e-3 } } });
    expect(() => platePlan(tiny)).toThrow(/heat spreads/);
  });

  it('is a part without corners: a plan of none, on a plate that warms all the same', () => {
    const round = Array.from({ length: 40 }, (_, i) => {
      const angle = (2 * Math.PI * i) / 40;
      return { x: 0.05 * Math.cos(angle), y: 0.05 * Math.sin(angle) };
    });
    const plan = platePlan(cutOf([round]));
    expect(plan.corners).toEqual([]);
    expect(plan.totals.meanPlateTemperature).toBeGreaterThan(293.15);
    expect(plan.totals.highestBackground).toBeNull();
  });

  it('is a cut that was given up: it ends with a word of its own', () => {
    expect(() => platePlan(cutOf([square(0, 0, 0.05)]), () => false)).toThrow(PlatePlanCancelled);
    const shares: number[] = [];
    platePlan(cutOf([square(0, 0, 0.05)]), (share) => void shares.push(share));
    expect(shares.at(-1)).toBe(1);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
  });

  it('is a corner nearer to the next than the kerf is wide: it is pointed out and left', () => {
    const step = 0.5e-3;
    const plan = platePlan(
      cutOf([
        [
          { x: 0, y: 0 },
          { x: 0.05, y: 0 },
          { x: 0.05, y: 0.05 },
          { x: 0.025, y: 0.05 },
          { x: 0.025, y: 0.05 - step },
          { x: 0, y: 0.05 - step },
        ],
      ]),
    );
    const close = plan.corners.filter(({ problem }) => problem?.includes('than the kerf is wide'));
    expect(close.length).toBeGreaterThan(0);
    for (const { treatment } of close) expect(treatment).toBe('leave');
  });

  it('is a contour that no cut comes to: its corners are planned alone and pointed out', () => {
    const request = cutOf([square(0, 0, 0.05), square(0.1, 0, 0.05)]);
    const runsLeft = request.cutPath.runs.filter(({ contourId }) => contourId === '1');
    const plan = platePlan({ ...request, cutPath: { runs: runsLeft } });
    const uncut = plan.corners.filter(({ contourId }) => contourId === '2');
    expect(uncut).toHaveLength(4);
    for (const { background, returnTime, problem } of uncut) {
      expect([background, returnTime]).toEqual([null, null]);
      expect(problem).toBeDefined();
    }
  });
});

describe('a corner behind a short edge', () => {
  /** A strip leaning by an angle, so wide between its long edges. */
  const strip = (width: number, lean: number): Point[] => {
    const over = width / Math.tan(lean);
    return [
      { x: 0, y: 0 },
      { x: 0.1, y: 0 },
      { x: 0.1 - over, y: width },
      { x: -over, y: width },
    ];
  };
  const alone = { pierceHeat: 0, rules: { ...cutOf([]).rules, returnExcessLimit: 900 } };

  it('returns as hot as the closed form has it with all that was cut before', () => {
    for (const lean of [60, 90, 120])
      for (const width of [4e-3, 6e-3, 10e-3, 15e-3]) {
        const request = cutOf([strip(width, (lean * Math.PI) / 180)], alone);
        const { legs, corners } = preparedPlate(request);
        const plan = platePlan(request);
        const behind = legs.legs.filter(({ own, earlier }) => earlier.length > 0 && pathLength(own) < 0.03);
        expect(behind).toHaveLength(2);
        for (const leg of behind) {
          const found = corners[leg.corner]?.found;
          const told = plan.corners[leg.corner];
          if (!found || !told) throw new Error('there is no such corner');
          const rise =
            returnOf({
              corner: found.onPath,
              before: [...leg.earlier, ...leg.own],
              treatment: { kind: 'leave' },
              cut: request.cut,
              plateTemperature: request.plateTemperature,
            }) - request.plateTemperature;
          expect(Math.abs((told.returnWithout - request.plateTemperature) / rise - 1)).toBeLessThan(0.02);
        }
      }
  });

  it('knows no tip before it where the cut has only just begun', () => {
    const { legs } = preparedPlate(cutOf([strip(6e-3, 1.2), strip(6e-3, 1.2).map(({ x, y }) => ({ x, y: y + 0.1 }))]));
    // the first of each strip comes behind its lead-in, the others behind the corner before
    expect(legs.legs.map(({ earlier }) => earlier.length > 0)).toEqual([
      false,
      true,
      true,
      true,
      false,
      true,
      true,
      true,
    ]);
  });
});

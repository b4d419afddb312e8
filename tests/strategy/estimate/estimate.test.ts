import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  comparedFigures,
  comparePlans,
  cutLedger,
  cutSpent,
  moneyOf,
  planEstimate,
  type CutFigures,
  type EstimateInput,
  type Rates,
  type VariantEstimate,
} from '../../../strategy/estimate/index.ts';
import { plateField } from '../../../strategy/heat/plate/index.ts';
import { heatOfClock, plateClock, type HeightMoves, type PlateDrive } from '../../../strategy/motion/index.ts';
import type { CutPath, CutPiece } from '../../../strategy/path/cut-path.ts';
import { contourCorners, lineBetween, loopAt, pathLength } from '../../../strategy/path/index.ts';
import { runs } from '../../support/runs.ts';

const heights: HeightMoves = {
  travel: 0.015,
  pierceFrom: 0.01,
  pierceTo: 0.004,
  cut: 0.001,
  speed: 0.15,
  acceleration: 2,
  jerk: 50,
};
const drive: PlateDrive = {
  feed: 1 / 60,
  acceleration: 2,
  jerk: 50,
  travel: 1,
  pierce: 8,
  restart: 0.6,
  heights,
};
/** 20 mm at 1 m/min: the ledger's own example. */
const cut: CutFigures = {
  kerfWidth: 0.6e-3,
  heatIntoPlate: 6.5e6,
  pierceHeat: 6000,
  meanPower: 4000,
  pierceEnergy: 9000,
  oxygenFlow: 0.745e-3,
  pierceOxygen: 5e-3,
};
const loading = { time: 300, exchange: 30, shuttleTable: true };
const rates: Rates = {
  currency: 'EUR',
  machineHour: 140,
  oxygenKilogram: 0.3,
  electricityKilowattHour: 0.25,
  wallPlugEfficiency: 0.33,
};

type Treated = 'leave' | 'loop' | 'dwell' | 'ease';

/** Squares of some side in a row, every corner treated alike. */
function squares(count: number, side: number, treated: Treated): CutPath {
  return {
    runs: Array.from({ length: count }, (_, n) => {
      const x = n * (side + 0.05);
      const places = [
        { x, y: 0 },
        { x: x + side, y: 0 },
        { x: x + side, y: side },
        { x, y: side },
      ];
      const segments = places.map((place, i) => lineBetween(place, places[(i + 1) % 4] ?? place));
      const corners = contourCorners({ segments });
      const pieces = segments.flatMap((segment, i): CutPiece[] => {
        const corner = corners.find(({ index }) => index === (i + 1) % 4);
        const shares = treated === 'ease' ? { feedShare: 0.5, powerShare: 0.5 } : {};
        return [
          { kind: i === 0 ? 'lead-in' : 'contour', segments: [segment], ...shares },
          ...(corner && treated === 'loop' ? [{ kind: 'loop' as const, segments: loopAt(corner, 4e-3).segments }] : []),
          ...(corner && treated === 'dwell' ? [{ kind: 'dwell' as const, at: corner.point, duration: 1.5 }] : []),
        ];
      });
      return { contourId: `${n}`, name: `outline ${n}`, pierce: places[0] ?? { x, y: 0 }, pieces };
    }),
  };
}

const inputOf = (path: CutPath, more: Partial<EstimateInput> = {}): EstimateInput => ({
  clock: plateClock(path, drive),
  cut,
  thickness: 0.02,
  plateTemperature: 293.15,
  ...more,
});

const anyPath = fc
  .tuple(
    fc.integer({ min: 1, max: 6 }),
    fc.integer({ min: 20, max: 200 }),
    fc.constantFrom<Treated>('leave', 'loop', 'dwell', 'ease'),
  )
  .map(([count, side, treated]) => squares(count, side * 1e-3, treated));
const all = { numRuns: runs(40, 400) };

describe('what a cut spends', () => {
  it('adds up to the whole of its time', () => {
    fc.assert(
      fc.property(anyPath, (path) => {
        const clock = plateClock(path, drive);
        const { time, pierces } = cutSpent(clock);
        expect(Object.values(time).reduce((sum, one) => sum + one, 0)).toBeCloseTo(clock.duration, 8);
        expect(pierces).toBe(path.runs.length);
      }),
      all,
    );
  });

  it('tells loops from contours, waits from what follows them, and rapids from the head’s way up and down', () => {
    const of = (treated: Treated) => cutSpent(plateClock(squares(3, 0.1, treated), drive));
    const left = of('leave');
    const looped = of('loop');
    expect(left.time.loop + left.time.dwell + left.time.restart).toBe(0);
    expect(left.length.cut).toBeCloseTo(3 * 0.4, 9);
    // a loop of 4 mm at a right angle is 2e + r(π + β) long
    expect(looped.length.loop).toBeCloseTo(12 * (2 * 4e-3 + 4e-3 * 1.5 * Math.PI), 9);
    expect(looped.length.cut).toBeCloseTo(left.length.cut, 9);
    // the last one of each ends at rest
    expect(looped.time.loop / (looped.length.loop / drive.feed)).toBeCloseTo(1, 2);
    const waited = of('dwell');
    expect(waited.time.dwell).toBeCloseTo(12 * 1.5, 9);
    expect(waited.time.restart).toBeCloseTo(12 * 0.6, 9);
    expect(left.length.rapid).toBeCloseTo(2 * 0.15, 9);
    expect(left.time.rapid).toBeGreaterThan(2 * 0.15);
    expect(left.time.pierce).toBeCloseTo(3 * 8, 9);
    expect(left.time.height).toBeGreaterThan(0);
  });

  it('counts the beam as on along the path alone, and less where the power is eased', () => {
    const waited = cutSpent(plateClock(squares(2, 0.1, 'dwell'), drive));
    expect(waited.beam).toBeCloseTo(waited.time.cut, 9);
    const eased = cutSpent(plateClock(squares(2, 0.1, 'ease'), drive));
    expect(eased.beam).toBeCloseTo(eased.time.cut / 2, 9);
  });
});

describe('the estimate of a plan', () => {
  it('has sums that close', () => {
    fc.assert(
      fc.property(anyPath, fc.boolean(), (path, shuttleTable) => {
        const found = planEstimate(inputOf(path, { loading: { ...loading, shuttleTable }, rates }));
        const { total, ...parts } = found.time;
        expect(Object.values(parts).reduce((sum, one) => sum + one, 0)).toBeCloseTo(total, 8);
        expect(found.oxygen.pierces + found.oxygen.cutting).toBeCloseTo(found.oxygen.total, 12);
        expect(found.laser.pierces + found.laser.cutting).toBeCloseTo(found.laser.total, 6);
        expect((found.heat.pierces ?? 0) + found.heat.cutting).toBeCloseTo(found.heat.total, 6);
        if (found.money.kind === 'none') throw new Error(found.money.why);
        const { machine, oxygen, electricity, total: money } = found.money;
        expect((machine ?? 0) + (oxygen ?? 0) + (electricity ?? 0)).toBeCloseTo(money, 9);
      }),
      all,
    );
  });

  it('balances its ledger: absorbed light and burning are melt, heat in the plate and the rest', () => {
    fc.assert(
      fc.property(anyPath, fc.double({ min: 270, max: 700, noNaN: true }), (path, plateTemperature) => {
        const { ledger, heat } = planEstimate(inputOf(path, { plateTemperature }));
        const { absorbed, oxidation, melt, inPlate, rest } = ledger;
        expect(melt + inPlate + rest).toBeCloseTo(absorbed + oxidation, 3);
        expect(inPlate).toBe(heat.cutting);
      }),
      all,
    );
  });

  it('leaves a fifth for superheat and losses at 20 mm, 1 m/min and a kerf of 0.6 mm, as the ledger’s sources do', () => {
    const { ledger } = planEstimate(inputOf(squares(2, 0.2, 'leave')));
    // 5.2 kW in all, 2.0 kW melt, 2.2 kW into the plate, about 1.0 kW of superheat
    expect(ledger.rest / (ledger.absorbed + ledger.oxidation)).toBeGreaterThan(0.15);
    expect(ledger.rest / (ledger.absorbed + ledger.oxidation)).toBeLessThan(0.25);
    // 2.4 kW absorbed of 4 kW
    expect(ledger.absorption).toBeCloseTo(0.6, 1);
    expect(ledger.cautions).toEqual([]);
  });

  it('says when the plate is said to take more heat than there is, and when the laser gives too little', () => {
    const hot = planEstimate(inputOf(squares(1, 0.1, 'leave'), { cut: { ...cut, heatIntoPlate: 2e7 } }));
    expect(hot.ledger.rest).toBeLessThan(0);
    expect(hot.ledger.cautions[0]).toMatch(/heat is set too high/);
    const weak = planEstimate(inputOf(squares(1, 0.1, 'leave'), { cut: { ...cut, meanPower: 1000 } }));
    expect(weak.ledger.absorption).toBeGreaterThan(1);
    expect(weak.ledger.cautions[0]).toMatch(/laser’s energy/);
    expect(cutLedger({ volume: 0, plateTemperature: 293.15, laser: 0, inPlate: 0 }).absorption).toBeNull();
  });

  it('leaves the heat of the straight cut per metre, however the corners are gone through', () => {
    const path = squares(3, 0.1, 'loop');
    const length = pathLength(
      path.runs.flatMap(({ pieces }) => pieces.flatMap((one) => ('segments' in one ? one.segments : []))),
    );
    const { heat } = planEstimate(inputOf(path));
    expect(heat.cutting).toBeCloseTo(6.5e6 * 0.02 * length, 2);
    expect(heat.pierces).toBe(3 * 6000);
    expect(planEstimate(inputOf(path, { cut: { ...cut, pierceHeat: null } })).heat.pierces).toBeNull();
  });

  it('lets oxygen flow while it cuts, waits and starts again, and through each pierce', () => {
    const found = planEstimate(inputOf(squares(2, 0.1, 'dwell')));
    const { cut: along, dwell, restart } = found.time;
    expect(found.oxygen.cutting).toBeCloseTo(0.745e-3 * (along + dwell + restart), 12);
    expect(found.oxygen.pierces).toBeCloseTo(2 * 5e-3, 12);
    // 1.4276 kg per m³ at 0 °C as an ideal gas
    expect(found.oxygen.normalVolume).toBeCloseTo(found.oxygen.total / 1.4276, 4);
  });

  it('is never less with one more part, a slower feed, a longer pierce or a dearer hour', () => {
    const part = fc.integer({ min: 1, max: 5 });
    fc.assert(
      fc.property(part, fc.constantFrom<Treated>('leave', 'loop', 'dwell'), (count, treated) => {
        const of = (n: number, more: Partial<PlateDrive> = {}, hour = 140) =>
          planEstimate({
            ...inputOf(squares(n, 0.08, treated), { rates: { ...rates, machineHour: hour }, loading }),
            clock: plateClock(squares(n, 0.08, treated), { ...drive, ...more }),
          });
        const base = of(count);
        const costs = ({ time, oxygen, laser, heat, money }: typeof base) => [
          time.total,
          oxygen.total,
          laser.total,
          heat.total,
          money.kind === 'ok' ? money.total : 0,
        ];
        for (const worse of [
          of(count + 1),
          of(count, { feed: drive.feed / 2 }),
          of(count, { pierce: 9 }),
          of(count, {}, 150),
        ]) {
          // one more part hides more loading: the time alone may fall by that, and no more
          const [time = 0, ...rest] = costs(worse);
          const [before = 0, ...others] = costs(base);
          expect(time + worse.hiddenLoading).toBeGreaterThanOrEqual(before + base.hiddenLoading - 1e-9);
          rest.slice(0, 3).forEach((one, i) => expect(one).toBeGreaterThanOrEqual((others[i] ?? 0) - 1e-9));
        }
        expect(costs(of(count, {}, 150)).at(-1)).toBeGreaterThan(costs(base).at(-1) ?? Infinity);
      }),
      { numRuns: runs(15, 100) },
    );
  });

  it('takes mean and highest temperature from the plate’s field', () => {
    const path = squares(2, 0.1, 'leave');
    const clock = plateClock(path, drive);
    const { heat, pierces } = heatOfClock(clock, { heatIntoPlate: cut.heatIntoPlate, pierceHeat: 6000 });
    const box = { minX: -0.05, minY: -0.05, maxX: 0.35, maxY: 0.15 };
    const field = plateField({
      plate: box,
      thickness: 0.02,
      plateTemperature: 293.15,
      lossCoefficient: 0,
      heat: [...heat],
      pierces: [...pierces],
      until: clock.duration,
    });
    const { background, heat: left } = planEstimate(inputOf(path, { field }));
    // without losses all heat is there: mean rise = heat over heat capacity, at the field's own steel
    const { density, specificHeat } = { density: 7850, specificHeat: 633 };
    const rise = left.total / (density * specificHeat * 0.02 * 0.4 * 0.2);
    expect((background?.mean ?? 0) - 293.15).toBeGreaterThan(0.95 * rise);
    expect((background?.mean ?? 0) - 293.15).toBeLessThan(1.05 * rise);
    expect(background?.highest).toBeGreaterThan(background?.mean ?? Infinity);
    expect(planEstimate(inputOf(path)).background).toBeNull();
  });

  it('refuses a plate without thickness', () => {
    expect(() => planEstimate(inputOf(squares(1, 0.1, 'leave'), { thickness: 0 }))).toThrow(/thickness 0 m/);
  });
});

describe('money', () => {
  const spent = { time: 1800, oxygen: 2, laser: 3.3e6 };

  it('is hours, kilograms and kilowatt hours at the plant’s rates', () => {
    expect(moneyOf(spent, rates)).toEqual({
      kind: 'ok',
      currency: 'EUR',
      machine: 70,
      oxygen: 0.6,
      // 3.3 MJ of light at a third of efficiency are 10 MJ, 2.78 kWh
      electricity: (0.25 * 10e6) / 3.6e6,
      total: 70 + 0.6 + (0.25 * 10e6) / 3.6e6,
    });
  });

  it('leaves out what the plant gives no rate for, and is none without any', () => {
    expect(moneyOf(spent, { ...rates, machineHour: null, electricityKilowattHour: null })).toMatchObject({
      machine: null,
      electricity: null,
      total: 0.6,
    });
    const none = { kind: 'none', why: 'The plant gives no rates.' };
    expect(moneyOf(spent, null)).toEqual(none);
    expect(
      moneyOf(spent, { ...rates, machineHour: null, oxygenKilogram: null, electricityKilowattHour: null }),
    ).toEqual(none);
    expect(() => moneyOf(spent, { ...rates, wallPlugEfficiency: 0 })).toThrow(/efficiency 0/);
  });
});

describe('plans side by side', () => {
  const corners = { loops: 0, dwells: 0, eases: 0, rounds: 0, overLimit: 4, hottestReturn: 700 };
  const plan = (variant: VariantEstimate['variant'], treated: Treated): VariantEstimate => ({
    variant,
    estimate: planEstimate(inputOf(squares(2, 0.1, treated), { rates })),
    corners: { ...corners, overLimit: treated === 'leave' ? 4 : 0, loops: treated === 'loop' ? 8 : 0 },
  });
  const plans = [plan('untreated', 'leave'), plan('allLoops', 'loop'), plan('planned', 'dwell')];

  it('say what each costs more than the untreated cut', () => {
    const rows = comparePlans(plans);
    const row = (figure: string) => rows.find((one) => one.figure === figure);
    const time = plans.map(({ estimate }) => estimate.time.total);
    expect(row('time')?.values).toEqual(time);
    expect(row('time')?.differences).toEqual(time.map((one) => one - (time[0] ?? 0)));
    expect(row('overLimit')?.differences).toEqual([0, -4, -4]);
    expect(row('loop')?.values[0]).toBe(0);
    expect(row('dwell')?.values[2]).toBeCloseTo(8 * (1.5 + 0.6), 9);
  });

  it('have every figure in its order, but those that no plan has', () => {
    const figures = comparePlans(plans).map(({ figure }) => figure);
    expect(figures).toEqual(comparedFigures.filter((one) => !one.endsWith('Background')));
    const poor = plans.map((one) => ({
      ...one,
      estimate: { ...one.estimate, money: moneyOf({ time: 0, oxygen: 0, laser: 0 }, null) },
    }));
    expect(comparePlans(poor).map(({ figure }) => figure)).not.toContain('money');
  });

  it('are compared against one of them', () => {
    const rows = comparePlans(plans, 'planned');
    expect(rows[0]?.differences[2]).toBe(0);
    expect(() => comparePlans(plans, 'previous')).toThrow(/no previous plan/);
  });
});

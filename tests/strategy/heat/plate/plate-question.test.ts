import { describe, expect, it } from 'vitest';
import { heatedPath, midZoneProperties } from '../../../../strategy/heat/index.ts';
import type { PlateQuestion } from '../../../../strategy/heat/plate/index.ts';
import { plateField, PlateFieldCancelled, usualLoss } from '../../../../strategy/heat/plate/index.ts';
import { circleOf, lineBetween } from '../../../../strategy/path/index.ts';

const cold = 293.15;
const plate = { minX: 0, minY: 0, maxX: 0.3, maxY: 0.2 };
const heat = heatedPath([lineBetween({ x: 0.05, y: 0.1 }, { x: 0.25, y: 0.1 })], 0.02, 11, 1e5);
const question: PlateQuestion = { plate, thickness: 0.02, plateTemperature: cold, heat };
const capacity = midZoneProperties.density * midZoneProperties.specificHeat;
const box = (width: number, height: number) => ({ minX: 0, minY: 0, maxX: width, maxY: height });

describe('what a plate’s field is asked with', () => {
  it('refuses values outside their ranges with a sentence that names them', () => {
    const refused: [Partial<PlateQuestion>, RegExp][] = [
      [{ thickness: 0 }, /thickness 0 m/],
      [{ thickness: -0.02 }, /thickness -0.02 m/],
      [{ plateTemperature: -1 }, /plate temperature -1 K/],
      [{ plateTemperature: Number.NaN }, /plate temperature NaN K/],
      [{ ambient: 0 }, /ambient temperature 0 K/],
      [{ lossCoefficient: -5 }, /loss coefficient -5/],
      [{ properties: { ...midZoneProperties, conductivity: 0 } }, /must all be positive/],
      [{ cell: 0 }, /cell 0 m/],
      [{ cell: 0.08 }, /4 must fit across/],
      [{ cell: 1e-5 }, /more than/],
      [{ step: 0.01 }, /too short for cells/],
      [{ moments: 0 }, /0 moments/],
      [{ until: Infinity }, /end Infinity s/],
      [{ plate: box(0, 0.2) }, /outside \(0, ∞\)/],
      [{ plate: { minX: 0.3, minY: 0, maxX: 0, maxY: 0.2 } }, /outside \(0, ∞\)/],
      [{ pierces: [{ at: { x: 0.1, y: 0.1 }, time: 2, heat: -3 }] }, /heat -3 J of a pierce/],
    ];
    for (const [change, message] of refused)
      expect(() => plateField({ ...question, ...change }), String(message)).toThrow(message);
  });

  it('refuses a plate that heat crosses within a second', () => {
    expect(() => plateField({ ...question, plate: box(0.3, 0.005), heat: [] })).toThrow(/heat spreads within a second/);
  });

  it('refuses pieces and pierces that are not in the order of time', () => {
    const [piece] = heat;
    if (!piece) throw new Error('there is a piece');
    expect(() => plateField({ ...question, heat: [piece, piece] })).toThrow(/times must rise/);
    expect(() => plateField({ ...question, heat: [{ ...piece, from: 12 }] })).toThrow(/times must rise/);
    expect(() => plateField({ ...question, heat: [{ ...piece, powerPerLength: -1 }] })).toThrow(/power -1 W\/m/);
    const pierce = { at: { x: 0.1, y: 0.1 }, time: 3, heat: 10 };
    expect(() => plateField({ ...question, pierces: [pierce, { ...pierce, time: 2 }] })).toThrow(/times must rise/);
  });

  it('refuses readings off the plate and outside the time', () => {
    const field = plateField(question);
    expect(() => field.at({ x: -0.01, y: 0.1 }, 5)).toThrow(/outside the plate/);
    expect(() => field.at({ x: 0.1, y: 0.1 }, 1e4)).toThrow(/time 10000 s is outside/);
    expect(() => field.at({ x: 0.1, y: 0.1 }, -1)).toThrow(/time -1 s/);
    expect(() => field.background({ x: 0.1, y: 0.1 }, 7, 6)).toThrow(/since 7 s is after/);
    expect(() => field.frame(1000)).toThrow(/frame 1000/);
    expect(() => field.mean(-3)).toThrow(/time -3 s/);
  });

  it('says how far it is, and stops when told to', () => {
    const shares: number[] = [];
    plateField({ ...question, until: 300 }, (share) => {
      shares.push(share);
      return true;
    });
    expect(shares.length).toBeGreaterThan(5);
    expect(shares.every((share, i) => share > (shares[i - 1] ?? 0) && share <= 1)).toBe(true);
    let calls = 0;
    expect(() => plateField({ ...question, until: 300 }, () => ++calls < 3)).toThrow(PlateFieldCancelled);
    expect(calls).toBe(3);
  });

  it('takes 20 W/m²K off each face and air of 20 °C when nothing else is said', () => {
    const asked = plateField({ ...question, ambient: 293.15, lossCoefficient: usualLoss });
    expect(plateField(question).mean(11)).toBe(asked.mean(11));
    expect(plateField({ ...question, lossCoefficient: 0 }).mean(11)).toBeGreaterThan(asked.mean(11));
  });
});

describe('plates of other kinds', () => {
  it('is computed on small plates with cells that fit them', () => {
    for (const [width, height] of [
      [0.05, 0.03],
      [0.012, 0.2],
      [0.301, 0.2037],
    ] as const) {
      const path = heatedPath(
        [lineBetween({ x: width * 0.2, y: height / 2 }, { x: width * 0.8, y: height / 2 })],
        0.01,
        20,
        1e4,
      );
      const field = plateField({ ...question, plate: box(width, height), heat: path, lossCoefficient: 0, until: 120 });
      const { nx, ny, cellX, cellY } = field.grid;
      expect(Math.min(nx, ny)).toBeGreaterThanOrEqual(12);
      expect(nx * cellX).toBeCloseTo(width, 12);
      expect(ny * cellY).toBeCloseTo(height, 12);
      const expected = path.reduce((sum, { from, to, powerPerLength }) => sum + powerPerLength * (to - from), 0);
      expect(((field.mean(120) - cold) * capacity * width * height) / expected).toBeCloseTo(1, 8);
    }
  });

  it('leaves out what is cut off the plate, and says how much that was', () => {
    const off = heatedPath([lineBetween({ x: 0.2, y: 0.1 }, { x: 0.4, y: 0.1 })], 0.02, 10, 1e5);
    const field = plateField({
      ...question,
      lossCoefficient: 0,
      heat: off,
      pierces: [{ at: { x: 0.31, y: 0.1 }, time: 1, heat: 500 }],
    });
    expect(field.lost).toBeCloseTo(1e5 * 5 * 0.02 + 500, 6);
    expect((field.mean(10) - cold) * capacity * 0.06).toBeCloseTo(1e5 * 5, 3);
    expect(plateField(question).lost).toBe(0);
  });

  it('conducts within the outline of a remnant only', () => {
    const edge = {
      segments: [
        lineBetween({ x: 0, y: 0 }, { x: 0.3, y: 0 }),
        lineBetween({ x: 0.3, y: 0 }, { x: 0.3, y: 0.2 }),
        lineBetween({ x: 0.3, y: 0.2 }, { x: 0.2, y: 0.2 }),
        lineBetween({ x: 0.2, y: 0.2 }, { x: 0.2, y: 0.06 }),
        lineBetween({ x: 0.2, y: 0.06 }, { x: 0.1, y: 0.06 }),
        lineBetween({ x: 0.1, y: 0.06 }, { x: 0.1, y: 0.2 }),
        lineBetween({ x: 0.1, y: 0.2 }, { x: 0, y: 0.2 }),
        lineBetween({ x: 0, y: 0.2 }, { x: 0, y: 0 }),
      ],
    };
    const shape = { edge, openings: [{ segments: [circleOf({ x: 0.25, y: 0.1 }, 0.02)] }] };
    const path = heatedPath([lineBetween({ x: 0.03, y: 0.15 }, { x: 0.07, y: 0.15 })], 0.01, 5, 1e5);
    const field = plateField({ ...question, shape, lossCoefficient: 0, heat: path, until: 150 });
    const area = 0.3 * 0.2 - 0.1 * 0.14 - 14 * 1e-4; // 14 cells of the hole have their middles in it
    const released = path.reduce((sum, { from, to, powerPerLength }) => sum + powerPerLength * (to - from), 0);
    expect(((field.mean(150) - cold) * capacity * area) / released).toBeCloseTo(1, 1);
    // the notch is no way across: the other leg is as cold as the way round it is long
    const [here, across] = [field.at({ x: 0.05, y: 0.15 }, 150), field.at({ x: 0.23, y: 0.15 }, 150)];
    expect(here - cold).toBeGreaterThan(5);
    expect(across - cold).toBeLessThan(0.05);
    const frame = field.frame(field.times.length - 1);
    expect(frame[15 + 18 * field.grid.nx]).toBeCloseTo(cold, 3);
  });

  it('counts what is pierced and cut outside a remnant’s outline as lost', () => {
    const edge = { segments: [circleOf({ x: 0.1, y: 0.1 }, 0.09)] };
    const path = heatedPath([lineBetween({ x: 0.15, y: 0.1 }, { x: 0.25, y: 0.1 })], 0.01, 12, 1e5);
    const field = plateField({ ...question, shape: { edge, openings: [] }, heat: path });
    expect(field.lost / (1e5 * 10 * 0.02)).toBeCloseTo(0.6, 2);
  });

  it('takes a source that stands still', () => {
    const at = { x: 0.15, y: 0.1 };
    const still = [{ segment: lineBetween(at, at), from: 1, to: 6, powerPerLength: 5e4 }];
    const field = plateField({ ...question, heat: still, kerfs: [], lossCoefficient: 0, until: 60 });
    expect((field.mean(60) - cold) * capacity * 0.06).toBeCloseTo(2.5e5, 1);
    expect(field.at({ x: 0.16, y: 0.1 }, 60)).toBeGreaterThan(field.at({ x: 0.19, y: 0.1 }, 60));
  });

  it('stays within the memory it is given on a cut of hours', () => {
    const long = heatedPath([lineBetween({ x: 0.1, y: 0.1 }, { x: 1.9, y: 0.9 })], 5e-4, 4200, 1e4);
    const field = plateField({ ...question, plate: box(2, 1), heat: long, until: 7200 });
    expect(field.times).toHaveLength(60);
    expect(field.times.at(-1)).toBeCloseTo(7200, 6);
    expect(field.at({ x: 1, y: 0.5 }, 7200)).toBeGreaterThan(cold);
  });
});

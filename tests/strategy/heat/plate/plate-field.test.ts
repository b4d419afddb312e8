import { describe, expect, it } from 'vitest';
import type { HeatedPiece } from '../../../../strategy/heat/index.ts';
import { heatedPath, midZoneProperties, plateCoolingTime, rectangleRise } from '../../../../strategy/heat/index.ts';
import type { PlateQuestion } from '../../../../strategy/heat/plate/index.ts';
import { plateField } from '../../../../strategy/heat/plate/index.ts';
import type { Point } from '../../../../strategy/path/index.ts';
import { arcOf, lineBetween, segmentPointAt } from '../../../../strategy/path/index.ts';

const size = { length: 0.4, width: 0.3 };
const plate = { minX: 0, minY: 0, maxX: size.length, maxY: size.width };
const thickness = 0.02;
const cold = 293.15;
const capacity = midZoneProperties.density * midZoneProperties.specificHeat;
/** No losses and no kerfs: what the exact solution knows. */
const bare: PlateQuestion = {
  plate,
  thickness,
  plateTemperature: cold,
  ambient: cold,
  lossCoefficient: 0,
  heat: [],
  kerfs: [],
};

/** Two edges and a round, near the plate's own edge at places, 29 s long. */
const heat = heatedPath(
  [
    lineBetween({ x: 0.05, y: 0.025 }, { x: 0.3, y: 0.025 }),
    arcOf({ x: 0.3, y: 0.055 }, 0.03, -Math.PI / 2, Math.PI / 2),
    lineBetween({ x: 0.33, y: 0.055 }, { x: 0.28, y: 0.17 }),
  ],
  0.015,
  29,
  1e5,
);
const pierces = [{ at: { x: 0.05, y: 0.02 }, time: 1, heat: 6000 }];
const places = [
  { x: 0.2, y: 0.0265 },
  { x: 0.2, y: 0.05 },
  { x: 0.32, y: 0.045 },
  { x: 0.29, y: 0.12 },
  { x: 0.03, y: 0.001 },
  { x: 0.37, y: 0.06 },
  { x: 0.1, y: 0.2 },
];

/** The exact rise, K, in an insulated rectangle without kerfs: heat let go in drops of some milliseconds. */
function exactRise(pieces: readonly HeatedPiece[], at: Point, time: number, dropEvery = 0.005): number {
  let rise = 0;
  for (const { at: source, time: when, heat: left } of pierces)
    rise += rectangleRise(left / thickness, size, source, at, time - when, midZoneProperties);
  for (const { segment, from, to, powerPerLength } of pieces) {
    const until = Math.min(to, time);
    const drops = Math.ceil((until - from) / dropEvery);
    for (let k = 0; k < drops; k++) {
      const when = from + ((k + 0.5) * (until - from)) / drops;
      const source = segmentPointAt(segment, (when - from) / (to - from));
      const dropped = (powerPerLength * (until - from)) / drops;
      rise += rectangleRise(dropped, size, source, at, time - when, midZoneProperties);
    }
  }
  return rise;
}

describe('the plate’s field without kerfs', () => {
  const field = plateField({ ...bare, heat, pierces, until: 120 });

  it('agrees with the insulated rectangle to half a per cent of the greatest settled rise, at any place and moment', () => {
    const scale = field.hottest.temperature - cold;
    for (const time of [12.3, 28, 35, 60, 119]) {
      for (const at of places) {
        const error = field.at(at, time) - cold - exactRise(heat, at, time);
        expect(Math.abs(error) / scale, `${at.x}, ${at.y} at ${time} s`).toBeLessThan(5e-3);
      }
    }
  });

  it('knows what heat let go before a moment leaves later, whatever is let go after', () => {
    const scale = field.hottest.temperature - cold;
    for (const [since, time] of [
      [10, 12],
      [10, 24],
      [24, 60],
      [9, 110],
    ] as const) {
      const before = heat.flatMap((piece): HeatedPiece[] => (piece.to <= since ? [piece] : partBefore(piece, since)));
      for (const at of places) {
        const error = field.background(at, since, time) - cold - exactRise(before, at, time);
        expect(Math.abs(error) / scale, `${at.x}, ${at.y} from ${since} to ${time} s`).toBeLessThan(5e-3);
      }
    }
  });

  it('joins grid and closed form without a step when time goes on', () => {
    const at = { x: 0.2, y: 0.05 };
    let last = field.at(at, 20);
    for (let time = 20.05; time < 60; time += 0.05) {
      const now = field.at(at, time);
      expect(Math.abs(now - last)).toBeLessThan(0.12);
      last = now;
    }
  });

  it('gets four times nearer and more when the cell is halved', () => {
    const worst = (cell: number): number => {
      const finer = plateField({ ...bare, heat, pierces, until: 120, cell });
      return Math.max(
        ...[70, 119].flatMap((time) =>
          places.map((at) => Math.abs(finer.at(at, time) - cold - exactRise(heat, at, time))),
        ),
      );
    };
    expect(worst(0.01) / worst(0.005)).toBeGreaterThan(4);
  });

  it('shows in its frames what it says of the cells’ middles', () => {
    for (const i of [3, field.times.length - 1]) {
      const frame = field.frame(i);
      const { nx, ny, minX, minY, cellX, cellY } = field.grid;
      expect(frame).toHaveLength(nx * ny);
      for (let k = 0; k < frame.length; k += 7) {
        const at = { x: minX + ((k % nx) + 0.5) * cellX, y: minY + (Math.floor(k / nx) + 0.5) * cellY };
        expect(Math.abs((frame[k] ?? 0) - field.at(at, field.times[i] ?? 0))).toBeLessThan(0.6);
      }
    }
  });

  it('shows settled frames without what was let go last', () => {
    const { since, temperatures } = field.settledFrame(6);
    const time = field.times[6] ?? 0;
    expect(since).toBeLessThan(time);
    const { nx, cellX, cellY } = field.grid;
    for (let k = 0; k < temperatures.length; k += 11) {
      const at = { x: ((k % nx) + 0.5) * cellX, y: (Math.floor(k / nx) + 0.5) * cellY };
      expect(Math.abs((temperatures[k] ?? 0) - field.background(at, since, time))).toBeLessThan(0.3);
    }
  });
});

/** The part of a piece before a moment. */
function partBefore(piece: HeatedPiece, since: number): HeatedPiece[] {
  const { segment, from, to } = piece;
  if (from >= since) return [];
  if (segment.kind !== 'line') throw new Error('parted within a line only');
  const end = segmentPointAt(segment, (since - from) / (to - from));
  return [{ ...piece, segment: lineBetween(segment.start, end), to: since }];
}

describe('the laws of the plate’s field', () => {
  it('keeps all heat in an insulated plate, kerf or not, and at any moment', () => {
    for (const kerfs of [heat, []]) {
      const field = plateField({ ...bare, heat, pierces, kerfs, until: 200 });
      for (const time of [10, 29, 200]) {
        const given = heat.reduce(
          (sum, { from, to, powerPerLength }) => sum + powerPerLength * (Math.min(to, time) - Math.min(from, time)),
          0,
        );
        const expected = (given + 6000 / thickness) / capacity / (size.length * size.width);
        expect((field.mean(time) - cold) / expected).toBeCloseTo(1, 9);
      }
    }
  });

  it('holds the mean of its frames to that heat too', () => {
    const field = plateField({ ...bare, heat, pierces, until: 200 });
    const frame = field.settledFrame(field.times.length - 1).temperatures;
    const mean = frame.reduce((sum, one) => sum + one, 0) / frame.length;
    expect(mean).toBeCloseTo(field.mean(200), 3);
  });

  it('loses heat from its faces as e^(−t/τ)', () => {
    const h = 25;
    const field = plateField({ ...bare, lossCoefficient: h, heat, pierces, until: 900 });
    const tau = plateCoolingTime(thickness, h, midZoneProperties);
    const early = field.mean(100) - cold;
    expect((field.mean(900) - cold) / early).toBeCloseTo(Math.exp(-800 / tau), 9);
    const warm = plateField({ ...bare, plateTemperature: 423.15, lossCoefficient: h, until: 900 });
    expect((warm.at({ x: 0.1, y: 0.1 }, 900) - cold) / 130).toBeCloseTo(Math.exp(-900 / tau), 9);
  });

  it('is the same from here to there as from there to here', () => {
    const [a, b] = [
      { x: 0.113, y: 0.094 },
      { x: 0.171, y: 0.139 },
    ];
    const from = (at: Point) => plateField({ ...bare, pierces: [{ at, time: 0, heat: 1e4 }], until: 120 });
    const [there, back] = [from(a).at(b, 110) - cold, from(b).at(a, 110) - cold];
    expect(there).toBeGreaterThan(0.5);
    expect(there / back).toBeCloseTo(1, 3);
  });

  it('adds what two cuts leave', () => {
    const other = heatedPath([lineBetween({ x: 0.06, y: 0.2 }, { x: 0.2, y: 0.26 })], 0.015, 45, 1e5);
    const first = plateField({ ...bare, heat, until: 100 });
    const second = plateField({ ...bare, heat: other, until: 100 });
    const both = plateField({ ...bare, heat: [...heat, ...other], until: 100 });
    for (const at of places) expect(both.at(at, 100) - first.at(at, 100)).toBeCloseTo(second.at(at, 100) - cold, 7);
  });

  it('cools by the air when nothing is cut', () => {
    const field = plateField({ ...bare, until: 30 });
    expect(field.at({ x: 0.2, y: 0.1 }, 30)).toBe(cold);
    expect(field.hottest.temperature).toBe(cold);
    expect(field.mean(0)).toBe(cold);
  });

  it('comes to the same to the last digit each time', () => {
    const [one, two] = [plateField({ ...bare, heat, kerfs: heat }), plateField({ ...bare, heat, kerfs: heat })];
    for (const at of places) expect(one.at(at, 29)).toBe(two.at(at, 29));
  });
});

describe('where a plate’s field is split between grid and closed form', () => {
  const field = plateField({ ...bare, heat, pierces, until: 120 });

  it('splits at a moment before the one asked for, none before the cut', () => {
    expect(field.splitBefore(0)).toBe(-Infinity);
    for (const time of [5, 20, 77, 119]) {
      const since = field.splitBefore(time);
      expect(since).toBeLessThanOrEqual(time);
      expect(since).toBeGreaterThan(time - 30);
    }
  });

  it('takes nothing before the cut for no heat', () => {
    expect(field.background({ x: 0.1, y: 0.1 }, -Infinity, 50)).toBe(cold);
    expect(field.background({ x: 0.1, y: 0.1 }, 0, 50)).toBe(cold);
  });
});

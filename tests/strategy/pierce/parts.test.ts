import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  CHOKING_GAUGE_PRESSURE,
  effectiveDuty,
  oxygenMassFlow,
  peakRiseAroundLine,
  peakRiseAroundPoint,
  pulseTrain,
  routineTime,
  stageMeanPower,
  stagePulses,
  stageQuantitiesAt,
} from '../../../strategy/pierce/index.ts';
import { radiusOfPeakAroundPoint } from '../../../strategy/pierce/crater.ts';
import { anyStage, threeRamps } from './support.ts';

describe('oxygen through a nozzle', () => {
  it('has the same flow from both formulas where it begins to choke', () => {
    const below = oxygenMassFlow(0.0015, CHOKING_GAUGE_PRESSURE - 1e-3, 1);
    const above = oxygenMassFlow(0.0015, CHOKING_GAUGE_PRESSURE, 1);
    expect(Math.abs(above / below - 1)).toBeLessThan(1e-7);
  });

  it('grows with pressure and with the square of the diameter, from nothing at no pressure', () => {
    const pressure = fc.double({ min: 0, max: 10e5, noNaN: true });
    fc.assert(
      fc.property(pressure, pressure, (a, b) => {
        expect(oxygenMassFlow(0.0015, Math.max(a, b), 0.9)).toBeGreaterThanOrEqual(
          oxygenMassFlow(0.0015, Math.min(a, b), 0.9),
        );
        expect(oxygenMassFlow(0.003, a, 0.9)).toBeCloseTo(4 * oxygenMassFlow(0.0015, a, 0.9), 12);
      }),
    );
    expect(oxygenMassFlow(0.0015, 0, 1)).toBe(0);
  });

  it('is refused for a nozzle or pressure that cannot be', () => {
    expect(() => oxygenMassFlow(0, 1e5, 1)).toThrow(RangeError);
    expect(() => oxygenMassFlow(0.001, -1, 1)).toThrow(RangeError);
  });
});

describe('pulses', () => {
  it('lose half a rise time each, and never reach the peak when shorter than the rise', () => {
    expect(effectiveDuty(0.5, 100, 1e-3)).toBeCloseTo(0.45, 12);
    expect(effectiveDuty(0.1, 1000, 200e-6)).toBeCloseTo((1e-4 ** 2 / 4e-4) * 1000, 12);
    expect(effectiveDuty(0.5, 100, 0)).toBe(0.5);
    expect(effectiveDuty(1, 100, 1e-3)).toBe(1);
  });

  it('count without a jump where the pulse is as long as the rise', () => {
    const rise = 50e-6;
    const longer = effectiveDuty(rise * 1000 * (1 + 1e-9), 1000, rise);
    const shorter = effectiveDuty(rise * 1000 * (1 - 1e-9), 1000, rise);
    expect(longer).toBeCloseTo(shorter, 9);
  });

  it('lose less as the pause becomes shorter than the rise, and nothing more at duty 100 %', () => {
    const rise = 50e-6;
    const loss = (pause: number) => 1 - pause * 1000 - effectiveDuty(1 - pause * 1000, 1000, rise);
    expect(loss(2 * rise)).toBeCloseTo(rise * 500, 12);
    expect(loss(rise / 2)).toBeCloseTo(rise * 250, 12);
    expect(loss(1e-12)).toBeCloseTo(0, 8);
  });

  it('have no on-time and no energy of their own when the power is continuous', () => {
    expect(pulseTrain({ peakPower: 3000, duty: 1, pulseFrequency: null })).toEqual({
      meanPower: 3000,
      onTime: null,
      pulseEnergy: null,
    });
  });
});

describe('a stage', () => {
  it('has a mean power and a number of pulses that agree with a sum over its time', () => {
    fc.assert(
      fc.property(anyStage, (stage) => {
        const parts = 2000;
        let power = 0;
        let pulses = 0;
        for (let i = 0; i < parts; i++) {
          const set = stageQuantitiesAt(stage, (i + 0.5) / parts);
          power += (set.peakPower * set.duty) / parts;
          pulses += ((set.pulseFrequency ?? 0) * stage.duration) / parts;
        }
        expect(Math.abs(stageMeanPower(stage) / power - 1)).toBeLessThan(1e-5);
        expect(stagePulses(stage)).toBeCloseTo(pulses, 5);
      }),
      { numRuns: 30 },
    );
  });

  it('never leaves its two ends, however it rounds', () => {
    fc.assert(
      fc.property(anyStage, fc.double({ min: -1e-15, max: 1 + 1e-15, noNaN: true }), (stage, part) => {
        const set = stageQuantitiesAt(stage, part);
        const ends = [stage.from.oxygenPressure, stage.to.oxygenPressure];
        expect(set.oxygenPressure).toBeGreaterThanOrEqual(0);
        expect(set.oxygenPressure).toBeLessThanOrEqual(Math.max(...ends) * (1 + 1e-15));
      }),
    );
  });

  it('ramps the oxygen down to nothing without a negative pressure', () => {
    const [first] = threeRamps([500, 700, 1400, 2200]);
    if (first === undefined) throw new Error('no stage');
    const stage = { ...first, from: { ...first.from, oxygenPressure: 5e-324 }, to: { ...first.to, oxygenPressure: 0 } };
    for (const part of [0, 0.3, 0.999, 1, 1 + 1e-16])
      expect(stageQuantitiesAt(stage, part).oxygenPressure).toBeGreaterThanOrEqual(0);
  });

  it('adds its time to the routine', () => {
    expect(routineTime(threeRamps([1, 2, 3, 4]))).toBe(7.5);
  });
});

describe('greatest temperature around a pierce', () => {
  const [conductivity, capacity] = [45, 7850 * 600];
  const diffusivity = conductivity / capacity;

  /** Greatest value over time, sought by golden section. */
  function greatest(of: (time: number) => number, low: number, high: number): number {
    const ratio = (Math.sqrt(5) - 1) / 2;
    let [from, to] = [low, high];
    for (let i = 0; i < 100; i++) {
      const a = to - ratio * (to - from);
      const b = from + ratio * (to - from);
      if (of(a) > of(b)) to = b;
      else from = a;
    }
    return of((from + to) / 2);
  }

  it('is what the point source on a half-space gives at its best moment', () => {
    const r = 0.005;
    const rise = (t: number) =>
      (2 * 200 * Math.exp(-(r * r) / (4 * diffusivity * t))) / (capacity * (4 * Math.PI * diffusivity * t) ** 1.5);
    expect(peakRiseAroundPoint(200, r, capacity)).toBeCloseTo(greatest(rise, 1e-3, 10), 6);
  });

  it('is what the line source gives at its best moment', () => {
    const r = 0.01;
    const rise = (t: number) => (3e5 / (4 * Math.PI * conductivity * t)) * Math.exp(-(r * r) / (4 * diffusivity * t));
    expect(peakRiseAroundLine(3e5, r, capacity)).toBeCloseTo(greatest(rise, 1e-2, 100), 6);
  });

  it('is reached again at the radius it was asked for', () => {
    const radius = radiusOfPeakAroundPoint(200, 1500, capacity);
    expect(peakRiseAroundPoint(200, radius, capacity)).toBeCloseTo(1500, 8);
  });
});

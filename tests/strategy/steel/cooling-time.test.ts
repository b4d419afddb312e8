import { describe, expect, it } from 'vitest';
import { coolingTimes, cutEdgeCoolingTime } from '../../../strategy/steel/index.ts';

const line = { heatPerLength: 1e6, plateTemperature: 293.15, thickness: 0.02 };

describe('the time from 800 to 500 °C', () => {
  it('grows with the heat, with its square in a plate heated through, and with the plate’s temperature', () => {
    const [once, twice] = [coolingTimes(line), coolingTimes({ ...line, heatPerLength: 2e6 })];
    expect(twice.thick / once.thick).toBeCloseTo(2, 9);
    expect(twice.thin / once.thin).toBeCloseTo(4, 9);
    const hot = coolingTimes({ ...line, plateTemperature: 473.15 });
    expect(hot.thick).toBeGreaterThan(once.thick);
    expect(hot.thin).toBeGreaterThan(once.thin);
  });

  it('is the same both ways at the transition thickness, which grows with the root of the heat', () => {
    for (const heatPerLength of [1e5, 1e6, 4e6]) {
      const { transition } = coolingTimes({ ...line, heatPerLength });
      const { thin, thick } = coolingTimes({ ...line, heatPerLength, thickness: transition });
      expect(thin / thick).toBeCloseTo(1, 9);
      expect(transition / coolingTimes(line).transition).toBeCloseTo(Math.sqrt(heatPerLength / 1e6), 9);
    }
  });

  it('takes the factors of a joint’s shape', () => {
    const shaped = coolingTimes({ ...line, factor2: 0.9, factor3: 0.67 });
    expect(shaped.thin / coolingTimes(line).thin).toBeCloseTo(0.9, 12);
    expect(shaped.thick / coolingTimes(line).thick).toBeCloseTo(0.67, 12);
  });

  it('beside a cut does not depend on the thickness, which its heat grows with', () => {
    for (const thickness of [0.01, 0.03]) {
      const { thin } = coolingTimes({ heatPerLength: 6.5e6 * thickness, plateTemperature: 293.15, thickness });
      expect(cutEdgeCoolingTime(6.5e6, 293.15)).toBeCloseTo(thin, 12);
    }
    // hundredths of a second where a weld takes seconds
    expect(cutEdgeCoolingTime(6.5e6, 293.15)).toBeLessThan(coolingTimes(line).thin / 20);
  });

  it('refuses heat and thickness that are none, and a plate that is not below 500 °C', () => {
    expect(() => coolingTimes({ ...line, heatPerLength: 0 })).toThrow(/heat per length 0 is outside/);
    expect(() => coolingTimes({ ...line, thickness: -1 })).toThrow(/thickness -1 is outside/);
    expect(() => coolingTimes({ ...line, factor2: 0 })).toThrow(/factor F2 0 is outside/);
    expect(() => coolingTimes({ ...line, plateTemperature: 773.15 })).toThrow(/plate temperature 500 °C is outside/);
  });
});

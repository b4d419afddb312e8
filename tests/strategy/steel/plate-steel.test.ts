import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  steelConductivity,
  steelDiffusivity,
  steelEnthalpy,
  steelSpecificHeat,
  STEEL_DENSITY,
} from '../../../strategy/steel/index.ts';
import { kelvinFromCelsius } from '../../../strategy/units/index.ts';

const celsius = kelvinFromCelsius;

describe('properties of plate steel', () => {
  it('keeps the jumps that stand in EN 1993-1-2 at 600 and 900 °C', () => {
    expect(steelSpecificHeat(celsius(599.9999))).toBeCloseTo(759.92, 2);
    expect(steelSpecificHeat(celsius(600.0001))).toBeCloseTo(760.22, 2);
    expect(steelSpecificHeat(celsius(899.9999))).toBeCloseTo(650.44, 2);
    expect(steelSpecificHeat(celsius(900.0001))).toBe(650);
  });

  it('has an enthalpy that is continuous where a branch begins', () => {
    for (const end of [600, 735, 900]) {
      const below = steelEnthalpy(celsius(end - 1e-7));
      const above = steelEnthalpy(celsius(end + 1e-7));
      expect(above - below).toBeGreaterThan(0);
      expect(above - below).toBeLessThan(2e-7 * 5100);
    }
  });

  it('has an enthalpy whose slope is the specific heat', () => {
    fc.assert(
      fc.property(fc.double({ min: 20.1, max: 1199.9, noNaN: true }), (theta) => {
        const nearBranch = [600, 735, 900].some((end) => Math.abs(theta - end) < 0.02);
        fc.pre(!nearBranch);
        const step = 1e-3;
        const slope = (steelEnthalpy(celsius(theta + step)) - steelEnthalpy(celsius(theta - step))) / (2 * step);
        expect(Math.abs(slope / steelSpecificHeat(celsius(theta)) - 1)).toBeLessThan(1e-3);
      }),
    );
  });

  it('agrees with an integral of the specific heat by Simpson’s rule', () => {
    let sum = 0;
    const panels = 20_000;
    const width = 579.999 / panels;
    for (let i = 0; i < panels; i++) {
      const at = (part: number) => steelSpecificHeat(celsius(20 + (i + part) * width));
      sum += (width / 6) * (at(0) + 4 * at(0.5) + at(1));
    }
    expect(steelEnthalpy(celsius(599.999))).toBeCloseTo(sum, 3);
  });

  it('has a diffusivity of conductivity over density and specific heat', () => {
    fc.assert(
      fc.property(fc.double({ min: 20, max: 1200, noNaN: true }), (theta) => {
        const t = celsius(theta);
        expect(steelDiffusivity(t) * STEEL_DENSITY * steelSpecificHeat(t)).toBeCloseTo(steelConductivity(t), 9);
      }),
    );
  });

  it.each([19.9, 1200.1, -40, Number.NaN, Number.POSITIVE_INFINITY])('refuses %d °C with the range', (theta) => {
    for (const property of [steelSpecificHeat, steelConductivity, steelDiffusivity, steelEnthalpy]) {
      expect(() => property(celsius(theta))).toThrow(RangeError);
    }
  });

  it('takes 293.15 K as 20 °C whatever the subtraction rounds to', () => {
    expect(steelEnthalpy(293.15)).toBeCloseTo(0, 6);
    expect(steelSpecificHeat(293.15)).toBeCloseTo(439.80176, 5);
  });
});

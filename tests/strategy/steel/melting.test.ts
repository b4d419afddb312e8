import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  carbonEquivalentCet,
  carbonEquivalentCev,
  heatingEnthalpy,
  IRON_FUSION_HEAT,
  kerfConductionFactor,
  kerfConductionHeat,
  LEDGER_BURNT_SHARE,
  LEDGER_LASER,
  LEDGER_TOTAL,
  meltingEnthalpy,
  meltingEnthalpyPerVolume,
  oxidation,
  STEEL_DENSITY,
  steelEnthalpy,
} from '../../../strategy/steel/index.ts';

describe('heat to melt a plate', () => {
  it('falls by exactly what a hotter plate already holds', () => {
    fc.assert(
      fc.property(fc.double({ min: 293.15, max: 873.15, noNaN: true }), (plate) => {
        expect(meltingEnthalpy(293.15) - meltingEnthalpy(plate)).toBeCloseTo(steelEnthalpy(plate), 3);
      }),
    );
  });

  it('never grows with the plate’s temperature, also below 20 °C', () => {
    const temperature = fc.double({ min: 233.15, max: 873.15, noNaN: true });
    fc.assert(
      fc.property(temperature, temperature, (a, b) => {
        expect(meltingEnthalpy(Math.max(a, b))).toBeLessThanOrEqual(meltingEnthalpy(Math.min(a, b)));
      }),
    );
  });

  it('is the heat to reach melting and the heat of fusion together', () => {
    expect(heatingEnthalpy(473.15) + IRON_FUSION_HEAT).toBeCloseTo(meltingEnthalpy(473.15), 6);
  });

  it('is about 10.2 J/mm³ for a cold plate', () => {
    expect(meltingEnthalpyPerVolume(293.15) / 1e9).toBeCloseTo(10.2, 1);
  });

  it.each([233, 874, Number.NaN])('refuses a plate at %d K', (plate) => {
    expect(() => meltingEnthalpy(plate)).toThrow(/plate temperature .* K is outside/);
  });
});

describe('heat of oxidation', () => {
  it('gives about 17 MJ for each kilogram of oxygen, whichever oxide forms', () => {
    for (const oxide of ['FeO', 'Fe3O4', 'Fe2O3'] as const) {
      const { heatPerIron, oxygenPerIron, heatPerOxygen } = oxidation(oxide);
      expect(heatPerOxygen / 1e6).toBeGreaterThan(16.9);
      expect(heatPerOxygen / 1e6).toBeLessThan(17.6);
      expect(heatPerOxygen * oxygenPerIron).toBeCloseTo(heatPerIron, 3);
    }
  });

  it('closes the ledger of the cut with the share of iron burnt that it implies', () => {
    const burnt = LEDGER_BURNT_SHARE * STEEL_DENSITY * oxidation('FeO').heatPerIron;
    expect(burnt + LEDGER_LASER).toBeCloseTo(LEDGER_TOTAL, 0);
  });
});

describe('heat a straight cut leaves in the plate', () => {
  it('grows with the Péclet number and never jumps', () => {
    const peclet = fc.double({ min: 0.01, max: 50, noNaN: true });
    fc.assert(
      fc.property(peclet, (value) => {
        const here = kerfConductionFactor(value);
        const next = kerfConductionFactor(value * 1.0001);
        expect(next).toBeGreaterThanOrEqual(here);
        expect(next - here).toBeLessThan(1e-3);
      }),
    );
  });

  it('goes on beyond the table without a step, growing with the Péclet number', () => {
    for (const [end, factor] of [
      [0.2, 1.712],
      [5, 3.969],
    ] as const) {
      expect(kerfConductionFactor(end)).toBeCloseTo(factor, 9);
      for (const by of [0.999999, 1.000001]) expect(kerfConductionFactor(end * by)).toBeCloseTo(factor, 4);
    }
    const factors = [1e-3, 0.05, 0.1, 0.2, 1, 5, 8, 20].map((peclet) => kerfConductionFactor(peclet));
    expect([...factors].sort((one, other) => one - other)).toEqual(factors);
    expect(new Set(factors).size).toBe(factors.length);
  });

  it('is less for a faster cut, a narrower kerf and a hotter plate', () => {
    const usual = { feed: 0.0167, kerfWidth: 0.6e-3, plateTemperature: 293.15 };
    const heat = kerfConductionHeat(usual);
    expect(kerfConductionHeat({ ...usual, feed: 0.03 })).toBeLessThan(heat);
    expect(kerfConductionHeat({ ...usual, kerfWidth: 0.4e-3 })).toBeLessThan(heat);
    expect(kerfConductionHeat({ ...usual, plateTemperature: 473.15 })).toBeLessThan(heat);
  });

  it('is refused for a feed or kerf that cannot be', () => {
    const usual = { feed: 0.0167, kerfWidth: 0.6e-3, plateTemperature: 293.15 };
    for (const wrong of [{ feed: 0 }, { feed: Number.NaN }, { kerfWidth: -1 }, { plateTemperature: 2000 }]) {
      expect(() => kerfConductionHeat({ ...usual, ...wrong })).toThrow(RangeError);
    }
    expect(() => kerfConductionFactor(0)).toThrow(RangeError);
  });
});

describe('carbon equivalent', () => {
  it('is the carbon content itself when nothing else is listed', () => {
    expect(carbonEquivalentCev({ carbon: 0.17 })).toBe(0.17);
    expect(carbonEquivalentCet({ carbon: 0.17 })).toBe(0.17);
  });

  it('counts every alloying element that the certificate lists', () => {
    const full = {
      carbon: 0.1,
      manganese: 0.6,
      chromium: 0.1,
      molybdenum: 0.1,
      vanadium: 0.05,
      nickel: 0.15,
      copper: 0.15,
    };
    expect(carbonEquivalentCev(full)).toBeCloseTo(0.1 + 0.1 + 0.05 + 0.02, 12);
    expect(carbonEquivalentCet(full)).toBeCloseTo(0.1 + 0.07 + 0.0125 + 0.00375, 12);
  });

  it('is refused for a content that is no percentage', () => {
    expect(() => carbonEquivalentCev({ carbon: -0.1 })).toThrow(/carbon -0.1 %/);
    expect(() => carbonEquivalentCet({ carbon: 0.1, manganese: Number.NaN })).toThrow(/manganese NaN %/);
  });
});

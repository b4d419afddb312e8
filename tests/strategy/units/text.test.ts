import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  celsiusFromKelvin,
  dimensionUnits,
  fahrenheitFromKelvin,
  kelvinFromCelsius,
  kelvinFromFahrenheit,
  numberText,
  quantityFrom,
  quantityIn,
  quantityParse,
  quantityText,
  unitSymbol,
  type Dimension,
  type UnitSystem,
} from '../../../strategy/units/index.ts';

describe('a quantity as somebody reads it', () => {
  it.each<[number, Dimension, UnitSystem, string]>([
    [0.012, 'length', 'metric', '12 mm'],
    [0.0127, 'length', 'metric', '12.7 mm'],
    [0.0127, 'length', 'inch', '0.5 in'],
    [-0.00227, 'length', 'metric', '−2.27 mm'],
    [-1e-7, 'length', 'metric', '0 mm'],
    [1400, 'power', 'metric', '1.4 kW'],
    [700, 'power', 'metric', '0.7 kW'],
    [7e4, 'pressure', 'metric', '0.7 bar'],
    [7e4, 'pressure', 'inch', '10.15 psi'],
    [473.15, 'temperature', 'metric', '200 °C'],
    [473.15, 'temperature', 'inch', '392 °F'],
    [0.015, 'speed', 'metric', '900 mm/min'],
    [0.5, 'speed', 'metric', '30 m/min'],
    [0.015, 'speed', 'inch', '35.43 ipm'],
    [6.7, 'time', 'metric', '6.7 s'],
    [5e-5, 'time', 'metric', '0.00005 s'],
    [900, 'time', 'metric', '15 min'],
    [200, 'frequency', 'metric', '200 Hz'],
    [0.35, 'ratio', 'metric', '35 %'],
    [Math.PI / 3, 'angle', 'metric', '60°'],
  ])('%d as %s, %s, reads %4$s', (value, dimension, system, text) => {
    expect(quantityText(value, dimension, system).text).toBe(text);
  });

  it('shows the sign of a focus position, in the unit and with the decimals asked for', () => {
    expect(quantityText(0.005, 'length', 'metric', { sign: true }).text).toBe('+5 mm');
    expect(quantityText(0.005, 'length', 'metric', { sign: true, decimals: 2 }).number).toBe('+5.00');
    expect(quantityText(0, 'length', 'metric', { sign: true, decimals: 1 }).text).toBe('0.0 mm');
    expect(quantityText(1e-4, 'length', 'metric', { unit: 'µm' }).text).toBe('100 µm');
  });

  it('refuses to show a number that is none', () => {
    expect(() => quantityText(Number.NaN, 'length', 'metric')).toThrow(RangeError);
    expect(() => numberText(Number.POSITIVE_INFINITY, 1)).toThrow(RangeError);
  });
});

/** Ranges that occur at a machine, SI. */
const RANGES: readonly (readonly [Dimension, number, number])[] = [
  ['length', -0.05, 4],
  ['time', 0, 100_000],
  ['speed', 0, 3],
  ['acceleration', 0, 30],
  ['jerk', 0, 500],
  ['power', 0, 30_000],
  ['pressure', 0, 2_500_000],
  ['frequency', 0, 50_000],
  ['angle', 0, 2 * Math.PI],
  ['temperature', 240, 1500],
  ['temperatureDifference', 0, 1500],
  ['ratio', 0, 1],
  ['energy', 0, 1e7],
  ['energyPerLength', 0, 1e6],
  ['energyPerArea', 0, 5e7],
  ['mass', 0, 5000],
  ['volumeFlow', 0, 0.01],
];

describe('what is shown can be typed again', () => {
  it.each(RANGES)('%s: shown, typed and shown again is the same text', (dimension, min, max) => {
    fc.assert(
      fc.property(
        fc.double({ min, max, noNaN: true }),
        fc.constantFrom<UnitSystem>('metric', 'inch'),
        (value, system) => {
          const shown = quantityText(value, dimension, system);
          const typed = quantityParse(shown.text, dimension, shown.unit);
          if (typed.kind === 'none') throw new Error(typed.why);
          // A value just below a change of unit may round up to it ("600 s", then "10 min"): the unit is held.
          const again = quantityText(typed.value, dimension, system, {
            unit: shown.unit,
            decimals: (shown.number.split('.')[1] ?? '').length,
          });
          expect(again.text).toBe(shown.text);
        },
      ),
    );
  });

  it.each<[Dimension, number, number]>([
    ['length', -5000, 400_000],
    ['pressure', 0, 2500],
    ['temperature', -40, 1200],
    ['speed', 0, 9999],
  ])('%s: metric, then inch, then metric keeps every digit shown', (dimension, min, max) => {
    // One step of the last metric decimal shown: 0.01 mm, 0.01 bar, 1 °C, 1 mm/min.
    const step: Partial<Record<Dimension, readonly [number, string]>> = {
      length: [0.01, 'mm'],
      pressure: [0.01, 'bar'],
      temperature: [1, '°C'],
      speed: [1, 'mm/min'],
    };
    const [size = 1, unit = ''] = step[dimension] ?? [];
    fc.assert(
      fc.property(fc.integer({ min, max }), (steps) => {
        const value = quantityFrom(steps * size, dimension, unit);
        const inch = quantityParse(quantityText(value, dimension, 'inch').text, dimension, unit);
        if (inch.kind === 'none') throw new Error(inch.why);
        expect(quantityText(inch.value, dimension, 'metric')).toEqual(quantityText(value, dimension, 'metric'));
      }),
    );
  });

  it('goes from every unit to SI and back to 1e-12', () => {
    for (const [dimension] of RANGES) {
      for (const shown of dimensionUnits(dimension)) {
        fc.assert(
          fc.property(fc.double({ min: 1, max: 1e6, noNaN: true }), (value) => {
            const there = quantityFrom(value, dimension, unitSymbol(shown));
            expect(Math.abs(quantityIn(there, dimension, unitSymbol(shown)) / value - 1)).toBeLessThan(1e-12);
          }),
          { numRuns: 20 },
        );
      }
    }
  });

  it('keeps units that differ in capitals only out of one dimension', () => {
    for (const [dimension] of RANGES) {
      const seen = new Map<string, string>();
      for (const shown of dimensionUnits(dimension)) {
        for (const spelling of shown.spellings) {
          const owner = seen.get(spelling.toLowerCase());
          expect(owner === undefined || owner === unitSymbol(shown), `${dimension} ${spelling}`).toBe(true);
          seen.set(spelling.toLowerCase(), unitSymbol(shown));
        }
      }
    }
  });
});

describe('temperature', () => {
  it('turns °C and °F into kelvin and back', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 3000, noNaN: true }), (kelvin) => {
        expect(kelvinFromCelsius(celsiusFromKelvin(kelvin))).toBeCloseTo(kelvin, 9);
        expect(kelvinFromFahrenheit(fahrenheitFromKelvin(kelvin))).toBeCloseTo(kelvin, 9);
      }),
    );
    expect(fahrenheitFromKelvin(kelvinFromCelsius(-40))).toBeCloseTo(-40, 9);
  });
});

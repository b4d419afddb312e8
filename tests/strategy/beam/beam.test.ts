import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  beamMeanIntensity,
  beamParameterProduct,
  beamPropagationRatio,
  beamRadiusAt,
  beamRayleighLength,
  beamSpotDiameter,
} from '../../../strategy/beam/index.ts';
import { TEN_KILOWATT } from '../../support/machines.ts';

const optics = TEN_KILOWATT.optics;
const anyOptics = fc.record({
  coreDiameter: fc.double({ min: 14e-6, max: 1e-3, noNaN: true }),
  halfAngle: fc.double({ min: 0.02, max: 0.3, noNaN: true }),
  collimatorFocalLength: fc.double({ min: 0.03, max: 0.3, noNaN: true }),
  focusingFocalLength: fc.double({ min: 0.08, max: 0.5, noNaN: true }),
});

describe('the beam along its axis', () => {
  it('has twice the area one Rayleigh length from the waist, either side', () => {
    fc.assert(
      fc.property(anyOptics, (some) => {
        const length = beamRayleighLength(some);
        const waist = beamSpotDiameter(some) / 2;
        expect(beamRadiusAt(some, 0)).toBe(waist);
        expect((beamRadiusAt(some, length) / waist) ** 2).toBeCloseTo(2, 9);
        expect(beamRadiusAt(some, -length)).toBe(beamRadiusAt(some, length));
      }),
    );
  });

  it('keeps its parameter product through imaging: waist times far-field angle', () => {
    fc.assert(
      fc.property(anyOptics, (some) => {
        const far = 1e4 * beamRayleighLength(some);
        const angle = beamRadiusAt(some, far) / far;
        expect(((beamSpotDiameter(some) / 2) * angle) / beamParameterProduct(some)).toBeCloseTo(1, 6);
      }),
    );
  });

  it('cannot be better than diffraction allows when the fibre carries what it should', () => {
    expect(beamPropagationRatio(optics, 1.07e-6)).toBeGreaterThan(1);
  });

  it('spreads its power over the spot', () => {
    expect(beamMeanIntensity(6000, 1e-4) / 1e10).toBeCloseTo(19.0986, 3);
  });

  it('refuses optics that cannot be', () => {
    expect(() => beamSpotDiameter({ ...optics, collimatorFocalLength: 0 })).toThrow(/collimatorFocalLength 0/);
    expect(() => beamParameterProduct({ ...optics, halfAngle: Number.NaN })).toThrow(RangeError);
    expect(() => beamPropagationRatio(optics, 0)).toThrow(RangeError);
    expect(() => beamMeanIntensity(1, 0)).toThrow(RangeError);
  });
});

import type { MachineProfile, Nozzle } from '../../strategy/machine.ts';

/** The plant's 4 kW machine: small bed, dial referred to the plate and reading one to one. Invented. */
export const FOUR_KILOWATT: MachineProfile = {
  source: {
    maxPower: 4000,
    minPower: 200,
    wavelength: 1.07e-6,
    riseTime: 40e-6,
    minFrequency: 5,
    maxFrequency: 5000,
    minDuty: 0.05,
  },
  optics: { coreDiameter: 100e-6, halfAngle: 0.08, collimatorFocalLength: 0.1, focusingFocalLength: 0.2 },
  focusScale: { reference: 'plate', offset: 0, slope: 1, minDial: -0.02, maxDial: 0.02 },
  standoff: { min: 0.0005, max: 0.02 },
  oxygen: { minPressure: 0.2e5, maxPressure: 6e5 },
  axes: { maxFeed: 1, acceleration: 8, jerk: 80 },
  bed: { length: 3, width: 1.5, shuttleTable: false },
  smallestArc: 0.0005,
};

/** The plant's 10 kW machine: large bed with a shuttle table, focus scale reversed 2.2 to 1. Invented. */
export const TEN_KILOWATT: MachineProfile = {
  source: {
    maxPower: 10_000,
    minPower: 500,
    wavelength: 1.07e-6,
    riseTime: 50e-6,
    minFrequency: 5,
    maxFrequency: 5000,
    minDuty: 0.05,
  },
  optics: { coreDiameter: 100e-6, halfAngle: 0.08, collimatorFocalLength: 0.1, focusingFocalLength: 0.2 },
  focusScale: { reference: 'plate', offset: 0, slope: -2.2, minDial: -0.01, maxDial: 0.01 },
  standoff: { min: 0.0005, max: 0.025 },
  oxygen: { minPressure: 0.2e5, maxPressure: 10e5 },
  axes: { maxFeed: 2, acceleration: 12, jerk: 120 },
  bed: { length: 4, width: 2, shuttleTable: true },
  smallestArc: 0.0005,
};

export const NOZZLE_1_5: Nozzle = { type: 'single', diameter: 0.0015 };

import type { MachineProfile } from '../../strategy/machine.ts';
import { demoId } from './ids.ts';

export type DemoMachine = {
  readonly id: string;
  readonly revisionId: string;
  readonly name: string;
  readonly profile: MachineProfile;
  readonly note: string;
};

const source = { wavelength: 1.07e-6, minFrequency: 5, maxFrequency: 5000, minDuty: 0.05 };
const optics = { coreDiameter: 100e-6, halfAngle: 0.08, collimatorFocalLength: 0.1, focusingFocalLength: 0.2 };

const four: MachineProfile = {
  source: { ...source, maxPower: 4000, minPower: 200, riseTime: 40e-6 },
  optics,
  focusScale: { reference: 'plate', offset: 0, slope: 1, minDial: -0.02, maxDial: 0.02 },
  standoff: { min: 0.0005, max: 0.02 },
  oxygen: { minPressure: 0.2e5, maxPressure: 6e5 },
  axes: { maxFeed: 1, acceleration: 8, jerk: 80 },
  bed: { length: 3, width: 1.5, shuttleTable: false },
  smallestArc: 0.0005,
};

/** Its dial turns the other way and not one to one: 2.2 mm of travel for each millimetre typed. */
const ten: MachineProfile = {
  source: { ...source, maxPower: 10_000, minPower: 500, riseTime: 50e-6 },
  optics,
  focusScale: { reference: 'plate', offset: 0, slope: -2.2, minDial: -0.01, maxDial: 0.01 },
  standoff: { min: 0.0005, max: 0.025 },
  oxygen: { minPressure: 0.2e5, maxPressure: 10e5 },
  axes: { maxFeed: 2, acceleration: 12, jerk: 120 },
  bed: { length: 4, width: 2, shuttleTable: true },
  smallestArc: 0.0005,
};

export const demoMachines = {
  quay: [
    {
      id: demoId('quay machine 1'),
      revisionId: demoId('quay machine 1 revision 1'),
      name: 'No. 1, 4 kW',
      profile: four,
      note: 'Focus checked with a ramp of test pierces: the dial reads one to one, zero at the plate’s top.',
    },
    {
      id: demoId('quay machine 2'),
      revisionId: demoId('quay machine 2 revision 1'),
      name: 'No. 2, 10 kW',
      profile: ten,
      note: 'Focus scale is reversed, 2.2 to 1: to have the focus 5 mm above the plate, type −2.27.',
    },
  ],
  upland: [
    {
      id: demoId('upland machine 1'),
      revisionId: demoId('upland machine 1 revision 1'),
      name: 'The machine, 4 kW',
      profile: four,
      note: '',
    },
  ],
} as const satisfies Record<string, readonly DemoMachine[]>;

import type { Machine } from '@/shared/machines.ts';
import type { MachineProfile } from '@/strategy/machine.ts';

/** An invented machine with a reversed focus dial. */
export const profileOf = (): MachineProfile => ({
  source: {
    maxPower: 10_000,
    minPower: 500,
    wavelength: 1.07e-6,
    riseTime: 20e-6,
    minFrequency: 1,
    maxFrequency: 5000,
    minDuty: 0.02,
  },
  optics: { coreDiameter: 100e-6, halfAngle: 0.07, collimatorFocalLength: 0.1, focusingFocalLength: 0.2 },
  focusScale: { reference: 'plate', offset: 0, slope: -2.2, minDial: -0.012, maxDial: 0.012 },
  standoff: { min: 0.0005, max: 0.03 },
  oxygen: { minPressure: 0.1e5, maxPressure: 6e5 },
  axes: { maxFeed: 2, acceleration: 8, jerk: 80 },
  bed: { length: 4, width: 2, shuttleTable: true },
  smallestArc: 0.0005,
});

const by = { id: '019a0000-0000-7000-8000-000000000020', name: 'Engineer' };

export const machineOf = ({ version = 1, revisions = 1 } = {}): Machine => ({
  id: '019a0000-0000-7000-8000-000000000003',
  version,
  name: 'No. 2',
  revisions: Array.from({ length: revisions }, (_, index) => ({
    id: `019a0000-0000-7000-8000-0000000001${String(revisions - index).padStart(2, '0')}`,
    number: revisions - index,
    profile: profileOf(),
    note: '',
    madeAt: '2031-03-01T09:00:00Z',
    madeBy: by,
  })),
});

import {
  beamMeanIntensity,
  beamParameterProduct,
  beamPropagationRatio,
  beamRadiusAt,
  beamRayleighLength,
  beamSpotDiameter,
  dialForFocus,
  focusForDial,
  type Optics,
} from '../../strategy/beam/index.ts';
import type { FocusScale } from '../../strategy/machine.ts';
import { outsideChecks, type OutsideCheck } from './check.ts';

const ISO_11145 = 'ISO 11145 and ISO 11146, definitions seen through a glossary';
const ISO_11146 = 'ISO 11146, relation seen through a beam-diagnosis formulary';
const IMAGING = 'geometric imaging of the fibre’s end';
const GAUSSIAN = 'Gaussian optics, w₀ = λ·f·M²/(π·w)';
const FORMULA = 'computed from a published formula' as const;

function optics(core: number, halfAngle: number, collimator = 100, focusing = 200): Optics {
  return {
    coreDiameter: core * 1e-6,
    halfAngle: halfAngle * 1e-3,
    collimatorFocalLength: collimator * 1e-3,
    focusingFocalLength: focusing * 1e-3,
  };
}

function value(
  id: string,
  what: string,
  unit: string,
  expected: number,
  source: string,
  got: () => number,
): OutsideCheck {
  return { id, what, unit, got, expected, tolerance: { rel: 1e-6 }, source, standing: FORMULA };
}

const FIBRES = [
  [50, 80, 2, 5.8721358011],
  [100, 80, 4, 11.7442716022],
  [150, 100, 7.5, 22.0205092541],
] as const;

outsideChecks('beam', [
  ...FIBRES.flatMap(([core, angle, product, ratio]) => [
    value(`B01-${core}`, `BPP of ${core} µm, ${angle} mrad`, 'mm·mrad', product, ISO_11145, () => {
      return beamParameterProduct(optics(core, angle)) * 1e6;
    }),
    value(`B02-${core}`, `M² of ${product} mm·mrad at 1.07 µm`, '', ratio, ISO_11145, () => {
      return beamPropagationRatio(optics(core, angle), 1.07e-6);
    }),
  ]),
  ...(
    [
      [100, 100, 200, 200],
      [100, 75, 150, 200],
      [150, 100, 150, 225],
    ] as const
  ).map(([core, collimator, focusing, spot]) =>
    value(
      `B03-${core}-${collimator}`,
      `spot of ${core} µm by ${collimator} and ${focusing} mm`,
      'µm',
      spot,
      IMAGING,
      () => {
        return beamSpotDiameter(optics(core, 80, collimator, focusing)) * 1e6;
      },
    ),
  ),
  ...(
    [
      [50, 80, 200, 1.25],
      [100, 80, 200, 2.5],
      [150, 100, 150, 1.6875],
    ] as const
  ).map(([core, angle, focusing, length]) =>
    value(
      `B04-${core}`,
      `Rayleigh length of ${core} µm, ${angle} mrad by 100 and ${focusing} mm`,
      'mm',
      length,
      ISO_11146,
      () => {
        return beamRayleighLength(optics(core, angle, 100, focusing)) * 1e3;
      },
    ),
  ),
  ...(
    [
      [2.5, 0.141421356237],
      [10, 0.412310562562],
      [20, 0.80622577483],
    ] as const
  ).map(([distance, radius]) =>
    value(`B05-${distance}`, `beam radius ${distance} mm from the waist`, 'mm', radius, ISO_11146, () => {
      return beamRadiusAt(optics(100, 80), distance * 1e-3) * 1e3;
    }),
  ),
  value('B06', 'waist of a beam of M² 1.1 and 5 mm radius focused by 200 mm', 'µm', 14.9860294415, GAUSSIAN, () => {
    // A fibre with that beam's product, collimated to that radius: imaging must come to the same as diffraction.
    const [halfAngle, radius, wavelength] = [0.05, 5e-3, 1.07e-6];
    const coreDiameter = (2 * 1.1 * wavelength) / Math.PI / halfAngle;
    const collimatorFocalLength = radius / halfAngle;
    return (beamSpotDiameter({ coreDiameter, halfAngle, collimatorFocalLength, focusingFocalLength: 0.2 }) / 2) * 1e6;
  }),
  value('B07', 'mean intensity of 6 kW in a radius of 0.1 mm', 'MW/cm²', 19.098593171, 'definition', () => {
    return beamMeanIntensity(6000, 1e-4) / 1e10;
  }),
  ...(
    [
      [1000, 3.18309886184],
      [2000, 6.36619772368],
      [6000, 19.098593171],
    ] as const
  ).map(([power, intensity]) =>
    value(`P04-${power}`, `intensity of ${power} W in a 0.2 mm spot`, 'MW/cm²', intensity, 'definition', () => {
      return beamMeanIntensity(power, beamSpotDiameter(optics(100, 80)) / 2) / 1e10;
    }),
  ),
]);

const REVERSED: FocusScale = { reference: 'plate', offset: 0, slope: -2.2, minDial: -0.01, maxDial: 0.01 };
const PRACTICE = 'common practice: a dial seen reversed, 2.2 to 1; no source';

outsideChecks('focus dial', [
  {
    id: 'D01',
    what: 'number to type for a focus 5 mm above the plate on a reversed dial',
    unit: 'mm',
    got: () => {
      const reading = dialForFocus(REVERSED, 0.005, 0.001);
      if (reading.kind === 'none') throw new Error(reading.why);
      return reading.typed * 1e3;
    },
    expected: -2.27,
    tolerance: { abs: 0.005 },
    source: PRACTICE,
    standing: 'common practice',
  },
  {
    id: 'D02',
    what: 'focus position when +1 is typed on it',
    unit: 'mm',
    got: () => focusForDial(REVERSED, 0.001, 0.001) * 1e3,
    expected: -2.2,
    tolerance: { abs: 1e-9 },
    source: PRACTICE,
    standing: 'common practice',
  },
]);

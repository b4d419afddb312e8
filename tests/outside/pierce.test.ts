import {
  DEFAULT_RESERVE_RULES,
  PIERCE_DEFAULTS,
  peakRiseAroundLine,
  peakRiseAroundPoint,
  pierceParameters,
  piercePredict,
  pierceStageDefaults,
  pierceWarmth,
  pulseTrain,
  stageQuantitiesAt,
  type PierceParameters,
  type Stage,
  type StageQuantities,
} from '../../strategy/pierce/index.ts';
import {
  boreMoment,
  boreMomentEmpty,
  boreOf,
  boreSet,
  CONDUCTION,
  SET_SIZE,
  WALL,
} from '../../strategy/pierce/bore.ts';
import { toleranceFactor } from '../../strategy/pierce/tolerance-factor.ts';
import { beamMeanIntensity, beamRadiusAt } from '../../strategy/beam/index.ts';
import { netRemovalHeat } from '../../strategy/pierce/parameters.ts';
import { meltingEnthalpy, meltingEnthalpyPerVolume, STEEL_DENSITY } from '../../strategy/steel/index.ts';
import type { MachineProfile } from '../../strategy/machine.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../support/machines.ts';
import { outsideChecks, type OutsideCheck } from './check.ts';

const FORMULA = 'computed from a published formula' as const;
const DEFINITION = 'definition; pulse formulary';
const NIST = 'NIST Chemistry WebBook, iron (Chase 1998): 10.2 J/mm³ to melt';

const PULSES = [
  [6000, 0.25, 100, 1500, 15, 2.5],
  [3000, 0.4, 200, 1200, 6, 2],
  [12_000, 0.1, 500, 1200, 2.4, 0.2],
] as const;

outsideChecks(
  'pulses',
  PULSES.flatMap(([peakPower, duty, pulseFrequency, mean, energy, on]) => {
    const train = () => pulseTrain({ peakPower, duty, pulseFrequency });
    const name = `${peakPower / 1000} kW, ${duty * 100} %, ${pulseFrequency} Hz`;
    const one = (part: string, unit: string, expected: number, got: () => number): OutsideCheck => ({
      id: `U01-${peakPower}-${part}`,
      what: `${part} of ${name}`,
      unit,
      got,
      expected,
      tolerance: { rel: 1e-6 },
      source: DEFINITION,
      standing: FORMULA,
    });
    return [
      one('mean', 'W', mean, () => train().meanPower),
      one('energy', 'J', energy, () => train().pulseEnergy ?? Number.NaN),
      one('on-time', 'ms', on, () => (train().onTime ?? Number.NaN) * 1e3),
    ];
  }),
);

outsideChecks('ramps', [
  {
    id: 'U02',
    what: 'oxygen three fifths through a ramp from 1.1 to 0.8 bar',
    unit: 'bar',
    got: () => {
      const at = (oxygenPressure: number) => ({ ...stageOf(1000), oxygenPressure });
      return (
        stageQuantitiesAt({ duration: 5, from: at(1.1e5), to: at(0.8e5) }, (18 - 15) / (20 - 15)).oxygenPressure / 1e5
      );
    },
    expected: 0.92,
    tolerance: { rel: 1e-6 },
    source: 'definition of a straight line',
    standing: FORMULA,
  },
]);

/** Energy to melt a volume of iron from 25 °C, J/m³, from the NIST enthalpy of the liquid. */
const NIST_MELTING = 10.2e9;

/** Energy to melt a cylinder out of a plate, J; diameter and thickness in m. */
function leastEnergy(diameter: number, thickness: number): number {
  return meltingEnthalpyPerVolume(298.15) * (Math.PI / 4) * diameter ** 2 * thickness;
}

/** Continuous power of so many watts. */
function stageOf(power: number): StageQuantities {
  return {
    standoff: 0.006,
    focusPosition: 0,
    peakPower: power,
    duty: 1,
    pulseFrequency: null,
    oxygenPressure: 0.6e5,
  };
}

/** The same, long enough. */
function flat(power: number): readonly Stage[] {
  const set = stageOf(power);
  return [{ duration: 60, from: set, to: set }];
}

/** A pierce as it is begun with on the 10 kW machine, on a plate at 25 °C. */
function begun(millimetres: number) {
  const stages = pierceStageDefaults(TEN_KILOWATT, millimetres * 1e-3);
  return piercePredict({
    stages,
    thickness: millimetres * 1e-3,
    plateTemperature: 298.15,
    profile: TEN_KILOWATT,
    nozzle: NOZZLE_1_5,
  });
}

/** Light absorbed of a source's full power in the waist of its beam, W/cm². */
function absorbedIntensity({ source, optics }: MachineProfile): number {
  return (PIERCE_DEFAULTS.coupling * beamMeanIntensity(source.maxPower, beamRadiusAt(optics, 0))) / 1e4;
}

/** Predicted pierce of 6 mm with a bore of 1 mm, s. */
function predictedTime(power: number): number {
  const { breakthrough } = piercePredict({
    stages: flat(power),
    thickness: 0.006,
    plateTemperature: 298.15,
    profile: TEN_KILOWATT,
    nozzle: NOZZLE_1_5,
    parameters: { boreRadius: 0.5e-3, spotFollowing: 0 },
  });
  if (breakthrough.kind === 'none') throw new Error(breakthrough.why);
  return breakthrough.time;
}

outsideChecks('least energy and time of a pierce', [
  ...(
    [
      [0.6, 57.6796411199],
      [1, 160.221225333],
      [2, 640.884901332],
    ] as const
  ).map(([diameter, expected]): OutsideCheck => ({
    id: `P01-${diameter}`,
    what: `least energy for a ${diameter} mm hole in 20 mm`,
    unit: 'J',
    got: () => leastEnergy(diameter * 1e-3, 0.02),
    expected,
    tolerance: { rel: 0.005 },
    source: NIST,
    standing: FORMULA,
  })),
  ...(
    [
      [500, 0.801106126665],
      [1000, 0.400553063333],
      [2000, 0.200276531666],
    ] as const
  ).map(([power, expected]): OutsideCheck => ({
    id: `P02-${power}`,
    what: `least time for a 1 mm hole in 20 mm with 40 % of ${power} W`,
    unit: 's',
    got: () => leastEnergy(1e-3, 0.02) / (PIERCE_DEFAULTS.coupling * power),
    expected,
    tolerance: { rel: 0.005 },
    source: NIST,
    standing: FORMULA,
  })),
  ...[500, 1000, 2000, 4000].map((power): OutsideCheck => ({
    id: `P02-bound-${power}`,
    what: `predicted time for 6 mm with a 1 mm bore and ${power} W, against bare melting`,
    unit: 's',
    got: () => predictedTime(power),
    expected: (NIST_MELTING * (Math.PI / 4) * 1e-3 ** 2 * 0.006) / (0.4 * power),
    tolerance: { bound: 'at least' },
    source: `${NIST}: a lower bound of any pierce that oxidation does not feed`,
    standing: FORMULA,
  })),
  ...[8, 20, 30].map((millimetres): OutsideCheck => ({
    id: `P01-bound-${millimetres}`,
    what: `heat that a whole pierce of ${millimetres} mm takes up, against bare melting of its bore`,
    unit: 'J',
    got: () => {
      const { energy, oxidationHeat } = begun(millimetres);
      return energy.absorbed + oxidationHeat;
    },
    expected: NIST_MELTING * Math.PI * PIERCE_DEFAULTS.boreRadius ** 2 * millimetres * 1e-3,
    tolerance: { bound: 'at least' },
    source: NIST,
    standing: FORMULA,
  })),
  ...(['at least', 'at most'] as const).flatMap((bound) =>
    [FOUR_KILOWATT, TEN_KILOWATT].map((profile): OutsideCheck => ({
      id: `P05-${profile.source.maxPower}-${bound === 'at least' ? 'low' : 'high'}`,
      what: `intensity absorbed of ${profile.source.maxPower} W in the waist, where melt is thrown out efficiently`,
      unit: 'MW/cm²',
      got: () => absorbedIntensity(profile) / 1e6,
      expected: bound === 'at least' ? 1 : 100,
      tolerance: { bound },
      source: 'von Allmen, J. Appl. Phys. 47 (1976) 5460, abstract: 1 to 100 MW/cm² for most metals',
      standing: 'published',
    })),
  ),
]);

outsideChecks(
  'margin from few trials',
  (
    [
      [3, 7.65590013315],
      [5, 4.20268074126],
      [10, 2.91096341308],
      [20, 2.39600168375],
      [30, 2.21983753204],
    ] as const
  ).map(([trials, expected]): OutsideCheck => ({
    id: `P08-${trials}`,
    what: `standard deviations above the mean of ${trials} pierces by when 95 % are through, with 95 % confidence`,
    unit: '',
    got: () => toleranceFactor(trials),
    expected,
    tolerance: { rel: 1e-6 },
    source:
      'ISO 16269-6 and NIST/SEMATECH handbook, 7.2.6.3, through the noncentral t; tables as remembered read 7.656, 4.203, 2.911, 2.396, 2.220',
    standing: FORMULA,
  })),
);

outsideChecks('the ledger in the pierce', [
  {
    id: 'O06-pierce',
    what: 'energy per removed volume with the default parameters, cold plate',
    unit: 'J/mm³',
    got: () => ((meltingEnthalpy(293.15) + PIERCE_DEFAULTS.expulsionHeat) * STEEL_DENSITY) / 1e9,
    expected: 26,
    tolerance: { rel: 0.15 },
    source: 'Fomin et al., J. Appl. Mech. Tech. Phys. 58 (2017), abstract (cutting)',
    standing: 'published',
  },
  {
    id: 'O07-pierce',
    what: 'of that from the laser where oxygen is ample',
    unit: 'J/mm³',
    got: () => (netRemovalHeat(PIERCE_DEFAULTS, 293.15) * STEEL_DENSITY) / 1e9,
    expected: 12,
    tolerance: { abs: 1 },
    source: 'Golyshev et al., Quantum Electron. 45 (2015), abstract (cutting): 11…13 J/mm³',
    standing: 'published',
  },
  {
    id: 'R01',
    what: 'reserve asked for on a cold plate',
    unit: '',
    got: () => DEFAULT_RESERVE_RULES.cold,
    expected: 2,
    tolerance: { abs: 0 },
    source: 'common practice: a careful production pierce is through at about half of its routine; no source',
    standing: 'common practice',
  },
]);

/** Flows at one moment of a continuous pierce with a bore of a radius, at a depth, in m. */
function flowsAt(radius: number, depth: number, parameters: Partial<PierceParameters>): Float64Array {
  const all = pierceParameters({ ...parameters, boreRadius: radius, spotFollowing: 0 });
  const bore = boreOf(TEN_KILOWATT, NOZZLE_1_5, 293.15, all);
  const set = new Float64Array(SET_SIZE);
  const moment = boreMomentEmpty();
  const [stage] = flat(90_000);
  if (stage === undefined) throw new Error('no stage');
  boreSet(set, stage.from);
  boreMoment(bore, set, depth, moment);
  return moment;
}

const HOT_BORE =
  'hot cylinder in an infinite plate, 4πkdΔT/X·(1 − π²/6X²), X = ln(4αt/a²) − 0.577 (Carslaw & Jaeger, Conduction of Heat in Solids, 2nd ed., chapter 13, from memory)';

outsideChecks('what the plate conducts away in a pierce', [
  {
    id: 'H-disk',
    what: 'disk of 0.75 mm at melting on a half-space, k 30 W/(m K), plate at 20 °C',
    unit: 'W',
    got: () => flowsAt(0.75e-3, 0, {})[CONDUCTION] ?? Number.NaN,
    expected: 4 * 30 * 0.75e-3 * (1809 - 293.15),
    tolerance: { rel: 1e-9 },
    source:
      'steady disk on a half-space, 4kaΔT (Carslaw & Jaeger, Conduction of Heat in Solids, 2nd ed., chapter 8), seen quoted',
    standing: FORMULA,
  },
  {
    id: 'H-bore-1s',
    what: 'whole wall of a 1 mm bore in 20 mm kept at melting, taken for 3 s, against the loss after 1 s',
    unit: 'kW',
    got: () => wallLoss(),
    expected: 2.5,
    tolerance: { bound: 'at most' },
    source: HOT_BORE,
    standing: FORMULA,
  },
  {
    id: 'H-bore-5s',
    what: 'the same against the loss after 5 s',
    unit: 'kW',
    got: () => wallLoss(),
    expected: 1.9,
    tolerance: { bound: 'at least' },
    source: HOT_BORE,
    standing: FORMULA,
  },
]);

/** Loss of the whole wall, kW: the model takes a share of it, and the loss is linear in that share. */
function wallLoss(): number {
  const share = 0.3;
  return (flowsAt(0.5e-3, 0.02, { wallShare: share, attenuationLength: 0.06 })[WALL] ?? Number.NaN) / share / 1e3;
}

/** k 45 W/(m K), c 600 J/(kg K), ρ 7850 kg/m³: simple-model values of ENV 1993-1-2:1995, from memory. */
const CAPACITY = 7850 * 600;
const SOURCES_MAXIMUM =
  'instantaneous source (Carslaw & Jaeger, Conduction of Heat in Solids, 2nd ed., 10.3(1) and chapter 10) evaluated at its best moment';

outsideChecks('greatest temperature around a pierce', [
  ...(
    [
      [200, 5, 50.01490265642507],
      [200, 3, 231.55047526122715],
      [50, 2, 195.37071350166048],
    ] as const
  ).map(([heat, millimetres, expected]): OutsideCheck => ({
    id: `C01-${heat}-${millimetres}`,
    what: `rise ${millimetres} mm from ${heat} J at a point of the surface`,
    unit: 'K',
    got: () => peakRiseAroundPoint(heat, millimetres * 1e-3, CAPACITY),
    expected,
    tolerance: { rel: 1e-9 },
    source: SOURCES_MAXIMUM,
    standing: FORMULA,
  })),
  ...(
    [
      [10, 74.5857726424448],
      [5, 298.3430905697792],
    ] as const
  ).map(([millimetres, expected]): OutsideCheck => ({
    id: `C02-${millimetres}`,
    what: `rise ${millimetres} mm from 6 kJ along a line through 20 mm`,
    unit: 'K',
    got: () => peakRiseAroundLine(6000 / 0.02, millimetres * 1e-3, CAPACITY),
    expected,
    tolerance: { rel: 1e-9 },
    source: SOURCES_MAXIMUM,
    standing: FORMULA,
  })),
  {
    id: 'C03-slow',
    what: 'greatest rise 10 mm from 6 kJ given off along a line through 20 mm in 10 s, against the same at once',
    unit: 'K',
    got: () => pierceWarmth({ perLength: 6000 / 0.02, duration: 10 }, 0.01),
    expected: peakRiseAroundLine(6000 / 0.02, 0.01, STEEL_DENSITY * 529.8),
    tolerance: { bound: 'at most' },
    source: `${SOURCES_MAXIMUM}; c at 200 °C 529.8 J/(kg K), EN 1993-1-2:2005, 3.4.1.2`,
    standing: FORMULA,
  },
  {
    id: 'C03-at-once',
    what: 'the same given off in 1 ms',
    unit: 'K',
    got: () => pierceWarmth({ perLength: 6000 / 0.02, duration: 1e-3 }, 0.01),
    expected: 6000 / 0.02 / (Math.PI * Math.E * 7850 * 529.8 * 0.01 ** 2),
    tolerance: { rel: 1e-3 },
    source: `${SOURCES_MAXIMUM}; c at 200 °C 529.8 J/(kg K), EN 1993-1-2:2005, 3.4.1.2`,
    standing: FORMULA,
  },
  {
    id: 'H29-bound',
    what: 'greatest rise 10 mm from 6 kJ along a line through 20 mm, against the rise after 5 s',
    unit: 'K',
    got: () => peakRiseAroundLine(6000 / 0.02, 0.01, CAPACITY),
    expected: 62.870670747,
    tolerance: { bound: 'at least' },
    source: 'instantaneous line source 5 s after 6 kJ in 20 mm: 62.87 K at 10 mm (Carslaw & Jaeger, 10.3(1))',
    standing: FORMULA,
  },
]);

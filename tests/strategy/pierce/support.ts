import * as fc from 'fast-check';
import type { PierceInput, PierceParameters, Stage, StageQuantities } from '../../../strategy/pierce/index.ts';
import { meltingEnthalpy, STEEL_DENSITY } from '../../../strategy/steel/index.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';

/** Ordinary conditions by mean power: duty 40 %, focus 5 mm above the plate. */
export function conditions(
  meanPower: number,
  frequency: number,
  standoff: number,
  oxygenPressure: number,
): StageQuantities {
  const duty = 0.4;
  return {
    standoff,
    focusPosition: 0.005,
    peakPower: meanPower / duty,
    duty,
    pulseFrequency: frequency,
    oxygenPressure,
  };
}

/** Three ramps of mean power (W), from 10 mm standoff, 100 Hz and 0.5 bar to 4 mm, 200 Hz and 0.7 bar. */
export function threeRamps(powers: readonly [number, number, number, number]): readonly Stage[] {
  const [a, b, c, d] = powers;
  const knots = [
    conditions(a, 100, 0.01, 0.5e5),
    conditions(b, 130, 0.008, 0.6e5),
    conditions(c, 160, 0.006, 0.6e5),
    conditions(d, 200, 0.004, 0.7e5),
  ] as const;
  return [
    { duration: 1.5, from: knots[0], to: knots[1] },
    { duration: 2, from: knots[1], to: knots[2] },
    { duration: 4, from: knots[2], to: knots[3] },
  ];
}

/** One stage that holds a mean power. */
export function held(meanPower: number, duration: number): readonly Stage[] {
  const set = conditions(meanPower, 150, 0.006, 0.6e5);
  return [{ duration, from: set, to: set }];
}

/** The same stages with continuous power of the same mean, focus on the plate: nothing pulsed, nothing beside the bore. */
export function continuous(stages: readonly Stage[]): readonly Stage[] {
  const plain = (set: StageQuantities): StageQuantities => ({
    ...set,
    peakPower: set.peakPower * set.duty,
    duty: 1,
    pulseFrequency: null,
    focusPosition: 0,
  });
  return stages.map((stage) => ({ ...stage, from: plain(stage.from), to: plain(stage.to) }));
}

/** The plain arithmetic: 12 J/mm³ of absorbed light, 135 W lost, bore radius 0.75 mm, coupling 0.4 fading over 12 mm. */
export const PLAIN: Partial<PierceParameters> = {
  attenuationLength: 0.012,
  spotFollowing: 0,
  guidedShare: 1,
  burntShare: 0,
  expulsionHeat: 12e9 / STEEL_DENSITY - meltingEnthalpy(293.15),
  conductivity: 135 / (4 * 0.75e-3 * (1809 - 293.15)),
  deepConduction: 0,
  wallShare: 0,
  pauseLoss: 0,
};

export function input(stages: readonly Stage[], changed: Partial<PierceInput> = {}): PierceInput {
  return { stages, thickness: 0.019, plateTemperature: 293.15, profile: TEN_KILOWATT, nozzle: NOZZLE_1_5, ...changed };
}

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/** Any quantities that a machine could be asked for. */
const anyQuantities = (pulsed: boolean): fc.Arbitrary<StageQuantities> =>
  fc.record({
    standoff: number(0.001, 0.02),
    focusPosition: number(-0.015, 0.02),
    peakPower: number(200, 12_000),
    duty: pulsed ? number(0.05, 1) : fc.constant(1),
    pulseFrequency: pulsed ? number(5, 3000) : fc.constant(null),
    oxygenPressure: number(0, 3e5),
  });

export const anyStage: fc.Arbitrary<Stage> = fc
  .boolean()
  .chain((pulsed) => fc.record({ duration: number(0.1, 6), from: anyQuantities(pulsed), to: anyQuantities(pulsed) }));

export const anyStages = fc.array(anyStage, { minLength: 1, maxLength: 5 });
export const anyThickness = number(0.003, 0.04);
export const anyPlate = number(253.15, 773.15);

/** Moment of breakthrough, s; infinite when there is none, so that two can be compared. */
export function throughAt(
  breakthrough: { readonly kind: 'through'; readonly time: number } | { readonly kind: 'none' },
): number {
  return breakthrough.kind === 'through' ? breakthrough.time : Number.POSITIVE_INFINITY;
}

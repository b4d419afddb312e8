import { beamRayleighLength, beamSpotDiameter } from '../beam/index.ts';
import type { MachineProfile, Nozzle } from '../machine.ts';
import {
  IRON_MELTING_TEMPERATURE,
  HOT_DIFFUSIVITY,
  meltingEnthalpy,
  oxidation,
  STEEL_DENSITY,
} from '../steel/index.ts';
import { oxygenMassFlow } from './oxygen-flow.ts';
import { netRemovalHeat, REFERENCE_BEAM_RADIUS, type PierceParameters } from './parameters.ts';
import { effectiveDuty } from './pulse.ts';
import type { StageQuantities } from './stage.ts';

/** What stays the same through one prediction. */
export type Bore = {
  readonly parameters: PierceParameters;
  readonly waist: number; // m
  readonly rayleighLength: number; // m
  readonly riseTime: number; // s
  readonly nozzleDiameter: number; // m
  /** Growth of the jet's radius with distance, for this nozzle. */
  readonly jetSpread: number;
  /** Heat to melt a kilogram from the plate's temperature, J/kg. */
  readonly meltHeat: number;
  /** Melting temperature less the plate's, K. */
  readonly temperatureRise: number;
  /** Heat lost per metre of wall kept at melting, W/m. */
  readonly wallLossPerDepth: (boreRadius: number) => number;
};

/** Every flow of heat at one moment, W, and what follows from them. Filled anew by `boreMoment`, to spare the garbage. */
export type BoreMoment = {
  /** Speed of the bottom, m/s. */
  speed: number;
  boreRadius: number; // m
  /** Power leaving the source, W. */
  emitted: number;
  /** Light absorbed at the bottom, W. */
  bottomLight: number;
  /** Light absorbed on the way down, W. */
  wallLight: number;
  oxidation: number; // W
  melt: number; // W
  expulsion: number; // W
  conduction: number; // W
  pauses: number; // W
  wall: number; // W
  /** Oxygen through the nozzle, kg/s. */
  oxygenFlow: number;
  /** Below 1 the melt finds its way out; above it the pierce erupts. Without unit. */
  eruptionIndex: number;
};

const FEO = oxidation('FeO');

/** Time for which a bore's wall loss is taken, s: a few seconds into the pierce. It stands under a logarithm. */
const WALL_TIME = 3;
const EULER = 0.5772156649;

/** Time the melt of one pulse needs to leave the bottom, s; what comes later in a long pulse meets a free one. Own estimate. */
const CLEARING_TIME = 0.01;

/** The outer stream of a double nozzle shields the jet: half the spread. Own estimate. */
const DOUBLE_NOZZLE_SPREAD = 0.5;

export function boreOf(
  profile: MachineProfile,
  nozzle: Nozzle,
  plateTemperature: number,
  parameters: PierceParameters,
): Bore {
  const { riseTime } = profile.source;
  if (!(riseTime >= 0 && riseTime <= 0.1)) throw new RangeError(`rise time ${riseTime} s is outside [0, 0.1] s`);
  if (!(nozzle.diameter > 0 && nozzle.diameter <= 0.01)) {
    throw new RangeError(`nozzle diameter ${nozzle.diameter} m is outside (0, 0.01] m`);
  }
  netRemovalHeat(parameters, plateTemperature); // refuses what would burn by itself
  const temperatureRise = IRON_MELTING_TEMPERATURE - plateTemperature;
  const perDepth = 4 * Math.PI * parameters.conductivity * temperatureRise * parameters.wallShare;
  return {
    parameters,
    waist: beamSpotDiameter(profile.optics) / 2,
    rayleighLength: beamRayleighLength(profile.optics),
    riseTime,
    nozzleDiameter: nozzle.diameter,
    jetSpread: parameters.jetSpread * (nozzle.type === 'double' ? DOUBLE_NOZZLE_SPREAD : 1),
    meltHeat: meltingEnthalpy(plateTemperature),
    temperatureRise,
    // Hot bore in an infinite plate, late form: 4πk ΔT / (ln(4αt/a²) − γ) per metre (Carslaw & Jaeger, chapter 13, from memory).
    wallLossPerDepth: (radius) => perDepth / (Math.log((4 * HOT_DIFFUSIVITY * WALL_TIME) / (radius * radius)) - EULER),
  };
}

export function boreMomentEmpty(): BoreMoment {
  return {
    speed: 0,
    boreRadius: 0,
    emitted: 0,
    bottomLight: 0,
    wallLight: 0,
    oxidation: 0,
    melt: 0,
    expulsion: 0,
    conduction: 0,
    pauses: 0,
    wall: 0,
    oxygenFlow: 0,
    eruptionIndex: 0,
  };
}

/**
 * Heat balance at the bottom of the bore, `depth` m down, with the six quantities as they are now; fills `moment`.
 *
 * Light. What enters is decided at the top of the plate: 1 − exp(−2a²/w²) of it, with w the beam's radius there (focus
 * position) and a the bore's. Of what entered, the share that would reach the depth in free space goes straight; of the
 * rest the wall guides `guidedShare` down, since free-space width overstates the width in a kerf. What goes down fades as
 * exp(−z/attenuationLength) in the rising melt and on the wall.
 * Pulses. Peak power counts for the effective on-time (duty, frequency, the source's rise).
 * Losses. The bottom is a disk at melting, 4·k·a·ΔT, in pulse and pause alike. A pause longer than `remeltTime` lets it freeze; what
 * was conducted away meanwhile is to be paid again. A share of the wall stays at melting; its loss grows with depth.
 * Oxygen. Nozzle flow (pressure) × the part of the widened jet that meets the bore (standoff) × exp(−z/oxygenDepth) ×
 * oxygenUse bounds the burning: heat = 1/(1/full + 1/bound), where full is the burnt share of all iron removed.
 * What is left melts and throws out steel: (melt + expulsion)·rate = light − losses + oxidation(rate), a quadratic.
 */
export function boreMoment(bore: Bore, set: StageQuantities, depth: number, moment: BoreMoment): void {
  const p = bore.parameters;

  const atTop = beamRadiusSquared(bore, set.focusPosition);
  const radius = Math.max(0.1e-3, p.boreRadius + p.spotFollowing * (Math.sqrt(atTop) - REFERENCE_BEAM_RADIUS));
  const area = Math.PI * radius * radius;
  const entered = 1 - Math.exp((-2 * radius * radius) / atTop);
  const straight = Math.min(
    entered,
    1 - Math.exp((-2 * radius * radius) / beamRadiusSquared(bore, set.focusPosition + depth)),
  );
  const goesDown = straight + p.guidedShare * (entered - straight);
  const reaches = goesDown * Math.exp(-depth / p.attenuationLength);

  const beamOn = set.pulseFrequency === null ? set.duty : effectiveDuty(set.duty, set.pulseFrequency, bore.riseTime);
  const emitted = set.peakPower * beamOn;
  const light = p.coupling * emitted * reaches;

  const conduction = 4 * p.conductivity * radius * bore.temperatureRise;
  const frozen = set.pulseFrequency === null ? 0 : Math.max(0, 1 - set.duty - set.pulseFrequency * p.remeltTime);
  const pauses = p.pauseLoss * conduction * frozen;
  const wall = bore.wallLossPerDepth(radius) * depth;
  const losses = conduction + pauses + wall;

  const oxygenFlow = oxygenMassFlow(bore.nozzleDiameter, set.oxygenPressure, p.dischargeCoefficient);
  const jetDiameter = bore.nozzleDiameter + 2 * bore.jetSpread * set.standoff;
  const caught = Math.min(1, (2 * radius) / jetDiameter) ** 2;
  const burningBound = p.oxygenUse * oxygenFlow * caught * Math.exp(-depth / p.oxygenDepth) * FEO.heatPerOxygen;

  const spare = light - losses;
  const removalHeat = bore.meltHeat + p.expulsionHeat;
  const burntHeat = p.burntShare * FEO.heatPerIron;
  // Does the bottom lose all that reaches it? Then it stands still, and the losses are no more than what comes.
  const massRate = spare > 0 ? removalRate(spare, removalHeat, burntHeat, burningBound) : 0;
  const kept = spare > 0 || losses === 0 ? 1 : light / losses;
  const full = burntHeat * massRate;

  moment.speed = massRate / (STEEL_DENSITY * area);
  moment.boreRadius = radius;
  moment.emitted = emitted;
  moment.bottomLight = light;
  moment.wallLight = p.coupling * emitted * (entered - reaches);
  moment.oxidation = full === 0 || burningBound === 0 ? 0 : (full * burningBound) / (full + burningBound);
  moment.melt = bore.meltHeat * massRate;
  moment.expulsion = p.expulsionHeat * massRate;
  moment.conduction = conduction * kept;
  moment.pauses = pauses * kept;
  moment.wall = wall * kept;
  moment.oxygenFlow = oxygenFlow;

  const onTime = set.pulseFrequency === null ? CLEARING_TIME : set.duty / set.pulseFrequency;
  const pulse = (p.coupling * reaches * set.peakPower * Math.min(onTime, CLEARING_TIME)) / area;
  moment.eruptionIndex = moment.speed / p.eruptionSpeed + pulse / p.eruptionEnergy;
}

/**
 * The same once the hole is through: nothing is left to melt, the rising melt is gone, and only the light that does not pass
 * straight through touches the wall.
 */
export function boreMomentThrough(bore: Bore, set: StageQuantities, thickness: number, moment: BoreMoment): void {
  boreMoment(bore, set, thickness, moment);
  const radius = moment.boreRadius;
  const entered = 1 - Math.exp((-2 * radius * radius) / beamRadiusSquared(bore, set.focusPosition));
  const passes = Math.min(
    entered,
    1 - Math.exp((-2 * radius * radius) / beamRadiusSquared(bore, set.focusPosition + thickness)),
  );
  moment.wallLight = bore.parameters.coupling * moment.emitted * (entered - passes);
  moment.speed = 0;
  moment.bottomLight = 0;
  moment.oxidation = 0;
  moment.melt = 0;
  moment.expulsion = 0;
  moment.conduction = 0;
  moment.pauses = 0;
  moment.wall = 0;
  moment.eruptionIndex = 0;
}

/**
 * Mass removed, kg/s: the positive root x of E·x = N + b·x·M/(b·x + M), with N the spare power, E the heat to remove a
 * kilogram, b the heat of burning its share and M the bound that oxygen sets.
 */
function removalRate(spare: number, removalHeat: number, burntHeat: number, bound: number): number {
  if (burntHeat === 0 || bound === 0) return spare / removalHeat;
  const linear = bound * (removalHeat - burntHeat) - spare * burntHeat;
  const root = Math.sqrt(linear * linear + 4 * removalHeat * burntHeat * spare * bound);
  // The form that does not subtract nearly equal numbers.
  return linear >= 0 ? (2 * spare * bound) / (linear + root) : (root - linear) / (2 * removalHeat * burntHeat);
}

function beamRadiusSquared(bore: Bore, distanceFromWaist: number): number {
  const ratio = distanceFromWaist / bore.rayleighLength;
  return bore.waist * bore.waist * (1 + ratio * ratio);
}

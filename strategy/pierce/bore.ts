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
import type { Stage, StageQuantities } from './stage.ts';

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
  /** 4πk·ΔT of the share of the wall that is kept at melting, W/m. */
  readonly wallConduction: number;
  /** What depends on focus or pressure alone, kept from one moment to the next since stages often hold them. */
  readonly kept: Float64Array;
};

/** Places of the six quantities in a set of them; a frequency of 0 stands for continuous power. */
export const STANDOFF = 0;
export const FOCUS = 1;
export const PEAK = 2;
export const DUTY = 3;
export const FREQUENCY = 4;
export const PRESSURE = 5;
export const SET_SIZE = 6;

/**
 * Places of the flows at one moment: W, but for the oxygen in kg/s. Their order is that of the sums over a routine. CRATER is the
 * heat that comes to the mouth; it is summed with a memory of its own.
 */
export const EMITTED = 0;
/** Light absorbed at the bottom, and on the way down. */
export const BOTTOM_LIGHT = 1;
export const WALL_LIGHT = 2;
export const OXIDATION = 3;
export const MELT = 4;
export const EXPULSION = 5;
export const CONDUCTION = 6;
export const PAUSES = 7;
export const WALL = 8;
export const OXYGEN = 9;
export const CRATER = 10;
export const FLOWS = 11;
/** Behind the flows: bore radius, m, and eruption index, without unit. They are looked at and not summed. */
export const BORE_RADIUS = 11;
export const ERUPTION = 12;
export const MOMENT_SIZE = 13;

const FEO = oxidation('FeO');

/** Time for which a bore's wall loss is taken, s: a few seconds into the pierce. It stands under a logarithm. */
const WALL_TIME = 3;
const EULER = 0.5772156649;

/** The outer stream of a double nozzle shields the jet: half the spread. Own estimate. */
const DOUBLE_NOZZLE_SPREAD = 0.5;

/** Gauge pressure that drives the melt as hard as the beam does by itself, Pa. Own estimate. */
const DRIVING_PRESSURE = 1e5;

/** Depth over which the bottom's heat still reaches the mouth, m, and how far heat at the mouth spreads. Own estimate. */
export const CRATER_SCALE = 3e-3;

/** Places in `Bore.kept`. */
const OF_FOCUS = 0;
const RADIUS = 1;
const AREA = 2;
const ENTERED = 3;
const WALL_PER_DEPTH = 4;
const STILL_LOSS = 5;
const OF_PRESSURE = 6;
const OXYGEN_FLOW = 7;
const MELT_SPEED = 8;
const KEPT_SIZE = 9;

/** Widest nozzle that is believed, m. */
export const WIDEST_NOZZLE = 0.01;

/**
 * What stays the same through a prediction. Plate temperature in K. RangeError for a rise time, nozzle, optics or plate that cannot
 * be, or parameters with which burning would all but feed itself.
 */
export function boreOf(
  profile: MachineProfile,
  nozzle: Nozzle,
  plateTemperature: number,
  parameters: PierceParameters,
): Bore {
  const { riseTime } = profile.source;
  if (!(riseTime >= 0 && riseTime <= 0.1)) throw new RangeError(`rise time ${riseTime} s is outside [0, 0.1] s`);
  if (!(nozzle.diameter > 0 && nozzle.diameter <= WIDEST_NOZZLE)) {
    throw new RangeError(`nozzle diameter ${nozzle.diameter} m is outside (0, ${WIDEST_NOZZLE}] m`);
  }
  netRemovalHeat(parameters, plateTemperature); // refuses what would burn by itself
  const temperatureRise = IRON_MELTING_TEMPERATURE - plateTemperature;
  return {
    parameters,
    waist: beamSpotDiameter(profile.optics) / 2,
    rayleighLength: beamRayleighLength(profile.optics),
    riseTime,
    nozzleDiameter: nozzle.diameter,
    jetSpread: parameters.jetSpread * (nozzle.type === 'double' ? DOUBLE_NOZZLE_SPREAD : 1),
    meltHeat: meltingEnthalpy(plateTemperature),
    temperatureRise,
    wallConduction: 4 * Math.PI * parameters.conductivity * temperatureRise * parameters.wallShare,
    kept: new Float64Array(KEPT_SIZE).fill(Number.NaN),
  };
}

/** Room for a moment. */
export function boreMomentEmpty(): Float64Array {
  return new Float64Array(MOMENT_SIZE);
}

/** Puts quantities in their places. */
export function boreSet(set: Float64Array, quantities: StageQuantities): void {
  set[STANDOFF] = quantities.standoff;
  set[FOCUS] = quantities.focusPosition;
  set[PEAK] = quantities.peakPower;
  set[DUTY] = quantities.duty;
  set[FREQUENCY] = quantities.pulseFrequency ?? 0;
  set[PRESSURE] = quantities.oxygenPressure;
}

/** The two ends of a stage, one behind the other. */
export function boreRamp(ramp: Float64Array, { from, to }: Stage): void {
  boreSet(ramp, from);
  boreSet(ramp.subarray(SET_SIZE), to);
}

/** The quantities at a part (0…1) of a stage. Never outside its ends, however it rounds. */
export function boreSetAt(set: Float64Array, ramp: Float64Array, part: number): void {
  const at = part < 0 ? 0 : part > 1 ? 1 : part;
  for (let i = 0; i < SET_SIZE; i++) {
    const from = ramp[i] ?? 0;
    const to = ramp[i + SET_SIZE] ?? 0;
    set[i] = from === to ? from : from * (1 - at) + to * at;
  }
}

/**
 * Speed of the bottom, m/s, `depth` m down with the quantities of `set`, from its heat balance; the flows are put into `moment`
 * from `place` on.
 *
 * Light. What enters is decided at the top of the plate: 1 − exp(−2a²/w²) of it, with w the beam's radius there (focus
 * position) and a the bore's. Of what entered, the share that would reach the depth in free space goes straight; of the
 * rest the wall guides `guidedShare` down, since free-space width overstates the width in a kerf. What goes down fades as
 * exp(−z/attenuationLength) in the rising melt and on the wall.
 * Pulses. Peak power counts for the effective on-time (duty, frequency, the source's rise).
 * Losses. The bottom is a disk at melting, in pulse and pause alike: 4·k·a·ΔT at the surface, growing by `deepConduction`·k·a·ΔT
 * once it is deep. Net of what it picks up again as it sinks into what it has warmed, this does not depend on its speed: an
 * own finite-volume solution stays within a tenth of it up to a Péclet number v·a/α of 2, five times a usual pierce's (tests).
 * A pause longer than `remeltTime` lets the bottom freeze; what was conducted away meanwhile is to be paid again. A share of the wall
 * stays at melting; its loss grows with depth.
 * Oxygen. Nozzle flow (pressure) × the part of the widened jet that meets the bore (standoff) × exp(−z/oxygenDepth) ×
 * oxygenUse bounds the burning: heat = 1/(1/full + 1/bound), where full is the burnt share of all iron removed.
 * What is left melts and throws out steel: (melt + expulsion)·rate = light − losses + oxidation(rate), a quadratic.
 */
export function boreMoment(bore: Bore, set: Float64Array, depth: number, moment: Float64Array, place = 0): number {
  const p = bore.parameters;
  const kept = bore.kept;
  const focus = set[FOCUS] ?? 0;
  const duty = set[DUTY] ?? 0;
  const frequency = set[FREQUENCY] ?? 0;
  const peak = set[PEAK] ?? 0;
  if (kept[OF_FOCUS] !== focus) keepFocus(bore, focus);
  if (kept[OF_PRESSURE] !== set[PRESSURE]) keepPressure(bore, set[PRESSURE] ?? 0);

  const radius = kept[RADIUS] ?? 0;
  const area = kept[AREA] ?? 0;
  const entered = kept[ENTERED] ?? 0;
  const passing = 1 - Math.exp((-2 * radius * radius) / beamRadiusSquared(bore, focus + depth));
  const straight = passing < entered ? passing : entered;
  const goesDown = straight + p.guidedShare * (entered - straight);
  const reaches = goesDown * Math.exp(-depth / p.attenuationLength);

  const beamOn = frequency === 0 ? duty : effectiveDuty(duty, frequency, bore.riseTime);
  const emitted = peak * beamOn;
  const light = p.coupling * emitted * reaches;

  const still = kept[STILL_LOSS] ?? 0;
  const conduction = still * (4 + p.deepConduction * (1 - Math.exp(-depth / radius)));
  const pause = frequency === 0 ? 0 : 1 - duty - frequency * p.remeltTime;
  const pauses = pause > 0 ? p.pauseLoss * conduction * pause : 0;
  const wall = (kept[WALL_PER_DEPTH] ?? 0) * depth;
  const losses = conduction + pauses + wall;

  const oxygenFlow = kept[OXYGEN_FLOW] ?? 0;
  const jetDiameter = bore.nozzleDiameter + 2 * bore.jetSpread * (set[STANDOFF] ?? 0);
  const reached = (2 * radius) / jetDiameter;
  const caught = reached < 1 ? reached * reached : 1;
  const bound = p.oxygenUse * oxygenFlow * caught * Math.exp(-depth / p.oxygenDepth) * FEO.heatPerOxygen;

  const spare = light - losses;
  const burntHeat = p.burntShare * FEO.heatPerIron;
  // Does the bottom lose all that reaches it? Then it stands still, and the losses are no more than what comes.
  const massRate = spare > 0 ? removalRate(spare, bore.meltHeat + p.expulsionHeat, burntHeat, bound) : 0;
  const share = spare > 0 || losses === 0 ? 1 : light / losses;
  const full = burntHeat * massRate;
  const speed = massRate / (STEEL_DENSITY * area);
  const index = speed === 0 ? 0 : eruptionIndex(speed, duty, frequency, depth + radius, kept[MELT_SPEED] ?? 0);

  const melt = bore.meltHeat * massRate;
  const expulsion = p.expulsionHeat * massRate;
  moment[place + EMITTED] = emitted;
  moment[place + BOTTOM_LIGHT] = light;
  moment[place + WALL_LIGHT] = p.coupling * emitted * (entered - reaches);
  moment[place + OXIDATION] = full === 0 || bound === 0 ? 0 : (full * bound) / (full + bound);
  moment[place + MELT] = melt;
  moment[place + EXPULSION] = expulsion;
  moment[place + CONDUCTION] = conduction * share;
  moment[place + PAUSES] = pauses * share;
  moment[place + WALL] = wall * share;
  moment[place + OXYGEN] = oxygenFlow;
  // Heat at the mouth: what the plate conducts while the hole is shallow, and what of the melt falls back beside it, the more the
  // nearer the pierce is to erupting.
  const fallback = (p.backfallShare * index) / p.eruptionLimit;
  moment[place + CRATER] =
    losses * share * Math.exp(-depth / CRATER_SCALE) + (melt + expulsion) * (fallback < 1 ? fallback : 1);
  moment[place + BORE_RADIUS] = radius;
  moment[place + ERUPTION] = index;
  return speed;
}

/**
 * The same once the hole is through: nothing is left to melt, the rising melt is gone, and only the light that does not pass
 * straight through touches the wall.
 */
export function boreMomentThrough(bore: Bore, set: Float64Array, thickness: number, moment: Float64Array): void {
  const focus = set[FOCUS] ?? 0;
  const frequency = set[FREQUENCY] ?? 0;
  const duty = set[DUTY] ?? 0;
  if (bore.kept[OF_FOCUS] !== focus) keepFocus(bore, focus);
  if (bore.kept[OF_PRESSURE] !== set[PRESSURE]) keepPressure(bore, set[PRESSURE] ?? 0);
  const radius = bore.kept[RADIUS] ?? 0;
  const entered = bore.kept[ENTERED] ?? 0;
  const passes = Math.min(entered, 1 - Math.exp((-2 * radius * radius) / beamRadiusSquared(bore, focus + thickness)));
  moment.fill(0);
  const emitted = (set[PEAK] ?? 0) * (frequency === 0 ? duty : effectiveDuty(duty, frequency, bore.riseTime));
  moment[EMITTED] = emitted;
  moment[WALL_LIGHT] = bore.parameters.coupling * emitted * (entered - passes);
  moment[OXYGEN] = bore.kept[OXYGEN_FLOW] ?? 0;
  moment[BORE_RADIUS] = radius;
}

/**
 * Melt that stands in the bore at the end of a pulse, as a share of what the bore and one radius above it hold: m/(z + a). Melt is made at
 * v/D while the beam is on and leaves with the time (z + a)/u that it needs to the mouth. So it is the melt of one pulse, v/f, when
 * the pauses are long, and what is made while the melt is on its way, v·(z + a)/u, when power is continuous.
 */
function eruptionIndex(speed: number, duty: number, frequency: number, way: number, meltSpeed: number): number {
  if (frequency === 0 || duty >= 1) return speed / meltSpeed;
  const leaves = way / meltSpeed;
  const period = 1 / frequency;
  const filled = (1 - Math.exp((-period * duty) / leaves)) / (1 - Math.exp(-period / leaves));
  return (speed * filled) / (duty * meltSpeed);
}

function keepFocus(bore: Bore, focus: number): void {
  const { parameters: p, kept } = bore;
  const atTop = beamRadiusSquared(bore, focus);
  const radius = Math.max(0.1e-3, p.boreRadius + p.spotFollowing * (Math.sqrt(atTop) - REFERENCE_BEAM_RADIUS));
  kept[OF_FOCUS] = focus;
  kept[RADIUS] = radius;
  kept[AREA] = Math.PI * radius * radius;
  kept[ENTERED] = 1 - Math.exp((-2 * radius * radius) / atTop);
  // Hot bore in an infinite plate, late form: 4πk ΔT / (ln(4αt/a²) − γ) per metre (Carslaw & Jaeger, chapter 13, from memory).
  kept[WALL_PER_DEPTH] =
    bore.wallConduction / (Math.log((4 * HOT_DIFFUSIVITY * WALL_TIME) / (radius * radius)) - EULER);
  kept[STILL_LOSS] = p.conductivity * radius * bore.temperatureRise;
}

function keepPressure(bore: Bore, pressure: number): void {
  const { parameters: p, kept } = bore;
  kept[OF_PRESSURE] = pressure;
  kept[OXYGEN_FLOW] = oxygenMassFlow(bore.nozzleDiameter, pressure, p.dischargeCoefficient);
  // Driven by the beam's own push and by the jet's pressure together: speed as the root of the pressure (Bernoulli).
  kept[MELT_SPEED] = p.meltSpeed * Math.sqrt(1 + pressure / DRIVING_PRESSURE);
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

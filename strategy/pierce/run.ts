import { HOT_DIFFUSIVITY } from '../steel/index.ts';
import {
  BORE_RADIUS,
  BOTTOM_LIGHT,
  boreMoment,
  boreMomentEmpty,
  boreMomentThrough,
  boreRamp,
  boreSetAt,
  CONDUCTION,
  CRATER,
  CRATER_SCALE,
  DUTY,
  EMITTED,
  ERUPTION,
  EXPULSION,
  FLOWS,
  FREQUENCY,
  MELT,
  MOMENT_SIZE,
  OXIDATION,
  OXYGEN,
  PAUSES,
  PRESSURE,
  SET_SIZE,
  WALL,
  WALL_LIGHT,
  type Bore,
} from './bore.ts';
import { HEATING_CAPACITY, radiusOfPeakAroundPoint } from './crater.ts';
import { integrate, integrateRoom, STEP_NODES, STEP_WEIGHTS } from './integrate.ts';
import { CHOKING_GAUGE_PRESSURE } from './oxygen-flow.ts';
import type { Stage } from './stage.ts';

/** Where the heat came from and went over the whole routine, J; what came is what went. */
export type PierceLedger = {
  readonly absorbed: number;
  readonly oxidation: number;
  readonly melt: number;
  readonly superheat: number;
  readonly conduction: number;
  readonly pauses: number;
  /** Lost by the hot wall and absorbed by it as light. */
  readonly wall: number;
};

/** A pierce in figures, without its trace. */
export type PierceRun = {
  /** Moment the hole is through, s, and the stage it falls in; null when it never is. */
  readonly through: { readonly time: number; readonly stage: number } | null;
  readonly routineTime: number; // s
  /** Depth at the end of the routine, m, and the bottom's speed when last seen, m/s. */
  readonly depth: number;
  readonly lastSpeed: number;
  /** Time before breakthrough during which the bottom stood still, s. */
  readonly stood: number;
  /** For each stage: depth at its end, m, and greatest eruption index in it before breakthrough. */
  readonly depths: Float64Array;
  readonly eruptions: Float64Array;
  readonly craterRadius: number; // m
  readonly emitted: number; // J
  readonly oxygenUsed: number; // kg
  readonly ledger: PierceLedger;
};

/** What is told of every step until the hole is through. */
export type RunStep = (
  stage: number,
  start: number,
  startDepth: number,
  startSpeed: number,
  end: number,
  endDepth: number,
  endSpeed: number,
) => void;

/** How a search asks: with a larger error, and no further than the eruption index that rules a pierce out. */
export type RunSearch = {
  /** Error of the depth in a step, m. */
  readonly tolerance: number;
  /** The run ends, with what it has so far, once the eruption index is above this. */
  readonly giveUpAt: number;
};

/** Time for which heat near the mouth counts, s: what a point source needs to spread over the crater's scale. */
const CRATER_MEMORY = CRATER_SCALE ** 2 / (6 * HOT_DIFFUSIVITY);

/** Speed below which the bottom counts as standing still, m/s. */
export const STALL_SPEED = 0.05e-3;

/** Error of the depth allowed for a step, m. */
const DEPTH_TOLERANCE = 1e-10;

/** Steps a stage takes at least, so that nothing short is stepped over; in a search. */
const LEAST_STEPS = 8;
const LEAST_SEARCH_STEPS = 4;

/** Gauss–Legendre, five points on 0…1 (Abramowitz & Stegun, table 25.4). */
const REST_NODES = [0.04691007703066802, 0.23076534494715845, 0.5, 0.7692346550528415, 0.953089922969332] as const;
const REST_WEIGHTS = [
  0.11846344252809454, 0.23931433524968324, 0.28444444444444444, 0.23931433524968324, 0.11846344252809454,
] as const;
/** Pieces of a stage after breakthrough for those points. */
const REST_PIECES = 3;

/**
 * Carries a staged pierce through its routine. Stages and thickness must have been found good; nothing is checked and no record
 * or list is made from step to step, since fits and searches call this by the hundred thousand.
 */
export function pierceRun(
  bore: Bore,
  stages: readonly Stage[],
  thickness: number,
  watch?: RunStep,
  search?: RunSearch,
): PierceRun {
  const room = integrateRoom(MOMENT_SIZE, FLOWS);
  const { nodes, sums } = room;
  const end = nodes.subarray(6 * MOMENT_SIZE);
  const set = new Float64Array(SET_SIZE);
  const ramp = new Float64Array(2 * SET_SIZE);
  const rest = boreMomentEmpty();
  const depths = new Float64Array(stages.length);
  const eruptions = new Float64Array(stages.length);
  let through: { readonly time: number; readonly stage: number } | null = null;
  let depth = 0;
  let lastSpeed = 0;
  let stood = 0;
  let stage = 0;
  let stageStart = 0;
  let duration = 1;
  let mouthHeat = 0;
  let greatestMouthHeat = 0;
  let widestBore = 0;
  let eruption = 0;
  let givenUp = false;
  const tolerance = search?.tolerance ?? DEPTH_TOLERANCE;
  const giveUpAt = search?.giveUpAt ?? Number.POSITIVE_INFINITY;
  const leastSteps = search === undefined ? LEAST_STEPS : LEAST_SEARCH_STEPS;

  const slopeAt = (time: number, at: number, flows: Float64Array, place: number): number => {
    boreSetAt(set, ramp, (time - stageStart) / duration);
    return boreMoment(bore, set, at > 0 ? at : 0, flows, place);
  };

  const seen = (from: number, z0: number, v0: number, to: number, z1: number, v1: number): boolean => {
    const h = to - from;
    let came = 0;
    for (let node = 0; node < 6; node++) {
      const weight = STEP_WEIGHTS[node] ?? 0;
      if (weight === 0) continue;
      const left = Math.exp(((STEP_NODES[node] ?? 0) - 1) * (h / CRATER_MEMORY));
      came += weight * left * (nodes[node * MOMENT_SIZE + CRATER] ?? 0);
    }
    const before = mouthHeat;
    mouthHeat = before * Math.exp(-h / CRATER_MEMORY) + h * came;
    const slope0 = (nodes[CRATER] ?? 0) - before / CRATER_MEMORY;
    const slope1 = (end[CRATER] ?? 0) - mouthHeat / CRATER_MEMORY;
    greatestMouthHeat = Math.max(greatestMouthHeat, greatestBetween(before, slope0, mouthHeat, slope1, h));
    for (let node = 0; node < 7; node++) {
      const index = nodes[node * MOMENT_SIZE + ERUPTION] ?? 0;
      if (index > eruption) eruption = index;
    }
    const bore0 = nodes[BORE_RADIUS] ?? 0;
    const bore1 = end[BORE_RADIUS] ?? 0;
    widestBore = Math.max(widestBore, bore0, bore1);
    lastSpeed = v1;
    if (v0 < STALL_SPEED && v1 < STALL_SPEED) stood += h;
    if (watch !== undefined) watch(stage, from, z0, v0, to, z1, v1);
    givenUp = eruption > giveUpAt;
    return givenUp;
  };

  for (; stage < stages.length && !givenUp; stage++) {
    const now = stages[stage];
    if (now === undefined) continue;
    duration = now.duration;
    const stageEnd = stageStart + duration;
    boreRamp(ramp, now);
    eruption = 0;
    let from = stageStart;
    if (through === null) {
      const options = {
        tolerance,
        firstStep: duration / 32,
        // The mouth's heat fades with its own time, which a step must not exceed.
        longestStep: Math.min(duration / leastSteps, CRATER_MEMORY),
        stopAt: thickness,
      };
      const kinks = rampKinks(ramp, bore);
      for (let piece = 0; piece <= kinks.length && through === null && !givenUp; piece++) {
        const kink = kinks[piece];
        const to = kink === undefined ? stageEnd : stageStart + kink * duration;
        if (to <= from) continue;
        const result = integrate(slopeAt, room, depth, from, to, options, seen);
        depth = result.value;
        from = result.time;
        if (result.reached) through = { time: result.time, stage };
      }
    }
    if (through !== null && from < stageEnd) {
      const piece = (stageEnd - from) / REST_PIECES;
      for (let i = 0; i < REST_PIECES * REST_NODES.length; i++) {
        const node = i % REST_NODES.length;
        const time = from + piece * ((i - node) / REST_NODES.length + (REST_NODES[node] ?? 0));
        boreSetAt(set, ramp, (time - stageStart) / duration);
        boreMomentThrough(bore, set, thickness, rest);
        const weight = piece * (REST_WEIGHTS[node] ?? 0);
        sums[EMITTED] = (sums[EMITTED] ?? 0) + weight * (rest[EMITTED] ?? 0);
        sums[WALL_LIGHT] = (sums[WALL_LIGHT] ?? 0) + weight * (rest[WALL_LIGHT] ?? 0);
        sums[OXYGEN] = (sums[OXYGEN] ?? 0) + weight * (rest[OXYGEN] ?? 0);
      }
    }
    depths[stage] = depth;
    eruptions[stage] = eruption;
    stageStart = stageEnd;
  }

  const sum = (flow: number): number => sums[flow] ?? 0;
  const molten = radiusOfPeakAroundPoint(Math.max(0, greatestMouthHeat), bore.temperatureRise, HEATING_CAPACITY);
  return {
    through,
    routineTime: stageStart,
    depth,
    lastSpeed,
    stood,
    depths,
    eruptions,
    craterRadius: Math.max(widestBore, molten),
    emitted: sum(EMITTED),
    oxygenUsed: sum(OXYGEN),
    ledger: {
      absorbed: sum(BOTTOM_LIGHT) + sum(WALL_LIGHT),
      oxidation: sum(OXIDATION),
      melt: sum(MELT),
      superheat: sum(EXPULSION),
      conduction: sum(CONDUCTION),
      pauses: sum(PAUSES),
      wall: sum(WALL) + sum(WALL_LIGHT),
    },
  };
}

/**
 * Parts of a stage at which the balance has a kink that depends on the ramps alone: pauses begin to freeze the bottom, pulses or
 * pauses become shorter than the rise, the nozzle chokes. A step across a kink would lose the order.
 */
function rampKinks(ramp: Float64Array, { parameters, riseTime }: Bore): readonly number[] {
  const at = (place: number, end: 0 | 1): number => ramp[place + end * SET_SIZE] ?? 0;
  const kinks: number[] = [];
  const put = (start: number, stop: number): void => {
    // Linear in time, so it passes zero once at most.
    if (start * stop < 0) kinks.push(start / (start - stop));
  };
  if (at(FREQUENCY, 0) !== 0) {
    const thaws = (end: 0 | 1) => 1 - at(DUTY, end) - parameters.remeltTime * at(FREQUENCY, end);
    const rises = (end: 0 | 1) => at(DUTY, end) - riseTime * at(FREQUENCY, end);
    put(thaws(0), thaws(1));
    put(rises(0), rises(1));
    const falls = (end: 0 | 1) => 1 - at(DUTY, end) - riseTime * at(FREQUENCY, end);
    put(falls(0), falls(1));
  }
  put(at(PRESSURE, 0) - CHOKING_GAUGE_PRESSURE, at(PRESSURE, 1) - CHOKING_GAUGE_PRESSURE);
  return kinks.length > 1 ? kinks.sort((a, b) => a - b) : kinks;
}

/** Greatest value of the cubic through both ends of a step with their slopes. */
function greatestBetween(from: number, fromSlope: number, to: number, toSlope: number, h: number): number {
  const ends = from > to ? from : to;
  // Does it rise at the start and fall at the end? Only then is there a crest between.
  if (!(fromSlope > 0 && toSlope < 0)) return ends;
  const d0 = h * fromSlope;
  const d1 = h * toSlope;
  const a = 2 * (from - to) + d0 + d1;
  const b = 3 * (to - from) - 2 * d0 - d1;
  const root = Math.sqrt(Math.max(0, b * b - 3 * a * d0));
  const s = d0 / (root - b);
  if (!(s > 0 && s < 1)) return ends;
  return Math.max(ends, from + s * (d0 + s * (b + s * a)));
}

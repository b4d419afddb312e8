import type { MachineProfile, Nozzle } from '../machine.ts';
import { HOT_DIFFUSIVITY, PLATE_TEMPERATURE_RANGE } from '../steel/index.ts';
import { numberText, quantityText } from '../units/index.ts';
import { boreMoment, boreMomentEmpty, boreMomentThrough, boreOf, type Bore, type BoreMoment } from './bore.ts';
import { HEATING_CAPACITY, radiusOfPeakAroundPoint } from './crater.ts';
import { integrate } from './integrate.ts';
import { PIERCE_MODEL_VERSION, pierceParameters, type PierceParameters } from './parameters.ts';
import { routineTime, stageMeanPower, stagePulses, stageQuantitiesAt } from './stage-math.ts';
import { stageProblems } from './stage-problems.ts';
import type { Stage } from './stage.ts';

export type PierceInput = {
  readonly stages: readonly Stage[];
  readonly thickness: number; // m
  /** Of the plate before this pierce, K. */
  readonly plateTemperature: number;
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
  readonly parameters?: Partial<PierceParameters>;
};

export type Breakthrough =
  | { readonly kind: 'through'; readonly time: number; readonly stage: number }
  | { readonly kind: 'none'; readonly why: string; readonly depth: number };

/** A time during which the bottom stands still. */
export type PierceStall = {
  readonly stage: number;
  readonly time: number;
  readonly duration: number;
  readonly depth: number;
  readonly why: string;
};

export type PierceStageResult = {
  readonly depthAtEnd: number; // m
  /** As set, W. */
  readonly meanPower: number;
  /** Greatest in the stage before breakthrough; 0 when the hole is through before it. */
  readonly eruptionIndex: number;
};

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

export type PiercePrediction = {
  readonly modelVersion: string;
  readonly breakthrough: Breakthrough;
  readonly routineTime: number; // s
  /** Depth over time, m and s, evenly spaced with the breakthrough put in; the thickness from then on. */
  readonly trace: { readonly time: readonly number[]; readonly depth: readonly number[] };
  readonly energy: { readonly emitted: number; readonly absorbed: number }; // J
  readonly oxidationHeat: number; // J
  readonly pulses: number;
  readonly meanPower: number; // W, as set
  readonly peakPower: number; // W
  /** Through the nozzle over the whole routine, kg. */
  readonly oxygenUsed: number;
  readonly stalls: readonly PierceStall[];
  /** In the plate at the end of the routine, J. */
  readonly heatLeft: number;
  readonly perStage: readonly PierceStageResult[];
  readonly craterRadius: number; // m
  readonly ledger: PierceLedger;
};

/** Thickest plate the model takes, m. Beyond 40 mm it is extrapolated well outside what its sources cover. */
export const THICKEST_PLATE = 0.06;

/** Speed below which the bottom counts as standing still, m/s, and for how long it must, s. */
const STALL_SPEED = 0.05e-3;
const SHORTEST_STALL = 0.1;

/** Points of the trace without the breakthrough. */
const TRACE_POINTS = 160;

/** Depth over which the bottom's heat still reaches the mouth, m, and how far heat at the mouth spreads. Own estimate. */
const CRATER_SCALE = 3e-3;
/** Time for which heat near the mouth counts, s: what a point source needs to spread over the scale. */
const CRATER_MEMORY = CRATER_SCALE ** 2 / (6 * HOT_DIFFUSIVITY);

/** Error of the depth allowed for a step, m. */
const DEPTH_TOLERANCE = 1e-9;

/** Places in the state that is integrated. */
const DEPTH = 0;
const EMITTED = 1;
const BOTTOM_LIGHT = 2;
const WALL_LIGHT = 3;
const OXIDATION = 4;
const MELT = 5;
const EXPULSION = 6;
const CONDUCTION = 7;
const PAUSES = 8;
const WALL = 9;
const OXYGEN = 10;
const CRATER_HEAT = 11;
const STATE_SIZE = 12;

/**
 * Depth over time of a staged pierce, the moment it is through, and where the heat goes. Depth follows the heat balance at the
 * bottom (`boreMoment`), integrated stage by stage with the breakthrough located to rounding. The first heating of the
 * surface to melting, a few hundredths of a second, is left out. Deterministic.
 * RangeError for stages that `stageProblems` objects to, a thickness outside (0, 60] mm, a plate outside −40…600 °C, or
 * parameters outside their table.
 */
export function piercePredict(input: PierceInput): PiercePrediction {
  const { stages, thickness } = input;
  const problems = stageProblems(stages);
  const [problem] = problems;
  if (problem !== undefined) throw new RangeError(`${problem.path}: ${problem.problem}`);
  if (!(thickness > 0 && thickness <= THICKEST_PLATE)) {
    throw new RangeError(`thickness ${thickness} m is outside (0, ${THICKEST_PLATE}] m`);
  }
  const { min, max } = PLATE_TEMPERATURE_RANGE;
  if (!(input.plateTemperature >= min && input.plateTemperature <= max)) {
    throw new RangeError(`plate temperature ${input.plateTemperature} K is outside [${min}, ${max}] K`);
  }
  const parameters = pierceParameters(input.parameters);
  const bore = boreOf(input.profile, input.nozzle, input.plateTemperature, parameters);
  const crater = craterWatch(bore);

  const total = routineTime(stages);
  const trace = traceWatch(total, thickness);
  const stalls = stallWatch();
  const state = new Float64Array(STATE_SIZE);
  const moment = boreMomentEmpty();
  const perStage: PierceStageResult[] = [];
  let through: { readonly time: number; readonly stage: number } | undefined;
  let stageStart = 0;
  let lastSpeed = 0;

  stages.forEach((stage, index) => {
    const stageEnd = stageStart + stage.duration;
    let eruption = 0;
    const setAt = (time: number) => stageQuantitiesAt(stage, (time - stageStart) / stage.duration);
    const look = (time: number, depth: number): BoreMoment => {
      boreMoment(bore, setAt(time), depth, moment);
      return moment;
    };
    const options = {
      tolerance: DEPTH_TOLERANCE,
      firstStep: stage.duration / 64,
      // The crater's heat fades with its own time, which an explicit step must not exceed by much.
      longestStep: Math.min(stage.duration / 12, CRATER_MEMORY),
    };

    let from = stageStart;
    if (through === undefined) {
      const watch = {
        step: (
          start: number,
          startState: Float64Array,
          startSlope: Float64Array,
          end: number,
          endState: Float64Array,
          endSlope: Float64Array,
        ) => {
          const startDepth = startState[DEPTH] ?? 0;
          const endDepth = endState[DEPTH] ?? 0;
          trace.step(start, startDepth, startSlope[DEPTH] ?? 0, end, endDepth, endSlope[DEPTH] ?? 0);
          if (start === stageStart) eruption = Math.max(eruption, look(start, startDepth).eruptionIndex);
          look(end, endDepth);
          eruption = Math.max(eruption, moment.eruptionIndex);
          crater.see(moment.boreRadius, endState[CRATER_HEAT] ?? 0);
          stalls.step(index, start, startSlope[DEPTH] ?? 0, end, endDepth, moment);
          lastSpeed = moment.speed;
        },
      };
      const result = integrate(
        (time, at, slope) => {
          const depth = Math.max(0, at[DEPTH] ?? 0);
          boreMoment(bore, setAt(time), depth, moment);
          slopes(moment, parameters, at, slope);
        },
        state,
        stageStart,
        stageEnd,
        { ...options, stopAt: thickness },
        watch,
      );
      if (result.reached) {
        state[DEPTH] = thickness;
        through = { time: result.time, stage: index };
        trace.through(result.time);
        from = result.time;
      }
      stalls.close(result.time);
    }
    if (through !== undefined && from < stageEnd) {
      integrate(
        (time, _at, slope) => {
          boreMomentThrough(bore, setAt(time), thickness, moment);
          slopes(moment, parameters, state, slope);
          slope[CRATER_HEAT] = 0;
        },
        state,
        from,
        stageEnd,
        { ...options, stopAt: Number.POSITIVE_INFINITY },
        { step: () => undefined },
      );
    }
    perStage.push({ depthAtEnd: state[DEPTH] ?? 0, meanPower: stageMeanPower(stage), eruptionIndex: eruption });
    stageStart = stageEnd;
  });

  const sum = (place: number): number => state[place] ?? 0;
  const absorbed = sum(BOTTOM_LIGHT) + sum(WALL_LIGHT);
  const wall = sum(WALL) + sum(WALL_LIGHT);
  return {
    modelVersion: PIERCE_MODEL_VERSION,
    breakthrough:
      through === undefined
        ? { kind: 'none', why: notThrough(sum(DEPTH), thickness, lastSpeed, total), depth: sum(DEPTH) }
        : { kind: 'through', time: through.time, stage: through.stage },
    routineTime: total,
    trace: trace.result(),
    energy: { emitted: sum(EMITTED), absorbed },
    oxidationHeat: sum(OXIDATION),
    pulses: Math.round(stages.reduce((pulses, stage) => pulses + stagePulses(stage), 0)),
    meanPower: stages.reduce((energy, stage) => energy + stageMeanPower(stage) * stage.duration, 0) / total,
    peakPower: Math.max(...stages.flatMap((stage) => [stage.from.peakPower, stage.to.peakPower])),
    oxygenUsed: sum(OXYGEN),
    stalls: stalls.result(),
    heatLeft: sum(CONDUCTION) + sum(PAUSES) + wall,
    perStage,
    craterRadius: crater.radius(),
    ledger: {
      absorbed,
      oxidation: sum(OXIDATION),
      melt: sum(MELT),
      superheat: sum(EXPULSION),
      conduction: sum(CONDUCTION),
      pauses: sum(PAUSES),
      wall,
    },
  };
}

function slopes(moment: BoreMoment, parameters: PierceParameters, state: Float64Array, slope: Float64Array): void {
  slope[DEPTH] = moment.speed;
  slope[EMITTED] = moment.emitted;
  slope[BOTTOM_LIGHT] = moment.bottomLight;
  slope[WALL_LIGHT] = moment.wallLight;
  slope[OXIDATION] = moment.oxidation;
  slope[MELT] = moment.melt;
  slope[EXPULSION] = moment.expulsion;
  slope[CONDUCTION] = moment.conduction;
  slope[PAUSES] = moment.pauses;
  slope[WALL] = moment.wall;
  slope[OXYGEN] = moment.oxygenFlow;
  // Heat at the mouth, fading as it spreads: what the plate conducts while the hole is shallow, and what of the melt falls
  // back beside it, the more the nearer the pierce is to erupting.
  const conducted = (moment.conduction + moment.pauses + moment.wall) * Math.exp(-(state[DEPTH] ?? 0) / CRATER_SCALE);
  const fallen = (moment.melt + moment.expulsion) * Math.min(1, parameters.backfallShare * moment.eruptionIndex);
  slope[CRATER_HEAT] = conducted + fallen - (state[CRATER_HEAT] ?? 0) / CRATER_MEMORY;
}

/** Collects the crater's radius: where the greatest temperature passes melting, and at least the bore itself. */
function craterWatch(bore: Bore) {
  let widest = 0;
  return {
    see(boreRadius: number, heat: number): void {
      const molten = radiusOfPeakAroundPoint(Math.max(0, heat), bore.temperatureRise, HEATING_CAPACITY);
      widest = Math.max(widest, molten, boreRadius);
    },
    radius: () => widest,
  };
}

/** Collects the depth at evenly spaced times, by the cubic through both ends of a step with their slopes. */
function traceWatch(total: number, thickness: number) {
  const time: number[] = [0];
  const depth: number[] = [0];
  let next = 1;
  const timeOf = (point: number) => (total * point) / TRACE_POINTS;
  const put = (at: number, value: number) => {
    time.push(at);
    depth.push(value);
  };
  return {
    step(start: number, from: number, fromSlope: number, end: number, to: number, toSlope: number): void {
      for (; next <= TRACE_POINTS && timeOf(next) <= end; next++) {
        const h = end - start;
        const s = (timeOf(next) - start) / h;
        const cubic =
          from * (1 + 2 * s) * (1 - s) ** 2 +
          to * s * s * (3 - 2 * s) +
          h * s * (1 - s) * (fromSlope * (1 - s) - toSlope * s);
        // Depth never goes back, and a cubic may overshoot by a hair.
        put(timeOf(next), Math.min(Math.max(cubic, from, depth[depth.length - 1] ?? 0), to));
      }
    },
    through(at: number): void {
      if (at > (time[time.length - 1] ?? 0)) put(at, thickness);
    },
    result() {
      const deepest = depth[depth.length - 1] ?? 0;
      // After breakthrough, or for a last point that rounding put beyond the end.
      for (; next <= TRACE_POINTS; next++) put(timeOf(next), deepest);
      return { time, depth };
    },
  };
}

/** Collects the times during which the bottom stands still. */
function stallWatch() {
  type Open = { stage: number; time: number; depth: number; why: string };
  const found: PierceStall[] = [];
  let open: Open | undefined;
  const close = (at: number) => {
    if (open !== undefined && at - open.time >= SHORTEST_STALL) found.push({ ...open, duration: at - open.time });
    open = undefined;
  };
  return {
    step(stage: number, start: number, startSpeed: number, end: number, depth: number, moment: BoreMoment): void {
      const stands = moment.speed < STALL_SPEED;
      const stood = startSpeed < STALL_SPEED;
      // Where the speed, straight between both ends, passes the bound.
      const crossing =
        stands === stood ? start : start + ((STALL_SPEED - startSpeed) / (moment.speed - startSpeed)) * (end - start);
      if (stands && open === undefined) open = { stage, time: crossing, depth, why: standsStill(depth, moment) };
      if (!stands) {
        if (stood && open === undefined) open = { stage, time: start, depth, why: standsStill(depth, moment) };
        close(crossing);
      }
    },
    close,
    result: () => found,
  };
}

function standsStill(depth: number, moment: BoreMoment): string {
  const lost = moment.conduction + moment.pauses + moment.wall;
  return `The bottom stands still at ${millimetres(depth)}: of ${watts(moment.emitted)} mean power ${watts(moment.bottomLight)} are absorbed there, and the plate conducts ${watts(lost)} away.`;
}

function notThrough(depth: number, thickness: number, speed: number, total: number): string {
  const where = `${millimetres(depth)} of ${millimetres(thickness)}`;
  if (speed < STALL_SPEED) return `Not through: stands still at ${where}. It needs more mean power at depth.`;
  return `Not through: the routine ends after ${quantityText(total, 'time', 'metric').text} at ${where}, still going down at ${numberText(speed * 1000, 1)} mm/s.`;
}

function millimetres(value: number): string {
  return quantityText(value, 'length', 'metric', { decimals: 1 }).text;
}

function watts(value: number): string {
  return quantityText(value, 'power', 'metric', { unit: 'W', decimals: 0 }).text;
}

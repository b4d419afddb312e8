import type { MachineProfile, Nozzle } from '../machine.ts';
import { quantityText } from '../units/index.ts';
import { millimetres } from '../units/said.ts';
import {
  BOTTOM_LIGHT,
  boreMoment,
  boreMomentEmpty,
  boreOf,
  boreSet,
  CONDUCTION,
  EMITTED,
  PAUSES,
  SET_SIZE,
  WALL,
  WALL_LIGHT,
  type Bore,
} from './bore.ts';
import { PIERCE_MODEL_VERSION, pierceParameters, type PierceParameters } from './parameters.ts';
import { effectiveDuty } from './pulse.ts';
import { pierceRun, STALL_SPEED, type PierceLedger, type PierceRun, type RunStep } from './run.ts';
import {
  routineTime,
  stageMeanPower,
  stageQuantitiesAt,
  stagesMeanPower,
  stagesPeakPower,
  stagesPulses,
} from './stage-math.ts';
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

/** What keeps the bottom from moving: pulses that never reach their peak, pauses that freeze it, a beam wider than the bore, or power. */
export type StallCause = 'rise' | 'pauses' | 'focus' | 'power';

/** A time during which the bottom stands still. */
export type PierceStall = {
  readonly stage: number;
  readonly time: number;
  readonly duration: number;
  readonly depth: number;
  readonly cause: StallCause;
  readonly why: string;
};

export type PierceStageResult = {
  readonly depthAtEnd: number; // m
  /** As set, W. */
  readonly meanPower: number;
  /** Greatest in the stage before breakthrough; 0 when the hole is through before it. */
  readonly eruptionIndex: number;
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

/** For how long the bottom must stand still to be told, s. */
export const SHORTEST_STALL = 0.1;

/** Points of the trace without the breakthrough. */
const TRACE_POINTS = 160;

/**
 * Depth over time of a staged pierce, the moment it is through, and where the heat goes. Depth follows the heat balance at the
 * bottom (`boreMoment`), integrated stage by stage with the breakthrough located to rounding. The first heating of the
 * surface to melting, a few hundredths of a second, is left out. Deterministic.
 * RangeError for stages that `stageProblems` objects to, a thickness outside (0, 60] mm, a plate outside −40…600 °C, or
 * parameters outside their table.
 */
export function piercePredict(input: PierceInput): PiercePrediction {
  const { stages, thickness } = input;
  const bore = boreFor(input);
  const total = routineTime(stages);
  const trace = traceWatch(total, thickness);
  const stalls = stallWatch(bore, stages);
  const run = pierceRun(bore, stages, thickness, (stage, start, from, fromSpeed, end, to, toSpeed) => {
    trace.step(start, from, fromSpeed, end, to, toSpeed);
    stalls.step(stage, start, from, fromSpeed, end, to, toSpeed);
  });
  stalls.close(run.through?.time ?? total);
  if (run.through !== null) trace.through(run.through.time);
  const { ledger } = run;
  return {
    modelVersion: PIERCE_MODEL_VERSION,
    breakthrough: breakthroughOf(run, thickness),
    routineTime: total,
    trace: trace.result(),
    energy: { emitted: run.emitted, absorbed: ledger.absorbed },
    oxidationHeat: ledger.oxidation,
    pulses: stagesPulses(stages),
    meanPower: stagesMeanPower(stages),
    peakPower: stagesPeakPower(stages),
    oxygenUsed: run.oxygenUsed,
    stalls: stalls.result(),
    heatLeft: heatLeftOf(ledger),
    perStage: stages.map((stage, index) => ({
      depthAtEnd: run.depths[index] ?? 0,
      meanPower: stageMeanPower(stage),
      eruptionIndex: run.eruptions[index] ?? 0,
    })),
    craterRadius: run.craterRadius,
    ledger,
  };
}

/** A prediction without its trace, its stalls and its sentences: what fits and searches ask for by the hundred thousand. */
export type PierceOutline = {
  /** Moment the hole is through, s; null when it never is. */
  readonly breakthroughTime: number | null;
  readonly routineTime: number; // s
  readonly depth: number; // m, at the end of the routine
  readonly craterRadius: number; // m
  /** Greatest of all stages before breakthrough. */
  readonly eruptionIndex: number;
  readonly oxygenUsed: number; // kg
  readonly heatLeft: number; // J
  readonly ledger: PierceLedger;
};

/**
 * The same numbers as `piercePredict` gives, to the last bit, at a fraction of its time: nothing is drawn and nothing told.
 * RangeError as there.
 */
export function pierceOutline(input: PierceInput): PierceOutline {
  return pierceOutlineOf(boreFor(input), input.stages, input.thickness);
}

/** `pierceOutline` for what has been found good already. */
export function pierceOutlineOf(bore: Bore, stages: readonly Stage[], thickness: number): PierceOutline {
  const run = pierceRun(bore, stages, thickness);
  let eruptionIndex = 0;
  for (const index of run.eruptions) if (index > eruptionIndex) eruptionIndex = index;
  return {
    breakthroughTime: run.through === null ? null : run.through.time,
    routineTime: run.routineTime,
    depth: run.depth,
    craterRadius: run.craterRadius,
    eruptionIndex,
    oxygenUsed: run.oxygenUsed,
    heatLeft: heatLeftOf(run.ledger),
    ledger: run.ledger,
  };
}

/** What stays the same through a prediction, after all of its input was found good. RangeError as from `piercePredict`. */
export function boreFor(input: PierceInput): Bore {
  const { stages, thickness, plateTemperature } = input;
  const [problem] = stageProblems(stages);
  if (problem !== undefined) throw new RangeError(`${problem.path}: ${problem.problem}`);
  if (!(thickness > 0 && thickness <= THICKEST_PLATE)) {
    throw new RangeError(`thickness ${thickness} m is outside (0, ${THICKEST_PLATE}] m`);
  }
  return boreOf(input.profile, input.nozzle, plateTemperature, pierceParameters(input.parameters));
}

/** Heat in the plate at the end of a routine, J: what was conducted away, paid in pauses, and lost or absorbed by the wall. */
export function heatLeftOf(ledger: PierceLedger): number {
  return ledger.conduction + ledger.pauses + ledger.wall;
}

function breakthroughOf(run: PierceRun, thickness: number): Breakthrough {
  if (run.through !== null) return { kind: 'through', time: run.through.time, stage: run.through.stage };
  return {
    kind: 'none',
    why: notThrough(run.depth, thickness, run.lastSpeed, run.routineTime),
    depth: run.depth,
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
function stallWatch(bore: Bore, stages: readonly Stage[]) {
  type Open = Pick<PierceStall, 'stage' | 'time' | 'depth' | 'cause' | 'why'>;
  const found: PierceStall[] = [];
  let open: Open | undefined;
  const close = (at: number) => {
    if (open !== undefined && at - open.time >= SHORTEST_STALL) found.push({ ...open, duration: at - open.time });
    open = undefined;
  };
  const startOf = (stage: number) => routineTime(stages.slice(0, stage));
  const begin = (stage: number, time: number, depth: number): Open => {
    const cause = stallCause(bore, stages, stage, time - startOf(stage), depth);
    return { stage, time, depth, ...cause };
  };
  const step: RunStep = (stage, start, from, fromSpeed, end, to, toSpeed) => {
    const stands = toSpeed < STALL_SPEED;
    const stood = fromSpeed < STALL_SPEED;
    // Where the speed, straight between both ends, passes the bound.
    const crossing =
      stands === stood ? start : start + ((STALL_SPEED - fromSpeed) / (toSpeed - fromSpeed)) * (end - start);
    if (stands && open === undefined) open = begin(stage, crossing, to);
    if (!stands) {
      if (stood && open === undefined) open = begin(stage, start, from);
      close(crossing);
    }
  };
  return { step, close, result: () => found };
}

/** A pulse of which less than this part counts is too short; pauses that cost this part of all losses are too long. Own choice. */
const PULSE_COUNTS = 0.6;
const PAUSES_COST = 0.3;
/** Less than this part of the light enters the bore: the beam is wider than the bore at the top. Own choice. */
const LIGHT_ENTERS = 0.6;

/** What stands in the way at a moment of a stage, in numbers and in a sentence. */
function stallCause(
  bore: Bore,
  stages: readonly Stage[],
  stage: number,
  time: number,
  depth: number,
): Pick<PierceStall, 'cause' | 'why'> {
  const now = stages[stage];
  if (now === undefined) throw new RangeError(`there is no stage ${stage}`);
  const quantities = stageQuantitiesAt(now, time / now.duration);
  const set = new Float64Array(SET_SIZE);
  const moment = boreMomentEmpty();
  boreSet(set, quantities);
  boreMoment(bore, set, depth, moment);
  const flow = (place: number) => moment[place] ?? 0;
  const lost = flow(CONDUCTION) + flow(PAUSES) + flow(WALL);
  const facts = `The bottom stands still at ${millimetres(depth)}: of ${watts(flow(EMITTED))} mean power ${watts(flow(BOTTOM_LIGHT))} are absorbed there, and the plate conducts ${watts(lost)} away.`;

  const { duty, pulseFrequency } = quantities;
  if (pulseFrequency !== null && effectiveDuty(duty, pulseFrequency, bore.riseTime) < PULSE_COUNTS * duty) {
    return { cause: 'rise', why: `${facts} The pulses are over before the source has risen: lower the frequency.` };
  }
  if (flow(PAUSES) > PAUSES_COST * lost) {
    return { cause: 'pauses', why: `${facts} It freezes in the pauses: raise the frequency or the duty.` };
  }
  const enters = (flow(BOTTOM_LIGHT) + flow(WALL_LIGHT)) / (bore.parameters.coupling * flow(EMITTED));
  if (enters < LIGHT_ENTERS) {
    return { cause: 'focus', why: `${facts} The beam is wider than the bore at the top: bring the focus nearer.` };
  }
  return { cause: 'power', why: `${facts} Light fades with depth: the mean power must grow.` };
}

function notThrough(depth: number, thickness: number, speed: number, total: number): string {
  const where = `${millimetres(depth)} of ${millimetres(thickness)}`;
  if (speed < STALL_SPEED) return `Not through: stands still at ${where}. It needs more mean power at depth.`;
  return `Not through: the routine ends after ${quantityText(total, 'time', 'metric').text} at ${where}, still going down at ${quantityText(speed, 'speed', 'metric', { unit: 'mm/s', decimals: 1 }).text}.`;
}

function watts(value: number): string {
  return quantityText(value, 'power', 'metric', { unit: 'W', decimals: 0 }).text;
}

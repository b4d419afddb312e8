import { ERUPTION_CAUTION, STEEPEST_STEP, type ReserveRules } from './checks.ts';
import type { Bore } from './bore.ts';
import { leadInNeeded } from './lead-in.ts';
import { heatLeftOf, SHORTEST_STALL } from './predict.ts';
import { planStages, type Frame, type Plan } from './propose-plan.ts';
import type { PierceResults } from './results.ts';
import { pierceRun, type PierceRun } from './run.ts';
import { routineTime, stagesMeanPower, stagesPeakPower, stagesPulses } from './stage-math.ts';
import { LONGEST_STAGE } from './stage-problems.ts';
import type { Stage } from './stage.ts';

/** A house rule as the designer sees it. */
export type ProposalRule = {
  /** What the lead wrote beside it. */
  readonly sentence: string;
  /** How far it is from holding, without unit: 0 when it holds. The nearer the smaller, so that a search finds the way. */
  readonly miss: (results: PierceResults) => number;
  /** What the results that it speaks of come to, in words. */
  readonly said: (results: PierceResults) => string;
};

/** Limits beside the reserve; each may be left out. SI. */
export type ProposalLimits = {
  /** Widest crater, as a radius. */
  readonly craterRadius?: number;
  /** Greatest share of the bore that a pulse's melt may fill; four fifths of what throws it out without it. */
  readonly eruptionIndex?: number;
  readonly routineTime?: number;
  readonly peakPower?: number;
  /** Lead-in that there is room for. */
  readonly leadInLength?: number;
};

/** What one candidate is judged by. */
export type Brief = {
  readonly thickness: { readonly min: number; readonly max: number };
  readonly coldPlate: number; // K
  readonly hottestPlate: number; // K
  readonly cold: Bore;
  readonly hot: Bore;
  readonly reserve: ReserveRules;
  readonly limits: ProposalLimits & { readonly eruptionIndex: number };
  readonly rules: readonly ProposalRule[];
  /** Every candidate is judged by exact figures. */
  readonly exact?: boolean;
};

/** What a proposal may miss. The first four are what makes a routine sound, the others are what was asked for. */
export const MISSES = [
  'through',
  'idle',
  'stall',
  'jump',
  'reserve-cold',
  'reserve-hot',
  'eruption',
  'crater',
  'routine-time',
  'lead-in',
] as const;
export type MissId = (typeof MISSES)[number];
/** Places from here on are the rules', in their order. */
export const FIRST_RULE = MISSES.length;

export type Judged = {
  readonly plan: Plan;
  readonly stages: readonly Stage[];
  readonly routineTime: number; // s
  /** The same before it is rounded to a tenth, s: what is compared, so that small steps count. */
  readonly wished: number;
  /** How far each limit is missed, in its own measure; 0 when it is kept. In the order of MISSES, then the rules. */
  readonly misses: Float64Array;
  /** Sum of the misses. */
  readonly missed: number;
  /** Figures that a sentence about a missed limit needs. */
  readonly figures: { readonly eruptionIndex: number; readonly craterRadius: number; readonly depth: number };
};

/** Error of the depth in a step that a search bears, m: its figures are asked again exactly in the end. */
const SEARCH_TOLERANCE = 1e-7;
/** Limits are kept by this much while searching, so that exact figures keep them too. */
const SEARCH_MARGIN = 0.004;
/** Long enough a hold to see whether it ever gets through, s. */
const LONG_HOLD = 30;
const SHORTEST_HOLD = 0.1;
/** Standing still for this long counts as a stall, s. Half of what a prediction tells, since steps that only begin or end in one are left out. */
const STOOD = SHORTEST_STALL / 2;

/**
 * A plan judged: its stages with the hold as long as the reserve asks for, and what it misses. Undefined when it is no better than a
 * routine that wishes for `beat` s and nothing more needed to be known.
 */
export function planJudged(
  frame: Frame,
  brief: Brief,
  plan: Plan,
  beat: number,
  exact = brief.exact === true,
): Judged | undefined {
  const margin = exact ? 1 : 1 - SEARCH_MARGIN;
  const { thickness, reserve, limits } = brief;
  const only = beat < Number.POSITIVE_INFINITY;
  // Once something keeps every limit, what erupts need not be followed to its end.
  const giveUpAt = only ? limits.eruptionIndex * margin : Number.POSITIVE_INFINITY;
  const search = exact ? undefined : { tolerance: SEARCH_TOLERANCE, giveUpAt };
  const misses = new Float64Array(FIRST_RULE + brief.rules.length);
  const miss = (id: MissId, by: number) => {
    misses[MISSES.indexOf(id)] = by > 0 ? by : 0;
  };

  // Once something keeps every limit, a hold need not be followed for longer than that one's bottom took.
  const longest = only ? Math.min(LONG_HOLD, beat / reserve.cold) : LONG_HOLD;
  const trial = planStages(frame, plan, longest);
  const ramps = frame.holds ? routineTime(trial.slice(0, -1)) : routineTime(trial);
  const shortest = frame.holds ? ramps + SHORTEST_HOLD : ramps;
  if (shortest >= beat) return undefined;
  const cold = pierceRun(brief.cold, trial, thickness.max, undefined, search);
  const throughCold = cold.through?.time ?? null;
  if (throughCold !== null && frame.holds && reserve.cold * throughCold >= beat) return undefined;
  if (throughCold === null && only) return undefined;
  const hot = pierceRun(brief.hot, trial, thickness.max, undefined, search);
  const throughHot = hot.through?.time ?? null;
  if (throughHot === null && only) return undefined;

  const needed = Math.max(shortest, reserve.cold * (throughCold ?? 0), reserve.hot * (throughHot ?? 0));
  const wished = frame.holds ? needed + plan.extra / 10 : ramps;
  if (wished >= beat) return undefined;
  // To the next tenth of a second, with room for the last digit.
  const total = frame.holds ? Math.ceil(wished * 10 - 1e-7) / 10 : ramps;
  const hold = Math.min(LONGEST_STAGE, Number((total - ramps).toFixed(6)));
  const stages = frame.holds ? planStages(frame, plan, hold) : trial;

  // Nothing is worse than not being through, however many rules are missed.
  if (throughCold === null) {
    miss('through', 1 + brief.rules.length + (thickness.max - cold.depth) / thickness.max);
  } else {
    const lastBegins = routineTime(stages.slice(0, -1));
    // Who gives stages decides when they end.
    if (!frame.given) miss('idle', lastBegins / throughCold - margin);
    if (!frame.holds) {
      miss('reserve-cold', (reserve.cold * throughCold) / total - 1);
      miss('reserve-hot', throughHot === null ? 1 : (reserve.hot * throughHot) / total - 1);
    }
  }
  miss('stall', cold.stood > STOOD ? 0.1 + cold.stood / LONG_HOLD : 0);
  miss('jump', steepest(frame, stages));
  const eruptionIndex = Math.max(greatest(cold.eruptions), greatest(hot.eruptions));
  const craterRadius = Math.max(cold.craterRadius, hot.craterRadius);
  miss('eruption', eruptionIndex / (limits.eruptionIndex * margin) - 1);
  if (limits.craterRadius !== undefined) miss('crater', craterRadius / (limits.craterRadius * margin) - 1);
  if (limits.routineTime !== undefined) miss('routine-time', total / (limits.routineTime * (1 + 1e-9)) - 1);

  // What misses something cannot beat what misses nothing, so its rules need not be asked.
  if (only && misses.some((by) => by > 0)) return undefined;
  if (throughCold === null) misses.fill(0.5, FIRST_RULE);
  else if (brief.rules.length > 0 || limits.leadInLength !== undefined) {
    const results = resultsOf(brief, stages);
    if (limits.leadInLength !== undefined) {
      miss('lead-in', results.leadInLength === null ? 1 : results.leadInLength / limits.leadInLength - 1);
    }
    brief.rules.forEach((rule, index) => {
      const by = rule.miss(results);
      // A rule that cannot be said counts as one missed by half.
      misses[FIRST_RULE + index] = Number.isFinite(by) ? Math.max(0, by) : 0.5;
    });
  }
  return {
    plan,
    stages,
    routineTime: total,
    wished,
    misses,
    missed: misses.reduce((sum, by) => sum + by, 0),
    figures: { eruptionIndex, craterRadius, depth: cold.depth },
  };
}

/**
 * The named results of stages, without a trace and each worked out when it is asked for, since a rule asks for one or two. The same as
 * `pierceResults` gives from a whole prediction, but that stalls are told as one or none: a run without a trace knows how long the
 * bottom stood and not how often.
 */
export function resultsOf(brief: Brief, stages: readonly Stage[]): PierceResults {
  const { thickness, coldPlate, hottestPlate } = brief;
  const cold = once(() => pierceRun(brief.cold, stages, thickness.max));
  const hot = once(() => pierceRun(brief.hot, stages, thickness.max));
  const thin = once(() => (thickness.min === thickness.max ? hot() : pierceRun(brief.hot, stages, thickness.min)));
  const total = routineTime(stages);
  const heatOf = (run: PierceRun, plate: number) => heatLeftOf(run.ledger) / plate;
  const perLength = once(() =>
    Math.max(heatOf(cold(), thickness.max), heatOf(hot(), thickness.max), heatOf(thin(), thickness.min)),
  );
  const craterRadius = once(() => Math.max(cold().craterRadius, hot().craterRadius, thin().craterRadius));
  const leadIn = once(() =>
    leadInNeeded({
      craterRadius: craterRadius(),
      heat: { perLength: perLength(), duration: total },
      plateTemperature: hottestPlate,
    }),
  );
  const throughAt = ({ through }: PierceRun) => through?.time ?? null;
  const reserve = (run: PierceRun) => (run.through === null ? null : total / run.through.time);
  return {
    get reserveCold() {
      return reserve(cold());
    },
    get reserveHot() {
      return reserve(hot());
    },
    get breakthroughCold() {
      return throughAt(cold());
    },
    get breakthroughHot() {
      return throughAt(hot());
    },
    routineTime: total,
    get craterRadius() {
      return craterRadius();
    },
    get leadInLength() {
      const needed = leadIn();
      return needed.kind === 'ok' ? needed.length : null;
    },
    get eruptionIndex() {
      return Math.max(greatest(cold().eruptions), greatest(hot().eruptions), greatest(thin().eruptions));
    },
    eruptionLimit: brief.cold.parameters.eruptionLimit,
    get meanPower() {
      return stagesMeanPower(stages);
    },
    get peakPower() {
      return stagesPeakPower(stages);
    },
    get energy() {
      return cold().emitted;
    },
    get heatLeft() {
      return heatLeftOf(cold().ledger);
    },
    get heatPerThickness() {
      return perLength();
    },
    get oxygenUsed() {
      return cold().oxygenUsed;
    },
    get pulses() {
      return stagesPulses(stages);
    },
    stageCount: stages.length,
    get stalls() {
      return cold().stood > STOOD ? 1 : 0;
    },
    thicknessMin: thickness.min,
    thicknessMax: thickness.max,
    coldPlate,
    hottestPlate,
  };
}

/** A value worked out when it is first asked for. */
function once<T>(work: () => T): () => T {
  let known: { readonly value: T } | undefined;
  return () => (known ??= { value: work() }).value;
}

/** Four fifths of the index that throws the melt out: from there it is cautioned about. */
export function usualEruptionLimit({ parameters }: Bore): number {
  return ERUPTION_CAUTION * parameters.eruptionLimit;
}

/** By how much the steepest step of power that a plan made is too steep; steps between given stages are their maker's. */
function steepest(frame: Frame, stages: readonly Stage[]): number {
  let most = 0;
  for (let index = 1; index < stages.length; index++) {
    if (frame.slots[index] !== null && frame.slots[index - 1] !== null) continue;
    const end = stages[index - 1]?.to;
    const start = stages[index]?.from;
    if (end === undefined || start === undefined || end === start) continue;
    const ratio = (start.peakPower * start.duty) / (end.peakPower * end.duty);
    most = Math.max(most, ratio / STEEPEST_STEP.power - 1);
  }
  return most;
}

function greatest(of: Float64Array): number {
  let most = 0;
  for (const value of of) if (value > most) most = value;
  return most;
}

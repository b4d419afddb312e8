import type { MachineProfile, Nozzle } from '../machine.ts';
import { COLD_PLATE_TEMPERATURE } from '../steel/index.ts';
import { numberText, quantityText } from '../units/index.ts';
import { millimetres, percent, seconds } from '../units/said.ts';
import { boreOf } from './bore.ts';
import { DEFAULT_RESERVE_RULES, pierceChecks, type PierceCheck, type ReserveRules } from './checks.ts';
import { pierceParameters, type PierceParameters } from './parameters.ts';
import { THICKEST_PLATE } from './predict.ts';
import {
  FIRST_RULE,
  MISSES,
  planJudged,
  usualEruptionLimit,
  type Brief,
  type Judged,
  type ProposalLimits,
  type ProposalRule,
} from './propose-judge.ts';
import { frameOf, type Frame } from './propose-plan.ts';
import { planSearch, SearchBudget, type SearchWatch } from './propose-search.ts';
import { pierceResults } from './results.ts';
import { MOST_STAGES, stageProblems } from './stage-problems.ts';
import type { Stage } from './stage.ts';
import { strategyPrediction, type StrategyPrediction } from './strategy-prediction.ts';

export type ProposeInput = {
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
  /** Thinnest and thickest plate, m. */
  readonly thickness: { readonly min: number; readonly max: number };
  readonly hottestPlateTemperature: number; // K
  /** K; 20 °C without it. */
  readonly coldPlateTemperature?: number;
  readonly reserve?: ReserveRules;
  readonly limits?: ProposalLimits;
  readonly rules?: readonly ProposalRule[];
  /** The stages in their order, those to keep as they are and null for each to be proposed; without it the number of stages is free. */
  readonly pinned?: readonly (Stage | null)[];
  readonly parameters?: Partial<PierceParameters>;
};

/** A limit that stands in the way, and what it would have to be for everything else to be kept. */
export type ProposalObstacle = {
  readonly limit:
    'reserve-cold' | 'reserve-hot' | 'eruption' | 'crater' | 'routine-time' | 'lead-in' | 'rule' | 'power' | 'stages';
  readonly sentence: string;
};

export type PierceProposal =
  | {
      readonly kind: 'ok';
      readonly stages: readonly Stage[];
      readonly prediction: StrategyPrediction;
      readonly checks: readonly PierceCheck[];
      /** Routines that were looked at. */
      readonly tried: number;
    }
  | {
      readonly kind: 'none';
      readonly why: string;
      readonly inTheWay: readonly ProposalObstacle[];
      /** What comes nearest, to be looked at; it keeps the given stages and misses what is said. */
      readonly nearest: readonly Stage[];
      readonly tried: number;
    }
  | { readonly kind: 'stopped' };

/** Stages of a routine that the search may make, the hold counted. */
const STAGE_COUNTS = [4, 3, 5, 2] as const;
/** Plans judged for a proposal, and for each question of what would have to give. */
const MOST_TRIES = 800;
const TRIES_PER_START = 300;
const TRIES_PER_OBSTACLE = 700;
/** Share of the work that the search itself is, when the limits must be asked as well. */
const SEARCH_SHARE = 0.4;

/**
 * The shortest staged pierce found that keeps the reserve, every limit and every rule: ramps that join and a hold as long as the
 * reserve asks for, within the machine, sound by `pierceChecks`. Given stages stay as they are. When there is none: which limit is in
 * the way and what it would have to be. The search is deterministic and local: it does not prove that nothing shorter exists.
 * RangeError for plates, temperatures, parameters or given stages that cannot be.
 */
export function piercePropose(
  input: ProposeInput,
  onProgress?: (share: number) => void,
  shouldStop?: () => boolean,
): PierceProposal {
  const brief = briefOf(input);
  const frames = framesOf(input);
  const watch = (from: number, to: number): SearchWatch => ({
    ...(onProgress === undefined ? {} : { onProgress: (share) => onProgress(from + (to - from) * share) }),
    ...(shouldStop === undefined ? {} : { shouldStop }),
  });
  const budget = new SearchBudget(MOST_TRIES, watch(0, SEARCH_SHARE));
  const quick = planSearch(frames, brief, budget, TRIES_PER_START);
  if (budget.stopped || quick === undefined) return { kind: 'stopped' };
  let tried = budget.tried;

  let found = quick;
  let exact = exactly(found.frame, brief, found.judged);
  // Does a limit or rule that the quick figures keep turn out to be missed by a hair? Then the search is done again by exact ones.
  if (exact.missed > 0 && found.judged.missed === 0) {
    const anew = new SearchBudget(MOST_TRIES, watch(SEARCH_SHARE, SEARCH_SHARE));
    const slow = planSearch(frames, { ...brief, exact: true }, anew, TRIES_PER_START);
    if (anew.stopped || slow === undefined) return { kind: 'stopped' };
    tried += anew.tried;
    found = slow;
    exact = exactly(found.frame, brief, found.judged);
  }
  if (exact.missed === 0) {
    const { prediction, checks } = judgedWhole(input, exact.stages);
    // Only stages that were given may be cautioned about; what the search made is sound.
    const sound = checks.every(({ state, id }) => state === 'ok' || (state === 'caution' && excused(input, id)));
    const kept = brief.rules.every((rule) => rule.miss(pierceResults(prediction)) === 0);
    if (sound && kept) {
      onProgress?.(1);
      return { kind: 'ok', stages: exact.stages, prediction, checks, tried };
    }
  }
  const proposal = none(input, brief, frames, found, watch, tried);
  if (proposal.kind !== 'stopped') onProgress?.(1);
  return proposal;
}

function briefOf(input: ProposeInput): Brief {
  const { thickness, profile, nozzle, hottestPlateTemperature } = input;
  if (!(thickness.min > 0 && thickness.min <= thickness.max && thickness.max <= THICKEST_PLATE)) {
    throw new RangeError(
      `thickness [${thickness.min}, ${thickness.max}] m is upside down or outside (0, ${THICKEST_PLATE}] m`,
    );
  }
  const coldPlate = input.coldPlateTemperature ?? COLD_PLATE_TEMPERATURE;
  if (!(hottestPlateTemperature >= coldPlate)) {
    throw new RangeError(`hottest plate ${hottestPlateTemperature} K is colder than the cold plate ${coldPlate} K`);
  }
  const reserve = input.reserve ?? DEFAULT_RESERVE_RULES;
  for (const [name, value] of Object.entries(reserve)) {
    if (!(value >= 1 && value <= 20)) throw new RangeError(`${name} reserve ${value} is outside [1, 20]`);
  }
  for (const [name, value] of Object.entries(input.limits ?? {})) {
    if (!(value > 0) || !Number.isFinite(value)) throw new RangeError(`limit ${name} ${value} is not positive`);
  }
  const parameters = pierceParameters(input.parameters);
  const cold = boreOf(profile, nozzle, coldPlate, parameters);
  const hot = boreOf(profile, nozzle, hottestPlateTemperature, parameters);
  const usual = usualEruptionLimit(cold);
  return {
    thickness,
    coldPlate,
    hottestPlate: hottestPlateTemperature,
    cold,
    hot,
    reserve,
    limits: { ...input.limits, eruptionIndex: Math.min(usual, input.limits?.eruptionIndex ?? usual) },
    rules: input.rules ?? [],
  };
}

function framesOf({ profile, pinned, limits }: ProposeInput): readonly Frame[] {
  const mostPower = limits?.peakPower ?? Number.POSITIVE_INFINITY;
  if (pinned === undefined) {
    return STAGE_COUNTS.map((count) => frameOf(profile, new Array<null>(count).fill(null), mostPower));
  }
  if (!(pinned.length >= 1 && pinned.length <= MOST_STAGES)) {
    throw new RangeError(`${pinned.length} stages are outside [1, ${MOST_STAGES}]`);
  }
  for (const [index, stage] of pinned.entries()) {
    const [problem] = stage === null ? [] : stageProblems([stage], profile);
    if (problem === undefined) continue;
    const end = problem.path.includes('.from.') ? ' at its start' : problem.path.includes('.to.') ? ' at its end' : '';
    throw new RangeError(`Stage ${index + 1} cannot be kept as it is${end}. ${problem.problem}`);
  }
  return [frameOf(profile, pinned, mostPower)];
}

/** The same plan with the exact figures; its hold may grow by the last digit. */
function exactly(frame: Frame, brief: Brief, { plan }: Judged): Judged {
  const judged = planJudged(frame, brief, plan, Number.POSITIVE_INFINITY, true);
  if (judged === undefined) throw new RangeError('a plan cannot be judged');
  return judged;
}

function judgedWhole(input: ProposeInput, stages: readonly Stage[]) {
  const { profile, nozzle, thickness, hottestPlateTemperature, coldPlateTemperature, parameters, limits } = input;
  const prediction = strategyPrediction({
    stages,
    thickness,
    hottestPlateTemperature,
    profile,
    nozzle,
    ...(coldPlateTemperature === undefined ? {} : { coldPlateTemperature }),
    ...(parameters === undefined ? {} : { parameters }),
  });
  const checks = pierceChecks({
    stages,
    prediction,
    profile,
    rules: input.reserve ?? DEFAULT_RESERVE_RULES,
    ...(limits?.leadInLength === undefined ? {} : { leadInLength: limits.leadInLength }),
    ...(limits?.craterRadius === undefined ? {} : { widestCrater: limits.craterRadius }),
  });
  return { prediction, checks };
}

/** What may be cautioned about in a proposal: a plate too hot for any lead-in, and what given stages bring along. */
function excused({ pinned, limits }: ProposeInput, id: PierceCheck['id']): boolean {
  if (id === 'lead-in') return limits?.leadInLength === undefined;
  const given = pinned?.some((stage) => stage !== null) === true;
  return given && (id === 'jump' || id === 'on-time' || id === 'idle-stage');
}

type Found = { readonly frame: Frame; readonly judged: Judged };

/** Which limit is in the way: each is asked for what it would have to give so that all others are kept. */
function none(
  input: ProposeInput,
  brief: Brief,
  frames: readonly Frame[],
  found: Found,
  watch: (from: number, to: number) => SearchWatch,
  triedBefore: number,
): PierceProposal {
  const nearest = exactly(found.frame, brief, found.judged);
  const notThrough = missOf(nearest, 'through') > 0;
  if (notThrough) {
    const sentence = `With all the power it may use the bottom reaches ${millimetres(nearest.figures.depth)} of ${millimetres(brief.thickness.max)}: a thinner plate, or more power.`;
    return {
      kind: 'none',
      why: sentence,
      inTheWay: [{ limit: 'power', sentence }],
      nearest: nearest.stages,
      tried: triedBefore,
    };
  }
  let tried = triedBefore;
  const inTheWay: ProposalObstacle[] = [];
  const places = negotiable(brief);
  for (const [index, place] of places.entries()) {
    const from = SEARCH_SHARE + ((1 - SEARCH_SHARE) * index) / places.length;
    const to = SEARCH_SHARE + ((1 - SEARCH_SHARE) * (index + 1)) / places.length;
    const budget = new SearchBudget(TRIES_PER_OBSTACLE, watch(from, to));
    const given = planSearch(frames, brief, budget, TRIES_PER_OBSTACLE / 2, place);
    tried += budget.tried;
    if (budget.stopped || given === undefined) return { kind: 'stopped' };
    const judged = exactly(given.frame, brief, given.judged);
    const gives = judged.misses[place] ?? 0;
    if (gives > 0 && judged.missed - gives <= 0) inTheWay.push(obstacle(input, brief, judged, place));
  }
  if (inTheWay.length > 0) {
    const why = `No routine keeps everything. ${inTheWay.map(({ sentence }) => sentence).join(' Or: ')}`;
    return { kind: 'none', why, inTheWay, nearest: nearest.stages, tried };
  }
  const missed = [...nearest.misses.keys()].filter((place) => (nearest.misses[place] ?? 0) > 0);
  const all = missed.map((place) => obstacle(input, brief, nearest, place));
  const why =
    all.length === 0
      ? 'No routine was found that every check agrees with.'
      : `No routine keeps everything, and giving way in one limit is not enough. Nearest: ${all.map(({ sentence }) => sentence).join(' ')}`;
  return { kind: 'none', why, inTheWay: all, nearest: nearest.stages, tried };
}

function missOf(judged: Judged, id: (typeof MISSES)[number]): number {
  return judged.misses[MISSES.indexOf(id)] ?? 0;
}

/** Places of the limits that somebody could give way in. */
function negotiable({ limits, rules }: Brief): readonly number[] {
  const place = (id: (typeof MISSES)[number]) => MISSES.indexOf(id);
  return [
    place('eruption'),
    ...(limits.craterRadius === undefined ? [] : [place('crater')]),
    ...(limits.routineTime === undefined ? [] : [place('routine-time')]),
    ...(limits.leadInLength === undefined ? [] : [place('lead-in')]),
    ...rules.map((_, index) => FIRST_RULE + index),
  ];
}

function obstacle(input: ProposeInput, brief: Brief, judged: Judged, place: number): ProposalObstacle {
  const { limits } = brief;
  const id = MISSES[place];
  const { figures } = judged;
  switch (id) {
    case 'eruption':
      return {
        limit: 'eruption',
        sentence: `The melt of a pulse would have to be allowed ${percent(figures.eruptionIndex)} of the bore instead of ${percent(limits.eruptionIndex)}.`,
      };
    case 'crater':
      return {
        limit: 'crater',
        sentence: `The crater would have to be allowed a radius of ${hundredths(figures.craterRadius)} instead of ${hundredths(limits.craterRadius ?? 0)}.`,
      };
    case 'routine-time':
      return {
        limit: 'routine-time',
        sentence: `The routine would have to be allowed ${seconds(judged.routineTime)} instead of ${seconds(limits.routineTime ?? 0)}.`,
      };
    case 'lead-in': {
      const { prediction } = judgedWhole(input, judged.stages);
      const needed = pierceResults(prediction).leadInLength;
      const sentence =
        needed === null
          ? 'No lead-in is long enough on a plate that hot.'
          : `The lead-in would have to be ${millimetres(needed)} long instead of ${millimetres(limits.leadInLength ?? 0)}.`;
      return { limit: 'lead-in', sentence };
    }
    case 'reserve-cold':
    case 'reserve-hot': {
      const { prediction } = judgedWhole(input, judged.stages);
      const { reserve } = id === 'reserve-cold' ? prediction.cold : prediction.hot;
      const reached = reserve.kind === 'ok' ? numberText(reserve.value, 2) : 'none';
      const [plate, asked] = id === 'reserve-cold' ? ['cold', brief.reserve.cold] : ['hot', brief.reserve.hot];
      return {
        limit: id,
        sentence: `The reserve on the ${plate} plate is ${reached} instead of ${numberText(asked, 2)}.`,
      };
    }
    case 'through':
    case 'stall':
      return { limit: 'power', sentence: 'The bottom stands still on the way: more power at depth is needed.' };
    case 'idle':
      return { limit: 'stages', sentence: 'The last stage begins when the hole is through already.' };
    case 'jump':
      return { limit: 'stages', sentence: 'The power jumps too steeply after a stage that was given.' };
    default: {
      const rule = brief.rules[place - FIRST_RULE];
      if (rule === undefined) throw new RangeError(`there is no rule at place ${place}`);
      const { prediction } = judgedWhole(input, judged.stages);
      const others = judged.missed > (judged.misses[place] ?? 0) ? 'As near as it comes' : 'With everything else kept';
      return {
        limit: 'rule',
        sentence: `This rule would have to give way: “${rule.sentence}” ${others}, ${rule.said(pierceResults(prediction))}.`,
      };
    }
  }
}

function hundredths(value: number): string {
  return quantityText(value, 'length', 'metric').text;
}

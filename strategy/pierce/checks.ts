import { dialForFocus } from '../beam/index.ts';
import type { MachineProfile } from '../machine.ts';
import { numberText, quantityText, type Dimension } from '../units/index.ts';
import { celsius, percent, seconds } from '../units/said.ts';
import { CRATER_SHARE, leadInNeeded, pierceWarmth } from './lead-in.ts';
import { pulseTrain } from './pulse.ts';
import type { Stage, StageQuantities } from './stage.ts';
import type { StrategyOutcome, StrategyPrediction } from './strategy-prediction.ts';

export type PierceCheckId =
  | 'power'
  | 'frequency'
  | 'duty'
  | 'on-time'
  | 'pressure'
  | 'standoff'
  | 'focus'
  | 'reserve-cold'
  | 'reserve-hot'
  | 'stall'
  | 'idle-stage'
  | 'jump'
  | 'eruption'
  | 'crater'
  | 'lead-in';

export type CheckState = 'ok' | 'caution' | 'wrong';

export type PierceCheck = {
  readonly id: PierceCheckId;
  readonly state: CheckState;
  readonly sentence: string;
  /** Stages it is about, counted from 0; empty when it is about the whole pierce. */
  readonly stages: readonly number[];
};

/** Least reserve that a plant asks for, without unit. */
export type ReserveRules = { readonly cold: number; readonly hot: number };

/** Common practice, no source: through at half the routine when cold, a little earlier when hot. */
export const DEFAULT_RESERVE_RULES: ReserveRules = { cold: 2, hot: 2.2 };

export type PierceCheckInput = {
  readonly stages: readonly Stage[];
  readonly prediction: StrategyPrediction;
  readonly profile: MachineProfile;
  /** Length of the lead-in from the pierce to the contour, m, where one is known. */
  readonly leadInLength?: number;
  readonly rules?: ReserveRules;
  /** Widest crater the plant accepts, as a radius in m, where it has said so. */
  readonly widestCrater?: number;
};

/** From this much of the eruption's limit it is a matter of luck. Own choice. */
export const ERUPTION_CAUTION = 0.8;
/** Steps between stages that are more than a machine follows or the melt bears at once. Common practice and own choice, no source. */
export const STEEPEST_STEP = { power: 1.5, standoff: 4e-3, focus: 4e-3, pressure: 0.5e5 } as const;
/** A pulse of fewer rise times than this is mostly ramp. Own choice. */
const ON_TIME_CAUTION = 5;

/** What an engineer would say about a staged pierce on a machine: its limits, the reserve, and what the plate will suffer. */
export function pierceChecks(input: PierceCheckInput): readonly PierceCheck[] {
  const { stages, prediction, profile } = input;
  const rules = input.rules ?? DEFAULT_RESERVE_RULES;
  const { source, standoff, oxygen } = profile;
  return [
    limitCheck(
      stages,
      'power',
      'Peak power',
      'power',
      (set) => set.peakPower,
      source.minPower,
      source.maxPower,
      'source gives',
    ),
    limitCheck(
      stages,
      'frequency',
      'Pulse frequency',
      'frequency',
      (set) => set.pulseFrequency,
      source.minFrequency,
      source.maxFrequency,
      'source takes',
    ),
    limitCheck(stages, 'duty', 'Duty', 'ratio', (set) => set.duty, source.minDuty, 1, 'source takes'),
    onTimeCheck(stages, source.riseTime),
    limitCheck(
      stages,
      'pressure',
      'Oxygen pressure',
      'pressure',
      (set) => set.oxygenPressure,
      oxygen.minPressure,
      oxygen.maxPressure,
      'machine gives',
    ),
    limitCheck(
      stages,
      'standoff',
      'Standoff',
      'length',
      (set) => set.standoff,
      standoff.min,
      standoff.max,
      'machine takes',
    ),
    focusCheck(stages, profile),
    reserveCheck('reserve-cold', prediction, prediction.cold, rules.cold),
    reserveCheck('reserve-hot', prediction, prediction.hot, rules.hot),
    stallCheck(prediction.cold),
    idleCheck(stages, prediction.cold),
    jumpCheck(stages),
    eruptionCheck(prediction),
    craterCheck(prediction, input.widestCrater),
    leadInCheck(prediction, input.leadInLength),
  ];
}

function limitCheck(
  stages: readonly Stage[],
  id: PierceCheckId,
  name: string,
  dimension: Dimension,
  of: (set: StageQuantities) => number | null,
  min: number,
  max: number,
  owner: string,
): PierceCheck {
  const shown = (value: number) => quantityText(value, dimension, 'metric').text;
  const values = stages.flatMap((stage, index) =>
    [stage.from, stage.to].flatMap((set) => {
      const value = of(set);
      return value === null ? [] : [{ index, value }];
    }),
  );
  const outside = values.filter(({ value }) => value < min || value > max);
  const [first] = outside;
  if (first !== undefined) {
    const sentence = `${stageName(first.index)} asks for ${shown(first.value)}: the ${owner} ${shown(min)} to ${shown(max)}.`;
    return check(
      id,
      'wrong',
      sentence,
      outside.map(({ index }) => index),
    );
  }
  if (values.length === 0) return check(id, 'ok', `${name}: continuous throughout.`);
  const low = Math.min(...values.map(({ value }) => value));
  const high = Math.max(...values.map(({ value }) => value));
  const span = low === high ? shown(low) : `${shown(low)} to ${shown(high)}`;
  return check(id, 'ok', `${name} ${span}: the ${owner} ${shown(min)} to ${shown(max)}.`);
}

function onTimeCheck(stages: readonly Stage[], riseTime: number): PierceCheck {
  const pulses = stages.flatMap((stage, index) =>
    [stage.from, stage.to].flatMap((set) => {
      const { onTime } = pulseTrain(set);
      return onTime === null ? [] : [{ index, onTime }];
    }),
  );
  const [first, ...others] = pulses;
  if (first === undefined) return check('on-time', 'ok', 'Continuous power throughout: no pulse to be too short.');
  const shortest = others.reduce((least, pulse) => (pulse.onTime < least.onTime ? pulse : least), first);
  const facts = `the shortest pulse, in stage ${shortest.index + 1}, lasts ${milliseconds(shortest.onTime)} and the source needs ${milliseconds(riseTime)} to rise`;
  if (shortest.onTime <= riseTime) {
    return check('on-time', 'wrong', `It never reaches its peak: ${facts}.`, [shortest.index]);
  }
  if (shortest.onTime < ON_TIME_CAUTION * riseTime) {
    return check('on-time', 'caution', `Much of it is ramp: ${facts}.`, [shortest.index]);
  }
  return check('on-time', 'ok', `${facts.charAt(0).toUpperCase()}${facts.slice(1)}.`);
}

function focusCheck(stages: readonly Stage[], profile: MachineProfile): PierceCheck {
  const typed: number[] = [];
  for (const [index, stage] of stages.entries()) {
    for (const set of [stage.from, stage.to]) {
      const reading = dialForFocus(profile.focusScale, set.focusPosition, set.standoff);
      if (reading.kind === 'none') return check('focus', 'wrong', `${stageName(index)}: ${reading.why}`, [index]);
      typed.push(reading.typed);
    }
  }
  const low = Math.min(...typed);
  const high = Math.max(...typed);
  const signed = (value: number) => quantityText(value, 'length', 'metric', { sign: true }).text;
  const span = low === high ? signed(low) : `${signed(low)} to ${signed(high)}`;
  return check('focus', 'ok', `The dial reads ${span}, within its travel.`);
}

function reserveCheck(
  id: 'reserve-cold' | 'reserve-hot',
  prediction: StrategyPrediction,
  outcome: StrategyOutcome,
  rule: number,
): PierceCheck {
  const plate = `${millimetres(prediction.thickness.max)} at ${celsius(outcome.plateTemperature)}`;
  const { breakthrough, reserve } = outcome;
  if (reserve.kind === 'none' || breakthrough.kind === 'none') {
    const why = breakthrough.kind === 'none' ? breakthrough.why : '';
    return check(id, 'wrong', `${plate}: no reserve. ${why}`);
  }
  const facts = `${plate}: through after ${seconds(breakthrough.time)} of ${seconds(prediction.routineTime)}, reserve ${numberText(reserve.value, 2)}`;
  if (reserve.value < rule) return check(id, 'wrong', `${facts}, less than the ${numberText(rule, 2)} asked for.`);
  return check(id, 'ok', `${facts}, at least the ${numberText(rule, 2)} asked for.`);
}

function stallCheck(outcome: StrategyOutcome): PierceCheck {
  const [first] = outcome.stalls;
  if (first === undefined) return check('stall', 'ok', 'The bottom keeps moving until the hole is through.');
  const sentence = `${stageName(first.stage)}, after ${seconds(first.time)}, for ${seconds(first.duration)}: ${first.why}`;
  return check(
    'stall',
    outcome.breakthrough.kind === 'through' ? 'caution' : 'wrong',
    sentence,
    outcome.stalls.map(({ stage }) => stage),
  );
}

function idleCheck(stages: readonly Stage[], outcome: StrategyOutcome): PierceCheck {
  const { breakthrough } = outcome;
  if (breakthrough.kind === 'none') return check('idle-stage', 'ok', 'Every stage acts: the hole is not through.');
  const idle = stages.map((_, index) => index).filter((index) => index > breakthrough.stage);
  const [first] = idle;
  if (first === undefined) return check('idle-stage', 'ok', 'Every stage begins before the hole is through.');
  const which =
    idle.length === 1 ? `Stage ${first + 1} begins` : `Stages ${idle.map((index) => index + 1).join(', ')} begin`;
  return check(
    'idle-stage',
    'caution',
    `${which} after the hole is through at ${seconds(breakthrough.time)}, even on the thickest cold plate: nothing but reserve.`,
    idle,
  );
}

function jumpCheck(stages: readonly Stage[]): PierceCheck {
  const found = stages.flatMap((stage, index) => {
    const before = stages[index - 1];
    const step = before === undefined ? undefined : steepStep(before.to, stage.from);
    return step === undefined ? [] : [{ index, step }];
  });
  const [first] = found;
  if (first === undefined) return check('jump', 'ok', 'The stages join without a steep step.');
  const also = found.length === 1 ? '' : ` (and ${found.length - 1} more)`;
  return check(
    'jump',
    'caution',
    `From stage ${first.index} to stage ${first.index + 1} ${first.step}${also}: ramp it.`,
    found.map(({ index }) => index),
  );
}

/** The first thing that jumps too far between the end of a stage and the start of the next. */
function steepStep(end: StageQuantities, start: StageQuantities): string | undefined {
  const powers = [end.peakPower * end.duty, start.peakPower * start.duty] as const;
  const told = (what: string, dimension: Dimension, from: number, to: number, sign: boolean) =>
    `${what} jumps from ${quantityText(from, dimension, 'metric', { sign }).text} to ${quantityText(to, dimension, 'metric', { sign }).text}`;
  const far = (from: number, to: number, most: number) => Math.abs(to - from) > most * (1 + 1e-9);
  // Less power at once harms nothing.
  if (powers[1] > STEEPEST_STEP.power * powers[0] * (1 + 1e-9)) {
    return `${told('mean power', 'power', ...powers, false)}, more than the melt bears at once`;
  }
  if (far(end.standoff, start.standoff, STEEPEST_STEP.standoff)) {
    return `${told('the nozzle', 'length', end.standoff, start.standoff, false)} above the plate, which takes the axis time`;
  }
  if (far(end.focusPosition, start.focusPosition, STEEPEST_STEP.focus)) {
    return `${told('the focus', 'length', end.focusPosition, start.focusPosition, true)}, which takes the lens time`;
  }
  if (far(end.oxygenPressure, start.oxygenPressure, STEEPEST_STEP.pressure)) {
    return `${told('oxygen', 'pressure', end.oxygenPressure, start.oxygenPressure, false)}, which takes the gas time`;
  }
  return undefined;
}

function eruptionCheck({ eruption }: StrategyPrediction): PierceCheck {
  const facts = `in stage ${eruption.stage + 1} the melt of a pulse fills ${percent(eruption.index)} of the bore, and ${percent(eruption.limit)} throws it out, on ${millimetres(eruption.thickness)} at ${celsius(eruption.plateTemperature)}`;
  const stages = [eruption.stage];
  if (eruption.index >= eruption.limit) {
    return check('eruption', 'wrong', `It erupts: ${facts}. Less mean power or shorter pulses there.`, stages);
  }
  if (eruption.index >= ERUPTION_CAUTION * eruption.limit) {
    return check('eruption', 'caution', `Close to erupting: ${facts}.`, stages);
  }
  return check('eruption', 'ok', `No eruption: ${facts}.`);
}

function craterCheck(prediction: StrategyPrediction, widest: number | undefined): PierceCheck {
  const facts = `The crater is about ${millimetres(2 * prediction.craterRadius)} wide at worst`;
  if (widest === undefined) return check('crater', 'ok', `${facts}.`);
  if (prediction.craterRadius > widest) {
    return check('crater', 'wrong', `${facts}, more than the ${millimetres(2 * widest)} accepted.`);
  }
  return check('crater', 'ok', `${facts}, at most the ${millimetres(2 * widest)} accepted.`);
}

function leadInCheck(prediction: StrategyPrediction, length: number | undefined): PierceCheck {
  const { craterRadius, heat, hot } = prediction;
  const needed = leadInNeeded({ craterRadius, heat, plateTemperature: hot.plateTemperature });
  const crater = `a crater ${millimetres(craterRadius)} in radius`;
  if (length === undefined) {
    if (needed.kind === 'none') return check('lead-in', 'caution', needed.why);
    return check('lead-in', 'ok', `A lead-in must be at least ${needed.sentence}.`);
  }
  const leadIn = `The lead-in of ${millimetres(length)}`;
  if (!(craterRadius < length)) {
    return check('lead-in', 'wrong', `${leadIn} is shorter than ${crater}: the contour is damaged where it begins.`);
  }
  if (craterRadius > CRATER_SHARE * length) {
    return check('lead-in', 'caution', `${leadIn} hardly clears ${crater}.`);
  }
  const warmer = quantityText(pierceWarmth(heat, length), 'temperatureDifference', 'metric').text;
  if (needed.kind === 'none') return check('lead-in', 'caution', needed.why);
  if (length < needed.length) {
    return check(
      'lead-in',
      'caution',
      `${leadIn} begins the contour where the pierce warms the plate by up to ${warmer}: it should be ${needed.sentence}.`,
    );
  }
  return check('lead-in', 'ok', `${leadIn} clears ${crater}; the pierce warms its end by ${warmer} at most.`);
}

function check(id: PierceCheckId, state: CheckState, sentence: string, stages: readonly number[] = []): PierceCheck {
  return { id, state, sentence, stages: [...new Set(stages)] };
}

function stageName(index: number): string {
  return `Stage ${index + 1}`;
}

/** To a tenth and without the zero behind the point: plates and craters are told side by side. */
function millimetres(value: number): string {
  return quantityText(Math.round(value * 1e4) / 1e4, 'length', 'metric').text;
}

function milliseconds(value: number): string {
  return quantityText(value, 'time', 'metric', { unit: 'ms' }).text;
}

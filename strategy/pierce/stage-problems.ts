import { dialForFocus, focusForDial } from '../beam/index.ts';
import type { MachineProfile } from '../machine.ts';
import { quantityText, type Dimension } from '../units/index.ts';
import type { Stage, StageQuantities } from './stage.ts';

/** Something in the stages that cannot be: the field's path, as in `stages[2].from.peakPower`, and a sentence. */
export type StageProblem = { readonly path: string; readonly problem: string };

/** More stages than this are no routine any more. */
export const MOST_STAGES = 20;

/** Longest stage, s. */
export const LONGEST_STAGE = 600;

type Range = {
  readonly name: string;
  readonly dimension: Dimension;
  readonly min: number;
  readonly max: number;
  /** Whether `min` itself is allowed. */
  readonly closed: boolean;
};

/** What is possible on any machine; a machine's own limits are `pierceChecks`' business, or `profile`'s below. */
const RANGES: Readonly<Record<keyof StageQuantities, Range>> = {
  standoff: { name: 'Standoff', dimension: 'length', min: 0, max: 0.05, closed: false },
  focusPosition: { name: 'Focus position', dimension: 'length', min: -0.06, max: 0.06, closed: true },
  peakPower: { name: 'Peak power', dimension: 'power', min: 0, max: 100_000, closed: false },
  duty: { name: 'Duty', dimension: 'ratio', min: 0, max: 1, closed: false },
  pulseFrequency: { name: 'Pulse frequency', dimension: 'frequency', min: 0.1, max: 100_000, closed: true },
  oxygenPressure: { name: 'Oxygen pressure', dimension: 'pressure', min: 0, max: 30e5, closed: true },
};

const QUANTITIES = [
  'standoff',
  'focusPosition',
  'peakPower',
  'duty',
  'pulseFrequency',
  'oxygenPressure',
] as const satisfies readonly (keyof StageQuantities)[];

/**
 * All that is wrong with the stages, in their order; empty when they can be predicted. With a machine its own limits of power,
 * frequency, duty, standoff and pressure are asked as well, and the travel of its focus.
 */
export function stageProblems(stages: readonly Stage[], profile?: MachineProfile): readonly StageProblem[] {
  if (stages.length === 0) return [{ path: 'stages', problem: 'A pierce needs at least one stage.' }];
  if (stages.length > MOST_STAGES) {
    return [{ path: 'stages', problem: `${stages.length} stages are more than ${MOST_STAGES}.` }];
  }
  const ranges = profile === undefined ? RANGES : machineRanges(profile);
  return stages.flatMap((stage, index) => {
    const problems = stageProblemsAt(stage, `stages[${index}]`, ranges);
    // What the dial takes depends on the standoff, so that must be one first.
    if (profile === undefined || problems.length > 0) return problems;
    return (['from', 'to'] as const).flatMap((end) => {
      const problem = travelProblem(stage[end], profile);
      return problem === undefined ? [] : [{ path: `stages[${index}].${end}.focusPosition`, problem }];
    });
  });
}

function travelProblem(
  { focusPosition, standoff }: StageQuantities,
  { focusScale }: MachineProfile,
): string | undefined {
  if (dialForFocus(focusScale, focusPosition, standoff).kind === 'ok') return undefined;
  const ends = [focusScale.minDial, focusScale.maxDial].map((typed) => focusForDial(focusScale, typed, standoff));
  const [least, most] = [Math.min(...ends), Math.max(...ends)].map((end) => shown(end, 'length'));
  return `Focus position ${shown(focusPosition, 'length')} is outside [${least}, ${most}], which the dial reaches at this standoff.`;
}

function stageProblemsAt(
  stage: Stage,
  path: string,
  ranges: Readonly<Record<keyof StageQuantities, Range>>,
): readonly StageProblem[] {
  const problems: StageProblem[] = [];
  if (!(stage.duration > 0 && stage.duration <= LONGEST_STAGE)) {
    problems.push({
      path: `${path}.duration`,
      problem: `Duration ${shown(stage.duration, 'time')} is outside (0, ${LONGEST_STAGE}] s.`,
    });
  }
  for (const end of ['from', 'to'] as const) {
    const set = stage[end];
    for (const field of QUANTITIES) {
      const problem = quantityProblem(set, field, ranges[field]);
      if (problem !== undefined) problems.push({ path: `${path}.${end}.${field}`, problem });
    }
  }
  if ((stage.from.pulseFrequency === null) !== (stage.to.pulseFrequency === null)) {
    problems.push({
      path: `${path}.to.pulseFrequency`,
      problem: 'A stage is pulsed from end to end or continuous from end to end: part it in two.',
    });
  }
  return problems;
}

function quantityProblem(set: StageQuantities, field: keyof StageQuantities, range: Range): string | undefined {
  const value = set[field];
  if (value === null) {
    return set.duty === 1
      ? undefined
      : `Without a pulse frequency the power is continuous: duty must be 100 %, not ${shown(set.duty, 'ratio')}.`;
  }
  const { name, dimension, min, max, closed } = range;
  if (value <= max && (closed ? value >= min : value > min)) return undefined;
  const bracket = closed ? '[' : '(';
  return `${name} ${shown(value, dimension)} is outside ${bracket}${shown(min, dimension)}, ${shown(max, dimension)}].`;
}

function machineRanges(profile: MachineProfile): Readonly<Record<keyof StageQuantities, Range>> {
  const { source, standoff, oxygen } = profile;
  return {
    ...RANGES,
    standoff: { ...RANGES.standoff, min: standoff.min, max: standoff.max, closed: true },
    peakPower: { ...RANGES.peakPower, min: source.minPower, max: source.maxPower, closed: true },
    duty: { ...RANGES.duty, min: source.minDuty, closed: true },
    pulseFrequency: { ...RANGES.pulseFrequency, min: source.minFrequency, max: source.maxFrequency },
    oxygenPressure: { ...RANGES.oxygenPressure, min: oxygen.minPressure, max: oxygen.maxPressure },
  };
}

/** A value that may be anything at all, since it is wrong. */
function shown(value: number, dimension: Dimension): string {
  return Number.isFinite(value) ? quantityText(value, dimension, 'metric').text : String(value);
}

import type { Knot, Range, Target } from '@/components/pierce/knots.ts';
import type { LaneName } from '@/components/pierce/section-layout.ts';
import type { Condition, Prediction } from '@/shared/strategies.ts';
import { dialForFocus } from '@/strategy/beam/index.ts';
import type { FocusScale } from '@/strategy/machine.ts';
import { quantityText, type Dimension, type UnitSystem } from '@/strategy/units/index.ts';
import { dialText, reserveText } from './pierce.ts';

const seconds = (value: number): string => quantityText(value, 'time', 'metric', { figures: 3 }).text;

const laneWords: Readonly<Record<LaneName, { short: string; of: string }>> = {
  standoff: { short: 'standoff', of: 'Standoff' },
  focusPosition: { short: 'focus', of: 'Focus' },
  meanPower: { short: 'mean power', of: 'Power' },
  oxygenPressure: { short: 'oxygen', of: 'Oxygen' },
};

/** Where a knot stands: at an end of a stage, or where two meet. */
function placeWords({ ends: [first, second] }: Knot): string {
  if (second) return `where stage ${first.stage + 1} meets stage ${second.stage + 1}`;
  return `at the ${first.end === 'from' ? 'start' : 'end'} of stage ${first.stage + 1}`;
}

/** Wordings of one thing, the longest first. */
export type KnotWordings = readonly [string, ...string[]];

/** The unit stands in the lane's name too, so it goes first. */
function focusWordings(
  { text, number }: { text: string; number: string },
  scale: FocusScale,
  focus: number,
  standoff: number,
): KnotWordings {
  const reading = dialForFocus(scale, focus, standoff);
  if (reading.kind === 'none') return [`${text}, not on the dial`, `${number}, off the dial`];
  const dial = `type ${dialText(reading.typed, reading.typed)}`;
  return [`${text}, ${dial}`, `${number}, ${dial}`];
}

export const knotText = {
  layer: 'Numbers that can be dragged',
  lane: (lane: LaneName) => `${laneWords[lane].of}: up and down change the chosen knot, left and right choose another`,
  laneShort: (lane: LaneName) => laneWords[lane].short,
  durations: 'Ends of the stages: left and right change how long a stage lasts',
  durationLabel: (stage: number) => `Duration of stage ${stage + 1}, on the time axis`,
  duration: seconds,
  knotLabel: (knot: Knot) => `${laneWords[knot.lane].of} ${placeWords(knot)}`,
  /**
   * A knot's value with what belongs to it, the longest wording first, for where there is less room. The dial's number is in each of a
   * focus position's: without it somebody types the position itself.
   */
  value: (knot: Knot, standoff: number, scale: FocusScale, system: UnitSystem): KnotWordings => {
    switch (knot.lane) {
      case 'standoff':
        return [quantityText(knot.set, 'length', system).text];
      case 'focusPosition':
        return focusWordings(quantityText(knot.set, 'length', system, { sign: true }), scale, knot.set, standoff);
      case 'meanPower': {
        const mean = quantityText(knot.value, 'power', system, { figures: 3 }).text;
        if (knot.duty === 1) return [mean];
        return [`${mean} mean, ${quantityText(knot.set, 'power', system).text} peak`, `${mean} mean`];
      }
      case 'oxygenPressure':
        return [quantityText(knot.set, 'pressure', system).text];
    }
  },
  none: 'Drag a knot, or choose one with a tap and type its number here.',
  /** Label of the number field of what is chosen. */
  field: (target: Target, knot: Knot | undefined): string => {
    if (target.kind === 'duration') return `Stage ${target.stage + 1} lasts`;
    if (!knot) return '';
    return `${target.lane === 'meanPower' ? 'Peak power' : laneWords[target.lane].of} ${placeWords(knot)}`;
  },
  less: 'Less',
  more: 'More',
  lessSpoken: (what: string) => `Less: ${what}`,
  moreSpoken: (what: string) => `More: ${what}`,
  dial: (scale: FocusScale, focus: number, standoff: number) => {
    const reading = dialForFocus(scale, focus, standoff);
    return reading.kind === 'ok' ? `Type ${dialText(reading.typed, reading.typed)} on the dial.` : reading.why;
  },
  mean: (power: number, duty: number, system: UnitSystem) =>
    duty === 1
      ? 'Continuous power: peak and mean are the same.'
      : `${quantityText(power * duty, 'power', system, { figures: 3 }).text} mean at a duty of ${quantityText(duty, 'ratio', system).text}; the duty is set in the sentence of the stage.`,
  outside: ({ min, max }: Range, dimension: Dimension, system: UnitSystem) =>
    `This machine takes ${quantityText(min, dimension, system).number} to ${quantityText(max, dimension, system).text}.`,
  outsideDuration: ({ min, max }: Range) => `A stage lasts ${seconds(min)} to ${seconds(max)}.`,
  noNumber: 'Give a number.',
} as const;

export const historyText = {
  undo: 'Undo',
  redo: 'Redo',
  bar: 'Steps and comparison',
} as const;

export const compareText = {
  toggle: (number: number) => `Compare with revision ${number}`,
  label: (number: number) => `revision ${number}`,
} as const;

/** How a pierce differs from another in breakthrough and reserve, in sentences. */
export function compareWords(than: string, before: Prediction, now: Prediction): string {
  const sentences = [
    `Against ${than}:`,
    conditionDifference('On a cold plate', before.cold, now.cold),
    conditionDifference('On the hottest plate', before.hot, now.hot),
    routineDifference(before.routineTime, now.routineTime),
  ];
  return sentences.join(' ');
}

function conditionDifference(plate: string, before: Condition, now: Condition): string {
  const [was, is] = [before.breakthrough, now.breakthrough];
  if (was.kind === 'none' && is.kind === 'none') return `${plate} neither gets through.`;
  if (is.kind === 'none') return `${plate} it no longer gets through.`;
  if (was.kind === 'none') return `${plate} it now gets through, after ${seconds(is.value)}.`;
  const later = is.value - was.value;
  const through =
    Math.abs(later) < 0.005
      ? 'through at the same moment'
      : `through ${seconds(Math.abs(later))} ${later > 0 ? 'later' : 'sooner'}`;
  if (before.reserve.kind === 'none' || now.reserve.kind === 'none') return `${plate} ${through}.`;
  const more = now.reserve.value - before.reserve.value;
  const reserve =
    Math.abs(more) < 0.005
      ? `the same reserve, ${reserveText(now.reserve.value)}`
      : `reserve ${reserveText(now.reserve.value)} instead of ${reserveText(before.reserve.value)}`;
  return `${plate} ${through}, ${reserve}.`;
}

function routineDifference(before: number, now: number): string {
  const longer = now - before;
  if (Math.abs(longer) < 0.005) return 'The routine is as long.';
  return `The routine is ${seconds(Math.abs(longer))} ${longer > 0 ? 'longer' : 'shorter'}.`;
}

export const splitText = {
  split: 'Split',
  splitSpoken: (number: number) => `Split stage ${number} in two at its middle`,
} as const;

/** What a stage comes to, said under it. */
export const stageResultText = {
  depth: (depth: string) => `${depth} deep at its end`,
  eruption: (share: string) => `${share} of an eruption`,
  stall: (from: string) => `Stands still from ${from}`,
} as const;

export const proposeText = {
  open: 'Propose',
  close: 'Close the proposal',
  title: 'Let the designer propose',
  meaning:
    'It looks for the shortest routine that keeps the reserves, this machine’s limits, the checks and every house rule that blocks.',
  cold: 'Reserve on a cold plate, at least',
  hot: 'Reserve on the hottest plate, at least',
  reserveHint: '1 to 20',
  reserveRange: 'Give a number from 1 to 20.',
  more: 'Further limits',
  fewer: 'Fewer limits',
  longest: 'Longest routine',
  crater: 'Widest crater, as a radius',
  leadIn: 'Lead-in there is room for',
  positive: 'Give a number above 0, or leave it empty.',
  keep: 'Keep as they are',
  keepHint: 'Tick none and the number of stages is free. Tick some and the others are worked out around them.',
  keepStage: (number: number) => `Stage ${number}`,
  begin: 'Work it out',
  again: 'Work it out again',
  wishes: 'Change what is wished',
  working: 'Trying routines',
  cancel: 'Cancel',
  refused: 'No proposal could be worked out',
  none: 'No routine keeps all of that',
  gives: 'What would have to give',
  nearest: 'The nearest is drawn in dots behind yours.',
  takeNearest: 'Take the nearest to work on',
  proposed: (stages: number, seconds: string) =>
    `Proposed: ${stages} ${stages === 1 ? 'stage' : 'stages'} over ${seconds}`,
  drawn: 'It is drawn in dots behind yours.',
  accept: 'Accept the proposal',
  dismiss: 'Dismiss',
  label: 'proposal',
  nearestLabel: 'nearest',
  now: 'yours',
  unsound: 'Put the numbers right first: a proposal starts from plate, machine and nozzle as they stand.',
  compare: 'Proposal beside yours',
} as const;

export const sensitivityText = {
  title: 'What the hall does to the reserve',
  hint: 'The same stages, one thing different at a time, on the thickest cold plate unless said otherwise.',
  notThrough: 'not through',
  asked: (rule: string) => `The thin line stands at ${rule}, what is asked for on a cold plate.`,
  change: (more: number) => `${more < 0 ? '−' : '+'}${Math.abs(more).toFixed(2)}`,
  same: 'no change',
  row: (what: string, reserve: string, change: string) =>
    `${what}: reserve ${reserve}${change === '' ? '' : `, ${change}`}`,
} as const;

import type { Check, Condition, Prediction, Revision, RevisionState } from '@/shared/strategies.ts';
import { quantityText, type QuantityText, type UnitSystem } from '@/strategy/units/index.ts';
import type { LaneName } from '@/components/pierce/section-layout.ts';

export const reserveText = (reserve: number | null): string =>
  // cut off, not rounded: 1.996 does not reach 2.00
  reserve === null ? 'none' : (Math.floor(reserve * 100 + 1e-6) / 100).toFixed(2);

/** A predicted time: three figures say all that an estimate knows. */
const secondsText = (seconds: number): string => quantityText(seconds, 'time', 'metric', { figures: 3 }).text;

/** What the core shows, for who doesn't see it. */
export const coreWords = (stages: number, reserve: number | null): string =>
  `Core: ${stages} ${stages === 1 ? 'band' : 'bands'} of depth, ${
    reserve === null ? 'not through' : `reserve ${reserveText(reserve)} on a cold plate`
  }`;

export const laneText: Readonly<Record<LaneName, { name: string; short: string }>> = {
  standoff: { name: 'standoff', short: 'Standoff' },
  focusPosition: { name: 'focus position, above the plate’s top', short: 'Focus' },
  meanPower: { name: 'mean power', short: 'Power' },
  oxygenPressure: { name: 'oxygen pressure', short: 'Oxygen' },
};

export const sectionText = {
  depth: 'depth',
  stage: (number: number) => [`stage ${number}`, `${number}`],
  lanes: 'Show under the section',
  /** Wordings of the dimension lines, the longest that fits is drawn. */
  through: (plate: string, short: string, seconds: number) => [
    `${plate}: through after ${secondsText(seconds)}`,
    `${short}: ${secondsText(seconds)}`,
    secondsText(seconds),
  ],
  inReserve: (seconds: number) => [
    `in reserve ${secondsText(seconds)}`,
    `reserve ${secondsText(seconds)}`,
    secondsText(seconds),
  ],
  notThrough: (plate: string) => [`${plate}: not through within the routine`, 'not through'],
  cold: 'cold plate',
  coldShort: 'cold',
  short: (kelvin: number, system: UnitSystem) => quantityText(kelvin, 'temperature', system).text,
  coldAt: (kelvin: number, system: UnitSystem) => `Cold plate, ${quantityText(kelvin, 'temperature', system).text}`,
  hotAt: (kelvin: number, system: UnitSystem) => `Plate at ${quantityText(kelvin, 'temperature', system).text}`,
  plateAt: (kelvin: number, system: UnitSystem) => `plate at ${quantityText(kelvin, 'temperature', system).text}`,
};

/** One plate temperature of the prediction in a sentence. */
export function conditionWords(plate: string, condition: Condition): string {
  if (condition.breakthrough.kind === 'none') {
    // most reasons begin with the words themselves
    const why = condition.breakthrough.why.replace(/^not through[:.,]?\s*/i, '');
    return `${plate}: not through. ${why.charAt(0).toUpperCase()}${why.slice(1)}`;
  }
  const through = `${plate}: through after ${secondsText(condition.breakthrough.value)}`;
  return condition.reserve.kind === 'ok'
    ? `${through}, reserve ${reserveText(condition.reserve.value)}.`
    : `${through}.`;
}

/** The section as sentences: all that the drawing says. */
export function sectionWords(prediction: Prediction, stages: readonly { duration: number }[], system: UnitSystem) {
  const thickness = quantityText(prediction.cold.thickness, 'length', system).text;
  const count = `${stages.length} ${stages.length === 1 ? 'stage' : 'stages'}`;
  return [
    `Section of a ${thickness} plate, depth of the pierce against time: ${count} over ${secondsText(prediction.routineTime)}.`,
    conditionWords(
      `Cold plate at ${quantityText(prediction.cold.plateTemperature, 'temperature', system).text}`,
      prediction.cold,
    ),
    conditionWords(
      `Plate at ${quantityText(prediction.hot.plateTemperature, 'temperature', system).text}`,
      prediction.hot,
    ),
  ].join(' ');
}

/** State of a revision: a shape, a word. */
export const stateText: Readonly<Record<RevisionState, string>> = {
  draft: 'Draft',
  inReview: 'In review',
  returned: 'Returned',
  approved: 'Approved',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
};

export const checksText = {
  inOrder: (number: number) => (number === 1 ? 'Show the one in order' : `Show the ${number} in order`),
  hide: 'Hide what is in order',
  allInOrder: (number: number) => `All ${number} checks are in order.`,
} as const;

export const checkStateText: Readonly<Record<Check['state'], string>> = {
  ok: 'In order',
  caution: 'Caution',
  wrong: 'Not in order',
};

/** One number to type, mm as the dial reads: to a hundredth where that is not zero, since a dial may move the focus twice as far. */
export const dialNumber = (metres: number): string =>
  quantityText(metres, 'length', 'metric', { unit: 'mm', decimals: 2 }).number.replace(/(\.\d)0$/, '$1');

/** The number to type at the machine, mm as its dial reads. */
export const dialText = (from: number, to: number): string =>
  dialNumber(from) === dialNumber(to) ? dialNumber(from) : `${dialNumber(from)} to ${dialNumber(to)}`;

export const stageText = {
  name: (number: number) => `Stage ${number}`,
  lasts: 'lasts',
  duration: (number: number) => `Duration of stage ${number}`,
  to: 'to',
  ramp: 'ramp',
  hold: 'hold',
  rampSpoken: (words: string, number: number) => `Ramp ${words.toLowerCase()} in stage ${number}`,
  holdSpoken: (words: string, number: number) => `Hold ${words.toLowerCase()} in stage ${number} at where it begins`,
  held: (words: string, number: number) => `${words} in stage ${number}`,
  end: (words: string, end: 'from' | 'to', number: number) =>
    `${words} at the ${end === 'from' ? 'start' : 'end'} of stage ${number}`,
  quantity: {
    standoff: 'Standoff',
    focusPosition: 'Focus',
    peakPower: 'Peak power',
    duty: 'Duty',
    pulseFrequency: 'Pulses at',
    oxygenPressure: 'Oxygen',
  },
  dial: (from: number, to: number) => ` type ${dialText(from, to)} on the dial`,
  /** The unit once where both have the same. */
  mean: (from: QuantityText, to: QuantityText) => {
    if (from.text === to.text) return ` ${to.text} mean`;
    return ` ${from.unit === to.unit ? from.number : from.text} to ${to.text} mean`;
  },
  continuous: 'Continuous power, no pulses.',
  makeContinuous: 'make continuous',
  makeContinuousSpoken: (number: number) => `Make the power of stage ${number} continuous`,
  makePulsed: 'pulse it',
  makePulsedSpoken: (number: number) => `Pulse the power of stage ${number}`,
} as const;

export const editorText = {
  actions: 'Change stages',
  fewerActions: 'Done',
  actionsSpoken: (number: number) => `Add, move or remove at stage ${number}`,
  add: 'Add after',
  addSpoken: (number: number) => `Add a stage after stage ${number}`,
  duplicate: 'Duplicate',
  duplicateSpoken: (number: number) => `Duplicate stage ${number}`,
  earlier: 'Earlier',
  earlierSpoken: (number: number) => `Move stage ${number} earlier`,
  later: 'Later',
  laterSpoken: (number: number) => `Move stage ${number} later`,
  remove: 'Remove',
  removeSpoken: (number: number) => `Remove stage ${number}`,
} as const;

export const cutText = {
  feed: 'Feed',
  power: 'Peak power',
  continuous: 'continuous.',
  duty: 'at duty',
  mean: (power: string) => `(${power} mean),`,
  pulses: 'pulses at',
  oxygen: 'Oxygen',
  standoff: 'Standoff',
  focus: ', focus',
  kerf: 'The kerf is',
  heat: 'wide and leaves in the plate, per area of cut face,',
  makePulsed: 'Pulse the power of the cut',
  makeContinuous: 'Make the power of the cut continuous',
  label: {
    feed: 'Feed',
    peakPower: 'Peak power of the cut',
    duty: 'Duty of the cut',
    pulseFrequency: 'Pulse frequency of the cut',
    oxygenPressure: 'Oxygen pressure of the cut',
    standoff: 'Standoff of the cut',
    focusPosition: 'Focus position of the cut',
    kerfWidth: 'Kerf width',
    heatIntoPlate: 'Heat into the plate per area of cut face',
  },
} as const;

export const cornerRulesText = {
  below: 'Treat a corner below',
  above: 'inside the part when the cut comes back to a tip more than',
  hotter: 'hotter than a straight edge.',
  loops: 'Loops may be used',
  radius: 'Arc of radius',
  extension: ', run on past the corner by',
  to: 'to',
  clearance: ', clear of everything by',
  dwells: 'Dwells may be used',
  longest: 'Wait at most',
  restart: '; getting the cut going again costs',
  eases: 'Corners may be eased',
  easeOver: 'Over',
  easeFeed: 'on each side bring the feed down to',
  easePower: 'and the mean power to',
  easeEnd: 'of the straight cut’s.',
  rounds: 'Corners may be rounded',
  roundRadius: 'Round with',
  roundTolerance: 'as long as the finished corner is no more than',
  roundEnd: 'off the drawing.',
  burnBack: 'Burn-back of the tip is judged',
  burnBackNoDeeper: 'No deeper than',
  burnBackAbove: 'inside the finished tip may it become hotter than',
  burnBackEnd: ', from where steel is taken to burn in oxygen.',
  label: {
    treatBelowAngle: 'Corners below this angle are treated',
    returnExcessLimit: 'Excess over a straight edge left untreated',
    radius: 'Radius of the loop',
    minExtension: 'Shortest run past the corner',
    maxExtension: 'Longest run past the corner',
    clearance: 'Clearance of the loop',
    maxDuration: 'Longest dwell',
    restart: 'Restart after a dwell',
    ease: {
      length: 'Length of the ease',
      feedShare: 'Share of the feed in the corner',
      powerShare: 'Share of the mean power in the corner',
    },
    round: { radius: 'Radius of the round', tolerance: 'Allowed off the drawing' },
    burnBack: { limit: 'Deepest burn-back', ignition: 'Ignition threshold' },
  },
} as const;

export const goodForText = {
  from: 'Plate from',
  upTo: 'to below',
  hottest: ', no hotter than',
  label: {
    min: 'Thinnest plate',
    max: 'Thickness the range ends before',
    hottestPlate: 'Hottest plate',
  },
  machine: 'Machine and its revision',
  machineRevision: (name: string, number: number) => `${name}, revision ${number}`,
  nozzle: 'Nozzle',
  gradeGroup: 'Grade group',
} as const;

/** A nozzle as it is asked for at the machine. */
export const nozzleWords = (
  nozzle: { name: string; type: 'single' | 'double'; diameter: number },
  system: UnitSystem,
) => `${nozzle.name}: ${nozzle.type}, ${quantityText(nozzle.diameter, 'length', system).text}`;

/** Half-open range of plate thickness (µm) as people read it. */
export function thicknessRangeText(range: { min: number; max: number }, system: UnitSystem): string {
  const min = quantityText(range.min * 1e-6, 'length', system);
  const max = quantityText(range.max * 1e-6, 'length', system);
  return `${min.number}–${max.text}`;
}

type Verdict = Revision['reviews'][number]['verdict'];

export const reviewText = {
  none: 'Not handed in yet.',
  verdict: {
    submitted: (who) => `Handed in by ${who}`,
    approved: (who) => `Approved by ${who}`,
    returned: (who) => `Returned by ${who}`,
    withdrawn: (who) => `Withdrawn by ${who}`,
    superseded: (who) => `Superseded by a revision that ${who} approved`,
  } satisfies Record<Verdict, (who: string) => string>,
  quoted: (words: string) => `“${words}”`,
} as const;

export const decisionText = {
  of: {
    submit: {
      title: 'Submit for review',
      meaning: 'A second person decides. The numbers can’t be changed once they are handed in.',
      words: 'What the reviewer should know',
      action: 'Submit for review',
      must: null,
    },
    approve: {
      title: 'Approve this revision',
      meaning:
        'Operators will be shown these numbers for plates of this range. An approved revision of the same strategy is superseded.',
      words: 'Words for the record',
      action: 'Approve',
      must: null,
    },
    giveBack: {
      title: 'Return this revision',
      meaning: 'The engineer begins the next draft from it.',
      words: 'What must change',
      action: 'Return',
      must: 'Say what must change.',
    },
    withdraw: {
      title: 'Withdraw this revision',
      meaning: 'Operators are no longer shown these numbers, from this moment.',
      words: 'Why it is withdrawn',
      action: 'Withdraw',
      must: 'Say why it is withdrawn.',
    },
  },
} as const;

export const revisionText = {
  by: (who: string, when: string) => `changed ${when}; written by ${who}`,
  section: 'Pierce in section',
  stages: 'The pierce, stage by stage',
  cut: 'The cut',
  cornerRules: 'Corners',
  goodFor: 'Good for',
  checks: 'Checks',
  history: 'What happened',
  unsaved: 'Changes are not saved yet.',
  restored: 'Changes you made before and did not save are still here.',
  saved: 'Saved.',
  behind: 'The prediction stands at the last numbers that could be computed.',
  wrongFields: (number: number) =>
    number === 1 ? 'One number below is not right yet.' : `${number} numbers below are not right yet.`,
  save: 'Save',
  drop: 'Drop changes',
  dropTitle: 'Drop the changes?',
  dropMeaning: 'The draft goes back to what was saved last.',
  submit: 'Submit for review',
  approve: 'Approve',
  giveBack: 'Return',
  withdraw: 'Withdraw',
  waiting: 'In review. Somebody who may approve decides next.',
  begin: 'Begin the next draft from this',
  openDraft: (number: number) => `Open draft ${number}`,
  conflict: {
    title: 'Somebody changed this draft meanwhile',
    detail: 'What you typed is still here and not saved. Either take theirs, or save yours over it.',
    mine: 'Save mine over theirs',
    theirs: 'Take theirs, drop mine',
  },
  throughHere: (into: number) => `Through here on a cold plate, ${secondsText(into)} into this stage.`,
  eyebrow: 'Strategy revision',
  number: (number: number) => `revision ${number}`,
  block: {
    plate: 'plate',
    machine: 'machine',
    machineRevision: (name: string, number: number) => `${name}, revision ${number}`,
    nozzle: 'nozzle',
    goodTo: 'good to',
    cold: 'reserve, cold',
    hot: 'reserve, hot',
    crater: 'crater radius',
    energy: 'laser energy',
    oxygen: 'oxygen used',
  },
  strategyLink: 'All revisions of this strategy',
} as const;

export const strategiesText = {
  title: 'Strategies',
  new: 'New strategy',
  search: 'Find by name, grade, machine or thickness',
  list: 'Strategies',
  loading: 'Fetching strategies',
  empty: 'No strategy yet',
  emptyHint:
    'A strategy holds the staged pierce, the cut conditions and the corner rules for one machine, grade group and thickness range.',
  noneFound: (text: string) => `No strategy matches “${text}”.`,
  reserves: (cold: number | null, hot: number | null) => `reserve ${reserveText(cold)} cold, ${reserveText(hot)} hot`,
  revision: (number: number) => `revision ${number}`,
  alsoApproved: (number: number) => `revision ${number} is approved`,
  reports: (number: number) => (number === 1 ? '1 open report' : `${number} open reports`),
  tail: 'Revisions, the newest first',
  one: 'Strategy',
  changed: (when: string) => `Changed ${when}`,
  open: 'Open the strategy',
  newTitle: 'New strategy',
  begin: 'Begin the draft',
  beyond: 'No pierce could be worked out for this machine, nozzle and thickness',
  beginNearest: 'Begin with the nearest',
  name: 'Name',
  nameHint: 'Suggested from what is chosen; change it as you like.',
  minHint: 'the range holds this',
  maxHint: 'and ends just below this',
  missing: {
    machineRevisionId: 'Choose the machine.',
    gradeGroup: 'Choose the grade group.',
    nozzleId: 'Choose the nozzle.',
  },
  lacking: 'A strategy needs a machine, a nozzle and a grade',
  lackingHint: 'Add what is missing on the machines page first.',
  defaults:
    'The draft begins with the shortest pierce that the designer finds within this machine’s limits and the plant’s rules. Every number can be changed.',
  suggested: (grade: string, range: string, machine: string) => `${grade}, ${range}, ${machine}`,
} as const;

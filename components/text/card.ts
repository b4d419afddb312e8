import type { Card } from '@/shared/cards.ts';
import { quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { count } from './corners.ts';

type Approved = Extract<Card['match'], { kind: 'approved' }>;

export const atTheMachineText = {
  title: 'At the machine',
  machine: 'Which machine?',
  otherMachine: 'Another machine',
  noMachines: 'No machine yet',
  noMachinesHint: 'An engineer adds the machine first.',
  tag: 'Plate tag',
  tagHint: 'As painted or labelled on the plate',
  show: 'Show the card',
  noTag: 'The plate has no tag',
  withTag: 'The plate has a tag',
  byHand: 'Plate without a tag',
  gradeGroup: 'Grade group',
  thickness: 'Nominal thickness',
  missing: {
    tag: 'Type the plate’s tag.',
    gradeGroup: 'Choose the grade group.',
    thickness: 'Give the thickness, 1 to 60 mm.',
  },
} as const;

export const cardText = {
  title: 'Plate card',
  loading: 'Fetching the card',
  plate: (tag: string, heat: string) => (heat === '' ? `Plate ${tag}` : `Plate ${tag}, heat ${heat}`),
  byHand: 'Plate given by hand',
  what: (grade: string, micrometres: number, system: UnitSystem) =>
    `${grade}, ${quantityText(micrometres * 1e-6, 'length', system).text}`,
  group: (group: string) => `Grade group ${group}`,
  measured: (micrometres: number, system: UnitSystem) =>
    `measured ${quantityText(micrometres * 1e-6, 'length', system).text}`,
  approved: (number: number) => `Approved, revision ${number}`,
  approvedBy: (who: string, when: string) => `by ${who}, ${when}`,
  asOf: (when: string, ago: string) => `as of ${when}, ${ago}`,
  kept: {
    title: 'No connection: this card was kept on this device',
    detail: (when: string, ago: string) =>
      `It is as of ${when}, ${ago}. It may have been withdrawn since. Ask before you cut by it.`,
  },
  olderMachine: (used: number, newest: number) =>
    `The strategy was made for revision ${used} of this machine; the machine is at revision ${newest}.`,
  cautions: 'Know first',
  before: 'Before you start',
  checks: {
    nozzle: (nozzle: Approved['nozzle'], system: UnitSystem) =>
      `Nozzle fitted: ${nozzle.type}, ${quantityText(nozzle.diameter, 'length', system).text} (${nozzle.name})`,
    window: 'Protective window checked this shift',
    focus: 'Focus checked',
    temperature: (kelvin: number, system: UnitSystem) =>
      `Plate below ${quantityText(kelvin, 'temperature', system).text}`,
    extraction: 'Extraction on, doors shut',
    oxygen: (pascal: number, system: UnitSystem) =>
      `Oxygen on, ready for up to ${quantityText(pascal, 'pressure', system).text}`,
  },
  stage: (number: number) => `Stage ${number}`,
  dial: 'focus, number to type',
  standoff: 'standoff',
  peak: 'peak power',
  duty: 'duty',
  pulses: 'pulses',
  continuous: 'continuous',
  oxygen: 'oxygen',
  feed: 'feed',
  kerf: 'kerf width',
  cut: 'The cut',
  corners: 'Corner plans',
  noCorners: 'No corner plan uses this revision.',
  cornerPlan: (plan: Approved['cornerPlans'][number]) =>
    `${count(plan.corners, 'corner')}: ${count(plan.loops, 'loop')}, ${count(plan.dwells, 'dwell')}; adds ${
      quantityText(plan.addedTime, 'time', 'metric', { figures: 3 }).text
    }`,
  estimates: 'Estimates for this plate',
  through: (kelvin: number, system: UnitSystem) =>
    `through, plate at ${quantityText(kelvin, 'temperature', system).text}`,
  reserve: (kelvin: number, system: UnitSystem) =>
    `reserve, plate at ${quantityText(kelvin, 'temperature', system).text}`,
  notThrough: 'not through',
  wrong: 'It went wrong',
  none: {
    title: 'No approved strategy',
    plain: 'Do not cut by another plate’s card.',
    ask: 'Ask the engineers',
    asked: 'The engineers have been asked.',
    askedHint: 'They see the plate, the machine and your words. Look here again later.',
    words: 'Anything they should know',
  },
  unknownTag: {
    title: (tag: string) => `No plate “${tag}” is booked in`,
    detail: 'Look at the tag again, or give the grade and the thickness by hand.',
  },
  again: 'Type the tag again',
  other: 'Another plate',
} as const;

export const reportText = {
  title: 'It went wrong',
  kind: 'What happened?',
  kinds: {
    erupted: 'It erupted',
    'not through': 'It was not through',
    'corner burnt': 'A corner burnt',
    'cut lost': 'The cut was lost',
    'nozzle or window damaged': 'Nozzle or window damaged',
    'something else': 'Something else',
  },
  chooseKind: 'Choose what happened.',
  words: 'In your words',
  photo: 'Picture',
  tooLarge: 'Take a smaller picture, or send the words without one.',
  send: 'Tell the engineers',
  sent: 'Sent',
  sentHint: 'The engineers have your report. Thank you for telling them.',
  back: 'Back to the card',
  another: 'Another plate',
} as const;

import { firstContent } from '@/components/pierce/first-content.ts';
import type { Card } from '@/shared/cards.ts';
import type { Machine, NozzleRow } from '@/shared/machines.ts';
import { bandsOfStored, predictionOf } from '@/shared/prediction.ts';
import type { Revision, StrategyContent } from '@/shared/strategies.ts';
import { dialForFocus } from '@/strategy/beam/index.ts';
import type { StageQuantities } from '@/strategy/pierce/index.ts';
import { TEN_KILOWATT } from '../support/machines.ts';
import { ids } from '../support/page.tsx';

const person = { id: ids.other, name: 'Engineer' };
const at = '2031-03-03T14:02:00Z';

export const nozzle: NozzleRow = {
  id: '019a0000-0000-7000-8000-00000000000a',
  name: 'No. 4',
  type: 'double',
  diameter: 1.5e-3,
};

/** The machine whose dial runs the other way, 2.2 to 1. */
export const machine: Machine = {
  id: ids.machine,
  version: 1,
  name: 'No. 2, 10 kW',
  revisions: [
    {
      id: '019a0000-0000-7000-8000-00000000000b',
      number: 7,
      profile: TEN_KILOWATT,
      note: '',
      madeAt: at,
      madeBy: person,
    },
  ],
};

export const grades = [
  { id: ids.grade, name: 'S355J2', group: 'S355' },
  { id: '019a0000-0000-7000-8000-00000000000c', name: 'S275JR', group: 'S275' },
];

/** A draft for 18 to below 22 mm, as a new strategy begins. */
export const content: StrategyContent = firstContent(
  {
    machineRevisionId: '019a0000-0000-7000-8000-00000000000b',
    gradeGroup: 'S355',
    nozzleId: nozzle.id,
    thickness: { min: 18_000, max: 22_000 },
    hottestPlate: 473.15,
  },
  TEN_KILOWATT,
  nozzle,
);

export const prediction = predictionOf({ content, profile: TEN_KILOWATT, nozzle });

export const revisionOf = (more: Partial<Revision> = {}): Revision => ({
  id: ids.revision,
  version: 3,
  strategyId: ids.strategy,
  strategyName: 'Bearing plate',
  number: 4,
  state: 'draft',
  content,
  prediction,
  houseRules: [],
  machine: { id: ids.machine, name: machine.name, revisionNumber: 7 },
  nozzle,
  touchedBy: [person],
  changedAt: at,
  reviews: [],
  ...more,
});

const onDial = (set: StageQuantities) => ({
  standoff: set.standoff,
  focusPosition: set.focusPosition,
  peakPower: set.peakPower,
  duty: set.duty,
  pulseFrequency: set.pulseFrequency,
  oxygenPressure: set.oxygenPressure,
  dial: dialForFocus(TEN_KILOWATT.focusScale, set.focusPosition, set.standoff),
});

/** The card of plate B-2207, measured a little thicker than it was ordered. */
export const approvedCard = (more: Partial<Card> = {}): Card => ({
  asOf: at,
  machine: { id: ids.machine, name: machine.name },
  plate: {
    id: ids.plate,
    version: 1,
    tag: 'B-2207',
    gradeId: ids.grade,
    heatNumber: '81443',
    nominalThickness: 20_000,
    measuredThickness: 22_300,
    surface: 'mill scale',
    certificate: '',
    length: null,
    width: null,
    grade: { id: ids.grade, name: 'S355J2', group: 'S355' },
    changedAt: at,
  },
  gradeGroup: 'S355',
  nominalThickness: 20_000,
  match: {
    kind: 'approved',
    strategy: { id: ids.strategy, name: 'Bearing plate' },
    revision: { id: ids.revision, number: 3, approvedAt: at, approvedBy: 'Lead' },
    machineRevision: { number: 7, newest: 7, focusScale: TEN_KILOWATT.focusScale },
    nozzle,
    thickness: content.thickness,
    hottestPlate: content.hottestPlate,
    cautions: [{ id: 'measured', state: 'caution', sentence: 'Measured at 22.3 mm, outside 18 to below 22 mm.' }],
    stages: content.stages.map(({ duration, from, to }) => ({ duration, from: onDial(from), to: onDial(to) })),
    cut: {
      ...content.cut,
      dial: dialForFocus(TEN_KILOWATT.focusScale, content.cut.focusPosition, content.cut.standoff),
    },
    routineTime: prediction.routineTime,
    thicknessUsed: 0.0223,
    cold: { plateTemperature: 293.15, breakthrough: 8, reserve: 2.31, why: null },
    hot: { plateTemperature: 473.15, breakthrough: 7.3, reserve: 2.53, why: null },
    craterRadius: prediction.craterRadius,
    bands: bandsOfStored(
      prediction,
      content.stages.map(({ duration }) => duration),
    ),
    cornerPlans: [],
  },
  ...more,
});

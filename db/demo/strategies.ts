import type { StrategyContent } from '../../shared/strategies.ts';
import { easeDefaults, roundDefaults } from '../../strategy/corners/rules.ts';
import type { MachineProfile } from '../../strategy/machine.ts';
import { pierceStageDefaults } from '../../strategy/pierce/index.ts';
import { demoId } from './ids.ts';
import { demoMachines, type DemoMachine } from './machines.ts';
import { demoNozzles } from './materials.ts';

const celsius = (degrees: number) => degrees + 273.15;
const radians = (degrees: number) => (degrees * Math.PI) / 180;

/** What becomes of a demo revision, in order. */
export type DemoFate = {
  readonly submit?: string;
  readonly approve?: { readonly by: 'lead' | 'approver'; readonly words: string };
  readonly giveBack?: { readonly by: 'lead' | 'approver'; readonly words: string };
};

export type DemoStrategy = {
  readonly id: string;
  readonly name: string;
  /** Each later one is a draft from the one before, saved with this content. */
  readonly revisions: readonly { readonly id: string; readonly content: StrategyContent; readonly fate: DemoFate }[];
};

type Wish = {
  readonly machine: DemoMachine;
  readonly nozzle: string;
  readonly gradeGroup: string;
  /** mm, the upper one itself not included. */
  readonly from: number;
  readonly to: number;
  /** Straight cut, m/min: common practice in size, no source. */
  readonly feed: number;
  readonly focus: number; // mm
  readonly hottest: number; // °C
  readonly loopRadius: number; // mm
  /** Corners may be eased and a little rounded too. */
  readonly gentle?: boolean;
};

/** Stages come from the designer's own defaults, so that every number on the screen is computed, none is remembered. */
function content(plant: string, wish: Wish): StrategyContent {
  const { machine, gradeGroup, from, to } = wish;
  const nozzle = demoNozzles(plant).find(({ name }) => name === wish.nozzle);
  if (!nozzle) throw new RangeError(`no demo nozzle is called ${wish.nozzle}`);
  const { type, diameter } = nozzle;
  return {
    machineRevisionId: machine.revisionId,
    gradeGroup,
    gas: 'oxygen',
    nozzleId: nozzle.id,
    thickness: { min: from * 1000, max: to * 1000 },
    hottestPlate: celsius(wish.hottest),
    stages: [...pierceStageDefaults(machine.profile, to / 1000, { type, diameter })],
    cut: {
      feed: wish.feed / 60,
      peakPower: powerOf(machine.profile),
      duty: 1,
      pulseFrequency: null,
      oxygenPressure: 0.6e5,
      standoff: 0.001,
      focusPosition: wish.focus / 1000,
      kerfWidth: 0.0006 + to * 1e-5,
      // About 6.5 J/mm² at 1 m/min, less when faster: half of what conduction takes goes with the root of the time.
      // J/m², in the three figures somebody would type
      heatIntoPlate: Number((6.5e6 / Math.sqrt(wish.feed)).toPrecision(3)),
    },
    cornerRules: {
      treatBelowAngle: radians(100),
      returnExcessLimit: 70,
      loop: {
        allowed: true,
        radius: wish.loopRadius / 1000,
        minExtension: 0.002,
        maxExtension: 0.03,
        clearance: 0.002,
      },
      dwell: { allowed: true, maxDuration: 12, restart: 2 },
      ...(wish.gentle ? { ease: { ...easeDefaults }, round: { ...roundDefaults } } : {}),
    },
  };
}

const powerOf = ({ source }: MachineProfile) => Math.round((source.maxPower * 0.9) / 100) * 100;

const [one, two] = demoMachines.quay;
const [upland] = demoMachines.upland;

const strategy = (plant: string, name: string, revisions: readonly [StrategyContent, DemoFate][]): DemoStrategy => ({
  id: demoId(`${plant} strategy ${name}`),
  name,
  revisions: revisions.map(([what, fate], index) => ({
    id: demoId(`${plant} strategy ${name} revision ${index + 1}`),
    content: what,
    fate,
  })),
});

const bearing = {
  machine: one,
  nozzle: 'Single 1.5',
  gradeGroup: 'S275',
  from: 18,
  to: 21,
  feed: 0.95,
  focus: 4,
  hottest: 120,
  loopRadius: 4,
  gentle: true,
};
const lug = {
  machine: two,
  nozzle: 'Double 1.5',
  gradeGroup: 'S355',
  from: 22,
  to: 26,
  feed: 1.05,
  focus: 5,
  hottest: 150,
  loopRadius: 5,
};

export const demoStrategies = (): Readonly<Record<'quay' | 'upland', readonly DemoStrategy[]>> => ({
  quay: [
    strategy('quay', 'Bearing plates 20, No. 1', [
      [
        content('quay', bearing),
        {
          submit: 'Ten test pierces on Q-2003, all through, none erupted.',
          approve: { by: 'lead', words: 'Seen the test pierces. Windows stayed clean.' },
        },
      ],
    ]),
    strategy('quay', 'Bearing plates 20, No. 2', [
      [
        content('quay', { ...lug, from: 18, to: 22, feed: 1.35 }),
        { submit: '', approve: { by: 'approver', words: 'Good for bearing plates and bollard bases.' } },
      ],
    ]),
    strategy('quay', 'Lifting lugs 25', [
      [
        content('quay', { ...lug, hottest: 100 }),
        { submit: 'First try for lugs.', approve: { by: 'lead', words: 'For cold plates only, until we know more.' } },
      ],
      [
        content('quay', lug),
        {
          submit: 'Good to 150 °C now: last stage lengthened after two pierces on a hot plate were late.',
          approve: { by: 'approver', words: 'Checked against the hot test plate.' },
        },
      ],
      [content('quay', { ...lug, feed: 1.12 }), {}],
    ]),
    strategy('quay', 'Slew-ring brackets 30', [
      [
        content('quay', { ...lug, nozzle: 'Double 2.0', from: 28, to: 31, feed: 0.8, loopRadius: 6 }),
        { submit: 'Asked for by the hall for Q-3001. Please look at the crater on the thin end.' },
      ],
    ]),
    strategy('quay', 'Bollard bases 15', [
      [content('quay', { ...bearing, from: 12, to: 16, feed: 1.4, focus: 3, loopRadius: 3 }), {}],
    ]),
    strategy('quay', 'Lifting lugs 30, No. 1', [
      [
        content('quay', { ...bearing, gradeGroup: 'S355', from: 28, to: 31, feed: 0.5 }),
        {
          submit: 'To have a way out when No. 2 stands still.',
          giveBack: { by: 'lead', words: '4 kW has nothing left at 30 mm. We will wait for No. 2 instead.' },
        },
      ],
    ]),
  ],
  upland: [
    strategy('upland', 'Brackets 15', [
      [
        content('upland', { ...bearing, machine: upland, from: 14, to: 17, feed: 1.3, focus: 3, loopRadius: 3 }),
        { submit: '', approve: { by: 'lead', words: '' } },
      ],
    ]),
  ],
});

import { describe, expect, it } from 'vitest';
import * as fc from 'fast-check';
import { stageSchema } from '../../../shared/strategies.ts';
import type { MachineProfile } from '../../../strategy/machine.ts';
import {
  pierceOutline,
  piercePredict,
  piercePropose,
  stageProblems,
  type ProposeInput,
  type Stage,
  type StageQuantities,
} from '../../../strategy/pierce/index.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { runs } from '../../support/runs.ts';
import { anyPlate, anyThickness, conditions, input, threeRamps } from './support.ts';

const RAMPS = threeRamps([500, 700, 1400, 2200]);

function withQuantity(changed: Partial<StageQuantities>, end: 'from' | 'to' = 'from'): readonly Stage[] {
  return RAMPS.map((stage, index) => (index === 2 ? { ...stage, [end]: { ...stage[end], ...changed } } : stage));
}

describe('what is wrong with stages', () => {
  it('is nothing for an ordinary pierce, also within the machine’s limits', () => {
    expect(stageProblems(RAMPS)).toEqual([]);
    expect(stageProblems(threeRamps([200, 300, 600, 900]), FOUR_KILOWATT)).toEqual([]);
  });

  it.each<[string, Partial<StageQuantities>, string]>([
    ['peakPower', { peakPower: -1 }, 'Peak power −1 W is outside (0 W, 100 kW].'],
    ['peakPower', { peakPower: 0 }, 'Peak power 0 W is outside (0 W, 100 kW].'],
    ['peakPower', { peakPower: Number.NaN }, 'Peak power NaN is outside (0 W, 100 kW].'],
    ['peakPower', { peakPower: Number.POSITIVE_INFINITY }, 'Peak power Infinity is outside (0 W, 100 kW].'],
    ['duty', { duty: 0 }, 'Duty 0 % is outside (0 %, 100 %].'],
    ['duty', { duty: 1.2 }, 'Duty 120 % is outside (0 %, 100 %].'],
    ['pulseFrequency', { pulseFrequency: 0 }, 'Pulse frequency 0 Hz is outside [0.1 Hz, 100 kHz].'],
    ['standoff', { standoff: 0 }, 'Standoff 0 mm is outside (0 mm, 50 mm].'],
    ['focusPosition', { focusPosition: 0.2 }, 'Focus position 200 mm is outside [−60 mm, 60 mm].'],
    ['oxygenPressure', { oxygenPressure: -1e4 }, 'Oxygen pressure −0.1 bar is outside [0 bar, 30 bar].'],
  ])('names the field %s and its range', (field, changed, problem) => {
    expect(stageProblems(withQuantity(changed))).toEqual([{ path: `stages[2].from.${field}`, problem }]);
    expect(stageProblems(withQuantity(changed, 'to'))).toEqual([{ path: `stages[2].to.${field}`, problem }]);
  });

  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY, 601])('a stage of %d s', (duration) => {
    const stages = RAMPS.map((stage, index) => (index === 1 ? { ...stage, duration } : stage));
    expect(stageProblems(stages).map(({ path }) => path)).toEqual(['stages[1].duration']);
  });

  it('continuous power with a duty below 100 %', () => {
    const set: StageQuantities = { ...conditions(1000, 100, 0.01, 5e4), pulseFrequency: null };
    const found = stageProblems([{ duration: 1, from: set, to: set }]);
    expect(found.map(({ path }) => path)).toEqual(['stages[0].from.pulseFrequency', 'stages[0].to.pulseFrequency']);
    expect(found[0]?.problem).toMatch(/continuous: duty must be 100 %, not 40 %/);
  });

  it('a stage that is pulsed at one end and continuous at the other', () => {
    const from = { ...conditions(1000, 100, 0.01, 5e4), duty: 1 };
    const found = stageProblems([{ duration: 1, from, to: { ...from, pulseFrequency: null } }]);
    expect(found.map(({ path }) => path)).toEqual(['stages[0].to.pulseFrequency']);
  });

  it('no stage at all, or more than twenty', () => {
    expect(stageProblems([])[0]?.path).toBe('stages');
    const [first] = RAMPS;
    if (first === undefined) throw new Error('no stage');
    expect(stageProblems(Array.from({ length: 21 }, () => first))[0]?.problem).toMatch(/21 stages are more than 20/);
    expect(stageProblems(Array.from({ length: 20 }, () => first))).toEqual([]);
  });

  it('what the machine cannot give, when one is named', () => {
    const found = stageProblems(threeRamps([500, 700, 1400, 2200]), FOUR_KILOWATT);
    expect(found).toEqual([
      { path: 'stages[2].to.peakPower', problem: 'Peak power 5.5 kW is outside [0.2 kW, 4 kW].' },
    ]);
  });

  it('a peak above the source, however short its duty', () => {
    const brief = withQuantity({ peakPower: 10_500, duty: 0.1 });
    expect(stageProblems(brief)).toEqual([]);
    expect(stageProblems(brief, TEN_KILOWATT)).toEqual([
      { path: 'stages[2].from.peakPower', problem: 'Peak power 10.5 kW is outside [0.5 kW, 10 kW].' },
    ]);
  });

  it('a focus beyond the dial’s travel, with the positions that the dial reaches', () => {
    expect(stageProblems(withQuantity({ focusPosition: 0.03 }), TEN_KILOWATT)).toEqual([
      {
        path: 'stages[2].from.focusPosition',
        problem: 'Focus position 30 mm is outside [−22 mm, 22 mm], which the dial reaches at this standoff.',
      },
    ]);
    // Referred to the nozzle, the dial's reach moves with the standoff, 6 mm here.
    const referred: MachineProfile = {
      ...TEN_KILOWATT,
      focusScale: { ...TEN_KILOWATT.focusScale, reference: 'nozzle', slope: 1 },
    };
    expect(stageProblems(withQuantity({ focusPosition: 0.016 }), referred)).toEqual([]);
    expect(stageProblems(withQuantity({ focusPosition: -0.005 }), referred).map(({ problem }) => problem)).toEqual([
      'Focus position −5 mm is outside [−4 mm, 16 mm], which the dial reaches at this standoff.',
    ]);
  });
});

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });

/** Quantities that any machine could be asked for, pulsed or continuous. */
const possible = (pulsed: boolean): fc.Arbitrary<StageQuantities> =>
  fc.record({
    standoff: number(1e-4, 0.05),
    focusPosition: number(-0.06, 0.06),
    peakPower: number(1, 60_000),
    duty: pulsed ? number(0.001, 1) : fc.constant(1),
    pulseFrequency: pulsed ? number(0.1, 1e5) : fc.constant(null),
    oxygenPressure: number(0, 30e5),
  });
const possibleStage: fc.Arbitrary<Stage> = fc
  .boolean()
  .chain((pulsed) => fc.record({ duration: number(0.001, 600), from: possible(pulsed), to: possible(pulsed) }));
const possibleStages = fc.array(possibleStage, { minLength: 1, maxLength: 20 });

/** Numbers that somebody's finger, a broken file or a hostile hand would bring. */
const wild = fc.oneof(
  fc.double(),
  fc.constantFrom(0, -0, -1, 1e-300, 1e300, Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY),
);

type Spoilt = { readonly stages: readonly Stage[]; readonly path: string };
const FIELDS = ['standoff', 'focusPosition', 'peakPower', 'duty', 'pulseFrequency', 'oxygenPressure'] as const;

/** Good stages with one number put out of every range, negated, or left out. */
const spoilt: fc.Arbitrary<Spoilt> = fc
  .record({
    stages: possibleStages,
    at: fc.nat(),
    end: fc.constantFrom('from' as const, 'to' as const),
    field: fc.constantFrom('duration' as const, ...FIELDS),
    bad: fc.constantFrom(Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, -1, 1e9, undefined),
  })
  .map(({ stages, at, end, field, bad }) => {
    const index = at % stages.length;
    // What is left out comes in from outside, where no type is checked.
    const value = bad as number;
    const changed = stages.map((stage, i): Stage => {
      if (i !== index) return stage;
      if (field === 'duration') return { ...stage, duration: value };
      return { ...stage, [end]: { ...stage[end], [field]: value } };
    });
    return { stages: changed, path: `stages[${index}].${field === 'duration' ? field : `${end}.${field}`}` };
  });

describe('random stage lists, thousands of them', { timeout: 600_000 }, () => {
  it('with one number wrong are refused at that field, with its range, by the prediction too', () => {
    fc.assert(
      fc.property(spoilt, ({ stages, path }) => {
        const found = stageProblems(stages).find((problem) => problem.path === path);
        expect(found?.problem, path).toMatch(/is outside [[(].*, .*\]/);
        expect(() => piercePredict(input(stages))).toThrow(RangeError);
      }),
      { numRuns: runs(3000, 30_000) },
    );
  });

  it('of wild numbers throughout have a problem or a prediction without a number that is none', () => {
    const quantities = fc.record({
      standoff: wild,
      focusPosition: wild,
      peakPower: wild,
      duty: wild,
      pulseFrequency: fc.oneof(wild, fc.constant(null)),
      oxygenPressure: wild,
    });
    fc.assert(
      fc.property(
        fc.array(fc.record({ duration: wild, from: quantities, to: quantities }), { maxLength: 25 }),
        (stages) => {
          if (stageProblems(stages).length > 0) expect(() => piercePredict(input(stages))).toThrow(RangeError);
          else expectFinite(piercePredict(input(stages)));
        },
      ),
      { numRuns: runs(2000, 30_000) },
    );
  });

  it('within every range are predicted without a number that is none, up to twenty stages and ten minutes each', () => {
    fc.assert(
      fc.property(possibleStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        expect(stageProblems(stages)).toEqual([]);
        expectFinite(pierceOutline(input(stages, { thickness, plateTemperature })));
      }),
      { numRuns: runs(400, 4000) },
    );
  });

  it('that a request may bring are never too much for the model', () => {
    fc.assert(
      fc.property(possibleStages, (stages) => {
        for (const stage of stages) expect(stageSchema.safeParse(stage).success).toBe(true);
        expect(stageProblems(stages)).toEqual([]);
      }),
      { numRuns: 200 },
    );
  });

  it('with a number wrong are refused by the designer at that field, before it searches', () => {
    fc.assert(
      fc.property(spoilt, fc.array(fc.boolean(), { minLength: 20, maxLength: 20 }), ({ stages, path }, kept) => {
        const index = Number(/\d+/.exec(path)?.[0]);
        const pinned = stages.map((stage, i) => (i === index || kept[i] === true ? stage : null));
        expect(() => piercePropose({ ...ASKED, pinned })).toThrow(/^Stage \d+ cannot be kept as it is/);
      }),
      { numRuns: runs(2000, 20_000) },
    );
  });

  it('that the machine can do are answered by the designer without a number that is none', () => {
    const on = ({ duration, from, to }: Stage): Stage => ({
      duration: Math.min(duration, 30),
      from: onMachine(from),
      to: onMachine(to),
    });
    fc.assert(
      fc.property(fc.array(possibleStage, { minLength: 1, maxLength: 4 }), fc.nat(15), (stages, kept) => {
        const pinned = stages.map((stage, index) => ((kept >> index) % 2 === 1 ? on(stage) : null));
        const proposal = piercePropose({ ...ASKED, pinned });
        if (proposal.kind === 'stopped') throw new Error('nobody stopped it');
        expectFinite(proposal);
        const answered = proposal.kind === 'ok' ? proposal.stages : proposal.nearest;
        expect(stageProblems(answered, TEN_KILOWATT)).toEqual([]);
        pinned.forEach((stage, index) => {
          if (stage !== null) expect(answered[index]).toEqual(stage);
        });
      }),
      { numRuns: runs(5, 150) },
    );
  });
});

const ASKED: ProposeInput = {
  profile: TEN_KILOWATT,
  nozzle: NOZZLE_1_5,
  thickness: { min: 0.018, max: 0.02 },
  hottestPlateTemperature: 423.15,
};

/** The nearest that the 10 kW machine can do. */
function onMachine(set: StageQuantities): StageQuantities {
  const { source, standoff, oxygen } = TEN_KILOWATT;
  const within = (value: number, min: number, max: number) => Math.min(Math.max(value, min), max);
  return {
    standoff: within(set.standoff, standoff.min, standoff.max),
    focusPosition: within(set.focusPosition, -0.022, 0.022),
    peakPower: within(set.peakPower, source.minPower, source.maxPower),
    duty: within(set.duty, source.minDuty, 1),
    pulseFrequency:
      set.pulseFrequency === null ? null : within(set.pulseFrequency, source.minFrequency, source.maxFrequency),
    oxygenPressure: within(set.oxygenPressure, oxygen.minPressure, oxygen.maxPressure),
  };
}

/** Every number finite, and no sentence with one that is not. */
function expectFinite(value: unknown): void {
  if (typeof value === 'number') expect(Number.isFinite(value)).toBe(true);
  if (typeof value === 'string') expect(value).not.toMatch(/NaN|Infinity|undefined/);
  if (typeof value === 'object' && value !== null) Object.values(value).forEach(expectFinite);
}

import { describe, expect, it } from 'vitest';
import * as fc from 'fast-check';
import { piercePredict, stageProblems, type Stage, type StageQuantities } from '../../../strategy/pierce/index.ts';
import { FOUR_KILOWATT } from '../../support/machines.ts';
import { conditions, input, threeRamps } from './support.ts';

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
    ['focusPosition', { focusPosition: 0.2 }, 'Focus position 200 mm is outside [−50 mm, 50 mm].'],
    ['oxygenPressure', { oxygenPressure: -1e4 }, 'Oxygen pressure −0.1 bar is outside [0 bar, 25 bar].'],
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

  it('any stages either have a problem or a prediction, never a crash of another kind', () => {
    const wild = fc.oneof(fc.double(), fc.constantFrom(0, -1, 1, 0.5, 100, Number.NaN));
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
        fc.array(fc.record({ duration: wild, from: quantities, to: quantities }), { maxLength: 3 }),
        (stages) => {
          if (stageProblems(stages).length > 0) expect(() => piercePredict(input(stages))).toThrow(RangeError);
          else expect(piercePredict(input(stages)).perStage).toHaveLength(stages.length);
        },
      ),
    );
  });
});

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  DEFAULT_RESERVE_RULES,
  pierceChecks,
  piercePredict,
  pierceReserve,
  pierceStageDefaults,
  stageProblems,
  strategyPrediction,
  type PierceCheckId,
  type Stage,
  type StageQuantities,
} from '../../../strategy/pierce/index.ts';
import type { MachineProfile } from '../../../strategy/machine.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { continuous, held, input, threeRamps } from './support.ts';

const HOT = 423.15;

function predicted(stages: readonly Stage[], thickness = 0.02, profile: MachineProfile = TEN_KILOWATT) {
  return strategyPrediction({
    stages,
    thickness: { min: thickness - 0.002, max: thickness },
    hottestPlateTemperature: HOT,
    profile,
    nozzle: NOZZLE_1_5,
  });
}

function checked(
  stages: readonly Stage[],
  id: PierceCheckId,
  changed: { readonly profile?: MachineProfile; readonly leadInLength?: number } = {},
) {
  const profile = changed.profile ?? TEN_KILOWATT;
  const all = pierceChecks({ ...changed, stages, profile, prediction: predicted(stages, 0.02, profile) });
  const found = all.find((check) => check.id === id);
  if (found === undefined) throw new Error(`no check ${id}`);
  return found;
}

function everywhere(stages: readonly Stage[], changed: Partial<StageQuantities>): readonly Stage[] {
  return stages.map((stage) => ({ ...stage, from: { ...stage.from, ...changed }, to: { ...stage.to, ...changed } }));
}

const GOOD = pierceStageDefaults(TEN_KILOWATT, 0.02);

describe('the prediction of a strategy', () => {
  const at = (stages: readonly Stage[], thickness: number, plateTemperature: number) =>
    piercePredict(input(stages, { thickness, plateTemperature }));
  const worst = (stages: readonly Stage[], thickness: number, plateTemperature: number) =>
    Math.max(...at(stages, thickness, plateTemperature).perStage.map(({ eruptionIndex }) => eruptionIndex));

  it('judges reserve at the thickest plate, crater and eruption at the thinnest and hottest', () => {
    const prediction = predicted(GOOD);
    expect(prediction.cold.breakthrough).toEqual(at(GOOD, 0.02, 293.15).breakthrough);
    expect(prediction.hot.breakthrough).toEqual(at(GOOD, 0.02, HOT).breakthrough);
    expect(prediction.cold.reserve).toEqual(pierceReserve(at(GOOD, 0.02, 293.15)));
    expect(prediction.craterRadius).toBe(at(GOOD, 0.018, HOT).craterRadius);
    expect(prediction.eruption).toMatchObject({ index: worst(GOOD, 0.018, HOT), stage: 0, plateTemperature: HOT });
    expect(prediction.eruption.thickness).toBeCloseTo(0.018, 12);
  });

  it('sees the eruption of a late, strong stage that only a thick cold plate is still closed for', () => {
    // Through 8 mm hot before the strong stage begins, but not through 20 mm cold.
    const stages = [...held(900, 6), ...continuous(held(8000, 5))];
    const prediction = strategyPrediction({
      stages,
      thickness: { min: 0.008, max: 0.02 },
      hottestPlateTemperature: HOT,
      profile: TEN_KILOWATT,
      nozzle: NOZZLE_1_5,
    });
    expect(worst(stages, 0.008, HOT)).toBeLessThan(prediction.eruption.limit);
    expect(prediction.eruption).toMatchObject({ stage: 1, thickness: 0.02 });
    const perStage = prediction.eruption.perStage;
    expect(perStage[1]).toBe(prediction.eruption.index);
    expect(perStage[0]).toBeLessThan(prediction.eruption.index);
    expect(prediction.eruption.index).toBeGreaterThan(prediction.eruption.limit);
    expect(prediction.craterRadius).toBeGreaterThan(at(stages, 0.008, HOT).craterRadius);
  });

  it('has no reserve, and a reason, when the hole is never through', () => {
    const { cold } = predicted(held(1000, 10), 0.025);
    expect(cold.reserve).toMatchObject({ kind: 'none', why: /^Not through/ });
  });

  it('has a reserve of routine over breakthrough, larger on a hot plate', () => {
    const { cold, hot, routineTime } = predicted(GOOD);
    if (cold.breakthrough.kind === 'none' || cold.reserve.kind === 'none') throw new Error('not through');
    expect(cold.reserve.value).toBeCloseTo(routineTime / cold.breakthrough.time, 12);
    expect(hot.reserve.kind === 'ok' && hot.reserve.value).toBeGreaterThan(cold.reserve.value);
  });

  it('survives being stored as JSON', () => {
    const prediction = predicted(GOOD);
    expect(JSON.parse(JSON.stringify(prediction))).toEqual(prediction);
  });

  it('refuses a range upside down and a hottest plate colder than the cold one', () => {
    const base = { stages: GOOD, profile: TEN_KILOWATT, nozzle: NOZZLE_1_5 };
    expect(() =>
      strategyPrediction({ ...base, thickness: { min: 0.02, max: 0.01 }, hottestPlateTemperature: HOT }),
    ).toThrow(/upside down/);
    expect(() =>
      strategyPrediction({ ...base, thickness: { min: 0.01, max: 0.02 }, hottestPlateTemperature: 280 }),
    ).toThrow(/colder than the cold plate/);
  });
});

describe('stages to start from', () => {
  const machines: readonly (readonly [string, MachineProfile, readonly number[]])[] = [
    ['4 kW', FOUR_KILOWATT, [6, 8, 10, 12, 14, 16]],
    ['10 kW', TEN_KILOWATT, [6, 10, 12, 15, 18, 20, 22, 25]],
  ];
  it.each(machines.flatMap(([name, profile, all]) => all.map((mm) => [name, mm, profile] as const)))(
    '%s, %d mm: within the machine, through with the reserve asked for, nothing to object to',
    (_, mm, profile) => {
      const thickness = mm / 1000;
      const stages = pierceStageDefaults(profile, thickness);
      expect(stages.length).toBeGreaterThanOrEqual(3);
      expect(stages.length).toBeLessThanOrEqual(4);
      expect(stageProblems(stages, profile)).toEqual([]);
      const prediction = strategyPrediction({
        stages,
        thickness: { min: thickness * 0.9, max: thickness },
        hottestPlateTemperature: HOT,
        profile,
        nozzle: NOZZLE_1_5,
      });
      const { cold, hot } = prediction;
      expect(cold.reserve.kind === 'ok' && cold.reserve.value).toBeGreaterThanOrEqual(DEFAULT_RESERVE_RULES.cold);
      expect(hot.reserve.kind === 'ok' && hot.reserve.value).toBeGreaterThanOrEqual(DEFAULT_RESERVE_RULES.hot);
      const objections = pierceChecks({ stages, prediction, profile }).filter(({ state }) => state !== 'ok');
      expect(objections).toEqual([]);
    },
  );

  it('join without a step from one stage to the next', () => {
    GOOD.forEach((stage, index) => {
      const next = GOOD[index + 1];
      if (next !== undefined) expect(next.from).toEqual(stage.to);
    });
  });

  it('keep within the machine for any machine and thickness', () => {
    const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(
        number(1000, 20_000),
        number(0.01, 0.3),
        number(0.003, 0.04),
        number(0.002, 0.02),
        (power, minDuty, thickness, dial) => {
          const profile: MachineProfile = {
            ...TEN_KILOWATT,
            source: { ...TEN_KILOWATT.source, maxPower: power, minPower: power / 10, minDuty },
            focusScale: { ...TEN_KILOWATT.focusScale, minDial: -dial / 10, maxDial: dial },
          };
          const stages = pierceStageDefaults(profile, thickness);
          expect(stageProblems(stages, profile)).toEqual([]);
          const prediction = predicted(stages, Math.max(thickness, 0.0031), profile);
          const focus = pierceChecks({ stages, profile, prediction }).find(({ id }) => id === 'focus');
          expect(focus?.state).toBe('ok');
        },
      ),
      { numRuns: 40 },
    );
  });

  it('are refused for a thickness that cannot be', () => {
    expect(() => pierceStageDefaults(TEN_KILOWATT, 0)).toThrow(RangeError);
    expect(() => pierceStageDefaults(TEN_KILOWATT, Number.NaN)).toThrow(RangeError);
  });
});

describe('what an engineer would say', () => {
  it.each<[PierceCheckId, readonly Stage[], RegExp]>([
    ['power', everywhere(GOOD, { peakPower: 12_000 }), /^Stage 1 asks for 12 kW: the source gives 0.5 kW to 10 kW\.$/],
    [
      'frequency',
      everywhere(GOOD, { pulseFrequency: 20_000 }),
      /^Stage 1 asks for 20 kHz: the source takes 5 Hz to 5000 Hz\.$/,
    ],
    ['duty', everywhere(GOOD, { duty: 0.02 }), /^Stage 1 asks for 2 %: the source takes 5 % to 100 %\.$/],
    [
      'pressure',
      everywhere(GOOD, { oxygenPressure: 12e5 }),
      /^Stage 1 asks for 12 bar: the machine gives 0.2 bar to 10 bar\.$/,
    ],
    ['standoff', everywhere(GOOD, { standoff: 0.03 }), /^Stage 1 asks for 30 mm: the machine takes 0.5 mm to 25 mm\.$/],
    ['focus', everywhere(GOOD, { focusPosition: 0.03 }), /^Stage 1: Focus \+30 mm would need −13\.64 mm on the dial/],
    [
      'on-time',
      everywhere(GOOD, { pulseFrequency: 5000, duty: 0.2 }).map((s) => s),
      /^Much of it is ramp|lasts 0\.04 ms/,
    ],
    ['reserve-cold', threeRamps([500, 700, 1400, 2200]), /no reserve\. Not through|less than the 2 asked for/],
    ['reserve-hot', threeRamps([600, 900, 1800, 2600]), /reserve 1\.\d+, less than the 2\.2 asked for/],
    ['stall', held(1000, 20), /^Stage 1, after \d+\.\d s, for \d+\.\d s: The bottom stands still at \d+\.\d mm/],
    [
      'eruption',
      continuous(held(4000, 20)),
      /^It erupts: in stage 1 the melt of a pulse fills \d+\.\d % of the bore, and 7 % throws it out, on 18 mm at 150 °C/,
    ],
  ])('%s: objects with the numbers', (id, stages, sentence) => {
    const found = checked(stages, id);
    expect(found.state).not.toBe('ok');
    expect(found.sentence).toMatch(sentence);
  });

  it('the pulse is shorter than the source needs to rise', () => {
    const found = checked(everywhere(GOOD, { pulseFrequency: 5000, duty: 0.1 }), 'on-time');
    expect(found).toMatchObject({
      state: 'wrong',
      sentence:
        'It never reaches its peak: the shortest pulse, in stage 1, lasts 0.02 ms and the source needs 0.05 ms to rise.',
    });
  });

  it('a stage begins when the hole is long through', () => {
    const last = GOOD.at(-1);
    if (last === undefined) throw new Error('no stage');
    const found = checked([...GOOD, last, last], 'idle-stage');
    expect(found.state).toBe('caution');
    expect(found.stages).toEqual([GOOD.length, GOOD.length + 1]);
    expect(found.sentence).toMatch(/^Stages 5, 6 begin after the hole is through at \d+\.\d s/);
  });

  it('the lead-in against the crater and the heat', () => {
    expect(checked(GOOD, 'lead-in', { leadInLength: 0.02 })).toMatchObject({
      state: 'ok',
      sentence: /clears a crater .* warms its end by \d+ K at most/,
    });
    expect(checked(GOOD, 'lead-in', { leadInLength: 0.003 })).toMatchObject({
      state: 'caution',
      sentence: /begins the contour where the pierce warms the plate by up to \d+ K: it should be .* below 250 °C/,
    });
    expect(checked(GOOD, 'lead-in', { leadInLength: 0.001 })).toMatchObject({
      state: 'caution',
      sentence: /hardly clears/,
    });
    expect(checked(GOOD, 'lead-in', { leadInLength: 0.0005 })).toMatchObject({
      state: 'wrong',
      sentence: /is shorter than a crater .* contour is damaged/,
    });
    expect(checked(GOOD, 'lead-in')).toMatchObject({
      state: 'ok',
      sentence: /^A lead-in must be at least \d+(\.\d)? mm/,
    });
  });

  it('a pierce near its eruption, between four fifths of the limit and the limit', () => {
    const stages = everywhere(GOOD, {});
    const raised = (factor: number) =>
      stages.map((stage) => ({
        ...stage,
        from: { ...stage.from, peakPower: stage.from.peakPower * factor },
        to: { ...stage.to, peakPower: stage.to.peakPower * factor },
      }));
    const states = [0.8, 0.9, 1, 1.1, 1.2, 1.3, 1.4, 1.5, 1.7].map((factor) => {
      const { index, limit } = predicted(raised(factor)).eruption;
      const { state, sentence } = checked(raised(factor), 'eruption');
      expect(state).toBe(index >= limit ? 'wrong' : index >= 0.8 * limit ? 'caution' : 'ok');
      if (state === 'caution') expect(sentence).toMatch(/^Close to erupting: in stage \d/);
      return state;
    });
    expect(new Set(states)).toEqual(new Set(['ok', 'caution', 'wrong']));
  });

  it('a plate too hot for the contour to begin beside the pierce at all', () => {
    const prediction = strategyPrediction({
      stages: GOOD,
      thickness: { min: 0.018, max: 0.02 },
      hottestPlateTemperature: 533.15,
      profile: TEN_KILOWATT,
      nozzle: NOZZLE_1_5,
    });
    for (const leadInLength of [undefined, 0.02]) {
      const found = pierceChecks({
        stages: GOOD,
        prediction,
        profile: TEN_KILOWATT,
        ...(leadInLength === undefined ? {} : { leadInLength }),
      }).find(({ id }) => id === 'lead-in');
      expect(found).toMatchObject({ state: 'caution', sentence: /plate itself, at 260 °C, is not below the 250 °C/ });
    }
  });

  it('a bottom that stands still: wrong when it never gets through, a caution when it does', () => {
    expect(checked(held(1000, 20), 'stall').state).toBe('wrong');
    expect(checked([...held(700, 12), ...held(3500, 20)], 'stall')).toMatchObject({
      state: 'caution',
      stages: [0],
      sentence: /^Stage 1, after \d+(\.\d)? s, for \d+(\.\d)? s: The bottom stands still/,
    });
    expect(checked(held(1000, 20), 'idle-stage').sentence).toBe('Every stage acts: the hole is not through.');
  });

  it('the crater against the widest a plant accepts', () => {
    const prediction = predicted(GOOD);
    const crater = (widestCrater: number) =>
      pierceChecks({ stages: GOOD, prediction, profile: TEN_KILOWATT, widestCrater }).find(({ id }) => id === 'crater');
    expect(crater(prediction.craterRadius)).toMatchObject({ state: 'ok', sentence: /at most the .* accepted/ });
    expect(crater(0.0005)).toMatchObject({ state: 'wrong', sentence: /more than the 1 mm accepted/ });
    expect(checked(GOOD, 'crater')).toMatchObject({ state: 'ok' });
  });

  it.each<[string, (first: Stage, second: Stage) => readonly Stage[], RegExp]>([
    [
      'mean power',
      (a, b) => [a, { ...b, from: { ...b.from, peakPower: a.to.peakPower * 2 } }],
      /^From stage 1 to stage 2 mean power jumps from .* kW to .* kW, more than the melt bears at once: ramp it\.$/,
    ],
    [
      'the nozzle',
      (a, b) => [a, { ...b, from: { ...b.from, standoff: a.to.standoff + 0.005 } }],
      /the nozzle jumps from 8 mm to 13 mm above the plate/,
    ],
    [
      'the focus',
      (a, b) => [a, { ...b, from: { ...b.from, focusPosition: -0.001 } }],
      /the focus jumps from \+5 mm to −1 mm/,
    ],
    [
      'oxygen',
      (a, b) => [a, { ...b, from: { ...b.from, oxygenPressure: 2e5 } }],
      /oxygen jumps from 0\.5 bar to 2 bar/,
    ],
  ])('a jump of %s from one stage to the next', (_, changed, sentence) => {
    const [first, second, ...others] = GOOD;
    if (first === undefined || second === undefined) throw new Error('no stages');
    expect(checked([...changed(first, second), ...others], 'jump')).toMatchObject({
      state: 'caution',
      stages: [1],
      sentence,
    });
    expect(checked(GOOD, 'jump').state).toBe('ok');
  });

  it('less power from one stage to the next is no jump', () => {
    expect(checked([...held(3000, 5), ...held(900, 20)], 'jump').state).toBe('ok');
  });

  it('a dial in its own numbers', () => {
    expect(checked(GOOD, 'focus')).toMatchObject({
      state: 'ok',
      sentence: 'The dial reads −2.27 mm, within its travel.',
    });
  });

  it('continuous power has no frequency and no pulse to check', () => {
    const stages = continuous(held(2000, 20));
    expect(checked(stages, 'frequency')).toMatchObject({
      state: 'ok',
      sentence: 'Pulse frequency: continuous throughout.',
    });
    expect(checked(stages, 'on-time')).toMatchObject({ state: 'ok' });
  });

  it('a plant’s own reserve rules are what is asked for', () => {
    const prediction = predicted(GOOD);
    const strict = pierceChecks({ stages: GOOD, prediction, profile: TEN_KILOWATT, rules: { cold: 3, hot: 3 } });
    expect(strict.find(({ id }) => id === 'reserve-cold')).toMatchObject({
      state: 'wrong',
      sentence: /less than the 3 asked for/,
    });
  });
});

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { MachineProfile } from '../../../strategy/machine.ts';
import {
  DEFAULT_RESERVE_RULES,
  pierceChecks,
  piercePropose,
  pierceResults,
  pierceStageDefaults,
  stageProblems,
  strategyPrediction,
  type PierceProposal,
  type ProposalRule,
  type ProposeInput,
  type Stage,
  type StageQuantities,
} from '../../../strategy/pierce/index.ts';
import { boreOf } from '../../../strategy/pierce/bore.ts';
import { pierceParameters } from '../../../strategy/pierce/parameters.ts';
import { resultsOf, usualEruptionLimit } from '../../../strategy/pierce/propose-judge.ts';
import { houseRuleHolds, houseRuleProposed } from '../../../strategy/rules/index.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { runs } from '../../support/runs.ts';
import { held, threeRamps } from './support.ts';

const HOT = 423.15;

function wanted(profile: MachineProfile, mm: number, changed: Partial<ProposeInput> = {}): ProposeInput {
  return {
    profile,
    nozzle: NOZZLE_1_5,
    thickness: { min: mm * 0.9e-3, max: mm * 1e-3 },
    hottestPlateTemperature: HOT,
    ...changed,
  };
}

function rule(expression: string): ProposalRule {
  return houseRuleProposed({ expression, sentence: `It must hold that ${expression}.` });
}

let free: PierceProposal | undefined;
/** What is proposed for 20 mm on the 10 kW machine when no rule is in force. */
function freely() {
  free ??= piercePropose(wanted(TEN_KILOWATT, 20));
  if (free.kind !== 'ok') throw new Error(free.kind);
  return free;
}

/** Judged again from the outside: a machine that can do it, every check agreed with, every limit and rule kept. */
function expectSound(input: ProposeInput, proposal: PierceProposal): void {
  if (proposal.kind !== 'ok') throw new Error(proposal.kind === 'none' ? proposal.why : 'stopped');
  const { stages } = proposal;
  expect(stageProblems(stages, input.profile)).toEqual([]);
  const prediction = strategyPrediction({ ...input, stages });
  expect(prediction).toEqual(proposal.prediction);
  const rules = input.reserve ?? DEFAULT_RESERVE_RULES;
  const checks = pierceChecks({
    stages,
    prediction,
    profile: input.profile,
    rules,
    ...(input.limits?.leadInLength === undefined ? {} : { leadInLength: input.limits.leadInLength }),
  });
  const given = input.pinned?.some((stage) => stage !== null) === true;
  expect(checks.filter(({ state }) => state === 'wrong')).toEqual([]);
  // Nobody asked for a lead-in: a plate too hot for any is cautioned about all the same.
  const asked = input.limits?.leadInLength !== undefined;
  const cautions = checks.filter(({ state, id }) => state === 'caution' && (asked || id !== 'lead-in'));
  if (!given) expect(cautions).toEqual([]);
  const results = pierceResults(prediction);
  expect(results.reserveCold).toBeGreaterThanOrEqual(rules.cold);
  expect(results.reserveHot).toBeGreaterThanOrEqual(rules.hot);
  const { limits } = input;
  if (limits?.craterRadius !== undefined) expect(results.craterRadius).toBeLessThanOrEqual(limits.craterRadius);
  if (limits?.eruptionIndex !== undefined) expect(results.eruptionIndex).toBeLessThanOrEqual(limits.eruptionIndex);
  if (limits?.routineTime !== undefined) expect(results.routineTime).toBeLessThanOrEqual(limits.routineTime + 1e-9);
  if (limits?.peakPower !== undefined) expect(results.peakPower).toBeLessThanOrEqual(limits.peakPower);
  for (const one of input.rules ?? []) expect(one.miss(results), one.sentence).toBe(0);
  (input.pinned ?? []).forEach((stage, index) => {
    if (stage !== null) expect(stages[index]).toEqual(stage);
  });
}

describe('a proposed pierce', () => {
  it.each<[string, number, MachineProfile]>([
    ['4 kW', 6, FOUR_KILOWATT],
    ['4 kW', 16, FOUR_KILOWATT],
    ['10 kW', 8, TEN_KILOWATT],
    ['10 kW', 20, TEN_KILOWATT],
    ['10 kW', 35, TEN_KILOWATT],
  ])('%s, %d mm: is sound, shorter than the stages to start from, and the same each time', (_, mm, profile) => {
    const input = wanted(profile, mm);
    const proposal = piercePropose(input);
    expectSound(input, proposal);
    const start = strategyPrediction({ ...input, stages: pierceStageDefaults(profile, mm * 1e-3) });
    expect(proposal.kind === 'ok' && proposal.prediction.routineTime).toBeLessThan(start.routineTime);
    expect(piercePropose(input)).toEqual(proposal);
  });

  it('is sound for any machine, plate and wish, or says what is in the way', () => {
    const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(
        fc.record({
          power: number(1500, 20_000),
          riseTime: number(0, 3e-4),
          minDuty: number(0.02, 0.4),
          slope: fc.constantFrom(-2.2, 1, 1.5),
          reference: fc.constantFrom('plate' as const, 'nozzle' as const),
          mm: number(3, 40),
          hot: number(293.15, 573.15),
          cold: number(1, 3),
          crater: fc.option(number(0.6e-3, 2e-3), { nil: undefined }),
          time: fc.option(number(1, 20), { nil: undefined }),
          double: fc.boolean(),
        }),
        ({ power, riseTime, minDuty, slope, reference, mm, hot, cold, crater, time, double }) => {
          const profile: MachineProfile = {
            ...TEN_KILOWATT,
            source: { ...TEN_KILOWATT.source, maxPower: power, minPower: power / 20, riseTime, minDuty },
            focusScale: { ...TEN_KILOWATT.focusScale, slope, reference },
          };
          const input = wanted(profile, mm, {
            hottestPlateTemperature: hot,
            reserve: { cold, hot: cold },
            nozzle: { type: double ? 'double' : 'single', diameter: 0.0015 },
            limits: {
              ...(crater === undefined ? {} : { craterRadius: crater }),
              ...(time === undefined ? {} : { routineTime: time }),
            },
          });
          const proposal = piercePropose(input);
          if (proposal.kind === 'ok') expectSound(input, proposal);
          else {
            if (proposal.kind === 'stopped') throw new Error('nobody stopped it');
            expect(proposal.why).not.toMatch(/NaN|Infinity|undefined/);
            expect(stageProblems(proposal.nearest)).toEqual([]);
          }
        },
      ),
      { numRuns: runs(12, 150) },
    );
  }, 600_000);

  it('is shorter when less is asked for, and longer when more is', () => {
    const time = (changed: Partial<ProposeInput>) => {
      const proposal = piercePropose(wanted(TEN_KILOWATT, 20, changed));
      return proposal.kind === 'ok' ? proposal.prediction.routineTime : Number.NaN;
    };
    const usual = time({});
    expect(time({ reserve: { cold: 1.5, hot: 1.5 } })).toBeLessThan(usual);
    expect(time({ reserve: { cold: 3, hot: 3 } })).toBeGreaterThan(usual);
    expect(time({ limits: { eruptionIndex: 0.03 } })).toBeGreaterThan(usual);
    expect(time({ limits: { peakPower: 3000 } })).toBeGreaterThan(usual);
  });

  it('keeps house rules as they are written', () => {
    const rules = ['peakPower <= 5 kW', 'oxygenUsed <= 3 g', 'stageCount <= 3', 'reserveCold >= 2.3'];
    const input = wanted(TEN_KILOWATT, 20, { rules: rules.map(rule) });
    const proposal = piercePropose(input);
    expectSound(input, proposal);
    if (proposal.kind !== 'ok') return;
    const results = pierceResults(proposal.prediction);
    for (const one of rules) expect(houseRuleHolds(one, results)).toEqual({ kind: 'ok', holds: true });
  });

  it.each([
    ['peakPower', 0.8, 'kW', 1e-3],
    ['craterRadius', 0.98, 'mm', 1e3],
    ['eruptionIndex', 0.8, '', 1],
    ['oxygenUsed', 0.9, 'g', 1e3],
    ['heatLeft', 0.95, 'kJ', 1e-3],
  ] as const)('gives way to a house rule on %s where the free one breaks it', (name, share, unit, scale) => {
    const free = freely();
    const most = pierceResults(free.prediction)[name] * share * scale;
    const input = wanted(TEN_KILOWATT, 20, { rules: [rule(`${name} <= ${most} ${unit}`)] });
    const bound = piercePropose(input);
    expectSound(input, bound);
    if (bound.kind !== 'ok') return;
    expect(bound.stages).not.toEqual(free.stages);
    expect(bound.prediction.routineTime).toBeGreaterThanOrEqual(free.prediction.routineTime);
  });

  it('is the same with a house rule that it keeps anyway', () => {
    const rules = ['reserveCold >= 2', 'routineTime <= 25 s', 'thicknessMax <= 30 mm', 'stalls == 0'].map(rule);
    expect(piercePropose(wanted(TEN_KILOWATT, 20, { rules }))).toEqual(freely());
  });

  it('is judged by the same results as a whole prediction gives', () => {
    const input = wanted(TEN_KILOWATT, 20);
    const parameters = pierceParameters();
    const cold = boreOf(input.profile, input.nozzle, 293.15, parameters);
    const hot = boreOf(input.profile, input.nozzle, HOT, parameters);
    const brief = {
      thickness: input.thickness,
      coldPlate: 293.15,
      hottestPlate: HOT,
      cold,
      hot,
      reserve: DEFAULT_RESERVE_RULES,
      limits: { eruptionIndex: usualEruptionLimit(cold) },
      rules: [],
    };
    for (const stages of [
      pierceStageDefaults(TEN_KILOWATT, 0.02),
      held(900, 6),
      [...held(600, 20), ...held(4000, 6)],
    ]) {
      expect(resultsOf(brief, stages)).toEqual(pierceResults(strategyPrediction({ ...input, stages })));
    }
  });
});

describe('given stages', () => {
  const [soft, , strong] = threeRamps([500, 700, 1400, 2200]);
  if (soft === undefined || strong === undefined) throw new Error('no stages');

  it.each([
    ['the first', [soft, null, null]],
    ['one in the middle', [null, strong, null]],
    ['two at the start', [soft, { ...strong, from: soft.to }, null]],
    ['the last', [null, null, { ...strong, duration: 12, from: strong.to }]],
  ])('%s stay as they are, and the others are fitted round them', (_, pinned) => {
    const input = wanted(TEN_KILOWATT, 20, { pinned });
    const proposal = piercePropose(input);
    expectSound(input, proposal);
    if (proposal.kind !== 'ok') return;
    expect(proposal.stages).toHaveLength(pinned.length);
    proposal.stages.forEach((stage, index) => {
      const next = proposal.stages[index + 1];
      if (pinned[index] === null && next !== undefined && index + 2 < proposal.stages.length) {
        expect(next.from).toEqual(stage.to);
      }
    });
  });

  it('of continuous power are met by pulses without a pause', () => {
    const { duration, from, to } = soft;
    const plain = (set: StageQuantities): StageQuantities => ({
      ...set,
      peakPower: set.peakPower * set.duty,
      duty: 1,
      pulseFrequency: null,
    });
    const given = { duration, from: plain(from), to: plain(to) };
    const input = wanted(TEN_KILOWATT, 20, { pinned: [given, null, null] });
    const proposal = piercePropose(input);
    expectSound(input, proposal);
    const met = proposal.kind === 'ok' ? proposal.stages[1]?.from : undefined;
    expect(met).toEqual({ ...given.to, pulseFrequency: met?.pulseFrequency });
    expect(met?.pulseFrequency).toBeGreaterThan(0);
  });

  it('all given are judged as they are', () => {
    const stages = pierceStageDefaults(TEN_KILOWATT, 0.02);
    const good = piercePropose(wanted(TEN_KILOWATT, 20, { pinned: stages }));
    expect(good.kind === 'ok' && good.stages).toEqual(stages);
    const short = piercePropose(
      wanted(TEN_KILOWATT, 20, { pinned: stages.map((s) => ({ ...s, duration: s.duration / 2 })) }),
    );
    expect(short.kind).toBe('none');
  });

  it.each<[string, Stage, string]>([
    [
      'a peak beyond the source',
      { ...soft, from: { ...soft.from, peakPower: 20_000 } },
      'Stage 2 cannot be kept as it is at its start. Peak power 20 kW is outside [0.5 kW, 10 kW].',
    ],
    [
      'a focus beyond the dial',
      { ...soft, to: { ...soft.to, focusPosition: -0.025 } },
      'Stage 2 cannot be kept as it is at its end. Focus position −25 mm is outside [−22 mm, 22 mm], which the dial reaches at this standoff.',
    ],
    ['no time', { ...soft, duration: 0 }, 'Stage 2 cannot be kept as it is. Duration 0 s is outside (0, 600] s.'],
  ])('of %s are refused by their number', (_, stage, message) => {
    const ask = () => piercePropose(wanted(TEN_KILOWATT, 20, { pinned: [null, stage, null] }));
    expect(ask).toThrow(RangeError);
    expect(ask).toThrow(message);
  });
});

describe('when no routine keeps everything', () => {
  const none = (changed: Partial<ProposeInput>, mm = 20, profile = TEN_KILOWATT) => {
    const proposal = piercePropose(wanted(profile, mm, changed));
    if (proposal.kind !== 'none') throw new Error(proposal.kind);
    return proposal;
  };

  it('too short a time: names the time it would take and the melt it would throw out', () => {
    const { inTheWay, why } = none({ limits: { routineTime: 2.5 } });
    expect(inTheWay.map(({ limit }) => limit)).toEqual(expect.arrayContaining(['routine-time', 'eruption']));
    expect(why).toMatch(/The routine would have to be allowed \d\.\d s instead of 2\.5 s/);
    const allowed = Number(/allowed (\d\.\d) s/.exec(why)?.[1]);
    // What it says would do does.
    expect(piercePropose(wanted(TEN_KILOWATT, 20, { limits: { routineTime: allowed } })).kind).toBe('ok');
  });

  it('a crater narrower than the bore: names the radius it would have to be', () => {
    const { inTheWay } = none({ limits: { craterRadius: 0.4e-3 } });
    expect(inTheWay.map(({ limit }) => limit)).toEqual(['crater']);
    expect(inTheWay[0]?.sentence).toMatch(/allowed a radius of 0\.\d+ mm instead of 0\.4 mm/);
  });

  it('a rule that cannot be kept is told in the lead’s own words', () => {
    const { inTheWay } = none({ rules: [rule('breakthroughCold <= 0.5 s'), rule('stageCount <= 4')] });
    expect(inTheWay.map(({ sentence }) => sentence)).toContainEqual(
      expect.stringMatching(
        /^This rule would have to give way: “It must hold that breakthroughCold <= 0\.5 s\.” With everything else kept, breakthroughCold is \d+(\.\d+)? s\.$/,
      ),
    );
  });

  it('rules that no stages could keep are each named', () => {
    const plate = rule('thicknessMax <= 15 mm');
    const one = none({ rules: [plate] });
    expect(one.inTheWay).toEqual([
      {
        limit: 'rule',
        sentence:
          'This rule would have to give way: “It must hold that thicknessMax <= 15 mm.” With everything else kept, thicknessMax is 20 mm.',
      },
    ]);
    const two = none({ rules: [plate, rule('hottestPlate <= 100 degC')] });
    expect(two.inTheWay).toHaveLength(2);
    expect(two.why).toMatch(/giving way in one limit is not enough.*thicknessMax is 20 mm.*hottestPlate is 150 °C/);
  });

  it('a rule that cannot be read is kept by no routine, and says why', () => {
    const { inTheWay } = none({ rules: [rule('craterRadius <= 1.5')] });
    expect(inTheWay[0]?.sentence).toMatch(/the two sides do not fit: a length and a plain number/i);
  });

  it('a plate beyond the source: says how deep it gets', () => {
    const weak = { ...FOUR_KILOWATT, source: { ...FOUR_KILOWATT.source, maxPower: 1000 } };
    const { inTheWay, why } = none({}, 40, weak);
    expect(inTheWay.map(({ limit }) => limit)).toEqual(['power']);
    expect(why).toMatch(/^With all the power it may use the bottom reaches \d+\.\d mm of 40\.0 mm/);
  });
});

describe('a search', () => {
  it.each([
    ['that finds one', {}],
    ['that must ask each limit', { limits: { routineTime: 2 } }],
  ])('%s tells how far it is, and stops when told to', (_, changed) => {
    const shares: number[] = [];
    piercePropose(wanted(TEN_KILOWATT, 20, changed), (share) => shares.push(share));
    expect(shares.length).toBeGreaterThan(2);
    expect(shares.every((share, index) => share <= 1 && share >= (shares[index - 1] ?? 0))).toBe(true);
    expect(shares.at(-1)).toBe(1);
    expect(piercePropose(wanted(TEN_KILOWATT, 20), undefined, () => true)).toEqual({ kind: 'stopped' });
  });

  it.each<[string, Partial<ProposeInput>, RegExp]>([
    ['a range upside down', { thickness: { min: 0.02, max: 0.01 } }, /upside down/],
    ['a plate that is no number', { thickness: { min: 0.01, max: Number.NaN } }, /NaN/],
    ['a hottest plate colder than the cold one', { hottestPlateTemperature: 200 }, /colder than the cold plate/],
    ['a reserve below one', { reserve: { cold: 0.5, hot: 2 } }, /cold reserve 0.5 is outside/],
    ['a limit of nothing', { limits: { craterRadius: 0 } }, /limit craterRadius 0 is not positive/],
    ['no stage at all', { pinned: [] }, /0 stages are outside/],
  ])('is refused for %s', (_, changed, message) => {
    expect(() => piercePropose(wanted(TEN_KILOWATT, 20, changed))).toThrow(message);
  });
});

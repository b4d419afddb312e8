import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { pierceResults, pierceStageDefaults, strategyPrediction } from '../../../strategy/pierce/index.ts';
import {
  houseRuleHolds,
  houseRuleRead,
  houseRuleTable,
  LONGEST_RULE,
  type HouseRuleResults,
} from '../../../strategy/rules/index.ts';
import { houseRuleMiss } from '../../../strategy/rules/rule.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';

const RESULTS: HouseRuleResults = {
  reserveCold: 2.3,
  reserveHot: null,
  breakthroughCold: 7,
  breakthroughHot: null,
  routineTime: 16.1,
  craterRadius: 1.5e-3,
  leadInLength: 0.008,
  eruptionIndex: 0.05,
  eruptionLimit: 0.07,
  meanPower: 1800,
  peakPower: 4000,
  energy: 28_980,
  heatLeft: 5200,
  heatPerThickness: 260e3,
  oxygenUsed: 0.0105,
  pulses: 2900,
  stageCount: 4,
  stalls: 0,
  thicknessMin: 0.018,
  thicknessMax: 0.02,
  coldPlate: 293.15,
  hottestPlate: 423.15,
};

const holds = (rule: string) => houseRuleHolds(rule, RESULTS);

describe('a house rule', () => {
  it.each<[string, boolean]>([
    ['reserveCold >= 2', true],
    ['reserveCold >= 2.3', true],
    ['reserveCold > 2.3', false],
    ['craterRadius <= 1.5 mm', true],
    ['craterRadius ≤ 0.06 in', true],
    ['craterRadius < 1500 um', false],
    ['2 <= reserveCold <= 2.2', false],
    ['breakthroughCold <= 0.2 min', true],
    ['peakPower <= 4 kW and oxygenUsed < 10 g', false],
    ['peakPower <= 4 kW and not (oxygenUsed < 10 g)', true],
    ['hottestPlate <= 150 degC', true],
    ['hottestPlate <= 149 °C', false],
    ['coldPlate > -10 degC', true],
    ['hottestPlate - coldPlate < 131 K', true],
    ['eruptionIndex <= 50 %', true],
    ['eruptionIndex / eruptionLimit < 0.7', false],
    ['meanPower * routineTime <= 29 kJ', true],
    ['heatPerThickness <= 250 kJ/m', false],
    ['energy / routineTime == meanPower', true],
    ['stalls != 0', false],
    ['-reserveCold + 5 > +2.6', true],
    ['thicknessMax - thicknessMin <= 2 mm', true],
    ['reserveCold >= 3 or thicknessMax < 25 mm', true],
  ])('%s: %s', (rule, expected) => {
    expect(holds(rule)).toEqual({ kind: 'ok', holds: expected });
  });

  it('names the results it speaks of, each once', () => {
    expect(houseRuleRead('reserveHot >= 2 and (craterRadius <= 1.5 mm or reserveHot > 3)')).toEqual({
      kind: 'ok',
      uses: ['reserveHot', 'craterRadius'],
    });
  });

  it('has no answer about a result that is not there, unless the rest decides it', () => {
    expect(holds('reserveHot >= 2')).toEqual({ kind: 'none', why: 'There is no reserveHot here.' });
    expect(holds('reserveHot >= 2 and reserveCold >= 2')).toMatchObject({ kind: 'none' });
    expect(holds('reserveHot >= 2 and reserveCold >= 3')).toEqual({ kind: 'ok', holds: false });
    expect(holds('reserveHot >= 2 or reserveCold >= 2')).toEqual({ kind: 'ok', holds: true });
    expect(holds('reserveCold / stalls > 1')).toEqual({ kind: 'none', why: 'There is no finite number here.' });
  });

  it.each(houseRuleTable.map((row) => [row.example, row] as const))(
    'as in the table, "%s", can be read and speaks of that result',
    (example, { name, meaning }) => {
      expect(houseRuleRead(example)).toEqual({ kind: 'ok', uses: [name] });
      expect(meaning).not.toBe('');
    },
  );

  it('gets every result from a prediction', () => {
    const thickness = { min: 0.018, max: 0.02 };
    const stages = pierceStageDefaults(TEN_KILOWATT, thickness.max);
    const results = pierceResults(
      strategyPrediction({
        stages,
        thickness,
        hottestPlateTemperature: 423.15,
        profile: TEN_KILOWATT,
        nozzle: NOZZLE_1_5,
      }),
    );
    for (const { name } of houseRuleTable) expect(Number.isFinite(results[name]), name).toBe(true);
    expect(results.stageCount).toBe(stages.length);
    expect(houseRuleHolds('reserveCold >= 2 and reserveHot >= 2.2 and stalls == 0', results)).toEqual({
      kind: 'ok',
      holds: true,
    });
  });
});

describe('what is no house rule', () => {
  it.each<[string, RegExp]>([
    ['', /Type a comparison/],
    ['   ', /Type a comparison/],
    ['reserveHot', /no comparison/],
    ['1 < 2', /names no result/],
    ['craterRadius <= 1.5', /do not fit: a length and a plain number/],
    ['craterRadius <= 1.5 s', /a length and a time/],
    ['craterRadius + routineTime > 1 mm', /do not fit/],
    ['reserveHot >= 2 and peakPower', /and stands between two comparisons/],
    ['not reserveHot > 2', /not stands before a comparison/],
    ['(reserveHot > 1) + 1 > 1', /joined with and, or, not/],
    ['reserveHot > 2 > (1 < 2)', /joined with/],
    ['stages > 2', /"stages" is no result and no unit/],
    ['pi < reserveHot', /"pi" is no result/],
    ['true', /no number/],
    ['reserveHot == true', /no number/],
    ['reserveHot > 1e999', /no number/],
    ['reserveHot > NaN', /no number/],
    ['reserveHot = 3', /is none of them/],
    ['f(reserveHot) = 3', /is none of them/],
    ['sqrt(reserveHot) > 1', /is none of them/],
    ['reserveHot.value > 1', /is none of them/],
    ['reserveHot % 2 > 0', /"mod" has no meaning/],
    ['reserveHot! > 0', /has no meaning/],
    ['reserveHot to kW', /has no meaning/],
    ['hottestPlate < degC', /right behind a number/],
    ['hottestPlate < 2 mm degC', /right behind a number/],
    ['reserveHot >', /cannot be read/],
    ['((((', /cannot be read/],
    ['reserveHot > 1; reserveHot', /";" has no meaning/],
    ['reserveHot > "2"', /has no meaning/],
    [`reserveHot > ${'1'.repeat(LONGEST_RULE)}`, /at most 200 characters/],
  ])('%s', (rule, why) => {
    const read = houseRuleRead(rule);
    expect(read).toMatchObject({ kind: 'none', why });
    expect(houseRuleHolds(rule, RESULTS)).toEqual(read);
  });

  it.each([
    'import("fs")',
    'eval("1")',
    'parse("1") > 0',
    'evaluate(reserveHot)',
    'createUnit(x)',
    'simplify(reserveHot)',
    'cos.constructor("return process")()',
    'reserveHot.constructor > 0',
    'constructor > 1',
    '__proto__ > 1',
    'hasOwnProperty > 1',
    'toString > 1',
    '[1,2][1] > 0',
    '{a: 1}.a > 0',
    'reserveHot > 0 ? 1 : 2',
    'x -> 1',
    'g(x) = x',
    'reserveHot = 1',
    '1:1000000000',
    'reserveHot > 9^9^9^9',
    'reserveHot > 0\nreserveHot > 1',
    '`${process.env}` > 1',
    '\u0000 > 1',
    `${'('.repeat(99)}reserveHot > 1${')'.repeat(99)}`,
    `${'-'.repeat(180)}reserveHot > 1`,
    'not '.repeat(40),
  ])('hostile: %j', (rule) => {
    const read = houseRuleRead(rule);
    if (read.kind === 'ok') {
      // Brackets and signs without end are arithmetic all the same.
      expect(read.uses).toEqual(['reserveHot']);
      return;
    }
    expect(read.why).not.toBe('');
    expect(read.why.length).toBeLessThan(200);
  });

  it('any text is refused with a reason or is a rule; nothing throws and nothing else is returned', () => {
    const pieces = fc.constantFrom(
      ...houseRuleTable.map(({ name }) => name),
      '>=',
      '<',
      '==',
      'and',
      'or',
      'not',
      '(',
      ')',
      '+',
      '-',
      '*',
      '/',
      '2',
      '1.5',
      '%',
      'mm',
      'in',
      'kW',
      'degC',
      'constructor',
      'f(',
      '=',
      '.',
      ',',
      '!',
    );
    const texts = fc.oneof(
      fc.string({ maxLength: 40 }),
      fc.string({ unit: 'binary', maxLength: 40 }),
      fc.array(pieces, { maxLength: 14 }).map((all) => all.join(' ')),
    );
    fc.assert(
      fc.property(texts, (text) => {
        const read = houseRuleRead(text);
        const found = houseRuleHolds(text, RESULTS);
        if (read.kind === 'none') expect(found.kind).toBe('none');
        if (found.kind === 'ok') expect(typeof found.holds).toBe('boolean');
        const miss = houseRuleMiss(text)(RESULTS);
        expect(miss >= 0).toBe(true);
        if (found.kind === 'ok') expect(miss === 0).toBe(found.holds);
      }),
      { numRuns: 2000 },
    );
  });
});

describe('how far a rule is missed', () => {
  it('shrinks as the result comes nearer, and is nothing when it holds', () => {
    const at = (craterRadius: number) => houseRuleMiss('craterRadius <= 1.5 mm')({ ...RESULTS, craterRadius });
    expect(at(3e-3)).toBeCloseTo(0.5, 12);
    expect(at(2e-3)).toBeLessThan(at(3e-3));
    expect(at(1.5e-3)).toBe(0);
  });

  it('adds up over and, takes the nearest over or, and turns round with not', () => {
    expect(houseRuleMiss('reserveCold >= 4.6 and peakPower <= 2 kW')(RESULTS)).toBeCloseTo(1, 12);
    expect(houseRuleMiss('reserveCold >= 4.6 or peakPower <= 3 kW')(RESULTS)).toBeCloseTo(0.25, 12);
    expect(houseRuleMiss('not (reserveCold < 4.6)')(RESULTS)).toBeCloseTo(0.5, 12);
    expect(houseRuleMiss('reserveHot >= 2')(RESULTS)).toBe(Number.POSITIVE_INFINITY);
  });
});

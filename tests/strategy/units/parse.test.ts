import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { quantityParse, type Dimension } from '../../../strategy/units/index.ts';

function value(text: string, dimension: Dimension, unit: string): number {
  const parsed = quantityParse(text, dimension, unit);
  if (parsed.kind === 'none') throw new Error(`${text}: ${parsed.why}`);
  return parsed.value;
}

function why(text: string, dimension: Dimension, unit: string): string {
  const parsed = quantityParse(text, dimension, unit);
  if (parsed.kind === 'ok') throw new Error(`${text} was understood as ${parsed.understood}`);
  return parsed.why;
}

describe('what people type', () => {
  it.each<[string, Dimension, string, number]>([
    ['12', 'length', 'mm', 0.012],
    ['12,7 mm', 'length', 'mm', 0.0127],
    ['1/2 in', 'length', 'mm', 0.0127],
    ['1 1/2 in', 'length', 'mm', 0.0381],
    ['1-1/2"', 'length', 'mm', 0.0381],
    ['3/4"', 'length', 'mm', 0.01905],
    ['¾ in', 'length', 'mm', 0.01905],
    ['1½ in', 'length', 'mm', 0.0381],
    ['.5in', 'length', 'mm', 0.0127],
    ['5\' 6"', 'length', 'mm', 1.6764],
    ['1 ft 6 1/2 in', 'length', 'mm', 0.4699],
    ['100 µm', 'length', 'mm', 1e-4],
    ['-2.27', 'length', 'mm', -0.00227],
    ['−2,27 mm', 'length', 'mm', -0.00227],
    ['+5', 'length', 'mm', 0.005],
    ['12 psi', 'pressure', 'bar', 82737.08751802033],
    ['0.7 bar', 'pressure', 'bar', 7e4],
    ['0,7 BAR(g)', 'pressure', 'bar', 7e4],
    ['200 C', 'temperature', '°C', 473.15],
    ['200 °C', 'temperature', '°C', 473.15],
    ['392 F', 'temperature', '°C', 473.15],
    ['-5', 'temperature', '°C', 268.15],
    ['50 %', 'ratio', '%', 0.5],
    ['50', 'ratio', '%', 0.5],
    ['2.2', 'ratio', '×', 2.2],
    ['900 mm/min', 'speed', 'mm/min', 0.015],
    ['0.9 m/min', 'speed', 'mm/min', 0.015],
    ['35 ipm', 'speed', 'mm/min', (35 * 0.0254) / 60],
    ['1.4 kW', 'power', 'kW', 1400],
    ['700 w', 'power', 'kW', 700],
    ['2 min 15 s', 'time', 's', 135],
    ['1 h 30 min', 'time', 's', 5400],
    ['60°', 'angle', '°', Math.PI / 3],
    ['1.5e-3 m', 'length', 'mm', 0.0015],
  ])('%s as %s is understood', (text, dimension, unit, expected) => {
    expect(value(text, dimension, unit)).toBeCloseTo(expected, 10);
  });

  it('says how it was understood, in the unit typed and in the unit of the field', () => {
    expect(quantityParse('1/2 in', 'length', 'mm')).toEqual({
      kind: 'ok',
      value: 0.0127,
      understood: '0.5 in = 12.7 mm',
    });
    expect(quantityParse('12', 'length', 'mm')).toMatchObject({ understood: '12 mm' });
    expect(quantityParse('12 psi', 'pressure', 'bar')).toMatchObject({ understood: '12 psi = 0.82737 bar' });
    expect(quantityParse('-2.27', 'length', 'mm')).toMatchObject({ understood: '−2.27 mm' });
  });
});

describe('what nobody can understand', () => {
  it.each<[string, Dimension, string, RegExp]>([
    ['', 'length', 'mm', /Type a number/],
    ['   ', 'length', 'mm', /Type a number/],
    ['-', 'length', 'mm', /does not begin with a number/],
    ['abc', 'length', 'mm', /does not begin with a number/],
    ['--5', 'length', 'mm', /does not begin with a number/],
    ['NaN', 'length', 'mm', /does not begin with a number/],
    ['Infinity', 'length', 'mm', /does not begin with a number/],
    ['1/0 in', 'length', 'mm', /0 below the line/],
    ['1e999', 'length', 'mm', /too large/],
    ['12 parsec', 'length', 'mm', /"parsec" is not a unit that fits here: type mm/],
    ['12 bar', 'length', 'mm', /not a unit that fits here/],
    ['1,000', 'length', 'mm', /could mean 1\.000 or 1000/],
    ['1.234,5', 'length', 'mm', /more than one decimal mark/],
    ['1 000', 'length', 'mm', /two numbers in a row/],
    ['12 13', 'length', 'mm', /two numbers in a row/],
    ['2026-12-01', 'length', 'mm', /not a unit/],
    ['1/2/3', 'length', 'mm', /not a unit/],
    ['-300', 'temperature', '°C', /below absolute zero/],
    ['1'.repeat(41), 'length', 'mm', /too long/],
    ['3 bara', 'pressure', 'bar', /not a unit that fits here/],
  ])('%j as %s is refused with a sentence', (text, dimension, unit, sentence) => {
    expect(why(text, dimension, unit)).toMatch(sentence);
  });

  it('takes a decimal comma before three digits when it can only be one', () => {
    expect(value('0,125 in', 'length', 'mm')).toBeCloseTo(0.003175, 12);
  });

  it('refuses a unit of the field that does not exist, as the caller’s mistake', () => {
    expect(() => quantityParse('1', 'length', 'bar')).toThrow(RangeError);
  });

  it('never gives a number that is not finite, whatever is typed', () => {
    const alphabet = fc.constantFrom(...'0123456789.,/ -−+eE"\'½mincfthsµ°%NaIy');
    fc.assert(
      fc.property(
        fc.oneof(fc.string(), fc.string({ unit: alphabet, maxLength: 45 }), fc.string({ unit: 'binary' })),
        fc.constantFrom<[Dimension, string]>(['length', 'mm'], ['time', 's'], ['temperature', '°C'], ['ratio', '%']),
        (text, [dimension, unit]) => {
          const parsed = quantityParse(text, dimension, unit);
          if (parsed.kind === 'ok') {
            expect(Number.isFinite(parsed.value)).toBe(true);
            expect(parsed.understood).not.toMatch(/NaN|Infinity/);
          } else {
            expect(parsed.why).toMatch(/\S.*[.]$/s);
          }
        },
      ),
      { numRuns: 2000 },
    );
  });
});

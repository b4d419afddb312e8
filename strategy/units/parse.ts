import { dimensionUnits, siFrom, siTo, unitFind, unitOf, unitSymbol, type Dimension, type Unit } from './dimension.ts';
import { MINUS, numberText, withSymbol } from './text.ts';

/** What a text means: the SI value and how it was understood, to be shown beside the field; or why it means nothing. */
export type QuantityParsed =
  | { readonly kind: 'ok'; readonly value: number; readonly understood: string }
  | { readonly kind: 'none'; readonly why: string };

/** More than anybody types for one number. It bounds the work, and what an error sentence repeats. */
const LONGEST_TEXT = 40;

const FRACTION_SIGNS: Readonly<Record<string, string>> = {
  '½': '1/2',
  '¼': '1/4',
  '¾': '3/4',
  '⅛': '1/8',
  '⅜': '3/8',
  '⅝': '5/8',
  '⅞': '7/8',
};

/** Unsigned decimal with a point or a comma, or a fraction, or a whole number and a fraction ("1 1/2", "1-1/2"). */
const MIXED = /^(\d+)(?:\s+|\s*-\s*)(\d+)\s*\/\s*(\d+)/;
const FRACTION = /^(\d+)\s*\/\s*(\d+)/;
const DECIMAL = /^(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+-]?\d+)?/;

/** Two units that people join, larger first: 1 ft 6 in, 2 min 15 s. */
const JOINED: Readonly<Partial<Record<Dimension, readonly (readonly [string, string])[]>>> = {
  length: [['ft', 'in']],
  time: [
    ['h', 'min'],
    ['min', 's'],
  ],
};

/**
 * SI value of what somebody typed: `12`, `12,7 mm`, `1/2 in`, `1 1/2"`, `12 psi`, `200 C`, `50 %`, `2 min 15 s`. Without a
 * unit the number is in `defaultUnit`. A comma is a decimal mark; a comma before exactly three digits could as well
 * part thousands ("1,000"), so it is refused and not guessed.
 * Never throws for a text and never gives NaN or an infinite number; RangeError when `defaultUnit` is no unit of the dimension.
 */
export function quantityParse(text: string, dimension: Dimension, defaultUnit: string): QuantityParsed {
  const usual = unitOf(dimension, defaultUnit);
  if (text.length > LONGEST_TEXT)
    return none(`That is too long for one number: type at most ${LONGEST_TEXT} characters.`);
  const plain = plainText(text);
  if (plain === '') return none('Type a number.');

  const negative = /^-\s*/.exec(plain);
  const unsigned = plain.slice(negative?.[0].length ?? (plain.startsWith('+') ? 1 : 0)).trim();
  const first = numberRead(unsigned);
  if (first.kind === 'none') return first;

  const tail = unsigned.slice(first.length).trim();
  const single = tail === '' ? usual : unitFind(dimension, tail);
  const read =
    single === undefined
      ? joinedRead(first.value, tail, dimension)
      : { kind: 'ok' as const, value: first.value, unit: single };
  if (read.kind === 'none') return read;

  const inUnit = negative === null ? read.value : -read.value;
  const value = siFrom(inUnit, read.unit);
  if (!Number.isFinite(value)) return none(`"${text.trim()}" is too large a number.`);
  // Is it a temperature that cannot exist?
  if (dimension === 'temperature' && value < 0) return none(`"${text.trim()}" is below absolute zero.`);
  return { kind: 'ok', value: value === 0 ? 0 : value, understood: understoodAs(inUnit, read.unit, usual) };
}

function none(why: string): { readonly kind: 'none'; readonly why: string } {
  return { kind: 'none', why };
}

/** One kind of minus, one kind of space, no fraction signs. */
function plainText(text: string): string {
  return text
    .replace(/[−–‒﹣－]/g, '-')
    .replace(/(\d?)([½¼¾⅛⅜⅝⅞])/g, (_, digit: string, sign: string) =>
      digit === '' ? (FRACTION_SIGNS[sign] ?? sign) : `${digit} ${FRACTION_SIGNS[sign] ?? sign}`,
    )
    .replace(/⁄/g, '/')
    .replace(/\s+/g, ' ')
    .trim();
}

type NumberRead =
  | { readonly kind: 'ok'; readonly value: number; readonly length: number }
  | { readonly kind: 'none'; readonly why: string };

/** The unsigned number a text begins with, and how many characters it takes. */
function numberRead(text: string): NumberRead {
  const mixed = MIXED.exec(text);
  if (mixed !== null) {
    return fractionRead(Number(mixed[1]), Number(mixed[2]), Number(mixed[3]), mixed[0].length);
  }
  const fraction = FRACTION.exec(text);
  if (fraction !== null) return fractionRead(0, Number(fraction[1]), Number(fraction[2]), fraction[0].length);

  const decimal = DECIMAL.exec(text);
  if (decimal === null) return none(`"${text}" does not begin with a number.`);
  const digits = decimal[0];
  const rest = text.slice(digits.length);
  if (/^[.,]?\d/.test(rest.trimStart()) || /^[.,]/.test(rest)) {
    // A second number follows at once: thousands marks ("1.234,5", "1 000"), a date, a typing slip.
    if (/^[.,]/.test(rest)) return none(`"${text}" has more than one decimal mark: type it without thousands marks.`);
    return none(`"${text}" has two numbers in a row: type it without spaces inside the number.`);
  }
  if (/^[1-9]\d{0,2},\d{3}$/.test(digits)) {
    const [whole = '', decimals = ''] = digits.split(',');
    return none(
      `"${digits}" could mean ${whole}.${decimals} or ${whole}${decimals}: type a point or leave the comma out.`,
    );
  }
  const value = Number(digits.replace(',', '.'));
  if (!Number.isFinite(value)) return none(`"${digits}" is too large a number.`);
  return { kind: 'ok', value, length: digits.length };
}

function fractionRead(whole: number, top: number, bottom: number, length: number): NumberRead {
  if (bottom === 0) return none('A fraction cannot have 0 below the line.');
  const value = whole + top / bottom;
  if (!Number.isFinite(value)) return none('That fraction is too large a number.');
  return { kind: 'ok', value, length };
}

type JoinedRead =
  | { readonly kind: 'ok'; readonly value: number; readonly unit: Unit }
  | { readonly kind: 'none'; readonly why: string };

/** "1 ft 6 in" after its first number: the sum in the larger unit; or why the text after the number means nothing. */
function joinedRead(first: number, tail: string, dimension: Dimension): JoinedRead {
  for (const [large, small] of JOINED[dimension] ?? []) {
    const largeUnit = unitOf(dimension, large);
    const smallUnit = unitOf(dimension, small);
    for (const spelling of largeUnit.spellings) {
      if (!tail.toLowerCase().startsWith(spelling.toLowerCase())) continue;
      const rest = tail.slice(spelling.length).replace(/^[\s-]+/, '');
      const second = numberRead(rest);
      if (second.kind === 'none') continue;
      if (unitFind(dimension, rest.slice(second.length).trim()) !== smallUnit) continue;
      return { kind: 'ok', value: first + siFrom(second.value, smallUnit) / largeUnit.factor, unit: largeUnit };
    }
  }
  const known = dimensionUnits(dimension).map(unitSymbol).join(', ');
  return none(`"${tail}" is not a unit that fits here: type ${known}.`);
}

/** "0.5 in = 12.7 mm": the number in the unit it was typed in, then in the field's own. */
function understoodAs(inUnit: number, typed: Unit, usual: Unit): string {
  const own = withUnit(inUnit, typed);
  return typed === usual ? own : `${own} = ${withUnit(siTo(siFrom(inUnit, typed), usual), usual)}`;
}

function withUnit(value: number, shown: Unit): string {
  return withSymbol(significant(value), unitSymbol(shown));
}

/** Five significant figures, more when the whole part is longer; very large and very small ones with an exponent. */
function significant(value: number): string {
  const size = Math.abs(value);
  if (size !== 0 && (size >= 1e9 || size < 1e-6)) return value.toExponential(4).replaceAll('-', MINUS);
  const decimals = size === 0 ? 0 : Math.max(0, 4 - Math.floor(Math.log10(size)));
  return numberText(value, Math.min(decimals, 10));
}

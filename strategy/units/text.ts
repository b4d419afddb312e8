import { siTo, unitOf, unitSymbol, type Dimension, type Unit } from './dimension.ts';

export type UnitSystem = 'metric' | 'inch';

export type QuantityTextOptions = {
  /** Unit to show instead of the system's own. */
  readonly unit?: string;
  /** Exactly so many decimals; without it up to the usual number, trailing zeros left out. */
  readonly decimals?: number;
  /** Instead of decimals: at most so many significant figures, trailing zeros left out; figures before the point all stay. */
  readonly figures?: number;
  /** Write the plus of a positive number, as for a focus position. */
  readonly sign?: boolean;
};

export type QuantityText = { readonly number: string; readonly unit: string; readonly text: string };

type Shown = { readonly unit: string; readonly decimals: number };

/** The typographic minus, U+2212. A hyphen breaks at a line end and reads as a dash beside figures. */
export const MINUS = '−';

/**
 * A quantity as somebody reads it: number, unit and both together, without thousands marks, with a real minus.
 * Decimals are chosen so that what is shown as metric comes back the same when the inch text of it is typed again.
 * `value` is SI. RangeError when it is not finite: "no answer" is told apart before it comes here.
 */
export function quantityText(
  value: number,
  dimension: Dimension,
  system: UnitSystem,
  options: QuantityTextOptions = {},
): QuantityText {
  if (!Number.isFinite(value)) throw new RangeError(`${dimension} ${value} cannot be shown`);
  const usual = shownAs(value, dimension, system);
  const shown: Unit = unitOf(dimension, options.unit ?? usual.unit);
  const inUnit = siTo(value, shown);
  const number =
    options.decimals !== undefined
      ? inUnit.toFixed(options.decimals)
      : trimmed(inUnit, decimalsOf(inUnit, options, options.unit === undefined ? usual.decimals : decimalsFor(inUnit)));
  const symbol = unitSymbol(shown);
  const signed = withSign(number, options.sign === true);
  return { number: signed, unit: symbol, text: withSymbol(signed, symbol) };
}

/** A number with up to so many decimals, trailing zeros left out, real minus. For counts and figures without a unit. */
export function numberText(value: number, decimals: number): string {
  if (!Number.isFinite(value)) throw new RangeError(`${value} cannot be shown`);
  return withSign(trimmed(value, decimals), false);
}

/** Number and unit as they stand side by side. Not of the folder's face: `quantityText` is. */
export function withSymbol(number: string, symbol: string): string {
  if (symbol === '°') return `${number}°`;
  if (symbol === '×') return number;
  return `${number} ${symbol}`;
}

function trimmed(value: number, decimals: number): string {
  const fixed = value.toFixed(decimals);
  return fixed.includes('.') ? fixed.replace(/\.?0+$/, '') : fixed;
}

function withSign(number: string, plus: boolean): string {
  const bare = number.startsWith('-') ? number.slice(1) : number;
  // What rounds to nothing has no sign.
  const isZero = Number(bare) === 0;
  if (isZero) return bare;
  if (number.startsWith('-')) return MINUS + bare;
  return plus ? `+${bare}` : bare;
}

/** Decimals that leave the figures asked for, toFixed's hundred at most; the usual ones when none are asked for. */
function decimalsOf(value: number, { figures }: QuantityTextOptions, usual: number): number {
  if (figures === undefined || value === 0) return usual;
  return Math.min(100, Math.max(0, figures - 1 - Math.floor(Math.log10(Math.abs(value)))));
}

/** Decimals that leave about four significant figures, for a unit that the reader chose. */
function decimalsFor(value: number): number {
  const size = Math.abs(value);
  if (size >= 1000) return 0;
  if (size >= 100) return 1;
  if (size >= 10) return 2;
  return size >= 1 ? 3 : 4;
}

function shownAs(value: number, dimension: Dimension, system: UnitSystem): Shown {
  const metric = system === 'metric';
  const size = Math.abs(value);
  switch (dimension) {
    case 'length':
      return metric ? { unit: 'mm', decimals: 2 } : { unit: 'in', decimals: 4 };
    case 'time':
      if (size < 600) return { unit: 's', decimals: size < 0.1 ? 5 : 2 };
      return size < 7200 ? { unit: 'min', decimals: 1 } : { unit: 'h', decimals: 2 };
    case 'speed':
      if (!metric) return { unit: 'ipm', decimals: 2 };
      return size < 10 / 60 ? { unit: 'mm/min', decimals: 0 } : { unit: 'm/min', decimals: 1 };
    case 'acceleration':
      return metric ? { unit: 'm/s²', decimals: 2 } : { unit: 'in/s²', decimals: 1 };
    case 'jerk':
      return metric ? { unit: 'm/s³', decimals: 1 } : { unit: 'in/s³', decimals: 0 };
    case 'power':
      return size < 100 ? { unit: 'W', decimals: 1 } : { unit: 'kW', decimals: 3 };
    case 'pressure':
      return metric ? { unit: 'bar', decimals: 2 } : { unit: 'psi', decimals: 2 };
    case 'frequency':
      return size < 10_000 ? { unit: 'Hz', decimals: size < 100 ? 1 : 0 } : { unit: 'kHz', decimals: 2 };
    case 'angle':
      return { unit: '°', decimals: 1 };
    case 'temperature':
      return metric ? { unit: '°C', decimals: 0 } : { unit: '°F', decimals: 0 };
    case 'temperatureDifference':
      return metric ? { unit: 'K', decimals: 0 } : { unit: '°F', decimals: 0 };
    case 'ratio':
      return { unit: '%', decimals: 1 };
    case 'energy':
      if (size < 1e3) return { unit: 'J', decimals: size < 10 ? 2 : 0 };
      return size < 1e6 ? { unit: 'kJ', decimals: 2 } : { unit: 'MJ', decimals: 2 };
    case 'energyPerLength':
      return metric ? { unit: 'J/mm', decimals: 1 } : { unit: 'kJ/in', decimals: 3 };
    case 'energyPerArea':
      return metric ? { unit: 'J/mm²', decimals: 2 } : { unit: 'J/in²', decimals: 0 };
    case 'mass':
      if (!metric) return { unit: 'lb', decimals: 2 };
      return size < 1 ? { unit: 'g', decimals: size < 0.01 ? 2 : 0 } : { unit: 'kg', decimals: 2 };
    case 'volumeFlow':
      return metric ? { unit: 'm³/h', decimals: 2 } : { unit: 'ft³/h', decimals: 1 };
  }
}

import { ZERO_CELSIUS } from './temperature.ts';

/** The kinds of quantity that people type or read. */
export type Dimension =
  | 'length'
  | 'time'
  | 'speed'
  | 'acceleration'
  | 'jerk'
  | 'power'
  | 'pressure'
  | 'frequency'
  | 'angle'
  | 'temperature'
  | 'temperatureDifference'
  | 'ratio'
  | 'energy'
  | 'energyPerLength'
  | 'energyPerArea'
  | 'mass'
  | 'volumeFlow';

/** One unit: SI value = typed × factor + shift. The first spelling is the one shown. */
export type Unit = {
  readonly spellings: readonly string[];
  readonly factor: number;
  readonly shift: number;
};

const INCH = 0.0254;
const FOOT = 0.3048;
const POUND = 0.45359237;
const STANDARD_GRAVITY = 9.80665;
const BTU = 1055.05585262;

function unit(factor: number, ...spellings: string[]): Unit {
  return { spellings, factor, shift: 0 };
}

/**
 * Units that are understood, per dimension. All factors are exact by definition (NIST SP 811, appendix B) but the Btu
 * (International Table), which is exact to the digits given there.
 * Pressures of a gas are gauge pressures, so `bar` and `bar(g)` are the same here; absolute ones are not understood.
 */
const UNITS: Readonly<Record<Dimension, readonly Unit[]>> = {
  length: [
    unit(1e-3, 'mm', 'millimetre', 'millimetres', 'millimeter', 'millimeters'),
    unit(1e-6, 'µm', 'μm', 'um', 'micron', 'microns'),
    unit(1e-2, 'cm'),
    unit(1, 'm', 'metre', 'metres', 'meter', 'meters'),
    unit(INCH, 'in', '"', '″', '”', "''", 'inch', 'inches', 'in.'),
    unit(INCH / 1000, 'thou', 'mil'),
    unit(FOOT, 'ft', "'", '′', '’', 'foot', 'feet'),
  ],
  time: [
    unit(1, 's', 'sec', 'secs', 'second', 'seconds'),
    unit(1e-3, 'ms'),
    unit(1e-6, 'µs', 'μs', 'us'),
    unit(60, 'min', 'mins', 'minute', 'minutes'),
    unit(3600, 'h', 'hr', 'hrs', 'hour', 'hours'),
  ],
  speed: [
    unit(1e-3 / 60, 'mm/min'),
    unit(1 / 60, 'm/min'),
    unit(1e-3, 'mm/s', 'mm/sec'),
    unit(1, 'm/s', 'm/sec'),
    unit(INCH / 60, 'ipm', 'in/min', 'inch/min', '"/min'),
    unit(INCH, 'in/s', 'ips'),
    unit(FOOT / 60, 'ft/min', 'fpm'),
  ],
  acceleration: [
    unit(1, 'm/s²', 'm/s2', 'm/s^2'),
    unit(1e-3, 'mm/s²', 'mm/s2', 'mm/s^2'),
    unit(INCH, 'in/s²', 'in/s2', 'in/s^2'),
    unit(STANDARD_GRAVITY, 'g'),
  ],
  jerk: [
    unit(1, 'm/s³', 'm/s3', 'm/s^3'),
    unit(1e-3, 'mm/s³', 'mm/s3', 'mm/s^3'),
    unit(INCH, 'in/s³', 'in/s3', 'in/s^3'),
  ],
  power: [
    unit(1e3, 'kW', 'kilowatt', 'kilowatts'),
    unit(1, 'W', 'watt', 'watts'),
    unit(550 * FOOT * POUND * STANDARD_GRAVITY, 'hp'),
  ],
  pressure: [
    unit(1e5, 'bar', 'bar(g)', 'barg', 'bars'),
    unit(1e2, 'mbar', 'hPa'),
    unit(1, 'Pa'),
    unit(1e3, 'kPa'),
    unit(1e6, 'MPa'),
    unit((POUND * STANDARD_GRAVITY) / (INCH * INCH), 'psi', 'psig', 'psi(g)', 'lbf/in²'),
    unit(101325, 'atm'),
  ],
  frequency: [unit(1, 'Hz', '1/s', 'hertz'), unit(1e3, 'kHz')],
  angle: [unit(Math.PI / 180, '°', 'deg', 'degree', 'degrees', 'º'), unit(1, 'rad'), unit(1e-3, 'mrad')],
  temperature: [
    { spellings: ['°C', 'C', 'degC', 'deg C', '° C', 'ºC', 'celsius'], factor: 1, shift: ZERO_CELSIUS },
    {
      spellings: ['°F', 'F', 'degF', 'deg F', '° F', 'ºF', 'fahrenheit'],
      factor: 5 / 9,
      shift: ZERO_CELSIUS - 160 / 9,
    },
    unit(1, 'K', 'kelvin'),
  ],
  temperatureDifference: [unit(1, 'K', '°C', 'C', 'kelvin', 'degC'), unit(5 / 9, '°F', 'F', 'degF')],
  ratio: [unit(1e-2, '%', 'percent', 'per cent', 'pct'), unit(1, '×', 'x', '1')],
  energy: [
    unit(1, 'J', 'Ws'),
    unit(1e3, 'kJ'),
    unit(1e6, 'MJ'),
    unit(3.6e6, 'kWh'),
    unit(BTU, 'Btu'),
    unit(4.184, 'cal'),
  ],
  energyPerLength: [
    unit(1e3, 'J/mm'),
    unit(1, 'J/m'),
    unit(1e6, 'kJ/mm'),
    unit(1e3 / INCH, 'kJ/in'),
    unit(1 / INCH, 'J/in'),
  ],
  energyPerArea: [
    unit(1e6, 'J/mm²', 'J/mm2', 'J/mm^2'),
    unit(1e4, 'J/cm²', 'J/cm2', 'J/cm^2'),
    unit(1, 'J/m²', 'J/m2', 'J/m^2'),
    unit(1 / (INCH * INCH), 'J/in²', 'J/in2', 'J/in^2'),
  ],
  mass: [unit(1, 'kg'), unit(1e-3, 'g'), unit(1e3, 't'), unit(POUND, 'lb', 'lbs')],
  volumeFlow: [
    unit(1 / 3600, 'm³/h', 'm3/h', 'm^3/h'),
    unit(1e-3 / 60, 'L/min', 'l/min', 'lpm'),
    unit(1, 'm³/s', 'm3/s'),
    unit(FOOT ** 3 / 3600, 'ft³/h', 'ft3/h', 'cfh'),
  ],
};

/** Units understood for a dimension, in the order in which they are offered. */
export function dimensionUnits(dimension: Dimension): readonly Unit[] {
  return UNITS[dimension];
}

/**
 * The unit that a spelling means in this dimension, or undefined. Exact spelling first, then without regard to capitals:
 * no dimension holds two units that differ in capitals only (there is no MW beside a mW), so that `KW` and `hz` are safe.
 */
export function unitFind(dimension: Dimension, spelling: string): Unit | undefined {
  const units = UNITS[dimension];
  const exact = units.find((candidate) => candidate.spellings.includes(spelling));
  if (exact !== undefined) return exact;
  const lower = spelling.toLowerCase();
  return units.find((candidate) => candidate.spellings.some((known) => known.toLowerCase() === lower));
}

/** How the unit is written on the screen. */
export function unitSymbol(shown: Unit): string {
  return shown.spellings[0] ?? '';
}

/** The same as `unitFind`; RangeError when the spelling is unknown, which is the caller's mistake. */
export function unitOf(dimension: Dimension, spelling: string): Unit {
  const found = unitFind(dimension, spelling);
  if (found === undefined) throw new RangeError(`"${spelling}" is no unit of ${dimension}`);
  return found;
}

/** SI value from a number in a unit. */
export function siFrom(value: number, from: Unit): number {
  return value * from.factor + from.shift;
}

/** Number in a unit from an SI value. */
export function siTo(value: number, to: Unit): number {
  return (value - to.shift) / to.factor;
}

/** SI value of a number given in a named unit; RangeError when the unit is unknown. */
export function quantityFrom(value: number, dimension: Dimension, spelling: string): number {
  return siFrom(value, unitOf(dimension, spelling));
}

/** Number, in a named unit, of an SI value; RangeError when the unit is unknown. */
export function quantityIn(value: number, dimension: Dimension, spelling: string): number {
  return siTo(value, unitOf(dimension, spelling));
}

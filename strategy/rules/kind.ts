import type { Dimension } from '../units/index.ts';

/** What a value is: its exponents of metre, kilogram, second and kelvin. */
export type Kind = readonly [length: number, mass: number, time: number, temperature: number];

export const PLAIN: Kind = [0, 0, 0, 0];

const OF_DIMENSION: Readonly<Record<Dimension, Kind>> = {
  length: [1, 0, 0, 0],
  time: [0, 0, 1, 0],
  speed: [1, 0, -1, 0],
  acceleration: [1, 0, -2, 0],
  jerk: [1, 0, -3, 0],
  power: [2, 1, -3, 0],
  pressure: [-1, 1, -2, 0],
  frequency: [0, 0, -1, 0],
  angle: PLAIN,
  temperature: [0, 0, 0, 1],
  temperatureDifference: [0, 0, 0, 1],
  ratio: PLAIN,
  energy: [2, 1, -2, 0],
  energyPerLength: [1, 1, -2, 0],
  energyPerArea: [0, 1, -2, 0],
  mass: [0, 1, 0, 0],
  volumeFlow: [3, 0, -1, 0],
};

export function kindOf(dimension: Dimension | 'count'): Kind {
  return dimension === 'count' ? PLAIN : OF_DIMENSION[dimension];
}

export function kindsEqual(a: Kind, b: Kind): boolean {
  return a.every((exponent, index) => exponent === b[index]);
}

/** Kind of a product, or with `sign` −1 of a quotient. */
export function kindJoined(a: Kind, b: Kind, sign: 1 | -1): Kind {
  return [a[0] + sign * b[0], a[1] + sign * b[1], a[2] + sign * b[2], a[3] + sign * b[3]];
}

const NAMES: readonly (readonly [Dimension, string])[] = [
  ['length', 'a length'],
  ['time', 'a time'],
  ['power', 'a power'],
  ['energy', 'an energy'],
  ['energyPerLength', 'an energy per length'],
  ['mass', 'a mass'],
  ['pressure', 'a pressure'],
  ['frequency', 'a frequency'],
  ['speed', 'a speed'],
  ['temperature', 'a temperature'],
];

/** The kind in words, as in "a length". */
export function kindName(kind: Kind): string {
  if (kindsEqual(kind, PLAIN)) return 'a plain number';
  const known = NAMES.find(([dimension]) => kindsEqual(OF_DIMENSION[dimension], kind));
  return known === undefined ? 'another kind of quantity' : known[1];
}

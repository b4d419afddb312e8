import { quantityText } from './text.ts';

/** Quantities in the sentences of strategy/: metric, each in one unit, with the figures that somebody would speak. */

/** A length (m) in millimetres to a tenth, as in "3.0 mm". */
export const millimetres = (length: number): string => quantityText(length, 'length', 'metric', { decimals: 1 }).text;

/** A time (s) in seconds to a tenth, as in "2.5 s". */
export const seconds = (time: number): string => quantityText(time, 'time', 'metric', { unit: 's', decimals: 1 }).text;

/** A temperature (K) in whole degrees Celsius, as in "250 °C". */
export const celsius = (kelvin: number): string => quantityText(kelvin, 'temperature', 'metric', { decimals: 0 }).text;

/** An angle (rad) in whole degrees, as in "45°". */
export const degrees = (angle: number): string => quantityText(angle, 'angle', 'metric', { decimals: 0 }).text;

/** A share (0…1) in per cent, as in "5.6 %". */
export const percent = (share: number): string => quantityText(share, 'ratio', 'metric').text;

import { quantityText } from '../units/text.ts';

/** A length (m) in millimetres to a hundredth, as in "0.33 mm": what a finished corner is off the drawing. */
export const hundredths = (length: number): string => quantityText(length, 'length', 'metric', { decimals: 2 }).text;

import { quantityText, type UnitSystem } from '@/strategy/units/index.ts';

/** Plate thickness, kept in whole µm, as it is read: "20 mm", "0.7874 in". */
export const thicknessText = (micrometres: number, system: UnitSystem): string =>
  quantityText(micrometres * 1e-6, 'length', system).text;

/** A half-open range of thickness as it is read: "18 to below 22 mm". */
export function thicknessRangeText(range: { readonly min: number; readonly max: number }, system: UnitSystem): string {
  const from = quantityText(range.min * 1e-6, 'length', system).number;
  return `${from} to below ${thicknessText(range.max, system)}`;
}

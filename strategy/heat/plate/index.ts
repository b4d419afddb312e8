export type { PierceHeat } from './heat-drops.ts';
export type { PlateGrid, PlateShape } from './plate-grid.ts';
export type { PlateField, PlateProgress, PlateQuestion } from './plate-field.ts';
export { plateField, PlateFieldCancelled, usualLoss } from './plate-field.ts';

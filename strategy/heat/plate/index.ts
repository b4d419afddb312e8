export type { PierceHeat } from './heat-drops.ts';
export type { PlateGrid, PlateShape } from './plate-grid.ts';
export type { PlateQuestion } from './plate-question.ts';
export { usualLoss } from './plate-question.ts';
export type { PlateField, PlateProgress } from './plate-field.ts';
export { plateField, PlateFieldCancelled } from './plate-field.ts';

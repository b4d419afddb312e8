export type {
  Aside,
  DrawingAnswers,
  DrawingContour,
  DrawingLayer,
  DrawingQuestion,
  DrawingReading,
  NoDrawing,
  OpenChain,
  Size,
} from './reading.ts';
export { drawingRead } from './reading.ts';
export type { Noted } from './source.ts';
export type { Repair } from './clean.ts';
export type { Gap } from './gaps.ts';
export type { ContourRole } from './nest.ts';
export type { DrawingUnit } from './unit.ts';
export { plausibleSize, unitLength } from './unit.ts';
export { drawingLimits } from './limits.ts';

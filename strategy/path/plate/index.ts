export type { PlacementArray } from './array.ts';
export { placementArray } from './array.ts';
export type { LayoutProblem, LayoutProblems, LayoutRoom } from './checks.ts';
export { layoutProblems, mostProblems } from './checks.ts';
export type { OrderChange } from './cut-order.ts';
export {
  contourMoved,
  cutOrder,
  cutOrderFault,
  cutOrderKept,
  partMoved,
  partSequence,
  startOf,
  travelLength,
} from './cut-order.ts';
export type { LayoutAsked, LayoutJudgement } from './judge.ts';
export { layoutJudged } from './judge.ts';
export type { PlateOutline } from './outline.ts';
export { plateRectangle, plateRemnant } from './outline.ts';
export type { LayoutPart, PartContour, PlacedContour, PlacedPart, Placement } from './placement.ts';
export { partPlaced, partSize, partsPlaced } from './placement.ts';

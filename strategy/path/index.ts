export type { Box, Point } from './point.ts';
export {
  boxGrow,
  boxUnion,
  emptyBox,
  pointAdd,
  pointCross,
  pointDistance,
  pointDot,
  pointLeft,
  pointLength,
  pointRotate,
  pointScale,
  pointSubtract,
  pointUnit,
} from './point.ts';
export type { Arc, Line, Segment } from './segment.ts';
export {
  arcOf,
  circleOf,
  lineBetween,
  pathLength,
  segmentBox,
  segmentEnd,
  segmentFromBulge,
  segmentLength,
  segmentPart,
  segmentPointAt,
  segmentReverse,
  segmentRotate,
  segmentShift,
  segmentStart,
  segmentTangentAt,
} from './segment.ts';
export type { Nearest } from './distance.ts';
export { segmentDistance, segmentMeetings, segmentNearestPoint, segmentPointDistance } from './distance.ts';
export type { Contour } from './contour.ts';
export {
  contourArea,
  contourBox,
  contourContains,
  contourLength,
  contourReverse,
  contourRotate,
  contourShift,
} from './contour.ts';
export type { SvgOptions } from './svg.ts';
export { svgContourData, svgPathData } from './svg.ts';
export { pathPart, pathWithoutLast } from './path-part.ts';
export type { Corner, Fillet } from './corner.ts';
export { contourCorners, cornerInward, cornerOfPath, cornerWait, largestFillet, smallestBreak } from './corner.ts';
export type { FlatLoop, Loop, LoopCorner, Slug, TangentLoop } from './loop.ts';
export {
  flatLoopAt,
  flatLoopDepth,
  flatLoopLength,
  flatLoopReach,
  loopAt,
  loopExtension,
  loopLength,
  loopReach,
  loopSlug,
} from './loop.ts';
export type { FieldContour, FieldLeadIn, FieldPlate, Obstacle, ObstacleField } from './obstacles.ts';
export { obstacleField } from './obstacles.ts';
export type { LoopBlock, LoopFit, LoopRoom, LoopSurroundings, PlacedLoop } from './loop-fit.ts';
export { leavesPlate, loopFits, loopFitsIn, loopRoom } from './loop-fit.ts';
export type { FlatExtensions, LoopBounds, LoopRadii } from './loop-radius.ts';
export { flatExtensions, loopRadii } from './loop-radius.ts';
export type { EasedPiece } from './ease.ts';
export { easedInto, easedOutOf, easedShare } from './ease.ts';
export type { CornerRound } from './round.ts';
export { arcRound, contourRounded, cornerRound, roundDeviation, roundRadius, roundTangent } from './round.ts';

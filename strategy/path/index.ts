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
export type { Corner } from './corner.ts';
export { contourCorners, cornerInward, cornerOfPath, smallestBreak } from './corner.ts';
export type { Loop, LoopCorner, Slug } from './loop.ts';
export { loopAt, loopExtension, loopLength, loopReach, loopSlug } from './loop.ts';
export type { LoopBlock, LoopFit, LoopSurroundings, Obstacle, ObstacleField } from './loop-fit.ts';
export { loopFits, obstacleField } from './loop-fit.ts';
export type { LoopBounds, LoopRadii } from './loop-radius.ts';
export { loopRadii } from './loop-radius.ts';

import {
  lineBetween,
  pointDistance,
  segmentBox,
  segmentEnd,
  segmentStart,
  type Point,
  type Segment,
} from '@/strategy/path/index.ts';

/** Drawings of fewer pieces are always drawn as they are. */
const fewPieces = 600;
/** What can't be told apart on a screen, px. */
const fineness = 0.5;

/**
 * How far what is drawn at a scale (px a metre) may lie from the drawing, m: half a pixel at most. The same for all scales between two powers of
 * two, so that enlarging seldom asks for new paths; 0 for drawings of few pieces.
 */
export function detailTolerance(scale: number, pieces: number): number {
  if (pieces < fewPieces || !(scale > 0)) return 0;
  return fineness / 2 ** Math.ceil(Math.log2(scale));
}

/**
 * The path without what is smaller than the tolerance, m: a run of pieces that stays within it of the run's beginning becomes one straight piece, so
 * nothing drawn lies farther off than that. Everything else stays as it is.
 */
export function pathThinned(path: readonly Segment[], tolerance: number): readonly Segment[] {
  if (!(tolerance > 0)) return path;
  const kept: Segment[] = [];
  let from: Point | null = null;
  let to: Point | null = null;
  const close = () => {
    if (from && to && (from.x !== to.x || from.y !== to.y)) kept.push(lineBetween(from, to));
    from = null;
  };
  for (const segment of path) {
    const start: Point = from ?? segmentStart(segment);
    if (staysWithin(segment, start, tolerance)) {
      from = start;
      to = segmentEnd(segment);
      continue;
    }
    close();
    // this piece may itself begin the next run
    const own = segmentStart(segment);
    if (staysWithin(segment, own, tolerance)) {
      from = own;
      to = segmentEnd(segment);
    } else kept.push(segment);
  }
  close();
  return kept;
}

function staysWithin(segment: Segment, centre: Point, reach: number): boolean {
  if (segment.kind === 'line') {
    return pointDistance(segment.start, centre) <= reach && pointDistance(segment.end, centre) <= reach;
  }
  const box = segmentBox(segment);
  return (
    Math.hypot(
      Math.max(centre.x - box.minX, box.maxX - centre.x),
      Math.max(centre.y - box.minY, box.maxY - centre.y),
    ) <= reach
  );
}

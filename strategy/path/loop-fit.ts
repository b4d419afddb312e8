import Flatbush from 'flatbush';
import { millimetres } from '../units/said.ts';
import type { Contour } from './contour.ts';
import { contourBox, contourContains } from './contour.ts';
import type { Nearest } from './distance.ts';
import { segmentDistance } from './distance.ts';
import type { Loop } from './loop.ts';
import type { Box, Point } from './point.ts';
import { boxGrow } from './point.ts';
import type { Segment } from './segment.ts';
import { segmentBox, segmentLength, segmentPart, segmentStart } from './segment.ts';

/** A finished edge that a loop must stay clear of. */
export type Obstacle = { readonly contourId: string; readonly name: string; readonly segment: Segment };

/** All finished edges of a plate with an index of their boxes. */
export type ObstacleField = {
  readonly contours: readonly { readonly name: string; readonly contour: Contour; readonly box: Box }[];
  readonly obstacles: readonly Obstacle[];
  readonly index: Flatbush | null;
};

/** The field of finished edges of contours; `name` is how a sentence calls the contour ("hole 3"). */
export function obstacleField(
  contours: readonly { readonly id: string; readonly name: string; readonly contour: Contour }[],
): ObstacleField {
  const obstacles = contours.flatMap(({ id, name, contour }) =>
    contour.segments.map((segment) => ({ contourId: id, name, segment })),
  );
  const boxed = contours.map(({ name, contour }) => ({ name, contour, box: contourBox(contour) }));
  if (obstacles.length === 0) return { contours: boxed, obstacles, index: null };
  const index = new Flatbush(obstacles.length);
  for (const { segment } of obstacles) {
    const box = segmentBox(segment);
    index.add(box.minX, box.minY, box.maxX, box.maxY);
  }
  index.finish();
  return { contours: boxed, obstacles, index };
}

/** What a loop is tried against. Lengths in m. */
export type LoopSurroundings = {
  readonly field: ObstacleField;
  /** Contour the loop belongs to. */
  readonly contourId: string;
  readonly kerfWidth: number;
  /** Least free width between the loop's kerf and anything else. */
  readonly clearance: number;
  /** Outline of the plate: a rectangle, a contour, or null when there is no plate to keep to. */
  readonly plate: Box | Contour | null;
  /** Loops already placed. */
  readonly loops: readonly { readonly name: string; readonly loop: Loop }[];
};

/** What stands in a loop's way. */
export type LoopBlock = 'part' | 'contour' | 'plate' | 'loop';

export type LoopFit =
  | { readonly kind: 'fits' }
  | { readonly kind: 'none'; readonly why: string; readonly what: LoopBlock; readonly at: Point };

/** The cut beside a loop's own corner leaves this share of half a kerf to the rounding of curved edges taken by their tangents. */
const tangentSlack = 0.02;

/** Rounding of coordinates that is no contact, m. */
const rounding = 1e-9;

/**
 * Whether the loop keeps clear of everything, judged on exact distances of lines and arcs from the middle of its kerf:
 * - its own part: kerf/2 + clearance, but beside the corner it starts from, where the part is as near as the kerf itself, kerf/2;
 * - other contours: one kerf more, since they are cut too and the free width is counted between the kerfs;
 * - the plate's edge: kerf/2 + clearance; another loop: kerf + clearance.
 */
export function loopFits(loop: Loop, around: LoopSurroundings): LoopFit {
  const half = around.kerfWidth / 2;
  const needed = half + around.clearance;
  const pieces = loopPieces(loop, needed);

  const outside = pieces.map((piece) => leavesPlate(piece.segment, around.plate, needed)).find((at) => at !== null);
  if (outside)
    return blocked('plate', outside, `the loop would come within ${millimetres(around.clearance)} of the plate's edge`);

  const within = materialAt(around.field, segmentStart(loop.segments[0]));
  if (within) return blocked('contour', segmentStart(loop.segments[0]), `the corner lies within ${within}`);

  const { index, obstacles } = around.field;
  for (const { segment, besideCorner } of index ? pieces : []) {
    const widest = needed + around.kerfWidth;
    const box = boxGrow(segmentBox(segment), widest);
    for (const i of index?.search(box.minX, box.minY, box.maxX, box.maxY) ?? []) {
      const obstacle = obstacles[i];
      if (!obstacle) continue;
      const own = obstacle.contourId === around.contourId;
      const least = own ? (besideCorner ? half * (1 - tangentSlack) : needed) : widest;
      const found = segmentDistance(segment, obstacle.segment);
      if (found.distance >= least - rounding) continue;
      return own
        ? blocked('part', found.onSecond, `the loop would come too near its own contour: ${room(found, half)}`)
        : blocked('contour', found.onSecond, `${obstacle.name} is in the way: ${room(found, 1.5 * around.kerfWidth)}`);
    }
  }
  for (const other of around.loops) {
    for (const { segment } of pieces) {
      for (const theirs of other.loop.segments) {
        const found = segmentDistance(segment, theirs);
        if (found.distance >= around.kerfWidth + around.clearance - rounding) continue;
        return blocked('loop', found.onSecond, `${other.name} is in the way: ${room(found, around.kerfWidth)}`);
      }
    }
  }
  return { kind: 'fits' };
}

/** Name of the smallest contour around a place that is steel to be kept, or null where it is scrap: inside an even number of contours. */
function materialAt({ contours }: ObstacleField, p: Point): string | null {
  const around = contours.filter(
    ({ contour, box }) =>
      p.x >= box.minX && p.x <= box.maxX && p.y >= box.minY && p.y <= box.maxY && contourContains(contour, p),
  );
  if (around.length % 2 === 0) return null;
  const area = (box: Box) => (box.maxX - box.minX) * (box.maxY - box.minY);
  return around.reduce((least, c) => (area(c.box) < area(least.box) ? c : least)).name;
}

/** The loop in pieces; those marked run beside the corner, where the part can be no farther than the kerf is wide. */
function loopPieces(loop: Loop, needed: number): { segment: Segment; besideCorner: boolean }[] {
  const [out, arc, back] = loop.segments;
  const angle = Math.abs(arc.sweep) - Math.PI;
  // beyond a blunt corner the extension leaves the second edge only at the slope sin β
  const slope = angle > Math.PI / 2 ? Math.sin(angle) : 1;
  const share = Math.min(1, needed / slope / segmentLength(out));
  const pieces = [
    { segment: segmentPart(out, 0, share), besideCorner: true },
    { segment: arc, besideCorner: false },
    { segment: segmentPart(back, 1 - share, 1), besideCorner: true },
  ];
  if (share < 1) {
    pieces.push({ segment: segmentPart(out, share, 1), besideCorner: false });
    pieces.push({ segment: segmentPart(back, 0, 1 - share), besideCorner: false });
  }
  return pieces;
}

/** Where a segment lies outside the plate or comes nearer to its edge than `needed` m, or null. */
export function leavesPlate(segment: Segment, plate: Box | Contour | null, needed: number): Point | null {
  if (plate === null) return null;
  if ('segments' in plate) {
    if (!contourContains(plate, segmentStart(segment))) return segmentStart(segment);
    for (const edge of plate.segments) {
      const found = segmentDistance(segment, edge);
      if (found.distance < needed - rounding) return found.onSecond;
    }
    return null;
  }
  const box = segmentBox(segment);
  const middle = { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 };
  if (box.minX - needed < plate.minX - rounding) return { x: plate.minX, y: middle.y };
  if (box.maxX + needed > plate.maxX + rounding) return { x: plate.maxX, y: middle.y };
  if (box.minY - needed < plate.minY - rounding) return { x: middle.x, y: plate.minY };
  if (box.maxY + needed > plate.maxY + rounding) return { x: middle.x, y: plate.maxY };
  return null;
}

const blocked = (what: LoopBlock, at: Point, why: string): LoopFit => ({ kind: 'none', what, at, why });

const room = (found: Nearest, taken: number): string =>
  found.distance > taken
    ? `only ${millimetres(found.distance - taken)} would stay between them`
    : 'the loop would cut into it';

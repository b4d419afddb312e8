import { millimetres } from '../units/said.ts';
import type { Contour } from './contour.ts';
import { contourContains } from './contour.ts';
import { segmentDistance } from './distance.ts';
import type { Loop } from './loop.ts';
import type { Obstacle, ObstacleField } from './obstacles.ts';
import { contoursAround, onPlate } from './obstacles.ts';
import type { Box, Point } from './point.ts';
import { boxGrow } from './point.ts';
import type { Line, Segment } from './segment.ts';
import { segmentBox, segmentLength, segmentPart, segmentStart } from './segment.ts';

/** What a loop is tried against. Lengths in m. */
export type LoopSurroundings = {
  readonly field: ObstacleField;
  /** Contour the loop belongs to. */
  readonly contourId: string;
  readonly kerfWidth: number;
  /** Least free width between the loop's kerf and anything else. */
  readonly clearance: number;
  /** Loops that are placed already and may be near. */
  readonly loops: readonly PlacedLoop[];
};

/** A loop that is cut before, as a sentence calls it. */
export type PlacedLoop = { readonly name: string; readonly loop: Loop };

/** What stands in a loop's way; `dropped` is what was cut before and is no longer there. */
export type LoopBlock = 'part' | 'contour' | 'plate' | 'loop' | 'lead-in' | 'dropped';

export type LoopFit =
  | { readonly kind: 'fits' }
  | { readonly kind: 'none'; readonly why: string; readonly what: LoopBlock; readonly at: Point };

/** All that loops of one corner can meet, found once for all their sizes. */
export type LoopRoom = {
  readonly around: LoopSurroundings;
  /** Number of the own contour in the cut order. */
  readonly own: number;
  /** Why no loop of this corner fits, whatever its size. */
  readonly blocked: LoopFit | null;
  readonly near: readonly Obstacle[];
};

/** The cut beside a loop's own corner leaves this share of half a kerf to the rounding of curved edges taken by their tangents. */
const tangentSlack = 0.02;

/** Rounding that is no contact, as a share of the kerf: about a nanometre. */
const contact = 1e-6;

/** Rounding of coordinates beside a plate's edge that is no contact, m. */
const rounding = 1e-9;

/** What loops that start in a place and reach no farther than `reach` (m) can meet. Throws RangeError when the field has no such contour. */
export function loopRoom(start: Point, reach: number, around: LoopSurroundings): LoopRoom {
  const { field, contourId, kerfWidth, clearance } = around;
  const own = field.orderOf.get(contourId);
  if (own === undefined) throw new RangeError(`there is no contour ${contourId} in the field`);
  const blocked = startBlocked(start, own, field);
  const by = reach + 1.5 * kerfWidth + clearance;
  const box = { minX: start.x - by, minY: start.y - by, maxX: start.x + by, maxY: start.y + by };
  const found = blocked ? [] : (field.index?.search(box.minX, box.minY, box.maxX, box.maxY) ?? []);
  // the index finds in the order of its tree; of two things in the way the one cut first is named
  const near = found.sort((a, b) => a - b).flatMap((i) => field.obstacles[i] ?? []);
  return { around, own, blocked, near };
}

/** A corner off the plate, in steel that is to be kept, or in what has dropped out already. */
function startBlocked(start: Point, own: number, field: ObstacleField): LoopFit | null {
  if (!onPlate(field, start)) return blocked('plate', start, "the corner lies outside the plate's edge");
  const around = contoursAround(field, start);
  const fallen = around.find((order) => order < own);
  if (fallen !== undefined) {
    const { name } = field.contours[fallen] ?? { name: 'the contour around it' };
    return blocked('dropped', start, `${name}, around this corner, is cut before and has dropped out: ${nothingThere}`);
  }
  if (around.length % 2 === 0) return null;
  const boxArea = (order: number) => {
    const { box } = field.contours[order] ?? { box: { minX: 0, minY: 0, maxX: Infinity, maxY: Infinity } };
    return (box.maxX - box.minX) * (box.maxY - box.minY);
  };
  const smallest = around.reduce((least, order) => (boxArea(order) < boxArea(least) ? order : least));
  return blocked('contour', start, `the corner lies within ${field.contours[smallest]?.name ?? 'a part'}`);
}

const nothingThere = 'there is nothing to burn, and the cut would start again at the far edge';

/** Whether a loop keeps clear of everything; see `loopFitsIn`. */
export const loopFits = (loop: Loop, around: LoopSurroundings): LoopFit =>
  loopFitsIn(loop, loopRoom(loop.segments[0].start, loop.reach, around));

/**
 * Whether the loop keeps clear of everything, judged on exact distances of lines and arcs from the middle of its kerf:
 * - its own part: kerf/2 + clearance, but beside the corner it starts from, where the part is as near as the kerf itself, kerf/2;
 * - other contours: one kerf more, since they are cut too and the free width is counted between the kerfs;
 * - the plate's edge: kerf/2 + clearance; lead-ins and other loops: kerf + clearance; a pierce's crater: kerf/2 + clearance from its rim.
 * What was cut before has dropped out: a loop that would run into it is refused for that reason.
 */
export function loopFitsIn(loop: Loop, room: LoopRoom): LoopFit {
  if (room.blocked) return room.blocked;
  const { kerfWidth, clearance, field, loops } = room.around;
  const half = kerfWidth / 2;
  const needed = half + clearance;
  const slack = contact * kerfWidth;
  const pieces = loopPieces(loop, needed);

  if (field.plate && 'minX' in field.plate) {
    for (const { box } of pieces) {
      const at = leavesRectangle(box, field.plate, needed - slack);
      if (at) return blocked('plate', at, tooNearThePlatesEdge(clearance));
    }
  }
  for (const obstacle of room.near) {
    for (const { segment, box, besideCorner } of pieces) {
      const least = leastDistance(obstacle, room, besideCorner);
      if (apart(box, obstacle.box, least)) continue;
      const found = segmentDistance(segment, obstacle.segment);
      if (found.distance - obstacle.radius >= least - slack) continue;
      return inTheWay(obstacle, found.distance - obstacle.radius, found.onSecond, room);
    }
  }
  for (const other of loops) {
    for (const theirs of other.loop.segments) {
      const theirBox = segmentBox(theirs);
      for (const { segment, box } of pieces) {
        if (apart(box, theirBox, kerfWidth + clearance)) continue;
        const found = segmentDistance(segment, theirs);
        if (found.distance >= kerfWidth + clearance - slack) continue;
        return found.distance > kerfWidth
          ? blocked('loop', found.onSecond, `${other.name} is in the way: ${roomLeft(found.distance - kerfWidth)}`)
          : blocked(
              'dropped',
              found.onSecond,
              `${other.name} is cut before and its slug has dropped out: ${nothingThere}`,
            );
      }
    }
  }
  return { kind: 'fits' };
}

function leastDistance({ kind, order }: Obstacle, { own, around }: LoopRoom, besideCorner: boolean): number {
  const half = around.kerfWidth / 2;
  if (kind === 'lead-in') return around.kerfWidth + around.clearance;
  if (kind !== 'edge') return half + around.clearance;
  if (order !== own) return 3 * half + around.clearance;
  return besideCorner ? half * (1 - tangentSlack) : half + around.clearance;
}

function inTheWay({ kind, order, name }: Obstacle, distance: number, at: Point, { own, around }: LoopRoom): LoopFit {
  const { kerfWidth, clearance } = around;
  if (kind === 'plate') return blocked('plate', at, tooNearThePlatesEdge(clearance));
  if (kind === 'edge' && order === own) {
    return blocked('part', at, `the loop would come too near its own contour: ${roomLeft(distance - kerfWidth / 2)}`);
  }
  const taken = kind === 'edge' ? 1.5 * kerfWidth : kind === 'lead-in' ? kerfWidth : kerfWidth / 2;
  if (kind === 'edge' && order < own && distance <= taken) {
    return blocked('dropped', at, `${name} is cut before and has dropped out: ${nothingThere}`);
  }
  return blocked(kind === 'edge' ? 'contour' : 'lead-in', at, `${name} is in the way: ${roomLeft(distance - taken)}`);
}

const tooNearThePlatesEdge = (clearance: number): string =>
  `the loop would come within ${millimetres(clearance)} of the plate's edge`;

const roomLeft = (left: number): string =>
  left > 0 ? `only ${millimetres(left)} would stay between them` : 'the loop would cut into it';

const blocked = (what: LoopBlock, at: Point, why: string): LoopFit => ({ kind: 'none', what, at, why });

/** Whether two boxes lie farther apart than a distance on one axis alone. */
const apart = (a: Box, b: Box, distance: number): boolean =>
  a.minX - b.maxX > distance || b.minX - a.maxX > distance || a.minY - b.maxY > distance || b.minY - a.maxY > distance;

type LoopPiece = { readonly segment: Segment; readonly box: Box; readonly besideCorner: boolean };

/** The loop in pieces; those marked run beside the corner, where the part can be no farther than the kerf is wide. */
function loopPieces(loop: Loop, needed: number): LoopPiece[] {
  const { segments } = loop;
  const [out, back] = [segments[0], lastOf(loop)];
  // both arcs of a flat loop turn half as far each
  const turn = loop.shape === 'tangent' ? Math.abs(loop.segments[1].sweep) : 2 * Math.abs(loop.segments[1].sweep);
  const angle = turn - Math.PI;
  // beyond a blunt corner the extension leaves the second edge only at the slope sin β
  const slope = angle > Math.PI / 2 ? Math.sin(angle) : 1;
  const share = Math.min(1, needed / slope / segmentLength(out));
  const piece = (segment: Segment, besideCorner: boolean) => ({ segment, box: segmentBox(segment), besideCorner });
  const pieces = [
    piece(segmentPart(out, 0, share), true),
    ...segments.slice(1, -1).map((segment) => piece(segment, false)),
    piece(segmentPart(back, 1 - share, 1), true),
  ];
  if (share < 1) {
    pieces.push(piece(segmentPart(out, share, 1), false));
    pieces.push(piece(segmentPart(back, 0, 1 - share), false));
  }
  return pieces;
}

const lastOf = (loop: Loop): Line => (loop.shape === 'tangent' ? loop.segments[2] : loop.segments[4]);

/** Where a segment comes nearer than `needed` m to the edge of a plate, a rectangle or an outline, or lies outside it; null where it does not. */
export function leavesPlate(segment: Segment, plate: Box | Contour | null, needed: number): Point | null {
  if (plate === null) return null;
  if ('minX' in plate) return leavesRectangle(segmentBox(segment), plate, needed - rounding);
  if (!contourContains(plate, segmentStart(segment))) return segmentStart(segment);
  for (const edge of plate.segments) {
    const found = segmentDistance(segment, edge);
    if (found.distance < needed - rounding) return found.onSecond;
  }
  return null;
}

function leavesRectangle(box: Box, plate: Box, needed: number): Point | null {
  const middle = { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 };
  const grown = boxGrow(box, needed);
  if (grown.minX < plate.minX) return { x: plate.minX, y: middle.y };
  if (grown.maxX > plate.maxX) return { x: plate.maxX, y: middle.y };
  if (grown.minY < plate.minY) return { x: middle.x, y: plate.minY };
  if (grown.maxY > plate.maxY) return { x: middle.x, y: plate.maxY };
  return null;
}

import type { Box, Point } from '../../path/point.ts';
import { segmentBox, segmentLength, segmentPart, segmentPointAt, segmentTangentAt } from '../../path/segment.ts';
import type { HeatedPiece } from '../path-heat.ts';

/** Heat that a piercing leaves at a place all at once. */
export type PierceHeat = { readonly at: Point; readonly time: number; readonly heat: number };

/** Heat that is laid on the grid at one place: J per metre of thickness, at its mean time, s. */
export type HeatDrop = {
  readonly x: number;
  readonly y: number;
  readonly time: number;
  readonly heat: number;
  /** Variances that the drop's own length gives it, m². */
  readonly alongX: number;
  readonly alongY: number;
  /** Unit vector of travel; none where the source stands still. */
  readonly tangent: Point | null;
};

/** The parts of pieces that lie within a moving window of time, in drops no longer than `length`, m, and no longer on their way than `lasting`, s. */
export function dropsBetween(
  pieces: readonly HeatedPiece[],
  first: number,
  after: number,
  until: number,
  length: number,
  lasting: number,
  laid: (drop: HeatDrop) => void,
): void {
  for (let n = first; n < pieces.length; n++) {
    const piece = pieces[n];
    if (!piece || piece.from >= until) return;
    const { segment, from, to, powerPerLength } = piece;
    const [start, end] = [Math.max(from, after), Math.min(to, until)];
    if (!(end > start) || powerPerLength === 0) continue;
    const whole = segmentLength(segment);
    const travelled = (whole * (end - start)) / (to - from);
    const count = Math.max(1, Math.ceil(travelled / length), Math.ceil((end - start) / lasting));
    const time = (end - start) / count;
    const square = (travelled / count) ** 2 / 12;
    for (let k = 0; k < count; k++) {
      const middle = start + (k + 0.5) * time;
      const share = (middle - from) / (to - from);
      const { x, y } = segmentPointAt(segment, share);
      const tangent = whole > 0 ? segmentTangentAt(segment, share) : null;
      laid({
        x,
        y,
        time: middle,
        heat: powerPerLength * time,
        alongX: tangent ? square * tangent.x * tangent.x : 0,
        alongY: tangent ? square * tangent.y * tangent.y : 0,
        tangent,
      });
    }
  }
}

/** Length of the bits that a piece is taken in where it leaves the plate, m. */
const clipped = 2e-3;

/**
 * The pieces as far as they lie in the plate, and the heat of the rest, J per metre of thickness: a cut that runs off the plate warms air. Pieces that leave are looked at in bits of 2 mm.
 */
export function piecesInside(
  pieces: readonly HeatedPiece[],
  plate: Box,
  steelAt: ((p: Point) => boolean) | null,
): { readonly inside: HeatedPiece[]; readonly lost: number } {
  const inside: HeatedPiece[] = [];
  let lost = 0;
  for (const piece of pieces) {
    const { segment, from, to, powerPerLength } = piece;
    const box = segmentBox(segment);
    const within = box.minX >= plate.minX && box.minY >= plate.minY && box.maxX <= plate.maxX && box.maxY <= plate.maxY;
    if (within && !steelAt) {
      inside.push(piece);
      continue;
    }
    const bits = Math.max(1, Math.ceil(segmentLength(segment) / clipped));
    const steel: boolean[] = [];
    for (let k = 0; k < bits; k++) {
      const p = segmentPointAt(segment, (k + 0.5) / bits);
      steel.push(inBox(plate, p) && (!steelAt || steelAt(p)));
    }
    if (!steel.includes(false)) {
      inside.push(piece);
      continue;
    }
    let k = 0;
    while (k < bits) {
      let next = k;
      while (next < bits && steel[next] === steel[k]) next++;
      const [a, b] = [k / bits, next / bits];
      const part = { segment: segmentPart(segment, a, b), from: from + a * (to - from), to: from + b * (to - from) };
      if (steel[k]) inside.push({ ...part, powerPerLength });
      else lost += powerPerLength * (part.to - part.from);
      k = next;
    }
  }
  return { inside, lost };
}

const inBox = ({ minX, minY, maxX, maxY }: Box, { x, y }: Point): boolean =>
  x >= minX && x <= maxX && y >= minY && y <= maxY;

import type { Point } from '../../path/point.ts';
import type { Segment } from '../../path/segment.ts';
import { lineBetween, segmentLength } from '../../path/segment.ts';
import type { HeatedPiece } from '../path-heat.ts';

/** Ends that are nearer than this are one, m; times that are, s. */
const touch = 1e-7;
/** Heat per length that differs by less, as a share, is the same. */
const alike = 1e-3;
/** Two directions of travel whose sine differs by less are one. */
const straight = 1e-6;

/**
 * The pieces with those that go on along the same line or arc joined to one, as long as a source that goes along it evenly passes no place more than `off`, s, too soon or too late: a
 * clock parts a path wherever its speed changes, which the plate as a whole doesn't feel. All heat stays where it was.
 */
export function joinedPieces(pieces: readonly HeatedPiece[], off: number): HeatedPiece[] {
  const joined: HeatedPiece[] = [];
  /** The last one so far, and where and when its source was where it was joined: m from its start, s. */
  let last: HeatedPiece | null = null;
  let length = 0;
  let joints: { place: number; time: number }[] = [];
  for (const piece of pieces) {
    const own = segmentLength(piece.segment);
    const segment: Segment | null =
      last && goesOn(last, length, piece, own) ? together(last.segment, piece.segment) : null;
    if (last && segment) {
      const from: number = last.from;
      const tried = [...joints, { place: length, time: last.to }];
      const slowness = (piece.to - from) / (length + own);
      if (tried.every(({ place, time }) => Math.abs(time - from - place * slowness) <= off)) {
        const heat: number = last.powerPerLength * (last.to - from) + piece.powerPerLength * (piece.to - piece.from);
        last = { segment, from, to: piece.to, powerPerLength: heat / (piece.to - from) };
        length += own;
        joints = tried;
        continue;
      }
    }
    if (last) joined.push(last);
    last = piece;
    length = own;
    joints = [];
  }
  if (last) joined.push(last);
  return joined;
}

/** Does a piece follow on another without a pause, both leaving as much heat in a metre? */
function goesOn(last: HeatedPiece, length: number, piece: HeatedPiece, own: number): boolean {
  if (!(length > 0 && own > 0 && piece.from - last.to <= touch)) return false;
  const before = (last.powerPerLength * (last.to - last.from)) / length;
  const after = (piece.powerPerLength * (piece.to - piece.from)) / own;
  return Math.abs(before - after) <= alike * Math.max(before, after);
}

/** Two segments as one where the second goes on along the first, or null. */
function together(a: Segment, b: Segment): Segment | null {
  if (a.kind === 'line' && b.kind === 'line') {
    const [ux, uy] = [a.end.x - a.start.x, a.end.y - a.start.y];
    const [wx, wy] = [b.end.x - b.start.x, b.end.y - b.start.y];
    const sizes = Math.hypot(ux, uy) * Math.hypot(wx, wy);
    if (!near(a.end, b.start) || Math.abs(ux * wy - uy * wx) > straight * sizes || ux * wx + uy * wy < 0) return null;
    return lineBetween(a.start, b.end);
  }
  if (a.kind === 'arc' && b.kind === 'arc') {
    const sweep = a.sweep + b.sweep;
    const same = near(a.centre, b.centre) && Math.abs(a.radius - b.radius) <= touch && a.sweep * b.sweep > 0;
    const meets = Math.abs(a.startAngle + a.sweep - b.startAngle) * a.radius <= touch;
    return same && meets && Math.abs(sweep) <= 2 * Math.PI ? { ...a, sweep } : null;
  }
  return null;
}

const near = (a: Point, b: Point): boolean => Math.abs(a.x - b.x) <= touch && Math.abs(a.y - b.y) <= touch;

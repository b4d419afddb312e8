import type { Point } from '@/strategy/path/index.ts';

/** A mark on a drawing, in px of the frame. */
export type PlacedMark = { id: string; x: number; y: number; full: boolean };

/**
 * Which marks have room to be drawn in full and which shrink to a dot: those first in the list win, so the caller says what matters.
 * `apart` is the least distance between two full ones, px.
 */
export function marksSpread(marks: readonly { id: string; x: number; y: number }[], apart: number): PlacedMark[] {
  const taken: { x: number; y: number }[] = [];
  return marks.map((mark) => {
    const full = taken.every((other) => Math.hypot(other.x - mark.x, other.y - mark.y) >= apart);
    if (full) taken.push(mark);
    return { ...mark, full };
  });
}

/** The mark nearest to a tap, within a finger's reach (px), or none. */
export function markNearest(marks: readonly PlacedMark[], at: Point, reach: number): string | null {
  let best: string | null = null;
  let least = reach;
  for (const mark of marks) {
    const distance = Math.hypot(mark.x - at.x, mark.y - at.y);
    if (distance < least) {
      least = distance;
      best = mark.id;
    }
  }
  return best;
}

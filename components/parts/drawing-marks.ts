import type { Point } from '@/strategy/path/index.ts';

/** A mark on a drawing, in px of the frame. */
export type PlacedMark = { id: string; x: number; y: number; full: boolean };

/**
 * Which marks have room to be drawn in full and which shrink to a dot: those first in the list win, so the caller says what matters.
 * `apart` is the least distance between two full ones, px; `most` is how many are full at all.
 */
export function marksSpread(
  marks: readonly { id: string; x: number; y: number }[],
  apart: number,
  most = Infinity,
): PlacedMark[] {
  // what is nearer than `apart` lies in the same cell or in one beside it
  const cells = new Map<string, { x: number; y: number }[]>();
  let taken = 0;
  return marks.map((mark) => {
    const column = Math.floor(mark.x / apart);
    const row = Math.floor(mark.y / apart);
    let full = taken < most;
    for (let i = column - 1; full && i <= column + 1; i++) {
      for (let j = row - 1; full && j <= row + 1; j++) {
        full = (cells.get(`${i} ${j}`) ?? []).every((other) => Math.hypot(other.x - mark.x, other.y - mark.y) >= apart);
      }
    }
    if (full) {
      taken += 1;
      const cell = `${column} ${row}`;
      const known = cells.get(cell);
      if (known) known.push(mark);
      else cells.set(cell, [mark]);
    }
    return { ...mark, full };
  });
}

/** One path for all dots, which a round pen draws as points; dots that would lie on each other, `apart` px at most, are one. */
export function dotsData(dots: readonly Point[], apart: number): string {
  const seen = new Set<string>();
  let data = '';
  for (const { x, y } of dots) {
    const cell = `${Math.round(x / apart)} ${Math.round(y / apart)}`;
    if (seen.has(cell)) continue;
    seen.add(cell);
    data += `M${x.toFixed(1)} ${y.toFixed(1)}h0`;
  }
  return data;
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

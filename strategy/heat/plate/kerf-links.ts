import type { Arc, Segment } from '../../path/segment.ts';
import { arcCovers } from '../../path/segment.ts';
import type { HeatedPiece } from '../path-heat.ts';
import type { PlateGrid } from './plate-grid.ts';

/**
 * When the way from the middle of each cell to the middle of the next is cut, s: to the right (`right`) and upwards (`up`), row by row. ∞ where no kerf
 * crosses it, −∞ where it leads out of the steel. A path that closes crosses every way out of what it encloses, whatever its shape.
 */
export type KerfLinks = {
  readonly right: Float64Array;
  readonly up: Float64Array;
  /** Number of the piece that cuts it, −1 where none does. */
  readonly rightBy: Int32Array;
  readonly upBy: Int32Array;
};

/** Room of cells: 1 for a whole one. A cell whose border with the next is a kerf reaches as far as that, and no further. */
export type CellRoom = Float64Array;

/** A way between two cells that is cut at a time: `index` of the first cell, to the right or upwards. */
export type LinkCut = {
  readonly time: number;
  readonly index: number;
  readonly upwards: boolean;
  /** Room that the first cell gets from the second, as the kerf isn't half way between their middles. */
  readonly room: number;
};

/**
 * Middles of cells are taken this share of a cell off, so that paths on round numbers, which often run exactly through middles, have a side; neither
 * share is one that a drawing's numbers hit.
 */
const offX = 1.3717e-5;
const offY = 2.1931e-5;

/** The ways between cells, and in the order of time those that the pieces cut. A piece opens its kerf as the source passes. */
export function kerfLinks(
  grid: PlateGrid,
  pieces: readonly HeatedPiece[],
  steel: Uint8Array | null,
): { readonly links: KerfLinks; readonly cuts: readonly LinkCut[] } {
  const { nx, ny, minX, minY, cellX, cellY } = grid;
  const right = new Float64Array(nx * ny).fill(Infinity);
  const up = new Float64Array(nx * ny).fill(Infinity);
  const startX = minX + (0.5 + offX) * cellX;
  const startY = minY + (0.5 + offY) * cellY;
  const rightBy = new Int32Array(nx * ny).fill(-1);
  const upBy = new Int32Array(nx * ny).fill(-1);
  const roomRight = new Float64Array(nx * ny);
  const roomUp = new Float64Array(nx * ny);
  for (let piece = 0; piece < pieces.length; piece++) {
    const one = pieces[piece];
    if (!one) continue;
    const { segment, from, to } = one;
    // a kerf askew crosses rows and columns: each counts by how square it is crossed, both together once
    // columns of middles: what crosses one cuts a way upwards
    crossings(segment, 'x', startX, cellX, nx, (column, share, y) => {
      const row = Math.floor((y - startY) / cellY);
      const index = row * nx + column;
      const time = from + share * (to - from);
      if (row < 0 || row >= ny - 1 || !(time < (up[index] ?? 0))) return;
      up[index] = time;
      upBy[index] = piece;
      roomUp[index] = ((y - startY) / cellY - row - 0.5) * travelAlong(segment, 'x', share) ** 2;
    });
    crossings(segment, 'y', startY, cellY, ny, (row, share, x) => {
      const column = Math.floor((x - startX) / cellX);
      const index = row * nx + column;
      const time = from + share * (to - from);
      if (column < 0 || column >= nx - 1 || !(time < (right[index] ?? 0))) return;
      right[index] = time;
      rightBy[index] = piece;
      roomRight[index] = ((x - startX) / cellX - column - 0.5) * travelAlong(segment, 'y', share) ** 2;
    });
  }
  if (steel) {
    for (let index = 0; index < nx * ny; index++) {
      if (index % nx < nx - 1 && !(steel[index] && steel[index + 1])) right[index] = -Infinity;
      if (index < nx * (ny - 1) && !(steel[index] && steel[index + nx])) up[index] = -Infinity;
    }
  }
  const cuts: LinkCut[] = [];
  for (let index = 0; index < nx * ny; index++) {
    const [toRight, upwards] = [right[index] ?? 0, up[index] ?? 0];
    if (toRight < Infinity) cuts.push({ time: toRight, index, upwards: false, room: roomRight[index] ?? 0 });
    if (upwards < Infinity) cuts.push({ time: upwards, index, upwards: true, room: roomUp[index] ?? 0 });
  }
  cuts.sort((a, b) => a.time - b.time);
  return { links: { right, up, rightBy, upBy }, cuts };
}

/** Calls back with number, share of the segment's length and the other coordinate wherever the segment crosses one of the parallels `start + k·step`, 0 ≤ k < count. */
function crossings(
  segment: Segment,
  axis: 'x' | 'y',
  start: number,
  step: number,
  count: number,
  met: (k: number, share: number, other: number) => void,
): void {
  if (segment.kind === 'arc') {
    arcCrossings(segment, axis, start, step, count, met);
    return;
  }
  const other = axis === 'x' ? 'y' : 'x';
  const a = segment.start[axis];
  const b = segment.end[axis];
  const low = Math.max(0, Math.floor((Math.min(a, b) - start) / step) + 1);
  const high = Math.min(count - 1, Math.floor((Math.max(a, b) - start) / step));
  for (let k = low; k <= high; k++) {
    const share = (start + k * step - a) / (b - a);
    met(k, share, segment.start[other] + share * (segment.end[other] - segment.start[other]));
  }
}

function arcCrossings(
  arc: Arc,
  axis: 'x' | 'y',
  start: number,
  step: number,
  count: number,
  met: (k: number, share: number, other: number) => void,
): void {
  const { centre, radius, startAngle, sweep } = arc;
  const low = Math.max(0, Math.ceil((centre[axis] - radius - start) / step));
  const high = Math.min(count - 1, Math.floor((centre[axis] + radius - start) / step));
  const turn = 2 * Math.PI;
  for (let k = low; k <= high; k++) {
    const along = (start + k * step - centre[axis]) / radius;
    if (Math.abs(along) >= 1) continue;
    const lean = Math.acos(along);
    for (const angle of axis === 'x' ? [lean, -lean] : [Math.PI / 2 - lean, Math.PI / 2 + lean]) {
      if (!arcCovers(arc, angle, 0)) continue;
      const offset = (((sweep > 0 ? angle - startAngle : startAngle - angle) % turn) + turn) % turn;
      const share = Math.min(1, offset / Math.abs(sweep));
      met(k, share, axis === 'x' ? centre.y + radius * Math.sin(angle) : centre.x + radius * Math.cos(angle));
    }
  }
}

/** How much of its travel a source makes along an axis, −1..1. */
function travelAlong(segment: Segment, axis: 'x' | 'y', share: number): number {
  if (segment.kind === 'arc') {
    const angle = segment.startAngle + share * segment.sweep;
    return axis === 'x' ? Math.sin(angle) : Math.cos(angle);
  }
  const { start, end } = segment;
  return (end[axis] - start[axis]) / Math.hypot(end.x - start.x, end.y - start.y);
}

/** Least room of a cell: the compact scheme bears no smaller one beside whole ones. */
const leastRoom = 0.3;

/** What a cut changes of the room of the two cells it parts: what the first gets, as far as the second (or the first) has it to give. */
export function roomGiven(room: CellRoom, { index, upwards, room: wanted }: LinkCut, nx: number): number {
  const next = index + (upwards ? nx : 1);
  const giver = wanted > 0 ? next : index;
  const given = Math.min(Math.abs(wanted), Math.max(0, (room[giver] ?? 0) - leastRoom));
  return wanted > 0 ? given : -given;
}

/** The room of the cells at a moment, s, with `cuts` in the order of time. */
export function roomAt(cells: number, cuts: readonly LinkCut[], nx: number, time: number): CellRoom {
  const room = new Float64Array(cells).fill(1);
  for (const cut of cuts) {
    if (cut.time > time) break;
    const given = roomGiven(room, cut, nx);
    const next = cut.index + (cut.upwards ? nx : 1);
    room[cut.index] = (room[cut.index] ?? 0) + given;
    room[next] = (room[next] ?? 0) - given;
  }
  return room;
}

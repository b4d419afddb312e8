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

/** A way between two cells that is cut at a time: `index` of the first cell, to the right or upwards. */
export type LinkCut = { readonly time: number; readonly index: number; readonly upwards: boolean };

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
  const cut = (links: Float64Array, by: Int32Array, index: number, time: number, piece: number): void => {
    if (!(time < (links[index] ?? 0))) return;
    links[index] = time;
    by[index] = piece;
  };
  for (let piece = 0; piece < pieces.length; piece++) {
    const one = pieces[piece];
    if (!one) continue;
    const { segment, from, to } = one;
    const lasts = to - from;
    // columns of middles: what crosses one cuts a way upwards
    crossings(segment, 'x', startX, cellX, nx, (column, share, y) => {
      const row = Math.floor((y - startY) / cellY);
      if (row >= 0 && row < ny - 1) cut(up, upBy, row * nx + column, from + share * lasts, piece);
    });
    crossings(segment, 'y', startY, cellY, ny, (row, share, x) => {
      const column = Math.floor((x - startX) / cellX);
      if (column >= 0 && column < nx - 1) cut(right, rightBy, row * nx + column, from + share * lasts, piece);
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
    if (toRight < Infinity) cuts.push({ time: toRight, index, upwards: false });
    if (upwards < Infinity) cuts.push({ time: upwards, index, upwards: true });
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

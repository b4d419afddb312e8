import { segmentMeetings } from '../../path/distance.ts';
import type { Point } from '../../path/point.ts';
import type { Segment } from '../../path/segment.ts';
import { lineBetween } from '../../path/segment.ts';
import type { HeatedPiece } from '../path-heat.ts';
import type { KerfLinks } from './kerf-links.ts';
import type { PlateGrid } from './plate-grid.ts';

/** A few cells that kerfs part from all others by the grid's reckoning alone: a tip that lies askew to the rows. */
export type TipBridge = {
  readonly cells: readonly number[];
  /** One of them, and the one beyond the corner between both that no kerf parts it from. */
  readonly cell: number;
  readonly beyond: number;
  /** When the last of their ways was cut, s. */
  readonly since: number;
};

/** Tells which cells lie on a place's side of the kerfs about it. */
export type KerfSides = {
  readonly bridges: readonly TipBridge[];
  /** The cell whose middle is nearest to a place, m, among those about it that no kerf open at `time`, s, parts it from; −1 when there is none. */
  cellBeside(x: number, y: number, time: number): number;
};

/** Cells of a tip that may be parted from the rest by the grid alone: more are a piece of their own. */
const mostInTip = 6;

/** The sides of the kerfs of `pieces`, whose ways on the grid `links` are. */
export function kerfSides(grid: PlateGrid, pieces: readonly HeatedPiece[], links: KerfLinks): KerfSides {
  const { nx, ny, minX, minY, cellX, cellY } = grid;
  const near = new Int32Array(4);
  const middleX = (cell: number): number => minX + ((cell % nx) + 0.5) * cellX;
  const middleY = (cell: number): number => minY + (Math.floor(cell / nx) + 0.5) * cellY;

  /** Notes the pieces that have cut one of the four ways about the corner between four cells by `time`; how many. */
  const about = (lowerLeft: number, time: number): number => {
    const { right, up, rightBy, upBy } = links;
    let count = 0;
    const note = (opened: number, by: number): void => {
      if (opened > time || by < 0) return;
      for (let k = 0; k < count; k++) if (near[k] === by) return;
      near[count++] = by;
    };
    note(right[lowerLeft] ?? Infinity, rightBy[lowerLeft] ?? -1);
    note(right[lowerLeft + nx] ?? Infinity, rightBy[lowerLeft + nx] ?? -1);
    note(up[lowerLeft] ?? Infinity, upBy[lowerLeft] ?? -1);
    note(up[lowerLeft + 1] ?? Infinity, upBy[lowerLeft + 1] ?? -1);
    return count;
  };

  const parted = (count: number, x: number, y: number, cell: number): boolean => {
    for (let k = 0; k < count; k++) {
      const piece = pieces[near[k] ?? -1];
      if (piece && crosses(piece.segment, x, y, middleX(cell), middleY(cell))) return true;
    }
    return false;
  };

  const bridges = tipBridges(grid, links, (cell, beyond, lowerLeft) => {
    const count = about(lowerLeft, Infinity);
    return !parted(count, middleX(cell), middleY(cell), beyond);
  });
  const beyondOf = new Map(bridges.flatMap((bridge) => bridge.cells.map((cell) => [cell, bridge] as const)));

  return {
    bridges,
    cellBeside(x, y, time) {
      const u = (x - minX) / cellX - 0.5;
      const v = (y - minY) / cellY - 0.5;
      const i = Math.min(nx - 2, Math.max(0, Math.floor(u)));
      const j = Math.min(ny - 2, Math.max(0, Math.floor(v)));
      const lowerLeft = j * nx + i;
      const count = about(lowerLeft, time);
      let nearest = -1;
      let least = Infinity;
      for (let corner = 0; corner < 4; corner++) {
        const [di, dj] = [corner & 1, corner >> 1];
        const [dx, dy] = [(i + di - u) * cellX, (j + dj - v) * cellY];
        const distance = dx * dx + dy * dy;
        if (distance >= least) continue;
        const cell = lowerLeft + di + dj * nx;
        if (count > 0 && parted(count, x, y, cell)) continue;
        least = distance;
        nearest = cell;
      }
      // out of a tip, which may be several cells deep
      for (let k = 0; k < mostInTip; k++) {
        const bridge = beyondOf.get(nearest);
        if (!bridge || bridge.since > time) break;
        nearest = bridge.beyond;
      }
      return nearest;
    },
  };
}

/** Does a kerf's piece cross the straight way between two places, m? */
function crosses(segment: Segment, ax: number, ay: number, bx: number, by: number): boolean {
  if (segment.kind === 'arc') return segmentMeetings(segment, lineBetween(at(ax, ay), at(bx, by))).length > 0;
  const { start, end } = segment;
  const [ux, uy] = [bx - ax, by - ay];
  const startSide = ux * (start.y - ay) - uy * (start.x - ax);
  const endSide = ux * (end.y - ay) - uy * (end.x - ax);
  if (startSide > 0 === endSide > 0) return false;
  const [wx, wy] = [end.x - start.x, end.y - start.y];
  const from = wx * (ay - start.y) - wy * (ax - start.x);
  const to = wx * (by - start.y) - wy * (bx - start.x);
  return from > 0 !== to > 0;
}

const at = (x: number, y: number): Point => ({ x, y });

/**
 * Where the grid parts a few cells from all others although none of the kerfs does: the cells of a narrow tip that lie corner to corner. Each such group gets a bridge to a cell beyond a corner,
 * nearest to the rest of the part first.
 */
function tipBridges(
  { nx, ny }: PlateGrid,
  { right, up, rightBy, upBy }: KerfLinks,
  joined: (cell: number, beyond: number, lowerLeft: number) => boolean,
): TipBridge[] {
  const group = new Int32Array(nx * ny).fill(-1);
  const small: number[][] = [];
  const stack: number[] = [];
  let groups = 0;
  for (let first = 0; first < nx * ny; first++) {
    if ((group[first] ?? 0) >= 0) continue;
    const cells: number[] = [];
    let size = 0;
    stack.push(first);
    group[first] = groups;
    for (let cell = stack.pop(); cell !== undefined; cell = stack.pop()) {
      if (size++ < mostInTip) cells.push(cell);
      const column = cell % nx;
      const visit = (next: number): void => {
        if ((group[next] ?? 0) >= 0) return;
        group[next] = groups;
        stack.push(next);
      };
      if (column < nx - 1 && right[cell] === Infinity) visit(cell + 1);
      if (column > 0 && right[cell - 1] === Infinity) visit(cell - 1);
      if (cell < nx * (ny - 1) && up[cell] === Infinity) visit(cell + nx);
      if (cell >= nx && up[cell - nx] === Infinity) visit(cell - nx);
    }
    if (size <= mostInTip && cells.some((cell) => cutAbout(cell))) small.push(cells);
    groups++;
  }
  const tips = new Set(small.map((cells) => group[cells[0] ?? 0] ?? -1));
  const bridges: TipBridge[] = [];
  // groups beside the rest first, then those beside these
  for (let found = true; found;) {
    found = false;
    for (const cells of small) {
      const own = group[cells[0] ?? 0] ?? -1;
      if (!tips.has(own)) continue;
      const bridge = bridgeOf(cells, own);
      if (!bridge) continue;
      bridges.push(bridge);
      tips.delete(own);
      found = true;
    }
  }
  return bridges;

  function cutAbout(cell: number): boolean {
    return (
      (rightBy[cell] ?? -1) >= 0 ||
      (upBy[cell] ?? -1) >= 0 ||
      (cell % nx > 0 && (rightBy[cell - 1] ?? -1) >= 0) ||
      (cell >= nx && (upBy[cell - nx] ?? -1) >= 0)
    );
  }

  function bridgeOf(cells: readonly number[], own: number): TipBridge | null {
    for (const cell of cells) {
      const [column, row] = [cell % nx, Math.floor(cell / nx)];
      for (const [di, dj] of [
        [1, 1],
        [-1, 1],
        [1, -1],
        [-1, -1],
      ] as const) {
        if (column + di < 0 || column + di >= nx || row + dj < 0 || row + dj >= ny) continue;
        const beyond = cell + di + dj * nx;
        const other = group[beyond] ?? -1;
        if (other === own || tips.has(other)) continue;
        const lowerLeft = Math.min(row, row + dj) * nx + Math.min(column, column + di);
        if (joined(cell, beyond, lowerLeft)) return { cells, cell, beyond, since: closed(cells) };
      }
    }
    return null;
  }

  /** When the last way out of cells was cut, s. */
  function closed(cells: readonly number[]): number {
    let latest = 0;
    for (const cell of cells) {
      for (const opened of [right[cell], up[cell], cell % nx > 0 ? right[cell - 1] : 0, up[cell - nx]]) {
        if (opened !== undefined && opened < Infinity) latest = Math.max(latest, opened);
      }
    }
    return latest;
  }
}

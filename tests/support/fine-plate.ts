import type { HeatedPiece, PlateProperties } from '../../strategy/heat/index.ts';
import { diffusivity } from '../../strategy/heat/index.ts';
import type { Box, Point } from '../../strategy/path/index.ts';
import { segmentPointAt, segmentTangentAt } from '../../strategy/path/index.ts';

/** A plate's rise, K, on a fine grid: explicit steps of finite volumes, insulated edge, no losses. */
export type FinePlate = { readonly rise: Float64Array; at(point: Point): number };

/**
 * The plate cut as the pieces say, at `time` s, solved on cells of `cell` m without any of the field's own code: an open kerf closes the faces between cells on its two sides
 * (told by the polygon of places every tenth of a cell), heat enters the nearest cell on each side by halves, and only what comes before `since` does.
 */
export function finePlate(
  plate: Box,
  pieces: readonly HeatedPiece[],
  plateProperties: PlateProperties,
  { cell, time, since = time, shielded = true }: { cell: number; time: number; since?: number; shielded?: boolean },
): FinePlate {
  const nx = Math.round((plate.maxX - plate.minX) / cell);
  const ny = Math.round((plate.maxY - plate.minY) / cell);
  const steps = Math.ceil((time * diffusivity(plateProperties)) / (0.2 * cell * cell));
  const step = time / steps;
  const share = (diffusivity(plateProperties) * step) / (cell * cell);
  const capacity = plateProperties.density * plateProperties.specificHeat * cell * cell;
  const right = new Float64Array(nx * ny).fill(share);
  const up = new Float64Array(nx * ny).fill(share);
  for (let j = 0; j < ny; j++) right[j * nx + nx - 1] = 0;
  for (let i = 0; i < nx; i++) up[(ny - 1) * nx + i] = 0;
  // middles a hair off, so that no path runs through them
  const middle = (k: number, from: number): number => from + (k + 0.5) * cell + 1.7e-8;
  const moves = trail(pieces, cell / 10);
  let rise = new Float64Array(nx * ny);
  let next = new Float64Array(nx * ny);
  let move = 0;
  for (let n = 0; n < steps; n++) {
    for (let one = moves[move]; one && one.time <= n * step; one = moves[++move]) {
      const { a, b, heat, tangent } = one;
      if (shielded) {
        const column = crossed(a.x, b.x, plate.minX, cell);
        if (column !== null && column >= 0 && column < nx) {
          const y = a.y + ((b.y - a.y) * (middle(column, plate.minX) - a.x)) / (b.x - a.x);
          const j = Math.floor((y - middle(0, plate.minY)) / cell);
          if (j >= 0 && j < ny) up[j * nx + column] = 0;
        }
        const row = crossed(a.y, b.y, plate.minY, cell);
        if (row !== null && row >= 0 && row < ny) {
          const x = a.x + ((b.x - a.x) * (middle(row, plate.minY) - a.y)) / (b.y - a.y);
          const i = Math.floor((x - middle(0, plate.minX)) / cell);
          if (i >= 0 && i < nx) right[row * nx + i] = 0;
        }
      }
      if (one.time >= since) continue;
      for (const side of [1, -1]) {
        let nearest = -1;
        let least = Infinity;
        const [ci, cj] = [Math.floor((b.x - plate.minX) / cell), Math.floor((b.y - plate.minY) / cell)];
        for (let j = Math.max(0, cj - 2); j <= Math.min(ny - 1, cj + 2); j++) {
          for (let i = Math.max(0, ci - 2); i <= Math.min(nx - 1, ci + 2); i++) {
            const [dx, dy] = [middle(i, plate.minX) - b.x, middle(j, plate.minY) - b.y];
            if (side * (tangent.x * dy - tangent.y * dx) <= 0 || dx * dx + dy * dy >= least) continue;
            least = dx * dx + dy * dy;
            nearest = j * nx + i;
          }
        }
        rise[nearest] = (rise[nearest] ?? 0) + heat / 2 / capacity;
      }
    }
    for (let j = 0; j < ny; j++) {
      for (let i = 0; i < nx; i++) {
        const k = j * nx + i;
        const here = rise[k] ?? 0;
        let sum = (right[k] ?? 0) * ((rise[k + 1] ?? 0) - here) + (up[k] ?? 0) * ((rise[k + nx] ?? 0) - here);
        if (i > 0) sum += (right[k - 1] ?? 0) * ((rise[k - 1] ?? 0) - here);
        if (j > 0) sum += (up[k - nx] ?? 0) * ((rise[k - nx] ?? 0) - here);
        next[k] = here + sum;
      }
    }
    [rise, next] = [next, rise];
  }
  const done = rise;
  return {
    rise: done,
    at({ x, y }) {
      const i = Math.min(nx - 1, Math.max(0, Math.floor((x - plate.minX) / cell)));
      const j = Math.min(ny - 1, Math.max(0, Math.floor((y - plate.minY) / cell)));
      return done[j * nx + i] ?? 0;
    },
  };
}

type Move = { a: Point; b: Point; time: number; heat: number; tangent: Point };

/** The pieces in small straight moves. */
function trail(pieces: readonly HeatedPiece[], length: number): Move[] {
  const moves: Move[] = [];
  for (const { segment, from, to, powerPerLength } of pieces) {
    const whole =
      segment.kind === 'line'
        ? Math.hypot(segment.end.x - segment.start.x, segment.end.y - segment.start.y)
        : segment.radius * Math.abs(segment.sweep);
    const count = Math.ceil(whole / length);
    for (let k = 1; k <= count; k++) {
      moves.push({
        a: segmentPointAt(segment, (k - 1) / count),
        b: segmentPointAt(segment, k / count),
        time: from + (k / count) * (to - from),
        heat: (powerPerLength * (to - from)) / count,
        tangent: segmentTangentAt(segment, (k - 0.5) / count),
      });
    }
  }
  return moves;
}

/** The number of the middle between two coordinates less than a cell apart, or none. */
function crossed(a: number, b: number, from: number, cell: number): number | null {
  const [low, high] = [Math.min(a, b), Math.max(a, b)].map((one) => (one - from - 1.7e-8) / cell - 0.5);
  const k = Math.ceil(low ?? 0);
  return k < (high ?? 0) ? k : null;
}

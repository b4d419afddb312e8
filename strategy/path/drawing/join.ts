import Flatbush from 'flatbush';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import { pathLength } from '../segment.ts';
import type { Piece } from './piece.ts';
import { pieceEnds } from './piece.ts';

/** Joints of the ends of pieces: the ends of piece i are at joints `at[2i]` and `at[2i + 1]`. */
export type Joints = { readonly at: Int32Array; readonly count: number };

/** Joined are loose ends no nearer to each other than this share of all they would close: a short line is no contour. */
const shortest = 3;

/**
 * Ends within `rounding` m of each other share a joint. Then loose ends, where one piece alone arrives, are joined with the nearest other within `gap` m, nearest
 * pairs first: so a wide tolerance closes gaps and leaves alone what is joined already, whatever the size of its details.
 */
export function joinEnds(pieces: readonly Piece[], rounding: number, gap: number): Joints {
  const ends = new Float64Array(4 * pieces.length);
  for (let i = 0; i < pieces.length; i++) {
    const piece = pieces[i];
    if (!piece) continue;
    const [a, b] = pieceEnds(piece);
    ends[4 * i] = a.x;
    ends[4 * i + 1] = a.y;
    ends[4 * i + 2] = b.x;
    ends[4 * i + 3] = b.y;
  }
  const sets = new Sets(2 * pieces.length);
  joinNear(ends, rounding, sets);
  if (gap > rounding) joinLoose(pieces, ends, gap, sets);
  return sets.numbered();
}

/** Disjoint sets of whole numbers. */
class Sets {
  readonly #parent: Int32Array;

  constructor(count: number) {
    this.#parent = new Int32Array(count);
    for (let i = 0; i < count; i++) this.#parent[i] = i;
  }

  of(i: number): number {
    const parent = this.#parent;
    let at = i;
    for (let up = parent[at] ?? at; up !== at; up = parent[at] ?? at) {
      const next = parent[up] ?? up;
      parent[at] = next;
      at = next;
    }
    return at;
  }

  join(i: number, k: number): void {
    this.#parent[this.of(k)] = this.of(i);
  }

  numbered(): Joints {
    const numbers = new Int32Array(this.#parent.length).fill(-1);
    let count = 0;
    const at = new Int32Array(numbers.length);
    for (let i = 0; i < at.length; i++) {
      const set = this.of(i);
      if (numbers[set] === -1) numbers[set] = count++;
      at[i] = numbers[set] ?? 0;
    }
    return { at, count };
  }
}

/** Side of a cell in tolerances: so wide that few ends lie near a border and must be sought beyond it. */
const cellWidth = 32;
/** Ends of one joint that are kept to compare others with: more would be the same place again. */
const crowd = 8;

/** A table of cells by their column and row; only ends in the same cell, or near its border, are compared. */
function joinNear(ends: Float64Array, tolerance: number, sets: Sets): void {
  const count = ends.length / 2;
  const cell = tolerance > 0 ? cellWidth * tolerance : 1e-9;
  const size = 2 ** Math.ceil(Math.log2(2 * count + 2));
  const firstIn = new Int32Array(size).fill(-1);
  const next = new Int32Array(count).fill(-1);
  const slotOf = (column: number, row: number): number =>
    (Math.imul(column | 0, 73_856_093) ^ Math.imul(row | 0, 19_349_663)) & (size - 1);
  for (let i = 0; i < count; i++) {
    const x = ends[2 * i] ?? 0;
    const y = ends[2 * i + 1] ?? 0;
    const column = Math.floor(x / cell);
    const row = Math.floor(y / cell);
    const lastColumn = Math.floor((x + tolerance) / cell);
    const lastRow = Math.floor((y + tolerance) / cell);
    let met = 0;
    for (let c = Math.floor((x - tolerance) / cell); c <= lastColumn; c++) {
      for (let r = Math.floor((y - tolerance) / cell); r <= lastRow; r++) {
        for (let k = firstIn[slotOf(c, r)] ?? -1; k >= 0 && met < crowd; k = next[k] ?? -1) {
          const dx = (ends[2 * k] ?? 0) - x;
          const dy = (ends[2 * k + 1] ?? 0) - y;
          if (dx * dx + dy * dy > tolerance * tolerance) continue;
          sets.join(k, i);
          met++;
        }
      }
    }
    if (met >= crowd) continue;
    const slot = slotOf(column, row);
    next[i] = firstIn[slot] ?? -1;
    firstIn[slot] = i;
  }
}

type Pair = { readonly a: number; readonly b: number; readonly size: number };

function joinLoose(pieces: readonly Piece[], ends: Float64Array, gap: number, sets: Sets): void {
  const arriving = new Int32Array(2 * pieces.length);
  for (let end = 0; end < 2 * pieces.length; end++) {
    const set = sets.of(end);
    arriving[set] = (arriving[set] ?? 0) + 1;
  }
  // where an odd number of pieces arrives one is missing
  const loose: number[] = [];
  for (let end = 0; end < 2 * pieces.length; end++) {
    if (sets.of(end) === end && (arriving[end] ?? 0) % 2 === 1) loose.push(end);
  }
  if (loose.length < 2) return;
  const whole = new Sets(2 * pieces.length);
  const lengths = new Float64Array(2 * pieces.length);
  for (const [i, piece] of pieces.entries()) {
    const [a, b] = [whole.of(sets.of(2 * i)), whole.of(sets.of(2 * i + 1))];
    const sum = (lengths[a] ?? 0) + (a === b ? 0 : (lengths[b] ?? 0)) + pathLength(piece.segments);
    if (a !== b) whole.join(a, b);
    lengths[whole.of(a)] = sum;
  }
  const placeOf = (end: number): Point => ({ x: ends[2 * end] ?? 0, y: ends[2 * end + 1] ?? 0 });
  const free = new Set(loose);
  for (let round = 0; round < 8; round++) {
    const pairs = nearestPairs([...free], placeOf, gap);
    let joined = false;
    for (const { a, b, size } of pairs) {
      if (!free.has(a) || !free.has(b)) continue;
      const [one, other] = [whole.of(a), whole.of(b)];
      if (one === other && (lengths[one] ?? 0) < shortest * size) continue;
      if (one !== other) {
        const sum = (lengths[one] ?? 0) + (lengths[other] ?? 0);
        whole.join(one, other);
        lengths[whole.of(one)] = sum;
      }
      sets.join(a, b);
      free.delete(a);
      free.delete(b);
      joined = true;
    }
    if (!joined) return;
  }
}

/** Neighbours looked at for each end: the nearest may be taken by another. */
const neighbours = 4;

function nearestPairs(ends: readonly number[], placeOf: (end: number) => Point, gap: number): Pair[] {
  if (ends.length < 2) return [];
  const index = new Flatbush(ends.length);
  for (const end of ends) {
    const { x, y } = placeOf(end);
    index.add(x, y, x, y);
  }
  index.finish();
  const pairs: Pair[] = [];
  for (const [i, end] of ends.entries()) {
    const p = placeOf(end);
    for (const k of index.neighbors(p.x, p.y, neighbours + 1, gap, (other) => other !== i)) {
      const other = ends[k];
      if (other === undefined) continue;
      const size = pointDistance(p, placeOf(other));
      if (size <= gap) pairs.push({ a: Math.min(end, other), b: Math.max(end, other), size });
    }
  }
  return pairs.sort((x, y) => x.size - y.size || x.a - y.a || x.b - y.b);
}

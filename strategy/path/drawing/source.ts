import type { Point } from '../point.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';
import type { Shape } from './shape.ts';
import type { DrawingUnit } from './unit.ts';

/** The geometry of one entity: connected shapes in order, m. */
export type DrawnPath = { readonly type: string; readonly layer: string; readonly shapes: readonly Shape[] };

/** What a file draws, whatever its format, before any of it is put together. */
export type Source = {
  readonly paths: readonly DrawnPath[];
  readonly notes: Notes;
  readonly hiddenLayers: ReadonlySet<string>;
  /** Unit the lengths were read in. */
  readonly unit: DrawingUnit;
  /** Why the unit must be asked for, or null. */
  readonly unitDoubt: string | null;
  /** Entities of the file by type. */
  readonly counts: Readonly<Record<string, number>>;
};

/** Something left out or put right: how often, and the first places, m. */
export type Noted = { readonly what: string; readonly count: number; readonly at: readonly Point[] };

/** Places kept of each kind: more are not drawn. */
const mostPlaces = 100;
/** Kinds kept: a damaged file could name as many as it has entities. */
const mostKinds = 200;

/** Gathers what was left out and what was put right, each kind with its places. */
export class Notes {
  readonly #left = new Map<string, { count: number; at: Point[] }>();
  readonly #mended = new Map<string, { count: number; at: Point[] }>();

  leave(what: string, at: Point | null): void {
    noteIn(this.#left, what, at);
  }

  mend(what: string, at: Point | null): void {
    noteIn(this.#mended, what, at);
  }

  get leftOut(): Noted[] {
    return listOf(this.#left);
  }

  get mended(): Noted[] {
    return listOf(this.#mended);
  }
}

function noteIn(notes: Map<string, { count: number; at: Point[] }>, what: string, at: Point | null): void {
  const key = notes.has(what) || notes.size < mostKinds ? what : 'things of other kinds';
  let noted = notes.get(key);
  if (!noted) notes.set(key, (noted = { count: 0, at: [] }));
  noted.count++;
  const drawable = at !== null && Math.hypot(at.x, at.y) <= drawingLimits.reach;
  if (drawable && noted.at.length < mostPlaces) noted.at.push(at);
}

const listOf = (notes: ReadonlyMap<string, { count: number; at: Point[] }>): Noted[] =>
  [...notes].map(([what, { count, at }]) => ({ what, count, at }));

/** Counts what a reader visits and stops it at the limit. */
export function entityCounter(): () => void {
  let visited = 0;
  return () => {
    if (++visited > drawingLimits.entities) {
      throw new DrawingRefusal(
        `The drawing holds more than ${drawingLimits.entities} entities once its inserts are resolved. Draw the part alone.`,
      );
    }
  };
}

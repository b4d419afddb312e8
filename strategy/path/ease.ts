import { pathPart } from './path-part.ts';
import type { Segment } from './segment.ts';
import { pathLength } from './segment.ts';

/** A piece of path with how far it is eased: 0 as the straight cut, 1 as in the corner. */
export type EasedPiece = { readonly segment: Segment; readonly eased: number };

/** Steps that stand for the even change along a stretch. */
export const easeSteps = 8;

/**
 * The last `length` m of a path that leads into a corner, in pieces along which the ease grows evenly from 0 to 1, each with its middle value; what lies before
 * them is `rest`. A path that is shorter is eased over all it has.
 */
export function easedInto(
  path: readonly Segment[],
  length: number,
): { readonly rest: readonly Segment[]; readonly eased: readonly EasedPiece[] } {
  const whole = pathLength(path);
  const taken = Math.min(length, whole);
  if (!(taken > 0)) return { rest: path, eased: [] };
  const start = whole - taken;
  const eased = Array.from({ length: easeSteps }, (_, i) =>
    pathPart(
      path,
      start + (taken * i) / easeSteps,
      i + 1 === easeSteps ? Infinity : start + (taken * (i + 1)) / easeSteps,
    ).map((segment) => ({ segment, eased: (i + 0.5) / easeSteps })),
  );
  return { rest: pathPart(path, 0, start), eased: eased.flat() };
}

/** The first `length` m of a path that leads out of a corner, the ease falling evenly from 1 to 0; what follows is `rest`. */
export function easedOutOf(
  path: readonly Segment[],
  length: number,
): { readonly rest: readonly Segment[]; readonly eased: readonly EasedPiece[] } {
  const taken = Math.min(length, pathLength(path));
  if (!(taken > 0)) return { rest: path, eased: [] };
  const eased = Array.from({ length: easeSteps }, (_, i) =>
    pathPart(path, (taken * i) / easeSteps, (taken * (i + 1)) / easeSteps).map((segment) => ({
      segment,
      eased: 1 - (i + 0.5) / easeSteps,
    })),
  );
  return { rest: pathPart(path, taken, Infinity), eased: eased.flat() };
}

/** Share of the straight cut's feed or power where the path is eased, given the share in the corner. */
export const easedShare = (eased: number, inCorner: number): number => 1 - eased * (1 - inCorner);

import type { Point } from './point.ts';
import type { Segment } from './segment.ts';

/** Shares of the cut's own feed and mean power, in (0, 1]: of a contour's piece that is eased; left out where neither is. */
export type CutEase = { readonly feedShare: number; readonly powerShare: number };

/** A piece of a cut: one after another they make up what is cut from a pierce to where the beam goes off. */
export type CutPiece =
  | ({ readonly kind: 'lead-in' | 'contour' | 'loop'; readonly segments: readonly Segment[] } & Partial<CutEase>)
  /** The cut waits with the beam off before it goes on along the next piece. */
  | { readonly kind: 'dwell'; readonly at: Point; readonly duration: number }; // s

/** All that is cut from one pierce: a contour with its lead-in and what its corners get. Pieces join end to start, m. */
export type CutRun = {
  readonly contourId: string;
  /** How a sentence or a comment calls it: "hole 3 of bracket 2". */
  readonly name: string;
  readonly pierce: Point;
  readonly pieces: readonly CutPiece[];
};

/** What a plate's cut consists of, in the order of cutting. Middle of the kerf, m. */
export type CutPath = { readonly runs: readonly CutRun[] };

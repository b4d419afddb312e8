import type { ShownPath } from '../../shared/take-away.ts';
import { cutPathOf } from '../../strategy/path/compensation/index.ts';
import { cutPathRequestOf } from './cut-path.ts';
import type { TakenPlan } from './repository.ts';

export type PathAsked = { readonly taken: TakenPlan; readonly as: 'path' };
export type PathAnswer = { readonly kind: 'path'; readonly path: ShownPath };

/** A plan's path as its files hold it, for the screen: a contour that can't be cut is missing there, and said to be. */
export function shownPath(taken: TakenPlan): ShownPath {
  const { path, problems } = cutPathOf(cutPathRequestOf(taken));
  return {
    runs: path.runs.map(({ contourId, name, pierce, pieces }) => ({
      contourId,
      name,
      pierce,
      pieces: pieces.map((piece) => (piece.kind === 'dwell' ? piece : { ...piece, segments: [...piece.segments] })),
    })),
    problems: problems.map(({ contourId, at, why, leftOut }) => ({ contourId, at, why, leftOut })),
  };
}

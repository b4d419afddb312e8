import type { CutEase, CutPath, CutPiece, CutRun } from '../../cut-path.ts';
import type { Segment } from '../../segment.ts';
import { segmentPart } from '../../segment.ts';

/** What is written into a file, whatever its format: the path, and the sentences that must stand in it. */
export type CutFile = {
  readonly path: CutPath;
  readonly unit: CutFileUnit;
  readonly title: string;
  /** A sentence each: of what, in which state, and the cautions. They stand where a reader of the file sees them. */
  readonly notes: readonly string[];
};

export type CutFileUnit = 'mm' | 'inch';

/** File units a metre, and how a sentence calls the unit. */
export const cutFileUnits = {
  mm: { scale: 1000, name: 'millimetres' },
  inch: { scale: 1 / 0.0254, name: 'inches' },
} as const satisfies Record<CutFileUnit, { scale: number; name: string }>;

/** Layers of a drawing and groups of a picture. */
export const cutLayers = ['contour', 'lead-in', 'loop'] as const satisfies readonly CutPiece['kind'][];
export type CutLayer = (typeof cutLayers)[number];

/** Segments of a piece; none of a dwell. */
export const pieceSegments = (piece: CutPiece): readonly Segment[] => (piece.kind === 'dwell' ? [] : piece.segments);

/**
 * The segment in as many equal parts as keep each arc's sweep within `most` rad. Several formats can't say a full circle in one piece
 * (its ends are the same), and those that find the centre from the ends lose it near half a turn.
 */
export function segmentWithin(segment: Segment, most: number): readonly Segment[] {
  if (segment.kind === 'line') return [segment];
  // a third of a turn computed two ways may differ by rounding: that is no reason for one more part
  const parts = Math.ceil(Math.abs(segment.sweep) / most - 1e-9);
  if (parts <= 1) return [segment];
  return Array.from({ length: parts }, (_, i) => segmentPart(segment, i / parts, (i + 1) / parts));
}

/** What a piece is eased to; null of one at the cut's own feed and power. */
export function pieceEase(piece: CutPiece): CutEase | null {
  if (piece.kind === 'dwell' || piece.feedShare === undefined) return null;
  return { feedShare: piece.feedShare, powerShare: piece.powerShare ?? 1 };
}

/** "feed 93 % and power 88 %": shares in words, to a tenth of a percent. */
export function easeText({ feedShare, powerShare }: CutEase): string {
  const percent = (share: number) => `${Number((share * 100).toFixed(1))} %`;
  return feedShare === powerShare
    ? `feed and power ${percent(feedShare)}`
    : `feed ${percent(feedShare)} and power ${percent(powerShare)}`;
}

/** A stretch of a run that is eased: its pieces one after another. */
export type EasedStretch = {
  readonly run: CutRun;
  readonly pieces: readonly { readonly segments: readonly Segment[]; readonly ease: CutEase }[];
};

/** Stretches of a path that are eased, in the order of cutting. */
export function easedStretches({ runs }: CutPath): EasedStretch[] {
  return runs.flatMap((run) => {
    const stretches: { run: CutRun; pieces: { segments: readonly Segment[]; ease: CutEase }[] }[] = [];
    let last: (typeof stretches)[number] | null = null;
    for (const piece of run.pieces) {
      const ease = pieceEase(piece);
      if (ease === null) last = null;
      else if (last) last.pieces.push({ segments: pieceSegments(piece), ease });
      else stretches.push((last = { run, pieces: [{ segments: pieceSegments(piece), ease }] }));
    }
    return stretches;
  });
}

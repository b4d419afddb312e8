import type { CutPath, CutPiece } from '../../cut-path.ts';
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

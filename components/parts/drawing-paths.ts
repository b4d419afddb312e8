import { useMemo } from 'react';
import { boxUnion, segmentBox, type Box, type Point, type Segment } from '@/strategy/path/index.ts';
import { detailTolerance, pathThinned } from './drawing-detail.ts';
import { contourCircle, pathsBox } from './drawing-geometry.ts';
import { pathWriter } from './drawing-space.ts';

type Path = { readonly segments: readonly Segment[] };

export type DrawnPaths = {
  contours: readonly Path[];
  open: readonly Path[];
  loops: readonly (Path & { readonly id: string })[];
  slugs: readonly Path[];
  leadIns: readonly Path[];
  plate: Box | null;
  outline: readonly Path[];
  traces: readonly (Path & { readonly id: string; readonly kind: 'chosen' | 'way' | 'ease' })[];
};

/** Loops and slugs smaller than this are not worth drawing, px. */
const smallest = 2;

/** The box of all that is drawn, m. */
export function useDrawnBox({ contours, open, loops, leadIns, plate, outline }: DrawnPaths): Box {
  return useMemo(() => {
    const drawn = pathsBox([...contours, ...open, ...loops, ...leadIns, ...outline]);
    const all = plate ? boxUnion(drawn, plate) : drawn;
    return Number.isFinite(all.minX) ? all : { minX: 0, minY: 0, maxX: 0.1, maxY: 0.1 };
  }, [contours, open, loops, leadIns, outline, plate]);
}

/**
 * The texts of all paths. Written once for all scales between two powers of two: what is smaller than half a pixel there is left out of large drawings,
 * loops that would be a dot are left out of any.
 */
export function useDrawnTexts(
  { contours, open, loops, slugs, leadIns, plate, outline, traces }: DrawnPaths,
  box: Box,
  scale: number,
) {
  const origin: Point = useMemo(() => ({ x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 }), [box]);
  const pieces = useMemo(() => contours.reduce((sum, { segments }) => sum + segments.length, 0), [contours]);
  const write = useMemo(() => pathWriter(origin), [origin]);
  const tolerance = detailTolerance(scale, pieces);
  const step = 2 ** Math.ceil(Math.log2(scale));
  const part = useMemo(
    () =>
      contours
        .map(({ segments }) => pathThinned(segments, tolerance))
        .map((segments) => (segments.length > 0 ? `${write(segments)}Z` : ''))
        .join(''),
    [contours, tolerance, write],
  );
  const still = useMemo(
    () => ({
      open: open.map(({ segments }) => write(segments)).join(''),
      leadIns: leadIns.map(({ segments }) => write(segments)).join(''),
      plate: plate === null ? '' : `${write(boxPath(plate))}Z`,
      outline: outline.map(({ segments }) => (segments.length > 0 ? `${write(segments)}Z` : '')).join(''),
    }),
    [open, leadIns, plate, outline, write],
  );
  const loopTexts = useMemo(
    () =>
      loops.filter(({ segments }) => seenAt(segments, step)).map(({ id, segments }) => ({ id, data: write(segments) })),
    [loops, step, write],
  );
  const slugText = useMemo(
    () =>
      slugs
        .filter(({ segments }) => seenAt(segments, step))
        .map(({ segments }) => `${write(segments)}Z`)
        .join(''),
    [slugs, step, write],
  );
  const traceTexts = useMemo(
    () => traces.map(({ id, kind, segments }) => ({ id, kind, data: write(segments) })),
    [traces, write],
  );
  const circles = useMemo(() => contours.flatMap((contour) => contourCircle(contour) ?? []), [contours]);
  return { origin, write, part, ...still, loops: loopTexts, slugs: slugText, traces: traceTexts, circles };
}

function seenAt(segments: readonly Segment[], scale: number): boolean {
  return segments.some((segment) => {
    const box = segmentBox(segment);
    return Math.max(box.maxX - box.minX, box.maxY - box.minY) * scale >= smallest;
  });
}

function boxPath({ minX, minY, maxX, maxY }: Box): Segment[] {
  const corners = [
    { x: minX, y: minY },
    { x: maxX, y: minY },
    { x: maxX, y: maxY },
    { x: minX, y: maxY },
  ];
  return corners.map((start, i) => ({ kind: 'line', start, end: corners[(i + 1) % 4] ?? start }));
}

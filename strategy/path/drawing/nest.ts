import Flatbush from 'flatbush';
import type { Contour } from '../contour.ts';
import { contourArea, contourBox, contourContains, contourReverse } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Box } from '../point.ts';
import { segmentPointAt } from '../segment.ts';

/** Outer outlines (depth 0), holes (odd depths) and islands, which are parts inside holes (even depths from 2). */
export type ContourRole = 'outer' | 'hole' | 'island';

export type Nested = {
  readonly contour: Contour;
  readonly depth: number;
  readonly role: ContourRole;
  readonly parent: number | null;
};

/** Contours with their depth, role and the index of the contour around each, turned so that the part lies on the left of travel. */
export function nestContours(contours: readonly Contour[]): Nested[] {
  if (contours.length === 0) return [];
  const boxes = contours.map(contourBox);
  const areas = contours.map((c) => Math.abs(contourArea(c)));
  const index = new Flatbush(contours.length);
  for (const box of boxes) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();

  const bySize = contours.map((_, i) => i).sort((a, b) => (areas[b] ?? 0) - (areas[a] ?? 0) || a - b);
  const rank = new Int32Array(contours.length);
  bySize.forEach((i, k) => {
    rank[i] = k;
  });
  const parents: (number | null)[] = contours.map(() => null);
  const depths: number[] = contours.map(() => 0);
  for (const i of bySize) {
    const contour = contours[i];
    const box = boxes[i];
    if (!contour || !box) continue;
    const own = rank[i] ?? 0;
    const larger = Int32Array.from(
      index.search(box.minX, box.minY, box.maxX, box.maxY, (k) => (rank[k] ?? 0) < own),
      (k) => rank[k] ?? 0,
    ).sort();
    // the smallest of those around it
    let parent: number | undefined;
    for (let k = larger.length - 1; k >= 0 && parent === undefined; k--) {
      const candidate = bySize[larger[k] ?? 0] ?? 0;
      const [outer, outerBox] = [contours[candidate], boxes[candidate]];
      if (outer && outerBox && lies(contour, box, outer, outerBox)) parent = candidate;
    }
    if (parent === undefined) continue;
    parents[i] = parent;
    depths[i] = (depths[parent] ?? 0) + 1;
  }
  return contours.map((contour, i) => {
    const depth = depths[i] ?? 0;
    const role = depth === 0 ? 'outer' : depth % 2 === 1 ? 'hole' : 'island';
    const turned = contourArea(contour) > 0 === (role !== 'hole') ? contour : contourReverse(contour);
    return { contour: turned, depth, role, parent: parents[i] ?? null };
  });
}

/**
 * Whether one contour lies in another: its box must, and the first of its places that is not on the other contour too. Contours that cross each other
 * are listed as crossings; for them the answer is only that of this place.
 */
function lies(inner: Contour, innerBox: Box, outer: Contour, outerBox: Box): boolean {
  const slack = 1e-9 + 1e-6 * Math.hypot(outerBox.maxX - outerBox.minX, outerBox.maxY - outerBox.minY);
  const fits =
    innerBox.minX >= outerBox.minX - slack &&
    innerBox.minY >= outerBox.minY - slack &&
    innerBox.maxX <= outerBox.maxX + slack &&
    innerBox.maxY <= outerBox.maxY + slack;
  if (!fits) return false;
  const { segments } = inner;
  const tried = Math.min(segments.length, 12);
  for (let k = 0; k < tried; k++) {
    const segment = segments[Math.floor((k * segments.length) / tried)];
    if (!segment) continue;
    const place = segmentPointAt(segment, 0.37);
    if (outer.segments.some((s) => segmentPointDistance(s, place) < slack)) continue;
    return contourContains(outer, place);
  }
  // all on the other contour: the same figure twice
  return false;
}

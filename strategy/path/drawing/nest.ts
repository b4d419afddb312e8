import Flatbush from 'flatbush';
import type { Contour } from '../contour.ts';
import { contourArea, contourContains, contourReverse } from '../contour.ts';
import { segmentPointDistance } from '../distance.ts';
import type { Box, Point } from '../point.ts';
import type { Segment } from '../segment.ts';
import { arcCovers, segmentPointAt, segmentStart } from '../segment.ts';
import { segmentBoxes, sortedBy, writeBox } from './soup.ts';

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
  const scratch = new Float64Array(4);
  const boxes = contours.map((contour) => boxOf(contour, scratch));
  const signed = Float64Array.from(contours, contourArea);
  const index = new Flatbush(contours.length);
  for (const box of boxes) index.add(box.minX, box.minY, box.maxX, box.maxY);
  index.finish();

  const bySize = sortedBy(signed.map((area) => -Math.abs(area)));
  const rank = new Int32Array(contours.length);
  for (let k = 0; k < bySize.length; k++) rank[bySize[k] ?? 0] = k;
  const parents: (number | null)[] = contours.map(() => null);
  const depths: number[] = contours.map(() => 0);
  const insides = new Map<number, Inside>();
  const insideOf = (i: number, contour: Contour): Inside => {
    const known = insides.get(i);
    if (known) return known;
    const made = insideTest(contour);
    insides.set(i, made);
    return made;
  };
  for (const i of bySize) {
    const contour = contours[i];
    const box = boxes[i];
    if (!contour || !box) continue;
    const own = rank[i] ?? 0;
    const slack = slackOf(box);
    const around: number[] = [];
    // whatever holds the contour holds the corner of its box
    index.search(box.minX - slack, box.minY - slack, box.minX + slack, box.minY + slack, (k) => {
      const other = rank[k] ?? 0;
      if (other < own) around.push(other);
      return false;
    });
    // the smallest of those around it
    let parent: number | undefined;
    if (around.length > 1) around.sort((a, b) => b - a);
    for (const k of around) {
      const candidate = bySize[k] ?? 0;
      const [outer, outerBox] = [contours[candidate], boxes[candidate]];
      if (!outer || !outerBox || !boxHolds(outerBox, box)) continue;
      if (!lies(contour, insideOf(candidate, outer), slackOf(outerBox))) continue;
      parent = candidate;
      break;
    }
    if (parent === undefined) continue;
    parents[i] = parent;
    depths[i] = (depths[parent] ?? 0) + 1;
  }
  return contours.map((contour, i) => {
    const depth = depths[i] ?? 0;
    const role = depth === 0 ? 'outer' : depth % 2 === 1 ? 'hole' : 'island';
    const turned = (signed[i] ?? 0) > 0 === (role !== 'hole') ? contour : contourReverse(contour);
    return { contour: turned, depth, role, parent: parents[i] ?? null };
  });
}

function boxOf({ segments }: Contour, box: Float64Array): Box {
  let minX = Infinity;
  let minY = Infinity;
  let maxX = -Infinity;
  let maxY = -Infinity;
  for (const segment of segments) {
    writeBox(box, 0, segment);
    minX = Math.min(minX, box[0] ?? minX);
    minY = Math.min(minY, box[1] ?? minY);
    maxX = Math.max(maxX, box[2] ?? maxX);
    maxY = Math.max(maxY, box[3] ?? maxY);
  }
  return { minX, minY, maxX, maxY };
}

const slackOf = (box: Box): number => 1e-9 + 1e-6 * Math.hypot(box.maxX - box.minX, box.maxY - box.minY);

function boxHolds(outer: Box, inner: Box): boolean {
  const slack = slackOf(outer);
  return (
    inner.minX >= outer.minX - slack &&
    inner.minY >= outer.minY - slack &&
    inner.maxX <= outer.maxX + slack &&
    inner.maxY <= outer.maxY + slack
  );
}

/** Places of a contour that are tried, since one may lie on the other contour. */
const tries = 12;

/**
 * Whether one contour, whose box fits, lies in another: the first of its places that is not on the other contour must. Contours that cross each other
 * are listed as crossings; for them the answer is only that of this place.
 */
function lies({ segments }: Contour, inside: Inside, slack: number): boolean {
  const tried = Math.min(segments.length, tries);
  for (let k = 0; k < tried; k++) {
    const segment = segments[Math.floor((k * segments.length) / tried)];
    const answer = segment ? inside(segmentPointAt(segment, 0.37), slack) : null;
    if (answer !== null) return answer;
  }
  // all on the other contour: the same figure twice
  return false;
}

/** Whether a place lies inside a contour, or null when it is on the contour or at the height of one of its corners, within `slack` m. */
type Inside = (p: Point, slack: number) => boolean | null;

/** Fewer segments than this are looked at one by one. */
const few = 40;

function insideTest(contour: Contour): Inside {
  const { segments } = contour;
  if (segments.length < few) {
    return (p, slack) =>
      segments.some((s) => segmentPointDistance(s, p) < slack) ? null : contourContains(contour, p);
  }
  // the segments by their height, so that a ray meets only those that reach its own
  const boxes = segmentBoxes(segments);
  const index = new Flatbush(segments.length);
  for (let i = 0; i < boxes.length; i += 4) index.add(0, boxes[i + 1] ?? 0, 0, boxes[i + 3] ?? 0);
  index.finish();
  return (p, slack) => {
    let crossings = 0;
    let near = false;
    index.search(0, p.y - slack, 0, p.y + slack, (i) => {
      const segment = segments[i];
      if (segment && !near) {
        near =
          segmentPointDistance(segment, p) < slack ||
          [segmentStart(segment).y, boxes[4 * i + 1] ?? 0, boxes[4 * i + 3] ?? 0].some(
            (y) => Math.abs(y - p.y) < slack * 1e-3,
          );
        crossings += rayCrossings(segment, p);
      }
      return false;
    });
    return near ? null : crossings % 2 === 1;
  };
}

/** How often the ray to the right meets the segment; no end of it, and no top or bottom of its circle, is at the ray's height. */
function rayCrossings(segment: Segment, p: Point): number {
  if (segment.kind === 'line') {
    const { start, end } = segment;
    if (start.y > p.y === end.y > p.y) return 0;
    return start.x + ((p.y - start.y) / (end.y - start.y)) * (end.x - start.x) > p.x ? 1 : 0;
  }
  const { centre, radius } = segment;
  const height = p.y - centre.y;
  const reach = radius * radius - height * height;
  if (reach <= 0) return 0;
  return [-Math.sqrt(reach), Math.sqrt(reach)].filter(
    (x) => centre.x + x > p.x && arcCovers(segment, Math.atan2(height, x), 0),
  ).length;
}

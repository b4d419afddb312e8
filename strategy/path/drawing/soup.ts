import Flatbush from 'flatbush';
import type { Point } from '../point.ts';
import type { Segment } from '../segment.ts';

/** Boxes of many segments in one array, four numbers each (min x, min y, max x, max y), m. */
export function segmentBoxes(segments: readonly Segment[]): Float64Array {
  const boxes = new Float64Array(4 * segments.length);
  for (let i = 0; i < segments.length; i++) {
    const segment = segments[i];
    if (segment) writeBox(boxes, 4 * i, segment);
  }
  return boxes;
}

/** Writes the exact bounds of a segment into four places of an array from `at` on, without making anything else. */
export function writeBox(boxes: Float64Array, at: number, segment: Segment): void {
  if (segment.kind === 'line') {
    const { start, end } = segment;
    boxes[at] = start.x < end.x ? start.x : end.x;
    boxes[at + 1] = start.y < end.y ? start.y : end.y;
    boxes[at + 2] = start.x < end.x ? end.x : start.x;
    boxes[at + 3] = start.y < end.y ? end.y : start.y;
    return;
  }
  const { centre, radius, startAngle, sweep } = segment;
  let [minX, minY, maxX, maxY] = [-1, -1, 1, 1];
  if (Math.abs(sweep) < 2 * Math.PI) {
    const stop = startAngle + sweep;
    const [x0, y0, x1, y1] = [Math.cos(startAngle), Math.sin(startAngle), Math.cos(stop), Math.sin(stop)];
    minX = Math.min(x0, x1);
    maxX = Math.max(x0, x1);
    minY = Math.min(y0, y1);
    maxY = Math.max(y0, y1);
    // quarter turns of the circle that the arc passes
    const high = Math.max(startAngle, stop) / (Math.PI / 2) + 1e-12;
    for (let quarter = Math.ceil(Math.min(startAngle, stop) / (Math.PI / 2) - 1e-12); quarter <= high; quarter++) {
      const which = ((quarter % 4) + 4) % 4;
      if (which === 0) maxX = 1;
      else if (which === 1) maxY = 1;
      else if (which === 2) minX = -1;
      else minY = -1;
    }
  }
  boxes[at] = centre.x + radius * minX;
  boxes[at + 1] = centre.y + radius * minY;
  boxes[at + 2] = centre.x + radius * maxX;
  boxes[at + 3] = centre.y + radius * maxY;
}

/** Pairs of boxes tried at most: a drawing so dense that more touch is no part. */
const mostPairs = 600_000;

/** Comparisons in one sweep, a box: where more would be needed a tree of boxes is quicker. */
const mostSwept = 200;

/**
 * Calls `meet` once for each two of the boxes that touch or lie within `slack` of each other; false when there were too many and the rest was left.
 */
export function touchingPairs(boxes: Float64Array, slack: number, meet: (a: number, b: number) => void): boolean {
  const count = boxes.length / 4;
  if (count < 2) return true;
  const across = sweepOf(boxes, 0, slack);
  const down = sweepOf(boxes, 1, slack);
  const sweep = across.work <= down.work ? across : down;
  return sweep.work <= mostSwept * count ? sweptPairs(boxes, slack, sweep, meet) : treePairs(boxes, slack, meet);
}

/** Boxes in the order of their lower side along an axis (0 x, 1 y), but for what is less than any slack, and how many comparisons it takes to sweep along it. */
type Sweep = { readonly axis: 0 | 1; readonly order: Int32Array; readonly lows: Float64Array; readonly work: number };

function sweepOf(boxes: Float64Array, axis: 0 | 1, slack: number): Sweep {
  const count = boxes.length / 4;
  const own = new Float64Array(count);
  for (let i = 0; i < count; i++) own[i] = boxes[4 * i + axis] ?? 0;
  const order = nearlySortedBy(own);
  const lows = new Float64Array(count);
  for (let k = 0; k < count; k++) lows[k] = own[order[k] ?? 0] ?? 0;
  let work = 0;
  for (let k = 0; k < count; k++) {
    const high = (boxes[4 * (order[k] ?? 0) + axis + 2] ?? 0) + slack;
    // how many begin before this one ends, by halving
    let from = k + 1;
    let to = count;
    while (from < to) {
      const middle = (from + to) >> 1;
      if ((lows[middle] ?? 0) <= high) from = middle + 1;
      else to = middle;
    }
    work += from - k;
  }
  return { axis, order, lows, work };
}

function sweptPairs(boxes: Float64Array, slack: number, sweep: Sweep, meet: (a: number, b: number) => void): boolean {
  const { axis, order, lows } = sweep;
  const count = order.length;
  // in the order of the sweep, so that what is compared lies side by side in memory
  const highs = new Float64Array(count);
  const froms = new Float64Array(count);
  const tos = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    const at = 4 * (order[k] ?? 0);
    highs[k] = (boxes[at + axis + 2] ?? 0) + slack;
    froms[k] = boxes[at + 1 - axis] ?? 0;
    tos[k] = (boxes[at + 3 - axis] ?? 0) + slack;
  }
  let pairs = 0;
  for (let k = 0; k < count; k++) {
    const high = highs[k] ?? 0;
    const from = froms[k] ?? 0;
    const to = tos[k] ?? 0;
    for (let m = k + 1; m < count && (lows[m] ?? 0) <= high; m++) {
      if ((froms[m] ?? 0) > to || (tos[m] ?? 0) < from) continue;
      pairs++;
      const a = order[k] ?? 0;
      const b = order[m] ?? 0;
      if (a < b) meet(a, b);
      else meet(b, a);
    }
    if (pairs > mostPairs) return false;
  }
  return true;
}

function treePairs(boxes: Float64Array, slack: number, meet: (a: number, b: number) => void): boolean {
  const count = boxes.length / 4;
  const index = new Flatbush(count);
  for (let i = 0; i < boxes.length; i += 4) {
    index.add(boxes[i] ?? 0, boxes[i + 1] ?? 0, boxes[i + 2] ?? 0, boxes[i + 3] ?? 0);
  }
  index.finish();
  let pairs = 0;
  for (let a = 0; a < count; a++) {
    const i = 4 * a;
    const [x0, y0, x1, y1] = [boxes[i] ?? 0, boxes[i + 1] ?? 0, boxes[i + 2] ?? 0, boxes[i + 3] ?? 0];
    index.search(x0 - slack, y0 - slack, x1 + slack, y1 + slack, (b) => {
      if (b > a) {
        pairs++;
        meet(a, b);
      }
      return false;
    });
    if (pairs > mostPairs) return false;
  }
  return true;
}

/** Places of the values in rising order; equal ones in the order they stand. */
export function sortedBy(values: Float64Array): Int32Array {
  const order = new Int32Array(values.length);
  for (let i = 0; i < order.length; i++) order[i] = i;
  return order.sort((a, b) => {
    const u = values[a] ?? 0;
    const v = values[b] ?? 0;
    return u < v ? -1 : u > v ? 1 : a - b;
  });
}

/** Steps the range of the values is divided into for sorting. */
const sortSteps = 2 ** 32 - 1;
const half = 2 ** 16;

/**
 * Places of the values in rising order but for those within a `sortSteps`th of their range, which stay as they are. Sorted by the two halves of a whole number, which is
 * several times quicker than comparing.
 */
export function nearlySortedBy(values: Float64Array): Int32Array {
  const count = values.length;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < count; i++) {
    const value = values[i] ?? 0;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  const steps = new Uint32Array(count);
  const scale = high > low ? sortSteps / (high - low) : 0;
  for (let i = 0; i < count; i++) steps[i] = ((values[i] ?? 0) - low) * scale;
  let order = new Int32Array(count);
  for (let i = 0; i < count; i++) order[i] = i;
  let next = new Int32Array(count);
  for (const shift of [0, 16]) {
    const places = new Int32Array(half + 1);
    for (let i = 0; i < count; i++) {
      const bucket = (((steps[i] ?? 0) >>> shift) & (half - 1)) + 1;
      places[bucket] = (places[bucket] ?? 0) + 1;
    }
    for (let bucket = 1; bucket <= half; bucket++) places[bucket] = (places[bucket] ?? 0) + (places[bucket - 1] ?? 0);
    for (let k = 0; k < count; k++) {
      const i = order[k] ?? 0;
      const bucket = ((steps[i] ?? 0) >>> shift) & (half - 1);
      const place = places[bucket] ?? 0;
      next[place] = i;
      places[bucket] = place + 1;
    }
    [order, next] = [next, order];
  }
  return order;
}

/** Comparisons of equal keys at most: then what is left counts as different. */
const mostCompared = 20_000_000;

/**
 * Numbers by which equal things lie together when sorted: `keys[i]` may be off by at most `slack` between two equal ones. Calls `same` for each pair
 * near enough until it returns true, and gives each thing the first it is the same as, or itself; null when all are different.
 */
export function firstOfEach(
  keys: Float64Array,
  slack: number,
  same: (a: number, b: number) => boolean,
): Int32Array | null {
  // sorting numbers alone is quick, and mostly shows that no two are near
  const sorted = Float64Array.from(keys).sort();
  let near = false;
  for (let i = 1; i < sorted.length && !near; i++) near = (sorted[i] ?? 0) - (sorted[i - 1] ?? 0) <= slack;
  if (!near) return null;
  const order = nearlySortedBy(keys);
  const first = Int32Array.from(keys, (_, i) => i);
  let budget = mostCompared;
  for (let i = 0; i < order.length; i++) {
    const a = order[i] ?? 0;
    if (first[a] !== a) continue;
    for (let k = i + 1; k < order.length && budget > 0; k++, budget--) {
      const b = order[k] ?? 0;
      if ((keys[b] ?? 0) - (keys[a] ?? 0) > slack) break;
      if (first[b] === b && same(a, b)) first[b] = a;
    }
  }
  // the first in the file stands for its like, whichever was sorted first
  const least = Int32Array.from(first);
  for (let i = 0; i < first.length; i++) {
    const head = first[i] ?? i;
    least[head] = Math.min(least[head] ?? head, i);
  }
  return first.map((head) => least[head] ?? head);
}

/** A number in which places a little apart differ a little, and others hardly ever agree. The shares are irrational to each other. */
export const placeKey = (p: Point, q: Point, between: Point): number =>
  0.7548776662 * (p.x + q.x) + 0.5698402909 * (p.y + q.y) + 0.3819660113 * between.x + 0.2360679775 * between.y;

import type { Point } from '../point.ts';
import { pointCross, pointDistance, pointDot } from '../point.ts';
import type { Segment } from '../segment.ts';
import { lineBetween, segmentEnd, segmentReverse, segmentStart, segmentTangentAt } from '../segment.ts';
import type { Joints } from './join.ts';
import type { Piece } from './piece.ts';
import { segmentBoxes, nearlySortedBy } from './soup.ts';

/** What is put together: pieces, their places among what was drawn, and which were cut off longer ones. */
export type Parts = {
  readonly pieces: readonly Piece[];
  readonly order: Int32Array;
  readonly cut: { readonly has: (i: number) => boolean };
};

/** Pieces put together. `order` is the place of its first piece. */
export type Chain = {
  readonly segments: readonly Segment[];
  readonly layer: string;
  readonly order: number;
  /** Places of all its pieces. */
  readonly members: readonly number[];
};

export type Chains = { readonly closed: Chain[]; readonly open: Chain[]; readonly branches: Point[] };

/**
 * Pieces joined at their joints, each as often as `used` says. Pieces that end nowhere are taken off first, so that a line which only touches an outline does
 * not open it. Where more than two ends meet, a contour is begun at its leftmost place and walked with the part to the left, turning as far to the left as it goes, on
 * its own layer where that leads on: so contours that touch in a point or share an edge come out one by one. Such places are returned as branches.
 */
export function chainPieces(parts: Parts, joints: Joints, used: Uint8Array): Chains {
  return new Web(parts, joints, used).chains();
}

/** A step along an edge: twice its number, and one more against the sense it was drawn in. */
type Step = number;

const edgeOf = (step: Step): number => step >> 1;
const isReversed = (step: Step): boolean => (step & 1) === 1;

/** Where more than this many ends meet, no way on is better than another: the first free one is taken. */
const crowd = 32;
/** Directions nearer than this are one, rad. */
const tangent = 1e-7;

class Web {
  readonly #parts: Parts;
  /** Piece of each edge: a piece used twice is two edges. */
  readonly #piece: Int32Array;
  /** Joints at the ends of each edge: 2e and 2e + 1. */
  readonly #ends: Int32Array;
  /** Edges at each joint, one list behind the other. */
  readonly #first: Int32Array;
  readonly #list: Int32Array;
  /** Steps of a list that lead to nothing more are passed over once and for all. */
  readonly #from: Int32Array;
  readonly #done: Uint8Array;
  /** Edges that lead to nothing closed. */
  readonly #alone: Uint8Array;
  /** How many edges that lead to nothing closed are left at each joint. */
  readonly #dangling: Int32Array;
  /** Place along the walk of each joint passed, or −1. */
  readonly #passed: Int32Array;
  readonly #closed: Chain[] = [];
  readonly #open: Chain[] = [];

  constructor(parts: Parts, joints: Joints, used: Uint8Array) {
    this.#parts = parts;
    let count = 0;
    for (let i = 0; i < parts.pieces.length; i++) count += used[i] ?? 0;
    this.#piece = new Int32Array(count);
    this.#ends = new Int32Array(2 * count);
    let edge = 0;
    for (let i = 0; i < parts.pieces.length; i++) {
      for (let k = used[i] ?? 0; k > 0; k--) {
        this.#piece[edge] = i;
        this.#ends[2 * edge] = joints.at[2 * i] ?? 0;
        this.#ends[2 * edge + 1] = joints.at[2 * i + 1] ?? 0;
        edge++;
      }
    }
    const first = new Int32Array(joints.count + 1);
    for (const joint of this.#ends) first[joint + 1] = (first[joint + 1] ?? 0) + 1;
    for (let joint = 0; joint < joints.count; joint++) first[joint + 1] = (first[joint + 1] ?? 0) + (first[joint] ?? 0);
    const fill = first.slice(0, joints.count);
    this.#list = new Int32Array(2 * count);
    for (let end = 0; end < 2 * count; end++) {
      const joint = this.#ends[end] ?? 0;
      this.#list[fill[joint] ?? 0] = end >> 1;
      fill[joint] = (fill[joint] ?? 0) + 1;
    }
    this.#first = first;
    this.#from = first.slice(0, joints.count);
    this.#done = new Uint8Array(count);
    this.#alone = new Uint8Array(count);
    this.#dangling = new Int32Array(joints.count);
    this.#passed = new Int32Array(joints.count).fill(-1);
  }

  chains(): Chains {
    this.#peel();
    const branches = this.#branches();
    const count = this.#piece.length;
    // most contours have no branch at all: begun anywhere they come back
    if (branches.length === 0) {
      for (let edge = 0; edge < count; edge++) if (!this.#alone[edge]) this.#walk(2 * edge, 0);
    } else this.#walkFromLeft();
    // what ends somewhere, from its ends, so that it comes out whole
    for (let edge = 0; edge < count; edge++) {
      if (!this.#alone[edge] || this.#done[edge]) continue;
      if (this.#dangling[this.#ends[2 * edge] ?? 0] === 1) this.#walk(2 * edge, 1);
      else if (this.#dangling[this.#ends[2 * edge + 1] ?? 0] === 1) this.#walk(2 * edge + 1, 1);
    }
    for (let edge = 0; edge < count; edge++) this.#walk(2 * edge, this.#alone[edge] === 1 ? 1 : 0);
    const byOrder = (a: Chain, b: Chain) => a.order - b.order;
    return { closed: this.#closed.sort(byOrder), open: this.#open.sort(byOrder), branches };
  }

  /** Marks the edges that end alone, again and again. */
  #peel(): void {
    const joints = this.#passed.length;
    const left = new Int32Array(joints);
    const stack: number[] = [];
    for (let joint = 0; joint < joints; joint++) {
      left[joint] = (this.#first[joint + 1] ?? 0) - (this.#first[joint] ?? 0);
      if (left[joint] === 1) stack.push(joint);
    }
    for (let joint = stack.pop(); joint !== undefined; joint = stack.pop()) {
      for (let at = this.#first[joint] ?? 0; at < (this.#first[joint + 1] ?? 0); at++) {
        const edge = this.#list[at] ?? 0;
        if (this.#alone[edge]) continue;
        this.#alone[edge] = 1;
        this.#count(edge, 1);
        const other = this.#otherEnd(edge, joint);
        left[other] = (left[other] ?? 0) - 1;
        if (left[other] === 1) stack.push(other);
      }
    }
  }

  #otherEnd(edge: number, joint: number): number {
    const from = this.#ends[2 * edge] ?? 0;
    return from === joint ? (this.#ends[2 * edge + 1] ?? 0) : from;
  }

  #count(edge: number, by: 1 | -1): void {
    for (const joint of [this.#ends[2 * edge] ?? 0, this.#ends[2 * edge + 1] ?? 0]) {
      this.#dangling[joint] = (this.#dangling[joint] ?? 0) + by;
    }
  }

  #take(step: Step): void {
    const edge = edgeOf(step);
    this.#done[edge] = 1;
    if (this.#alone[edge]) this.#count(edge, -1);
  }

  #branches(): Point[] {
    const found: Point[] = [];
    for (let joint = 0; joint < this.#passed.length; joint++) {
      const from = this.#first[joint] ?? 0;
      const to = this.#first[joint + 1] ?? 0;
      if (to - from <= 2) continue;
      let count = 0;
      let last = -1;
      for (let at = from; at < to; at++) {
        const edge = this.#list[at] ?? 0;
        if (this.#alone[edge]) continue;
        count++;
        last = edge;
      }
      if (count > 2) found.push(this.#endPoint(last, this.#ends[2 * last] === joint));
    }
    return found;
  }

  #segments(edge: number): readonly Segment[] {
    return this.#parts.pieces[this.#piece[edge] ?? 0]?.segments ?? [];
  }

  #endPoint(edge: number, atStart: boolean): Point {
    const segments = this.#segments(edge);
    const segment = atStart ? segments[0] : segments.at(-1);
    if (!segment) throw new RangeError('a piece without segments has no ends');
    return atStart ? segmentStart(segment) : segmentEnd(segment);
  }

  #walkFromLeft(): void {
    const lefts = Float64Array.from(this.#piece, (piece) => leftOf(this.#parts.pieces[piece]?.segments ?? []));
    for (const edge of nearlySortedBy(lefts)) {
      if (!this.#alone[edge] && !this.#done[edge]) this.#walk(this.#firstStep(edge, lefts[edge] ?? 0), 0);
    }
  }

  /**
   * The leftmost of the edges that are left, in the sense that has the inside on its left: downwards where its leftmost place is between its ends; at an end,
   * the edge there that leaves lowest.
   */
  #firstStep(edge: number, left: number): Step {
    const [start, end] = [this.#endPoint(edge, true), this.#endPoint(edge, false)];
    const slack = 1e-9 + 1e-9 * Math.abs(left);
    if (Math.min(start.x, end.x) - left > slack) return 2 * edge + (descends(this.#segments(edge), left) ? 0 : 1);
    const fromStart = start.x < end.x || (start.x === end.x && start.y < end.y);
    const joint = this.#ends[2 * edge + (fromStart ? 0 : 1)] ?? 0;
    let best = 2 * edge + (fromStart ? 0 : 1);
    let lowest = Infinity;
    const from = this.#first[joint] ?? 0;
    for (let at = from; at < Math.min(this.#first[joint + 1] ?? 0, from + crowd); at++) {
      const other = this.#list[at] ?? 0;
      if (this.#done[other] || this.#alone[other]) continue;
      for (const side of [0, 1]) {
        if (this.#ends[2 * other + side] !== joint) continue;
        const { x, y } = this.#tangent(2 * other + side, 0);
        const slope = Math.atan2(y, x);
        if (slope < lowest) {
          lowest = slope;
          best = 2 * other + side;
        }
      }
    }
    return best;
  }

  /** Walks on from a step until it is back or there is no way on, along edges that lead nowhere (1) or those that don't (0). */
  #walk(begin: Step, alone: 0 | 1): void {
    if (this.#done[edgeOf(begin)]) return;
    const steps: Step[] = [begin];
    const tails: number[] = [this.#tail(begin)];
    this.#take(begin);
    this.#passed[tails[0] ?? 0] = 0;
    for (;;) {
      const last = steps.at(-1);
      if (last === undefined) break;
      const joint = this.#head(last);
      // back at a joint passed before? What lies between is a contour of its own
      const back = this.#passed[joint] ?? -1;
      if (back >= 0) {
        this.#closed.push(this.#chainOf(steps.splice(back), true));
        for (const one of tails.splice(back + 1)) this.#passed[one] = -1;
        if (steps.length === 0) break;
      } else {
        this.#passed[joint] = steps.length;
        tails.push(joint);
      }
      const from = steps.at(-1);
      const next = from === undefined ? -1 : this.#choose(from, joint, alone);
      if (next < 0) break;
      this.#take(next);
      steps.push(next);
    }
    for (const one of tails) this.#passed[one] = -1;
    if (steps.length > 0) this.#open.push(this.#chainOf(steps, false));
  }

  #tail(step: Step): number {
    return this.#ends[step] ?? 0;
  }

  #head(step: Step): number {
    return this.#ends[step ^ 1] ?? 0;
  }

  #choose(from: Step, joint: number, alone: 0 | 1): Step {
    const end = this.#first[joint + 1] ?? 0;
    const ways: Step[] = [];
    // those already walked at the head of the list are never looked at again
    let start = this.#from[joint] ?? 0;
    while (start < end && this.#done[this.#list[start] ?? 0]) start++;
    this.#from[joint] = start;
    const many = end - start > crowd;
    for (let at = start; at < end; at++) {
      const edge = this.#list[at] ?? 0;
      if (this.#done[edge] || this.#alone[edge] !== alone) continue;
      const step = 2 * edge + (this.#ends[2 * edge] === joint ? 0 : 1);
      if (many) return step;
      // one that begins and ends here stands in the list twice
      if (ways.at(-1) !== step) ways.push(step);
    }
    if (ways.length <= 1) return ways[0] ?? -1;
    const layer = this.#parts.pieces[this.#piece[edgeOf(from)] ?? 0]?.layer;
    const same = ways.filter((step) => this.#parts.pieces[this.#piece[edgeOf(step)] ?? 0]?.layer === layer);
    return this.#leftmost(from, same.length > 0 ? same : ways);
  }

  #leftmost(from: Step, ways: readonly Step[]): Step {
    const incoming = this.#tangent(from, 1);
    const turnOf = (step: Step): number => {
      // back along the copy of the very piece that led here is no way on
      if (this.#piece[edgeOf(step)] === this.#piece[edgeOf(from)]) return -Infinity;
      const outgoing = this.#tangent(step, 0);
      const turn = Math.atan2(pointCross(incoming, outgoing), pointDot(incoming, outgoing));
      return turn > Math.PI - tangent ? -Math.PI : turn;
    };
    let best = ways[0] ?? -1;
    let most = turnOf(best);
    for (const step of ways.slice(1)) {
      const turn = turnOf(step);
      // tangent to each other? Then the one that bends more to the left leaves the other on its right
      const more = Math.abs(turn - most) < tangent ? this.#bend(step) - this.#bend(best) : turn - most;
      if (!(more > 0)) continue;
      best = step;
      most = turn;
    }
    return best;
  }

  /** Direction of travel at the beginning (0) or the end (1) of a step. */
  #tangent(step: Step, at: 0 | 1): Point {
    const segments = this.#segments(edgeOf(step));
    const reversed = isReversed(step);
    const segment = (at === 0) !== reversed ? segments[0] : segments.at(-1);
    if (!segment) throw new RangeError('a piece without segments has no direction');
    if (!reversed) return segmentTangentAt(segment, at);
    const back = segmentTangentAt(segment, at === 0 ? 1 : 0);
    return { x: -back.x, y: -back.y };
  }

  /** Bend at the beginning of a step, 1/m, positive to the left. */
  #bend(step: Step): number {
    const segments = this.#segments(edgeOf(step));
    const segment = isReversed(step) ? segments.at(-1) : segments[0];
    if (!segment || segment.kind === 'line') return 0;
    return (Math.sign(segment.sweep) * (isReversed(step) ? -1 : 1)) / segment.radius;
  }

  #chainOf(steps: readonly Step[], round: boolean): Chain {
    const { pieces, order, cut } = this.#parts;
    const segments: Segment[] = [];
    const members: number[] = [];
    let least = Infinity;
    let parted = false;
    for (const step of steps) {
      const piece = this.#piece[edgeOf(step)] ?? 0;
      const place = order[piece] ?? 0;
      members.push(place);
      least = Math.min(least, place);
      parted ||= cut.has(piece);
      const own = pieces[piece]?.segments ?? [];
      if (!isReversed(step)) for (const segment of own) segments.push(segment);
      else for (const segment of own.map(segmentReverse).reverse()) segments.push(segment);
    }
    const layer = pieces[this.#piece[edgeOf(steps[0] ?? 0)] ?? 0]?.layer ?? '0';
    return { segments: parted ? whole(segments, round) : segments, layer, order: least, members };
  }
}

function leftOf(segments: readonly Segment[]): number {
  const [only] = segments;
  if (segments.length === 1 && only?.kind === 'line') return Math.min(only.start.x, only.end.x);
  const boxes = segmentBoxes(segments);
  let left = Infinity;
  for (let i = 0; i < boxes.length; i += 4) left = Math.min(left, boxes[i] ?? left);
  return left;
}

/** Whether the segments pass their leftmost place on the way down. */
function descends(segments: readonly Segment[], left: number): boolean {
  const boxes = segmentBoxes(segments);
  let best: Segment | undefined;
  let near = Infinity;
  for (const [i, segment] of segments.entries()) {
    const off = (boxes[4 * i] ?? Infinity) - left;
    if (off < near) {
      near = off;
      best = segment;
    }
  }
  if (best?.kind === 'arc') return best.sweep > 0;
  return !best || best.end.y < best.start.y;
}

/** Pieces that were cut where another began to lie on them are one again where both parts are used. */
function whole(segments: readonly Segment[], round: boolean): Segment[] {
  const joined: Segment[] = [];
  for (const segment of segments) {
    const before = joined.at(-1);
    const both = before ? together(before, segment) : null;
    if (both) joined[joined.length - 1] = both;
    else joined.push(segment);
  }
  const [first] = joined;
  const last = joined.at(-1);
  if (round && joined.length > 2 && first && last) {
    const both = together(last, first);
    if (both) return [both, ...joined.slice(1, -1)];
  }
  return joined;
}

function together(a: Segment, b: Segment): Segment | null {
  if (a.kind === 'line' && b.kind === 'line') {
    const [u, v] = [segmentTangentAt(a, 0), segmentTangentAt(b, 0)];
    return pointDot(u, v) > 0 && Math.abs(pointCross(u, v)) < 1e-9 ? lineBetween(a.start, b.end) : null;
  }
  if (a.kind === 'arc' && b.kind === 'arc') {
    const sweep = a.sweep + b.sweep;
    const same =
      a.sweep > 0 === b.sweep > 0 &&
      pointDistance(a.centre, b.centre) <= 1e-9 * a.radius &&
      Math.abs(a.radius - b.radius) <= 1e-9 * a.radius;
    return same && Math.abs(sweep) < 2 * Math.PI - 1e-6 ? { ...a, sweep } : null;
  }
  return null;
}

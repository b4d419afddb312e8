import type { Contour, Point } from '../../strategy/path/index.ts';
import { seededNumbers } from '../bench/line.ts';
import {
  contourArea,
  contourReverse,
  pointDistance,
  segmentBox,
  segmentEnd,
  segmentFromBulge,
  segmentMeetings,
  segmentPointAt,
  segmentStart,
} from '../../strategy/path/index.ts';

/** Numbers in [0, 1) from a seed: the same seed, the same contours. */
export const seeded = seededNumbers;

/** A closed contour through points, with bulges from each to the next (0 straight). */
export const bulged = (points: readonly Point[], bulges: readonly number[] = []): Contour => ({
  segments: points.map((p, i) => segmentFromBulge(p, points[(i + 1) % points.length] ?? p, bulges[i] ?? 0)),
});

const polar = (radius: number, angle: number): Point => ({
  x: radius * Math.cos(angle),
  y: radius * Math.sin(angle),
});

/** Spokes of random length about a centre, straight or bulged edges between their ends. Counter-clockwise. */
function star(random: () => number): Contour {
  const count = 5 + Math.floor(random() * 16);
  const round = random() < 0.7;
  const points = Array.from({ length: count }, (_, i) =>
    polar(0.02 + 0.08 * random(), (2 * Math.PI * (i + 0.8 * (random() - 0.5))) / count),
  );
  return bulged(
    points,
    points.map(() => (round && random() < 0.6 ? (random() - 0.5) * 1.2 : 0)),
  );
}

/** A curve drawn in many short straight pieces. */
function facets(random: () => number): Contour {
  const count = 60 + Math.floor(random() * 240);
  const waves = Array.from({ length: 5 }, () => ({
    size: 0.01 * random(),
    times: 1 + Math.floor(random() * 9),
    phase: 2 * Math.PI * random(),
  }));
  return bulged(
    Array.from({ length: count }, (_, i) => {
      const angle = (2 * Math.PI * i) / count;
      return polar(
        waves.reduce((sum, { size, times, phase }) => sum + size * Math.sin(times * angle + phase), 0.06),
        angle,
      );
    }),
  );
}

/** A plate with slots of random width, depth and end, some narrower than a kerf. */
function slotted(random: () => number): Contour {
  const points: Point[] = [
    { x: 0, y: 0 },
    { x: 0.2, y: 0 },
    { x: 0.2, y: 0.1 },
  ];
  const bulges = [0, 0, 0];
  for (let x = 0.185; x > 0.03;) {
    const width = 2e-4 + 6e-3 * random();
    const depth = 0.01 + 0.07 * random();
    const lean = (random() - 0.5) * 4e-3;
    points.push({ x, y: 0.1 }, { x: x + lean, y: 0.1 - depth });
    bulges.push(0, random() < 0.5 ? 1 : 0);
    points.push(
      { x: x + lean - width, y: 0.1 - depth },
      { x: x - width - (random() < 0.3 ? 2e-3 * random() : 0), y: 0.1 },
    );
    bulges.push(0, 0);
    x -= width + 4e-3 + 0.03 * random();
  }
  points.push({ x: 0, y: 0.1 });
  bulges.push(0);
  return bulged(points, bulges);
}

/** The outline of squares that share sides, grown one by one: edges in line, slots all of one width, places where four squares meet. */
const squares = (random: () => number): Contour => bulged(squareCorners(random));

function squareCorners(random: () => number): Point[] {
  const side = 4e-3;
  const key = (x: number, y: number) => `${x} ${y}`;
  const taken = new Map<string, readonly [number, number]>([[key(0, 0), [0, 0]]]);
  const count = 8 + Math.floor(random() * 60);
  const has = (x: number, y: number) => taken.has(key(x, y));
  while (taken.size < count) {
    const from = [...taken.values()][Math.floor(random() * taken.size)] ?? [0, 0];
    const [dx, dy] = [[1, 0] as const, [-1, 0] as const, [0, 1] as const, [0, -1] as const][
      Math.floor(random() * 4)
    ] ?? [1, 0];
    const [x, y] = [from[0] + dx, from[1] + dy];
    if (has(x, y)) continue;
    // squares that would touch in a corner alone make no contour
    const touches = [
      [-1, -1],
      [1, -1],
      [-1, 1],
      [1, 1],
    ].some(([i = 0, k = 0]) => has(x + i, y + k) && !has(x + i, y) && !has(x, y + k));
    if (!touches) taken.set(key(x, y), [x, y]);
  }
  // sides with a square on their left and none on their right, chained; the longest chain is the outer one
  const next = new Map<string, Point>();
  for (const [x, y] of taken.values()) {
    if (!has(x, y - 1)) next.set(key(x, y), { x: x + 1, y });
    if (!has(x + 1, y)) next.set(key(x + 1, y), { x: x + 1, y: y + 1 });
    if (!has(x, y + 1)) next.set(key(x + 1, y + 1), { x, y: y + 1 });
    if (!has(x - 1, y)) next.set(key(x, y + 1), { x, y });
  }
  const rings: Point[][] = [];
  while (next.size > 0) {
    const ring: Point[] = [];
    for (let at = [...next.values()][0]; at && next.has(key(at.x, at.y));) {
      const to: Point | undefined = next.get(key(at.x, at.y));
      next.delete(key(at.x, at.y));
      ring.push(at);
      at = to;
    }
    rings.push(ring);
  }
  const outer = rings.reduce((a, b) => (contourArea(bulged(b)) > contourArea(bulged(a)) ? b : a));
  const corners = outer.filter((p, i) => {
    const [a, b] = [outer.at(i - 1) ?? p, outer[(i + 1) % outer.length] ?? p];
    return (p.x - a.x) * (b.y - p.y) !== (p.y - a.y) * (b.x - p.x);
  });
  return corners.map(({ x, y }) => ({ x: x * side, y: y * side }));
}

/** The same with each corner rounded, some by as much as the sides allow, so that arcs follow on arcs without a kink. */
function rounded(random: () => number): Contour {
  const corners = squareCorners(random);
  const points: Point[] = [];
  const bulges: number[] = [];
  corners.forEach((p, i) => {
    const [a, b] = [corners.at(i - 1) ?? p, corners[(i + 1) % corners.length] ?? p];
    const radius = [0, 5e-4, 1e-3, 1.5e-3, 2e-3][Math.floor(5 * random())] ?? 0;
    const towards = (q: Point): Point => {
      const share = radius / pointDistance(p, q);
      return { x: p.x + share * (q.x - p.x), y: p.y + share * (q.y - p.y) };
    };
    const left = (p.x - a.x) * (b.y - p.y) - (p.y - a.y) * (b.x - p.x) > 0;
    points.push(towards(a));
    bulges.push(radius === 0 ? 0 : (left ? 1 : -1) * Math.tan(Math.PI / 8));
    if (radius === 0) return;
    points.push(towards(b));
    bulges.push(0);
  });
  // where two roundings take all of a side nothing straight is left between them
  const kept = points.flatMap((p, i) => {
    const next = points[(i + 1) % points.length] ?? p;
    return bulges[i] === 0 && pointDistance(p, next) < 1e-12 ? [] : [{ p, bulge: bulges[i] ?? 0 }];
  });
  return bulged(
    kept.map(({ p }) => p),
    kept.map(({ bulge }) => bulge),
  );
}

const kinds = { star, facets, slotted, squares, rounded } as const;
export type RandomKind = keyof typeof kinds;
export const randomKinds: readonly RandomKind[] = ['star', 'facets', 'slotted', 'squares', 'rounded'];

/** A random contour that does not cross itself, counter-clockwise, about 0.1 m in size. */
export function randomContour(random: () => number, kind: RandomKind): Contour {
  for (let tries = 0; tries < 1000; tries++) {
    const contour = kinds[kind](random);
    if (!crossesItself(contour)) return contourArea(contour) > 0 ? contour : contourReverse(contour);
  }
  throw new Error(`no ${kind} that does not cross itself in 1000 tries`);
}

function crossesItself({ segments }: Contour): boolean {
  const boxes = segments.map(segmentBox);
  return segments.some((a, i) => {
    const box = boxes[i];
    return segments.some((b, k) => {
      const other = boxes[k];
      if (k <= i || !box || !other) return false;
      if (box.maxX < other.minX || other.maxX < box.minX || box.maxY < other.minY || other.maxY < box.minY)
        return false;
      const ends = [segmentStart(a), segmentEnd(a)];
      return segmentMeetings(a, b).some((p) => ends.every((end) => pointDistance(end, p) > 1e-9));
    });
  });
}

/** A contour as points, its arcs cut into chords that stand off them by `deviation` m at most. */
export function flattened({ segments }: Contour, deviation: number): Point[] {
  return segments.flatMap((segment) => {
    if (segment.kind === 'line') return [segment.start];
    const step = 2 * Math.acos(Math.max(-1, 1 - deviation / segment.radius));
    const parts = Math.max(1, Math.ceil(Math.abs(segment.sweep) / step));
    return Array.from({ length: parts }, (_, i) => segmentPointAt(segment, i / parts));
  });
}

import { area, ClipperOffset, EndType, JoinType } from 'clipper2-ts';
import type { Path64, Paths64 } from 'clipper2-ts';
import { contourOffset } from '../../strategy/path/compensation/index.ts';
import type { Contour } from '../../strategy/path/index.ts';
import { circleOf, contourArea, segmentPointAt, segmentPointDistance } from '../../strategy/path/index.ts';
import { bulged, flattened, randomContour, randomKinds, seeded } from '../support/random-contours.ts';
import { sayLine, timeOf } from './line.ts';

const kerf = 1.6e-3;
/**
 * Error that the peer is asked to keep, m: the step of whole numbers that a plate in 10⁻⁴ mm has. Its chords stand off their arcs by no more, before the offset
 * and in what it rounds. Ours keeps arcs and is exact to rounding: with chords the same is not to be had in any time.
 */
const error = 1e-7;
const unit = 1e-8;

// Two hundred contours as a plate has them: bores, outlines of lines and arcs, curves in short pieces.
const random = seeded(20_261_201);
const contours: Contour[] = Array.from({ length: 200 }, (_, i) =>
  i % 3 === 0
    ? { segments: [circleOf({ x: random(), y: random() }, 4e-3 + 0.03 * random())] }
    : randomContour(random, randomKinds[i % randomKinds.length] ?? 'star'),
);

const ours = (contour: Contour): number =>
  contourOffset(contour, kerf / 2, { outside: { kind: 'arc' } }).reduce(
    (count, loop) => count + loop.contour.segments.length,
    0,
  );

function peer(contour: Contour): number {
  return peerPaths(contour).reduce((count, points) => count + points.length, 0);
}

function peerPaths(contour: Contour): Paths64 {
  const offset = new ClipperOffset(2, error / unit);
  const path: Path64 = flattened(contour, error).map(({ x, y }) => ({
    x: Math.round(x / unit),
    y: Math.round(y / unit),
  }));
  offset.addPath(path, JoinType.Round, EndType.Polygon);
  const solution: Paths64 = [];
  offset.execute(kerf / 2 / unit, solution);
  return solution;
}

/** Largest error of an area within the path, as a share of it, over the circles: there it is known. */
function largestAreaError(areaOf: (contour: Contour) => number): number {
  return contours.reduce((largest, contour) => {
    const [circle] = contour.segments;
    if (contour.segments.length !== 1 || circle?.kind !== 'arc') return largest;
    const exact = Math.PI * (circle.radius + kerf / 2) ** 2;
    return Math.max(largest, Math.abs(areaOf(contour) / exact - 1));
  }, 0);
}
const areaErrors = {
  ours: largestAreaError((contour) =>
    contourOffset(contour, kerf / 2, { outside: { kind: 'arc' } }).reduce(
      (sum, one) => sum + contourArea(one.contour),
      0,
    ),
  ),
  peer: largestAreaError((contour) => peerPaths(contour).reduce((sum, points) => sum + area(points) * unit ** 2, 0)),
};
console.error(`largest area error of circles: ours ${areaErrors.ours}, peer ${areaErrors.peer}`);

/** How far places of our path are from half a kerf away from the contour, as a share of it. */
const errors = contours.flatMap((contour) =>
  contourOffset(contour, kerf / 2, { outside: { kind: 'arc' } }).flatMap((loop) =>
    loop.contour.segments.map((segment) => {
      const place = segmentPointAt(segment, 0.37);
      const distance = contour.segments.reduce((least, s) => Math.min(least, segmentPointDistance(s, place)), Infinity);
      return Math.abs(distance / (kerf / 2) - 1);
    }),
  ),
);

/** A wavy outline in `count` short pieces. */
const wavy = (count: number): Contour =>
  bulged(
    Array.from({ length: count }, (_, i) => {
      const angle = (2 * Math.PI * i) / count;
      const radius = 0.5 + 0.03 * Math.sin(9 * angle);
      return { x: radius * Math.cos(angle), y: radius * Math.sin(angle) };
    }),
  );
const [few, many] = [wavy(1000), wavy(8000)];
const timeOfOne = (contour: Contour) => timeOf(() => ours(contour), { warmUp: 3, rounds: 7, calls: 1 });
const exponent = Math.log(timeOfOne(many) / timeOfOne(few)) / Math.log(8);

const all = (work: (contour: Contour) => number) => () => contours.reduce((sum, contour) => sum + work(contour), 0);
const oursTime = timeOf(all(ours), { warmUp: 5, rounds: 31, calls: 1 });
const peerTime = timeOf(all(peer), { warmUp: 2, rounds: 5, calls: 1 });
sayLine({
  case: 'offset',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms',
  ratio: peerTime / oursTime,
  errorMean: errors.reduce((sum, one) => sum + one, 0) / errors.length,
  errorMax: Math.max(...errors),
  exponent,
});

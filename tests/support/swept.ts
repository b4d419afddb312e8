import { area, EndType, FillRule, inflatePaths, intersect, JoinType, type Path64, type Paths64 } from 'clipper2-ts';
import type { Contour, Point, Segment } from '../../strategy/path/index.ts';
import { segmentLength, segmentPointAt } from '../../strategy/path/index.ts';

/** Whole units a metre for the polygon package: a hundredth of a micrometre. */
const scale = 1e8;
const chord = 2e-4; // m

const whole = ({ x, y }: Point) => ({ x: Math.round(x * scale), y: Math.round(y * scale) });

/** Places along a path, arcs in chords. */
function flattened(path: readonly Segment[]): Path64 {
  return path.flatMap((segment) => {
    const steps = segment.kind === 'line' ? 1 : Math.max(8, Math.ceil(segmentLength(segment) / chord));
    return Array.from({ length: steps + 1 }, (_, i) => whole(segmentPointAt(segment, i / steps)));
  });
}

const total = (paths: Paths64): number => Math.abs(paths.reduce((sum, path) => sum + area(path), 0)) / scale ** 2;

/** What a kerf of a width (m) along a path takes from a part, m²: swept and overlapped by a general polygon package. */
export function sweptOverlap(path: readonly Segment[], kerfWidth: number, part: Contour): number {
  const swept = inflatePaths(
    [flattened(path)],
    (kerfWidth / 2) * scale,
    JoinType.Round,
    EndType.Round,
    2,
    0.002 * scale * 1e-3,
  );
  return total(intersect(swept, [flattened(part.segments)], FillRule.NonZero));
}

/** Area within a closed outline less a strip of `by` m along it, m², by the same package. */
export function areaInside(outline: readonly Point[], by: number): number {
  const path = outline.map(whole);
  const counterClockwise = area(path) < 0 ? path.reverse() : path;
  return total(inflatePaths([counterClockwise], -by * scale, JoinType.Miter, EndType.Polygon, 100));
}

import { ClipperOffset, EndType, JoinType } from 'clipper2-ts';
import type { Path64, Paths64 } from 'clipper2-ts';
import { describe, expect, it } from 'vitest';
import { contourOffset } from '../../../strategy/path/compensation/index.ts';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import { contourArea, contourLength, segmentPointDistance } from '../../../strategy/path/index.ts';
import { flattened, randomContour, randomKinds, seeded } from '../../support/random-contours.ts';
import { runs } from '../../support/runs.ts';

// An independent polygon offset, in whole numbers of 10 nm; arcs go into it as chords.
const unit = 1e-8;
const flattening = 2e-7;

function peerOffset(contour: Contour, distance: number, join: JoinType, limit: number): Point[][] {
  const offset = new ClipperOffset(limit, flattening / unit);
  const path: Path64 = flattened(contour, flattening).map(({ x, y }) => ({
    x: Math.round(x / unit),
    y: Math.round(y / unit),
  }));
  offset.addPath(path, join, EndType.Polygon);
  const solution: Paths64 = [];
  offset.execute(distance / unit, solution);
  return solution.map((points) => points.map(({ x, y }) => ({ x: x * unit, y: y * unit })));
}

const polygonArea = (points: readonly Point[]): number =>
  points.reduce((sum, a, i) => {
    const b = points[(i + 1) % points.length] ?? a;
    return sum + a.x * b.y - a.y * b.x;
  }, 0) / 2;

describe('agreement with an independent polygon offset', () => {
  it.each(randomKinds)(
    'over %s: the same area, and no place farther from the other than chords are from arcs',
    (kind) => {
      for (let seed = 1; seed <= runs(2, 1000); seed++) {
        const random = seeded(seed * 7919);
        const contour = randomContour(random, kind);
        const length = contourLength(contour);
        for (const distance of [2e-4 + 3e-3 * random(), -(2e-4 + 3e-3 * random()), 2e-3, 1e-3, -2e-3]) {
          const straight = kind === 'facets' || kind === 'squares';
          for (const sharp of straight ? [false, true] : [false]) {
            const limit = 30;
            const ours = contourOffset(contour, distance, {
              outside: sharp ? { kind: 'sharp', limit } : { kind: 'arc' },
            });
            const peer = peerOffset(contour, distance, sharp ? JoinType.Miter : JoinType.Round, limit);
            const area = ours.reduce((sum, loop) => sum + contourArea(loop.contour), 0);
            const theirs = peer.reduce((sum, points) => sum + polygonArea(points), 0);
            const allowed = (length + 2 * Math.PI * Math.abs(distance)) * 4 * flattening;
            const what = `${kind}, seed ${seed}, ${distance} m, ${sharp ? 'sharp' : 'round'}`;
            expect(Math.abs(area - theirs), what).toBeLessThan(allowed);
            // every one of its points lies on our path: but at the ends of closing necks, which grow by the root of the error
            const path = ours.flatMap((loop) => loop.contour.segments);
            const off = peer
              .filter((points) => Math.abs(polygonArea(points)) > 1e-8)
              .flat()
              .map((p) => path.reduce((least, segment) => Math.min(least, segmentPointDistance(segment, p)), Infinity));
            const share = off.filter((d) => d > 4 * flattening).length / Math.max(1, off.length);
            expect(share, what).toBeLessThan(0.02);
            if (off.length > 0) expect(Math.max(...off), what).toBeLessThan(1e-4);
          }
        }
      }
    },
  );
});

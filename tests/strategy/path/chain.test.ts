import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  lineBetween,
  pathLength,
  pointDistance,
  segmentEnd,
  segmentReverse,
  segmentStart,
} from '../../../strategy/path/index.ts';
import { chainPieces } from '../../../strategy/path/drawing/chain.ts';
import { joinEnds } from '../../../strategy/path/drawing/join.ts';
import type { Piece } from '../../../strategy/path/drawing/piece.ts';

const tolerance = 1e-6;
/** Joined where the ends are within the tolerance, each piece used once. */
function chained(pieces: readonly Piece[], gap: number) {
  const order = Int32Array.from(pieces, (_, i) => i);
  const joints = joinEnds(pieces, Math.min(gap, tolerance / 100), gap);
  return chainPieces({ pieces, order, cut: new Set() }, joints, new Uint8Array(pieces.length).fill(1));
}
const unit = fc.double({ min: -1, max: 1, noNaN: true });

describe('pieces put together', () => {
  it('close wherever their ends are within the tolerance, in any order and sense', () => {
    const polygons = fc.array(fc.integer({ min: 3, max: 9 }), { minLength: 1, maxLength: 6 });
    fc.assert(
      fc.property(
        polygons,
        fc.array(unit, { minLength: 200, maxLength: 200 }),
        fc.array(fc.nat(1e6), { minLength: 60, maxLength: 60 }),
        unit,
        (sides, noise, shuffle, far) => {
          let n = 0;
          // two ends of a joint are each off by less than half the tolerance
          const off = () => (noise[n++ % noise.length] ?? 0) * tolerance * 0.3;
          const pieces = sides.flatMap((count, i) =>
            Array.from({ length: count }, (_, k) => {
              const at = (j: number) => ({
                x: far + 0.3 * i + 0.1 * Math.cos((2 * Math.PI * j) / count) + off(),
                y: 0.1 * Math.sin((2 * Math.PI * j) / count) + off(),
              });
              const line = lineBetween(at(k), at((k + 1) % count));
              return { segments: [off() > 0 ? line : segmentReverse(line)], layer: '0' };
            }),
          );
          const order = pieces
            .map((piece, i) => ({ piece, key: shuffle[i % shuffle.length] ?? 0 }))
            .sort((a, b) => a.key - b.key);
          const { closed, open, branches } = chained(
            order.map(({ piece }) => piece),
            tolerance,
          );
          expect([closed.length, open.length, branches.length]).toEqual([sides.length, 0, 0]);
          for (const { segments } of closed) {
            segments.forEach((segment, i) => {
              const next = segments[(i + 1) % segments.length];
              if (next) expect(pointDistance(segmentEnd(segment), segmentStart(next))).toBeLessThanOrEqual(tolerance);
            });
          }
        },
      ),
    );
  });

  it('stay apart when their ends are farther than the tolerance', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1.01, max: 5, noNaN: true }),
        fc.double({ min: 0, max: 6.3, noNaN: true }),
        unit,
        (gap, angle, far) => {
          const end = { x: far, y: far };
          const start = { x: far + gap * tolerance * Math.cos(angle), y: far + gap * tolerance * Math.sin(angle) };
          const pieces = [
            { segments: [lineBetween({ x: far - 1, y: 0 }, end)], layer: '0' },
            { segments: [lineBetween(start, { x: far + 1, y: 5 })], layer: '0' },
          ];
          expect(chained(pieces, tolerance).open).toHaveLength(2);
        },
      ),
    );
  });

  it('join only at the very same place when no tolerance is allowed', () => {
    const pieces = [
      { segments: [lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0.3 })], layer: '0' },
      { segments: [lineBetween({ x: 0.1, y: 0.3 }, { x: 1, y: 1 })], layer: '0' },
      { segments: [lineBetween({ x: 1 + 1e-15, y: 1 }, { x: 2, y: 1 })], layer: '0' },
    ];
    expect(chained(pieces, 0).open.map((c) => c.segments.length)).toEqual([2, 1]);
  });

  it('that only touch an outline do not open it', () => {
    const corners = [
      { x: 0, y: 0 },
      { x: 1, y: 0 },
      { x: 1, y: 1 },
      { x: 0, y: 1 },
    ];
    const outline = corners.map((p, i) => ({ segments: [lineBetween(p, corners[(i + 1) % 4] ?? p)], layer: '0' }));
    const mark = { segments: [lineBetween({ x: 1, y: 1 }, { x: 2, y: 2 })], layer: '0' };
    const { closed, open } = chained([mark, ...outline], tolerance);
    expect([closed.map((c) => pathLength(c.segments)), open.length]).toEqual([[4], 1]);
  });

  it('of two contours that touch in a point come out as two', () => {
    const loop = (sign: number) => {
      const corners = [
        { x: 0, y: 0 },
        { x: sign, y: 0.5 },
        { x: sign, y: -0.5 },
      ];
      return corners.map((p, i) => ({ segments: [lineBetween(p, corners[(i + 1) % 3] ?? p)], layer: '0' }));
    };
    const { closed, branches } = chained([...loop(1), ...loop(-1)], tolerance);
    expect(closed.map((c) => c.segments.length)).toEqual([3, 3]);
    expect(branches).toHaveLength(1);
  });

  // once every end was compared with every other: twenty thousand lines through one point took a minute and a half
  it('that meet by thousands in one place are still put together, two by two', () => {
    const pieces = Array.from({ length: 20_000 }, (_, i) => ({
      segments: [lineBetween({ x: 0, y: 0 }, { x: Math.cos(i), y: Math.sin(i) })],
      layer: '0',
    }));
    const { closed, open } = chained(pieces, tolerance);
    expect([closed.length, open.length]).toEqual([0, 10_000]);
  });
});

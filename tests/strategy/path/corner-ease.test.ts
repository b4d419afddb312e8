import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  arcOf,
  easedInto,
  easedOutOf,
  easedShare,
  lineBetween,
  pathLength,
  pathPart,
  pathWithoutLast,
  pointDistance,
  segmentEnd,
  segmentLength,
  segmentReverse,
  segmentStart,
} from '../../../strategy/path/index.ts';

const path = [
  lineBetween({ x: 0, y: 0 }, { x: 0.01, y: 0 }),
  arcOf({ x: 0.01, y: 0.005 }, 0.005, -Math.PI / 2, Math.PI / 2),
  lineBetween({ x: 0.015, y: 0.005 }, { x: 0.015, y: 0.02 }),
];
const whole = pathLength(path);
const lengths = fc.double({ min: 1e-4, max: 0.04, noNaN: true });

describe('a part of a path', () => {
  it('has the length asked for, joins up, and the parts before and after make the whole', () => {
    fc.assert(
      fc.property(lengths, lengths, (a, b) => {
        const [from, to] = [Math.min(a, b), Math.max(a, b)];
        const part = pathPart(path, from, to);
        expect(pathLength(part)).toBeCloseTo(Math.max(0, Math.min(to, whole) - Math.min(from, whole)), 12);
        part.slice(1).forEach((segment, i) => {
          const before = part[i];
          if (before) expect(pointDistance(segmentEnd(before), segmentStart(segment))).toBeLessThan(1e-12);
        });
        const rest = pathLength(pathPart(path, 0, from)) + pathLength(pathPart(path, to, Infinity));
        expect(rest + pathLength(part)).toBeCloseTo(whole, 12);
        expect(pathLength(pathWithoutLast(path, from))).toBeCloseTo(Math.max(0, whole - from), 12);
      }),
    );
  });
});

describe('an ease', () => {
  it('covers the last of the path and no more, rising evenly to the corner', () => {
    fc.assert(
      fc.property(lengths, (length) => {
        const { rest, eased } = easedInto(path, length);
        const taken = Math.min(length, whole);
        expect(pathLength(eased.map(({ segment }) => segment))).toBeCloseTo(taken, 12);
        expect(pathLength(rest)).toBeCloseTo(whole - taken, 12);
        const values = eased.map((piece) => piece.eased);
        expect([...values].sort((a, b) => a - b)).toEqual(values);
        // even steps: in the mean over the length it is half
        const mean = eased.reduce((sum, { segment, eased: by }) => sum + by * segmentLength(segment), 0) / taken;
        expect(mean).toBeCloseTo(0.5, 9);
        const last = eased.at(-1);
        expect(last && pointDistance(segmentEnd(last.segment), { x: 0.015, y: 0.02 })).toBeLessThan(1e-12);
      }),
    );
  });

  it('out of a corner is that into it, travelled the other way', () => {
    const reversed = path.map(segmentReverse).reverse();
    const [into, out] = [easedInto(path, 0.012).eased, easedOutOf(reversed, 0.012).eased];
    expect(out.map(({ eased }) => eased)).toEqual(into.map(({ eased }) => eased).reverse());
    expect(pathLength(easedOutOf(reversed, 0.012).rest)).toBeCloseTo(whole - 0.012, 12);
  });

  it('of no length changes nothing', () => {
    expect(easedInto(path, 0)).toEqual({ rest: path, eased: [] });
    expect(easedOutOf(path, 0)).toEqual({ rest: path, eased: [] });
  });

  it('is the share of the corner in the corner and the whole on the straight cut', () => {
    expect(easedShare(1, 0.4)).toBeCloseTo(0.4, 12);
    expect(easedShare(0, 0.4)).toBe(1);
    expect(easedShare(0.5, 0.4)).toBeCloseTo(0.7, 12);
  });
});

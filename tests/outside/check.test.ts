import { describe, expect, it } from 'vitest';
import { withinTolerance } from './check.ts';

describe('an outside value', () => {
  it('is met within a relative or an absolute tolerance, and exactly with none', () => {
    expect(withinTolerance(101, 100, { rel: 0.01 })).toBe(true);
    expect(withinTolerance(101.1, 100, { rel: 0.01 })).toBe(false);
    expect(withinTolerance(-99, -100, { rel: 0.01 })).toBe(true);
    expect(withinTolerance(5.4, 5, { abs: 0.5 })).toBe(true);
    expect(withinTolerance(5.6, 5, { abs: 0.5 })).toBe(false);
    expect(withinTolerance(2, 2, { abs: 0 })).toBe(true);
  });

  it('is kept as a bound', () => {
    expect(withinTolerance(25, 26, { bound: 'at most' })).toBe(true);
    expect(withinTolerance(27, 26, { bound: 'at most' })).toBe(false);
    expect(withinTolerance(27, 26, { bound: 'at least' })).toBe(true);
    expect(withinTolerance(25, 26, { bound: 'at least' })).toBe(false);
  });

  it('is never met by a value that is none', () => {
    for (const tolerance of [{ rel: 1 }, { abs: 1e9 }, { bound: 'at most' as const }, { bound: 'at least' as const }]) {
      expect(withinTolerance(Number.NaN, 1, tolerance)).toBe(false);
    }
  });
});

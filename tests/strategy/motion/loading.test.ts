import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  heightDefaults,
  heightMoves,
  loadingCost,
  loadingDefaults,
  loadingOf,
} from '../../../strategy/motion/index.ts';

describe('loading a plate', () => {
  it('costs all of its time without a second table', () => {
    expect(loadingCost(1200, { time: 300, exchange: 30, shuttleTable: false })).toEqual({ hidden: 0, added: 300 });
  });

  it('is hidden behind a longer cut with a second table, but for swapping the two', () => {
    expect(loadingCost(1200, { time: 300, exchange: 30, shuttleTable: true })).toEqual({ hidden: 300, added: 30 });
  });

  it('hides no more than the cut is long', () => {
    expect(loadingCost(120, { time: 300, exchange: 30, shuttleTable: true })).toEqual({ hidden: 120, added: 210 });
  });

  it('is hidden or added, and a longer cut never adds more', () => {
    const time = fc.double({ min: 0, max: 5000, noNaN: true });
    fc.assert(
      fc.property(time, time, time, fc.boolean(), (cut, load, exchange, shuttleTable) => {
        const of = (seconds: number) => loadingCost(seconds, { time: load, exchange, shuttleTable });
        const { hidden, added } = of(cut);
        expect(hidden + added).toBeCloseTo(load + (shuttleTable ? exchange : 0), 8);
        expect(of(cut + 100).added).toBeLessThanOrEqual(added);
      }),
    );
    expect(() => loadingCost(-1, { time: 1, exchange: 1, shuttleTable: true })).toThrow(/cut -1 s/);
  });
});

describe('what a machine’s profile says', () => {
  const bed = { length: 3, width: 1.5, shuttleTable: true };
  const axes = { maxFeed: 1, acceleration: 8, jerk: 80 };
  const standoffs = { pierceFrom: 0.01, pierceTo: 0.004, cut: 0.001 };

  it('of loading and of the head’s moves goes before what is assumed, number by number', () => {
    expect(loadingOf({ bed })).toEqual({ ...loadingDefaults, shuttleTable: true });
    expect(loadingOf({ bed, loading: { time: 120, exchange: null } })).toEqual({
      time: 120,
      exchange: loadingDefaults.exchange,
      shuttleTable: true,
    });
    expect(heightMoves({ axes }, standoffs)).toEqual({ ...heightDefaults, ...standoffs, jerk: 80 });
    expect(heightMoves({ axes, heights: { travel: null, speed: 0.3 } }, standoffs)).toMatchObject({
      travel: heightDefaults.travel,
      speed: 0.3,
    });
  });
});

import { describe, expect, it } from 'vitest';
import { integrate, type Derivative } from '../../../strategy/pierce/integrate.ts';

const oscillator: Derivative = (_, state, slope) => {
  slope[0] = state[1] ?? 0;
  slope[1] = -(state[0] ?? 0);
};

const NEVER = { stopAt: Number.POSITIVE_INFINITY };
const quiet = { step: () => undefined };

function errorWithSteps(steps: number): number {
  const state = new Float64Array([0, 1]);
  // A tolerance that is never missed makes every step the same.
  const size = 2 / steps;
  integrate(oscillator, state, 0, 2, { ...NEVER, tolerance: 1, firstStep: size, longestStep: size }, quiet);
  return Math.abs((state[0] ?? 0) - Math.sin(2));
}

describe('the integrator', () => {
  it('is of fifth order: half the step, a thirty-second of the error', () => {
    const order = Math.log2(errorWithSteps(10) / errorWithSteps(20));
    expect(order).toBeGreaterThan(4.6);
    expect(order).toBeLessThan(5.6);
  });

  it('keeps within its tolerance by itself', () => {
    const state = new Float64Array([0, 1]);
    integrate(oscillator, state, 0, 10, { ...NEVER, tolerance: 1e-10, firstStep: 1, longestStep: 10 }, quiet);
    expect(Math.abs((state[0] ?? 0) - Math.sin(10))).toBeLessThan(1e-8);
  });

  it('stops exactly where the first component reaches its bound', () => {
    const state = new Float64Array([0, 1]);
    const options = { tolerance: 1e-11, firstStep: 0.1, longestStep: 1, stopAt: 0.5 };
    const result = integrate(oscillator, state, 0, 10, options, quiet);
    expect(result.reached).toBe(true);
    expect(result.time).toBeCloseTo(Math.PI / 6, 9);
    expect(state[0]).toBeCloseTo(0.5, 12);
  });

  it('ends at the end when the bound is never reached', () => {
    const state = new Float64Array([0, 1]);
    const options = { tolerance: 1e-9, firstStep: 0.1, longestStep: 1, stopAt: 2 };
    expect(integrate(oscillator, state, 0, 3, options, quiet)).toEqual({ time: 3, reached: false });
  });

  it('hands over steps that join without a gap', () => {
    const ends: number[] = [];
    const state = new Float64Array([0, 1]);
    integrate(
      oscillator,
      state,
      1,
      4,
      { ...NEVER, tolerance: 1e-8, firstStep: 0.01, longestStep: 1 },
      {
        step: (start, _s, _ss, end) => {
          expect(start).toBe(ends.at(-1) ?? 1);
          ends.push(end);
        },
      },
    );
    expect(ends.at(-1)).toBe(4);
    expect(ends.length).toBeGreaterThan(4);
  });

  it('gives up with the time when the derivative is no number', () => {
    const broken: Derivative = (_, __, slope) => slope.fill(Number.NaN);
    const state = new Float64Array([0]);
    const options = { ...NEVER, tolerance: 1e-9, firstStep: 0.1, longestStep: 1 };
    expect(() => integrate(broken, state, 0, 1, options, quiet)).toThrow(RangeError);
  });
});

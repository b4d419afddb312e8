import { describe, expect, it } from 'vitest';
import { integrate, integrateRoom, type Slope } from '../../../strategy/pierce/integrate.ts';

/** x′ = cos t, written so that the value matters as well: x = sin t for a start at 0. */
const sine: Slope = (time, value, flows, place) => {
  flows[place] = Math.cos(time) ** 2;
  return Math.cos(time) + 2 * (Math.sin(time) - value);
};

const NEVER = { stopAt: Number.POSITIVE_INFINITY };

/** Error of the value and of the sum ∫cos² after so many equal steps. */
function errorsWithSteps(steps: number): readonly [number, number] {
  // A tolerance that is never missed makes every step the same.
  const size = 2 / steps;
  const room = integrateRoom(1, 1);
  const { value } = integrate(sine, room, 0, 0, 2, {
    ...NEVER,
    tolerance: 1,
    firstStep: size,
    longestStep: size,
  });
  return [Math.abs(value - Math.sin(2)), Math.abs((room.sums[0] ?? 0) - (1 + Math.sin(4) / 4))];
}

describe('the integrator', () => {
  it('is of fifth order, its sums too: half the step, a thirty-second of the error', () => {
    const [coarse, fine] = [errorsWithSteps(8), errorsWithSteps(16)];
    for (const i of [0, 1] as const) {
      const order = Math.log2(coarse[i] / fine[i]);
      expect(order).toBeGreaterThan(4.6);
      expect(order).toBeLessThan(6.4);
    }
  });

  it('keeps within its tolerance by itself', () => {
    const options = { ...NEVER, tolerance: 1e-10, firstStep: 1, longestStep: 10 };
    const { value } = integrate(sine, integrateRoom(1, 1), 0, 0, 10, options);
    expect(Math.abs(value - Math.sin(10))).toBeLessThan(1e-8);
  });

  it('stops exactly where the value reaches its bound, with the sums up to there', () => {
    const options = { tolerance: 1e-12, firstStep: 0.1, longestStep: 0.2, stopAt: 0.5 };
    const room = integrateRoom(1, 1);
    const result = integrate(sine, room, 0, 0, 10, options);
    expect(result.reached).toBe(true);
    expect(result.value).toBe(0.5);
    expect(result.time).toBeCloseTo(Math.PI / 6, 9);
    expect(room.sums[0]).toBeCloseTo(Math.PI / 12 + Math.sin(Math.PI / 3) / 4, 8);
  });

  it('ends at the end when the bound is never reached', () => {
    const options = { tolerance: 1e-9, firstStep: 0.1, longestStep: 1, stopAt: 2 };
    expect(integrate(sine, integrateRoom(1, 1), 0, 0, 3, options)).toMatchObject({ time: 3, reached: false });
  });

  it('hands over steps that join without a gap, in time, value and slope', () => {
    const ends: (readonly [number, number, number])[] = [];
    const options = { ...NEVER, tolerance: 1e-8, firstStep: 0.01, longestStep: 1 };
    integrate(sine, integrateRoom(1, 1), Math.sin(1), 1, 4, options, (start, value0, slope0, end, value1, slope1) => {
      expect([start, value0, slope0]).toEqual(ends.at(-1) ?? [1, Math.sin(1), Math.cos(1)]);
      ends.push([end, value1, slope1]);
      return false;
    });
    expect(ends.at(-1)?.[0]).toBe(4);
    expect(ends.length).toBeGreaterThan(4);
  });

  it('ends after the step that whoever watches has seen enough of', () => {
    const options = { ...NEVER, tolerance: 1e-8, firstStep: 0.01, longestStep: 0.5 };
    const result = integrate(sine, integrateRoom(1, 1), 0, 0, 4, options, (_s, _v, _k, end) => end > 1);
    expect(result.reached).toBe(false);
    expect(result.time).toBeGreaterThan(1);
    expect(result.time).toBeLessThan(1.6);
    expect(result.value).toBeCloseTo(Math.sin(result.time), 6);
  });

  it('gives up with the time when the derivative is no number', () => {
    const options = { ...NEVER, tolerance: 1e-9, firstStep: 0.1, longestStep: 1 };
    expect(() => integrate(() => Number.NaN, integrateRoom(1, 1), 0, 0, 1, options)).toThrow(RangeError);
  });
});

import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dialForFocus, focusForDial } from '../../../strategy/beam/index.ts';
import type { FocusScale } from '../../../strategy/machine.ts';
import { FOUR_KILOWATT, TEN_KILOWATT } from '../../support/machines.ts';

const reversed = TEN_KILOWATT.focusScale;

describe('focus position and the machine’s own dial', () => {
  it('types −2.27 for +5 mm on a dial reversed 2.2 to 1', () => {
    const reading = dialForFocus(reversed, 0.005, 0.001);
    expect(reading.kind === 'ok' && reading.typed * 1000).toBeCloseTo(-2.27, 2);
  });

  it('has the focus at −2.2 mm when +1 is typed on that dial', () => {
    expect(focusForDial(reversed, 0.001, 0.001) * 1000).toBeCloseTo(-2.2, 12);
  });

  it('types the position itself on a plain dial', () => {
    expect(dialForFocus(FOUR_KILOWATT.focusScale, 0.005, 0.01)).toEqual({ kind: 'ok', typed: 0.005 });
  });

  it('moves with the standoff when the dial is referred to the nozzle tip', () => {
    const scale: FocusScale = { reference: 'nozzle', offset: 0.001, slope: 1, minDial: -0.02, maxDial: 0.02 };
    expect(focusForDial(scale, 0.002, 0.01)).toBeCloseTo(0.013, 12);
    const reading = dialForFocus(scale, 0.013, 0.01);
    expect(reading.kind === 'ok' && reading.typed).toBeCloseTo(0.002, 12);
  });

  it('says what the dial takes when a position lies outside it', () => {
    expect(dialForFocus(reversed, 0.03, 0.001)).toEqual({
      kind: 'none',
      why: 'Focus +30 mm would need −13.64 mm on the dial, which takes −10 mm to +10 mm.',
    });
  });

  it('comes back to the same position, whatever the scale', () => {
    const scale = fc.record({
      reference: fc.constantFrom<'plate' | 'nozzle'>('plate', 'nozzle'),
      offset: fc.double({ min: -0.01, max: 0.01, noNaN: true }),
      slope: fc.oneof(fc.double({ min: 0.2, max: 5, noNaN: true }), fc.double({ min: -5, max: -0.2, noNaN: true })),
      minDial: fc.constant(-1),
      maxDial: fc.constant(1),
    });
    const metre = fc.double({ min: -0.03, max: 0.03, noNaN: true });
    fc.assert(
      fc.property(scale, metre, metre, (some, position, standoff) => {
        const reading = dialForFocus(some, position, standoff);
        if (reading.kind === 'none') throw new Error(reading.why);
        expect(focusForDial(some, reading.typed, standoff)).toBeCloseTo(position, 12);
      }),
    );
  });

  it('takes the position at the very end of its travel, however the division rounds', () => {
    const metre = fc.double({ min: 0.0001, max: 0.02, noNaN: true });
    fc.assert(
      fc.property(metre, metre, (dial, standoff) => {
        const scale: FocusScale = { reference: 'nozzle', offset: 0.0003, slope: -2.2, minDial: -dial, maxDial: dial };
        for (const end of [-dial, dial]) {
          const reading = dialForFocus(scale, focusForDial(scale, end, standoff), standoff);
          expect(reading.kind === 'ok' && Math.abs(reading.typed - end)).toBeLessThan(1e-12);
          expect(reading.kind === 'ok' && Math.abs(reading.typed)).toBeLessThanOrEqual(dial);
        }
      }),
    );
  });

  it('refuses a scale without slope and numbers that are none', () => {
    expect(() => dialForFocus({ ...reversed, slope: 0 }, 0.005, 0.001)).toThrow(/slope 0/);
    expect(() => dialForFocus(reversed, Number.NaN, 0.001)).toThrow(RangeError);
    expect(() => focusForDial(reversed, 0.001, Number.POSITIVE_INFINITY)).toThrow(RangeError);
  });
});

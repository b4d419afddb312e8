import type { FocusScale } from '../machine.ts';
import { quantityText } from '../units/index.ts';

/** The number to type, m; or why there is none. */
export type DialReading =
  { readonly kind: 'ok'; readonly typed: number } | { readonly kind: 'none'; readonly why: string };

/** A position at the very end of the dial's travel is not outside it for rounding, m. */
const ROUNDING = 1e-9;

/**
 * The number to type at the machine, m, for a focus position (m above the plate's top) at a standoff (m); none, with a
 * sentence, when it lies outside what the dial takes. RangeError when an argument is not finite or the scale's slope is zero.
 */
export function dialForFocus(scale: FocusScale, focusPosition: number, standoff: number): DialReading {
  finite('focus position', focusPosition);
  const typed = (focusPosition - atDialZero(scale, standoff)) / slopeOf(scale);
  if (typed < scale.minDial - ROUNDING || typed > scale.maxDial + ROUNDING) {
    const position = millimetres(focusPosition);
    return {
      kind: 'none',
      why: `Focus ${position} would need ${millimetres(typed)} on the dial, which takes ${millimetres(scale.minDial)} to ${millimetres(scale.maxDial)}.`,
    };
  }
  const within = Math.min(Math.max(typed, scale.minDial), scale.maxDial);
  return { kind: 'ok', typed: within === 0 ? 0 : within };
}

/**
 * The focus position, m above the plate's top, that a typed number (m) gives at a standoff (m). The dial's travel is not
 * asked: whatever a machine was seen to take has a meaning. RangeError when an argument is not finite or the slope is zero.
 */
export function focusForDial(scale: FocusScale, typed: number, standoff: number): number {
  finite('dial number', typed);
  return atDialZero(scale, standoff) + slopeOf(scale) * typed;
}

/** Focus position when the dial reads zero, m. A dial referred to the nozzle tip moves with the standoff. */
function atDialZero(scale: FocusScale, standoff: number): number {
  finite('standoff', standoff);
  finite('offset of the focus scale', scale.offset);
  return scale.reference === 'nozzle' ? scale.offset + standoff : scale.offset;
}

function slopeOf(scale: FocusScale): number {
  if (!Number.isFinite(scale.slope) || scale.slope === 0) {
    throw new RangeError(`slope ${scale.slope} of the focus scale is zero or not finite`);
  }
  return scale.slope;
}

function finite(name: string, value: number): void {
  if (!Number.isFinite(value)) throw new RangeError(`${name} ${value} m is not finite`);
}

function millimetres(value: number): string {
  return quantityText(value, 'length', 'metric', { sign: true }).text;
}

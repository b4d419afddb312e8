import { degrees, millimetres } from '../units/said.ts';
import { loopExtension, loopLength } from './loop.ts';

/** Bounds of a loop's size. Lengths in m. */
export type LoopBounds = {
  /** The design number. */
  readonly radius: number;
  readonly minExtension: number;
  readonly maxExtension: number;
  /** Smallest arc the machine follows at cutting feed. */
  readonly smallestArc: number;
};

export type LoopRadii =
  { readonly kind: 'radii'; readonly radii: readonly number[] } | { readonly kind: 'none'; readonly why: string };

/** A flat loop's arcs and the extensions to try on a corner, m, longest first. */
export type FlatExtensions =
  | { readonly kind: 'extensions'; readonly radius: number; readonly extensions: readonly number[] }
  | { readonly kind: 'none'; readonly why: string };

/** Sizes tried from the design number down to the smallest allowed. */
const steps = 8;

/**
 * Radii to try on a corner of the given angle (rad), m, largest first: the design number, or what the extension's bounds leave of it, then
 * smaller ones in equal ratios down to the machine's smallest arc or the least extension, whichever ends first.
 */
export function loopRadii(angle: number, bounds: LoopBounds): LoopRadii {
  if (!(angle > 0 && angle < Math.PI)) throw new RangeError(`corner angle ${angle} rad is outside (0, π)`);
  const slope = Math.tan(angle / 2);
  const least = Math.max(bounds.smallestArc, bounds.minExtension * slope);
  const most = bounds.maxExtension * slope;
  if (least > most) {
    return {
      kind: 'none',
      why:
        `at ${degrees(angle)} an arc of ${millimetres(least)}, the least the machine and the rules allow, ` +
        `needs an extension of ${millimetres(loopExtension(least, angle))}; the rules end at ${millimetres(bounds.maxExtension)}`,
    };
  }
  const first = Math.min(most, Math.max(least, bounds.radius));
  if (first <= least * (1 + 1e-9)) return { kind: 'radii', radii: [first] };
  return {
    kind: 'radii',
    radii: Array.from({ length: steps + 1 }, (_, i) => first * (least / first) ** (i / steps)),
  };
}

/** A flat loop is worth trying when its extension is longer than the tangent loop's of the same arc by this factor. */
const flatter = 1.05;

/**
 * Flat loops to try on a corner of the given angle (rad): both arcs as small as the machine follows, the extension (m) first the one with which the path is as long
 * as the designed loop's, which costs as much time and stands less deep into the skeleton, or the longest allowed; then shorter in equal ratios down
 * to the least, or to where nothing is left of the straight. None where the designed loop is as small already.
 */
export function flatExtensions(angle: number, bounds: LoopBounds): FlatExtensions {
  const sizes = loopRadii(angle, bounds);
  if (sizes.kind === 'none') return sizes;
  const radius = bounds.smallestArc;
  const design = Math.max(...sizes.radii);
  const [s, c] = [Math.sin(angle / 2), Math.cos(angle / 2)];
  const length = loopLength(design, loopExtension(design, angle), angle);
  const asLong = (length - radius * (Math.PI + angle - 2 * c)) / (2 + 2 * s);
  const longest = Math.min(bounds.maxExtension, asLong);
  const shortest = Math.max(bounds.minExtension, flatter * loopExtension(radius, angle));
  if (longest < shortest) {
    return { kind: 'none', why: `with the machine's smallest arc, ${millimetres(radius)}, a flat loop is no smaller` };
  }
  if (longest <= shortest * (1 + 1e-9)) return { kind: 'extensions', radius, extensions: [longest] };
  return {
    kind: 'extensions',
    radius,
    extensions: Array.from({ length: steps + 1 }, (_, i) => longest * (shortest / longest) ** (i / steps)),
  };
}

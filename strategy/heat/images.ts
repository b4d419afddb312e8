import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';
import { instantaneousLine } from './line-source.ts';
import { besselIScaled } from './special-functions.ts';

/** A place in polar coordinates about a wedge's tip: m and rad from its first edge. */
export type Polar = { readonly r: number; readonly theta: number };

/**
 * Temperature rise, K, in a plate that ends at the insulated straight edge x = 0 (steel at x ≥ 0), from `heatPerLength` J per metre of
 * thickness released at `source` `age` s ago: the source and its mirror image. Carslaw and Jaeger, ch. 10 and 14.
 */
export function straightEdgeRise(
  heatPerLength: number,
  source: { readonly x: number; readonly y: number },
  at: { readonly x: number; readonly y: number },
  age: number,
  plate: PlateProperties,
): number {
  if (source.x < 0 || at.x < 0) throw new RangeError(`x ${Math.min(source.x, at.x)} m is outside the steel (x ≥ 0)`);
  const across = at.y - source.y;
  return (
    instantaneousLine(heatPerLength, Math.hypot(at.x - source.x, across), age, plate) +
    instantaneousLine(heatPerLength, Math.hypot(at.x + source.x, across), age, plate)
  );
}

/**
 * Temperature rise, K, in an insulated wedge of angle π/n, by the 2n images at 2mβ ± θs. Carslaw and Jaeger, ch. 14. Throws RangeError
 * when the angle is no whole part of π: then only `wedgeRise` holds.
 */
export function wedgeRiseByImages(
  heatPerLength: number,
  angle: number,
  source: Polar,
  at: Polar,
  age: number,
  plate: PlateProperties,
): number {
  const n = Math.round(Math.PI / angle);
  if (n < 1 || Math.abs(n * angle - Math.PI) > 1e-9)
    throw new RangeError(`wedge angle ${angle} rad is not π divided by a whole number`);
  insideWedge(angle, source, at);
  let rise = 0;
  for (let m = 0; m < n; m++) {
    for (const image of [2 * m * angle + source.theta, 2 * m * angle - source.theta]) {
      const square = at.r * at.r + source.r * source.r - 2 * at.r * source.r * Math.cos(at.theta - image);
      rise += instantaneousLine(heatPerLength, Math.sqrt(Math.max(0, square)), age, plate);
    }
  }
  return rise;
}

/**
 * Temperature rise, K, in an insulated wedge of any angle 0..2π rad: Q′/(2ktβ)·e^(−(r²+rs²)/4αt)·[I₀(z) + 2ΣI_{mπ/β}(z)·cos(mπθ/β)·cos(mπθs/β)],
 * z = r·rs/2αt. Carslaw and Jaeger, ch. 14. At the tip itself 2π/β times the infinite plate, wherever the source is.
 */
export function wedgeRise(
  heatPerLength: number,
  angle: number,
  source: Polar,
  at: Polar,
  age: number,
  plate: PlateProperties,
): number {
  if (!(angle > 0 && angle <= 2 * Math.PI + 1e-12)) throw new RangeError(`wedge angle ${angle} rad is outside (0, 2π]`);
  insideWedge(angle, source, at);
  if (age <= 0) return 0;
  const alpha = diffusivity(plate);
  const z = (at.r * source.r) / (2 * alpha * age);
  // exp(z) of the scaled Bessel functions joined with the Gaussian: exp(−(r − rs)²/4αt)
  const front =
    (heatPerLength / (2 * plate.conductivity * age * angle)) * Math.exp(-((at.r - source.r) ** 2) / (4 * alpha * age));
  let sum = besselIScaled(0, z);
  for (let m = 1; m < 100_000; m++) {
    const order = (m * Math.PI) / angle;
    const bessel = besselIScaled(order, z);
    sum += 2 * bessel * Math.cos(order * at.theta) * Math.cos(order * source.theta);
    if (bessel < 1e-18) break;
  }
  return front * sum;
}

/** How many times hotter a wedge's tip gets than an infinite plate at the same distance from the source, dimensionless: 2π/β. Exact. */
export const tipFactor = (angle: number): number => (2 * Math.PI) / angle;

/** How many times hotter a tip gets than a straight edge when both edges are cut, dimensionless: π/β; an upper bound in practice. */
export const cornerFactor = (angle: number): number => Math.PI / angle;

function insideWedge(angle: number, source: Polar, at: Polar): void {
  for (const { r, theta } of [source, at]) {
    if (!(r >= 0 && theta >= -1e-12 && theta <= angle + 1e-12)) {
      throw new RangeError(`place r ${r} m, θ ${theta} rad is outside the wedge of ${angle} rad`);
    }
  }
}

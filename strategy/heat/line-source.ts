import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';
import { besselK0Scaled, exponentialIntegral } from './special-functions.ts';

/**
 * Temperature rise, K, at `distance` m from a line across an infinite plate in which `heatPerLength` J per metre of thickness was released
 * `age` s ago: Q′/(4πkt)·exp(−r²/4αt). Carslaw and Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, 10.3(1). 0 for age ≤ 0.
 */
export function instantaneousLine(
  heatPerLength: number,
  distance: number,
  age: number,
  plate: PlateProperties,
): number {
  if (age <= 0) return 0;
  const alpha = diffusivity(plate);
  return (
    (heatPerLength / (4 * Math.PI * plate.conductivity * age)) * Math.exp((-distance * distance) / (4 * alpha * age))
  );
}

/**
 * Temperature rise, K, at `distance` m from a line that has given off `powerPerLength` W per metre of thickness for `time` s:
 * q′/(4πk)·E₁(r²/4αt). Carslaw and Jaeger, ch. 10.
 */
export function continuousLine(powerPerLength: number, distance: number, time: number, plate: PlateProperties): number {
  if (time <= 0) return 0;
  if (!(distance > 0))
    throw new RangeError(`distance ${distance} m is outside (0, ∞): a line source has no finite temperature in itself`);
  const x = (distance * distance) / (4 * diffusivity(plate) * time);
  return (powerPerLength / (4 * Math.PI * plate.conductivity)) * exponentialIntegral(x);
}

/** A place seen from a moving source, m: `ahead` along its travel (behind is negative), `aside` across, `below` the surface. */
export type FromSource = { readonly ahead: number; readonly aside: number; readonly below?: number };

/**
 * Steady temperature rise, K, around a line source of `powerPerLength` W per metre of thickness that moves at `speed` m/s:
 * q′/(2πk)·exp(−vξ/2α)·K₀(r·√((v/2α)² + 2h/kd)). Rosenthal 1941, Carslaw and Jaeger 10.7. With `loss` the two faces give off
 * `coefficient` W/(m² K) each on a plate `thickness` m thick.
 */
export function movingLine(
  powerPerLength: number,
  speed: number,
  { ahead, aside }: FromSource,
  plate: PlateProperties,
  loss?: { readonly coefficient: number; readonly thickness: number },
): number {
  const r = Math.hypot(ahead, aside);
  if (!(r > 0)) throw new RangeError('the temperature in a line source itself is not finite');
  const half = speed / (2 * diffusivity(plate));
  const cooling = loss ? (2 * loss.coefficient) / (plate.conductivity * loss.thickness) : 0;
  const x = r * Math.sqrt(half * half + cooling);
  // exponents are joined before they are taken: each alone overflows far behind a fast source
  return (powerPerLength / (2 * Math.PI * plate.conductivity)) * Math.exp(-half * ahead - x) * besselK0Scaled(x);
}

/**
 * Steady temperature rise, K, in a half-space whose surface carries a point source of `power` W moving at `speed` m/s:
 * q/(2πkR)·exp(−v(ξ + R)/2α). Rosenthal 1941/1946; Carslaw and Jaeger, ch. 10.
 */
export function movingPoint(
  power: number,
  speed: number,
  { ahead, aside, below = 0 }: FromSource,
  plate: PlateProperties,
): number {
  const r = Math.hypot(ahead, aside, below);
  if (!(r > 0)) throw new RangeError('the temperature in a point source itself is not finite');
  return (power / (2 * Math.PI * plate.conductivity * r)) * Math.exp((-speed * (ahead + r)) / (2 * diffusivity(plate)));
}

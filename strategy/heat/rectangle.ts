import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';

/**
 * Temperature rise, K, in an insulated rectangle with a corner at the origin, from `heatPerLength` J per metre of thickness released at
 * `source` `age` s ago: Q′/(ρc)·Gx·Gy with the Green function X22 in each direction (Beck et al., Heat Conduction Using Green's Functions). Cosines
 * when the heat has spread (αt/L² > 0.05), images before. Throws RangeError for places outside.
 */
export function rectangleRise(
  heatPerLength: number,
  size: { readonly length: number; readonly width: number },
  source: { readonly x: number; readonly y: number },
  at: { readonly x: number; readonly y: number },
  age: number,
  plate: PlateProperties,
): number {
  if (age <= 0) return 0;
  const spread = diffusivity(plate) * age;
  const across = barGreen(size.length, at.x, source.x, spread) * barGreen(size.width, at.y, source.y, spread);
  return (heatPerLength / (plate.density * plate.specificHeat)) * across;
}

/** Green function of an insulated bar, 1/m; `spread` = αt, m². */
function barGreen(length: number, x: number, source: number, spread: number): number {
  for (const place of [x, source]) {
    if (!(place >= 0 && place <= length)) throw new RangeError(`place ${place} m is outside [0, ${length}] m`);
  }
  if (spread / (length * length) > 0.05) {
    let sum = 1;
    for (let m = 1; m < 100; m++) {
      const wave = (m * Math.PI) / length;
      const fade = Math.exp(-wave * wave * spread);
      sum += 2 * fade * Math.cos(wave * x) * Math.cos(wave * source);
      if (fade < 1e-18) break;
    }
    return sum / length;
  }
  let sum = 0;
  for (let n = -6; n <= 6; n++) {
    for (const image of [2 * n * length + source, 2 * n * length - source])
      sum += Math.exp(-((x - image) ** 2) / (4 * spread));
  }
  return sum / Math.sqrt(4 * Math.PI * spread);
}

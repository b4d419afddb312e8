import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';
import { erfc } from './special-functions.ts';

/** Surface temperature rise, K, of a half-space under a constant flux, W/m², for `time` s: (2q″/k)·√(αt/π). Carslaw and Jaeger, ch. 2. */
export const surfaceRiseUnderFlux = (flux: number, time: number, plate: PlateProperties): number =>
  ((2 * flux) / plate.conductivity) * Math.sqrt((diffusivity(plate) * time) / Math.PI);

/** Share of a step of surface temperature that has come `depth` m deep after `time` s: erfc(x/2√(αt)). Carslaw and Jaeger, ch. 2. */
export const stepShareAtDepth = (depth: number, time: number, alpha: number): number =>
  erfc(depth / (2 * Math.sqrt(alpha * time)));

/** Time, s, until a surface pulse on a plate has levelled through the thickness to `residual` (5 %): ln(2/ε)/π²·d²/α, from the first cosine mode. */
export const levellingTime = (thickness: number, plate: PlateProperties, residual = 0.05): number =>
  (Math.log(2 / residual) / Math.PI ** 2) * (thickness ** 2 / diffusivity(plate));

import { COLD_PLATE_TEMPERATURE, heatingEnthalpy, IRON_MELTING_TEMPERATURE, STEEL_DENSITY } from '../steel/index.ts';

/**
 * Greatest temperature rise, K, at a distance (m) from heat (J) released at once at a point of a thick plate's surface:
 * (2Q/ρc)·(3/(2πe))^1.5/r³. From the instantaneous point source with the time derivative set to zero.
 */
export function peakRiseAroundPoint(heat: number, distance: number, volumetricHeatCapacity: number): number {
  return (((2 * heat) / volumetricHeatCapacity) * POINT_FACTOR) / distance ** 3;
}

/**
 * Greatest temperature rise, K, at a distance (m) from heat (J per m of thickness) released at once along a line through the
 * plate: Q′/(πe·ρc·r²). From the instantaneous line source (Carslaw & Jaeger, 2nd ed., 10.3(1)).
 */
export function peakRiseAroundLine(heatPerLength: number, distance: number, volumetricHeatCapacity: number): number {
  return heatPerLength / (Math.PI * Math.E * volumetricHeatCapacity * distance ** 2);
}

/** Distance at which `peakRiseAroundPoint` is `rise` K, m. */
export function radiusOfPeakAroundPoint(heat: number, rise: number, volumetricHeatCapacity: number): number {
  return Math.cbrt(((2 * heat) / volumetricHeatCapacity / rise) * POINT_FACTOR);
}

const POINT_FACTOR = (3 / (2 * Math.PI * Math.E)) ** 1.5;

/** Mean heat capacity of steel from 20 °C to melting, J/(m³ K). */
export const HEATING_CAPACITY =
  (STEEL_DENSITY * heatingEnthalpy(COLD_PLATE_TEMPERATURE)) / (IRON_MELTING_TEMPERATURE - COLD_PLATE_TEMPERATURE);

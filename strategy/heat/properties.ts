import { STEEL_DENSITY, steelConductivity, steelSpecificHeat } from '../steel/index.ts';

/** Thermal properties taken as constant in every closed form here. SI. */
export type PlateProperties = {
  readonly conductivity: number; // W/(m K)
  readonly density: number; // kg/m³
  readonly specificHeat: number; // J/(kg K)
};

/** Thermal diffusivity k/(ρc), m²/s. Throws RangeError for a property that is not positive. */
export function diffusivity({ conductivity, density, specificHeat }: PlateProperties): number {
  if (!(conductivity > 0 && density > 0 && specificHeat > 0)) {
    throw new RangeError(`properties k ${conductivity}, ρ ${density}, c ${specificHeat} must all be positive`);
  }
  return conductivity / (density * specificHeat);
}

/** About the middle of the way from the kerf's wall to the plate, K: 450 °C. Own choice. */
const MID_ZONE = 723.15;

/**
 * Carbon steel at 450 °C: about 39.0 W/(m K), 633 J/(kg K) and 7850 kg/m³ (EN 1993-1-2:2005, 3.4.1 and 3.2.2).
 * The true properties change by tens of per cent between kerf and plate; a calibration takes up the rest.
 */
export const midZoneProperties: PlateProperties = {
  conductivity: steelConductivity(MID_ZONE),
  density: STEEL_DENSITY,
  specificHeat: steelSpecificHeat(MID_ZONE),
};

/** Distance over which heat has spread after `time` s, m: √(4αt). */
export const diffusionLength = (properties: PlateProperties, time: number): number =>
  Math.sqrt(4 * diffusivity(properties) * time);

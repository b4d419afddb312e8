import type { PlateProperties } from '../../strategy/heat/index.ts';
import { STEEL_DENSITY, steelConductivity, steelSpecificHeat } from '../../strategy/steel/plate-steel.ts';

/**
 * What a plate does with heat, by its conduction potential θ = ∫k dT from the plate's own temperature, W/m: heat content, J/m³, and temperature rise, K,
 * both 0 at θ = 0. With θ the flux is linear whatever the conductivity does (Kirchhoff's transformation).
 */
export type SteelHeat = {
  readonly constant: boolean;
  readonly contentOf: (theta: number) => number;
  readonly capacityOf: (theta: number) => number; // d content / dθ, s/m²
  readonly thetaOf: (content: number) => number;
  readonly riseOf: (theta: number) => number;
};

/** Constant conductivity and specific heat. */
export function constantHeat({ conductivity, density, specificHeat }: PlateProperties): SteelHeat {
  const capacity = (density * specificHeat) / conductivity;
  return {
    constant: true,
    contentOf: (theta) => capacity * theta,
    capacityOf: () => capacity,
    thetaOf: (content) => content / capacity,
    riseOf: (theta) => theta / conductivity,
  };
}

/**
 * Carbon steel as in EN 1993-1-2:2005, 3.4.1, from a plate temperature in K on: tables a kelvin apart, straight between. Past 1200 °C and below the plate
 * temperature the last values go on, so that a node right at the source has some; the places that are read stay below.
 */
export function standardHeat(plateTemperature: number): SteelHeat {
  const [least, greatest] = [293.15, 1473.15];
  const inRange = (t: number): number => Math.min(greatest, Math.max(least, t));
  const count = Math.ceil(greatest - plateTemperature) + 1;
  const [theta, content] = [new Float64Array(count), new Float64Array(count)];
  for (let i = 1; i < count; i++) {
    const middle = inRange(plateTemperature + i - 0.5);
    theta[i] = (theta[i - 1] ?? 0) + steelConductivity(middle);
    content[i] = (content[i - 1] ?? 0) + STEEL_DENSITY * steelSpecificHeat(middle);
  }
  const index = (table: Float64Array, value: number): number => {
    let [low, high] = [0, count - 1];
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if ((table[middle] ?? 0) <= value) low = middle;
      else high = middle;
    }
    return low;
  };
  const share = (table: Float64Array, value: number): { i: number; t: number } => {
    const i = index(table, value);
    const [a, b] = [table[i] ?? 0, table[i + 1] ?? 1];
    return { i, t: (value - a) / (b - a) };
  };
  const read = (table: Float64Array, { i, t }: { i: number; t: number }): number => {
    const [a, b] = [table[i] ?? 0, table[i + 1] ?? 0];
    return a + t * (b - a);
  };
  return {
    constant: false,
    contentOf: (value) => read(content, share(theta, value)),
    capacityOf: (value) => {
      const i = index(theta, value);
      return ((content[i + 1] ?? 0) - (content[i] ?? 0)) / ((theta[i + 1] ?? 0) - (theta[i] ?? 0));
    },
    thetaOf: (value) => read(theta, share(content, value)),
    riseOf: (value) => {
      const { i, t } = share(theta, value);
      return i + t;
    },
  };
}

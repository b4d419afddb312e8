import { celsiusFromKelvin } from '../units/index.ts';

/** Density of steel, kg/m³, taken constant: EN 1993-1-2:2005, 3.2.2 (from memory). */
export const STEEL_DENSITY = 7850;

/** Range of the property formulas, °C: EN 1993-1-2:2005, 3.4.1. */
const LEAST = 20;
const GREATEST = 1200;

/** Slack for the rounding of 293.15 − 273.15, K. */
const ROUNDING = 1e-6;

/**
 * Specific heat of carbon steel, J/(kg K), at a temperature in K. EN 1993-1-2:2005, 3.4.1.2 (seen through secondary
 * reproductions). The peak at 735 °C is the transformation; the small jumps at 600 and 900 °C are in the standard.
 * RangeError outside 20…1200 °C.
 */
export function steelSpecificHeat(temperature: number): number {
  const t = celsiusInRange(temperature);
  if (t < 600) return 425 + 0.773 * t - 1.69e-3 * t ** 2 + 2.22e-6 * t ** 3;
  if (t < 735) return 666 + 13002 / (738 - t);
  if (t < 900) return 545 + 17820 / (t - 731);
  return 650;
}

/**
 * Thermal conductivity of carbon steel, W/(m K), at a temperature in K. EN 1993-1-2:2005, 3.4.1.3 (seen through a
 * secondary reproduction). RangeError outside 20…1200 °C.
 */
export function steelConductivity(temperature: number): number {
  const t = celsiusInRange(temperature);
  return t < 800 ? 54 - 3.33e-2 * t : 27.3;
}

/** Thermal diffusivity of carbon steel, m²/s, at a temperature in K, from the two above. RangeError outside 20…1200 °C. */
export function steelDiffusivity(temperature: number): number {
  return steelConductivity(temperature) / (STEEL_DENSITY * steelSpecificHeat(temperature));
}

/**
 * Enthalpy of carbon steel above its value at 20 °C, J/kg, at a temperature in K: the integral of the specific heat, closed
 * form in each branch. RangeError outside 20…1200 °C.
 */
export function steelEnthalpy(temperature: number): number {
  const t = celsiusInRange(temperature);
  if (t < 600) return cubicBranch(t) - cubicBranch(LEAST);
  if (t < 735) return AT_600 + 666 * (t - 600) - 13002 * Math.log((738 - t) / 138);
  if (t < 900) return AT_735 + 545 * (t - 735) + 17820 * Math.log((t - 731) / 4);
  return AT_900 + 650 * (t - 900);
}

function cubicBranch(t: number): number {
  return 425 * t + (0.773 / 2) * t ** 2 - (1.69e-3 / 3) * t ** 3 + (2.22e-6 / 4) * t ** 4;
}

/** Enthalpy where a branch begins, J/kg. */
const AT_600 = cubicBranch(600) - cubicBranch(LEAST);
const AT_735 = AT_600 + 666 * 135 - 13002 * Math.log(3 / 138);
const AT_900 = AT_735 + 545 * 165 + 17820 * Math.log(169 / 4);

function celsiusInRange(temperature: number): number {
  const celsius = celsiusFromKelvin(temperature);
  if (!(celsius >= LEAST - ROUNDING && celsius <= GREATEST + ROUNDING)) {
    throw new RangeError(`steel temperature ${temperature} K (${celsius} °C) is outside ${LEAST}…${GREATEST} °C`);
  }
  return Math.min(Math.max(celsius, LEAST), GREATEST);
}

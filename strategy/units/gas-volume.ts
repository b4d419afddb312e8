import { ZERO_CELSIUS, kelvinFromFahrenheit } from './temperature.ts';
import { quantityFrom } from './dimension.ts';

/**
 * Flow in m³/s at normal state (0 °C, 101 325 Pa; DIN 1343) of a gas metered in standard cubic feet an hour (70 °F, 1 atm).
 * Ideal gas: the two states differ in temperature only.
 */
export function normalFlowFromStandardCubicFeet(cubicFeetPerHour: number): number {
  return (quantityFrom(cubicFeetPerHour, 'volumeFlow', 'ft³/h') * ZERO_CELSIUS) / kelvinFromFahrenheit(70);
}

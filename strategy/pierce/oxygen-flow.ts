import { OXYGEN_MOLAR_MASS } from '../steel/index.ts';
import { ZERO_CELSIUS } from '../units/index.ts';

/** Universal gas constant, J/(mol K), exact (SI 2019). */
const GAS_CONSTANT = 8.314462618;

/** Ratio of specific heats of oxygen as an ideal two-atomic gas. */
const OXYGEN_HEAT_RATIO = 1.4;

/** Standard atmosphere, Pa: what gauge pressures are counted from and what the jet leaves into. */
const ATMOSPHERE = 101_325;

/** Oxygen before the nozzle, K. */
const STAGNATION_TEMPERATURE = 293.15;

const SPECIFIC_GAS_CONSTANT = GAS_CONSTANT / OXYGEN_MOLAR_MASS;

/**
 * Ratio of outer to inner absolute pressure at and below which a nozzle chokes, without unit: (2/(γ+1))^(γ/(γ−1)), 0.528 for
 * oxygen. Isentropic flow of an ideal gas.
 */
export function criticalPressureRatio(heatRatio: number = OXYGEN_HEAT_RATIO): number {
  return (2 / (heatRatio + 1)) ** (heatRatio / (heatRatio - 1));
}

/** Flow factor C* of a choked nozzle, without unit: √γ·(2/(γ+1))^((γ+1)/(2(γ−1))), 0.685 for oxygen (form of ISO 9300). */
export function criticalFlowFactor(heatRatio: number = OXYGEN_HEAT_RATIO): number {
  return Math.sqrt(heatRatio) * (2 / (heatRatio + 1)) ** ((heatRatio + 1) / (2 * (heatRatio - 1)));
}

/** Gauge pressure from which an oxygen nozzle into the open air chokes, Pa: 0.905 bar. Thick plate is cut below it. */
export const CHOKING_GAUGE_PRESSURE = ATMOSPHERE / criticalPressureRatio() - ATMOSPHERE;

const CHOKED_FACTOR = criticalFlowFactor() / Math.sqrt(SPECIFIC_GAS_CONSTANT * STAGNATION_TEMPERATURE);
const SUBCRITICAL_FACTOR = Math.sqrt(
  (2 * OXYGEN_HEAT_RATIO) / (OXYGEN_HEAT_RATIO - 1) / (SPECIFIC_GAS_CONSTANT * STAGNATION_TEMPERATURE),
);

/**
 * Mass flow of oxygen through a nozzle into the open air, kg/s; diameter in m, pressure in Pa gauge at the nozzle. St Venant
 * and Wantzel's formula below 0.905 bar, the choked one above; they meet there. `dischargeCoefficient` 1 is the ideal nozzle.
 * RangeError for a diameter that is not positive or a negative pressure.
 */
export function oxygenMassFlow(diameter: number, gaugePressure: number, dischargeCoefficient: number): number {
  if (!(diameter > 0)) throw new RangeError(`nozzle diameter ${diameter} m is not positive`);
  if (!(gaugePressure >= 0)) throw new RangeError(`oxygen pressure ${gaugePressure} Pa is negative`);
  const area = (Math.PI / 4) * diameter * diameter;
  const inner = ATMOSPHERE + gaugePressure;
  if (gaugePressure >= CHOKING_GAUGE_PRESSURE) return dischargeCoefficient * area * inner * CHOKED_FACTOR;
  // ratio^(2/γ) − ratio^((γ+1)/γ), with 2/γ + (γ−1)/γ = (γ+1)/γ: two powers instead of three.
  const ratio = ATMOSPHERE / inner;
  const low = ratio ** (2 / OXYGEN_HEAT_RATIO);
  const bracket = low - low * ratio ** ((OXYGEN_HEAT_RATIO - 1) / OXYGEN_HEAT_RATIO);
  return dischargeCoefficient * area * inner * SUBCRITICAL_FACTOR * Math.sqrt(Math.max(0, bracket));
}

/** Density of oxygen at normal state (0 °C, 101 325 Pa; DIN 1343) as an ideal gas, kg/m³. */
export const OXYGEN_NORMAL_DENSITY = ATMOSPHERE / (SPECIFIC_GAS_CONSTANT * ZERO_CELSIUS);

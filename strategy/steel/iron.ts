import { STEEL_DENSITY, steelEnthalpy, steelSpecificHeat } from './plate-steel.ts';

/** Molar mass of iron, kg/mol (IUPAC 2021 standard atomic weight). */
export const IRON_MOLAR_MASS = 55.845e-3;

/** Melting temperature of iron in the NIST data below, K. Handbooks give 1811 K. */
export const IRON_MELTING_TEMPERATURE = 1809;

/** Where the NIST enthalpies begin, K. */
const REFERENCE_TEMPERATURE = 298.15;

/** Shomate coefficients: H(T) − H(298.15 K) in kJ/mol with t = T/1000 K. */
type Shomate = {
  readonly a: number;
  readonly b: number;
  readonly c: number;
  readonly d: number;
  readonly e: number;
  readonly f: number;
  readonly h: number;
};

/** NIST Chemistry WebBook, iron (Chase 1998), solid 1100…1809 K. Coefficients from memory, enthalpies agree with the page. */
const SOLID: Shomate = { a: -776.7387, b: 919.4005, c: -383.7184, d: 57.08148, e: 242.1369, f: 697.6234, h: 0 };

/**
 * The same, liquid 1809…3133 K, where the heat capacity is constant (46.024 J/(mol K)). The reference is the solid at
 * 298.15 K, hence h = 0.
 */
const LIQUID: Shomate = { a: 46.024, b: 0, c: 0, d: 0, e: 0, f: -10.80543, h: 0 };

/** Enthalpy of liquid iron at melting above solid iron at 298.15 K, J/kg: about 1.297 MJ/kg. NIST (Chase 1998). */
export const IRON_LIQUID_ENTHALPY = enthalpyPerKilogram(LIQUID, IRON_MELTING_TEMPERATURE);

/** Enthalpy of solid iron at melting above solid iron at 298.15 K, J/kg: about 1.050 MJ/kg. NIST (Chase 1998). */
export const IRON_SOLID_ENTHALPY = enthalpyPerKilogram(SOLID, IRON_MELTING_TEMPERATURE);

/** Latent heat of fusion of iron, J/kg: about 247 kJ/kg, the difference of the two. */
export const IRON_FUSION_HEAT = IRON_LIQUID_ENTHALPY - IRON_SOLID_ENTHALPY;

/** Coldest and hottest plate that formulas here accept, K: −40 °C in an unheated hall in winter, 600 °C. */
export const PLATE_TEMPERATURE_RANGE = { min: 233.15, max: 873.15 } as const;

/** 20 °C, K: the cold plate that a reserve and the ledger of a cut are stated for, and the coldest of EN 1993-1-2. */
export const COLD_PLATE_TEMPERATURE = 293.15;

/** The plate's temperature, K, as it came. RangeError outside −40…600 °C. */
export function plateTemperatureChecked(plateTemperature: number): number {
  const { min, max } = PLATE_TEMPERATURE_RANGE;
  if (!(plateTemperature >= min && plateTemperature <= max)) {
    throw new RangeError(`plate temperature ${plateTemperature} K is outside [${min}, ${max}] K`);
  }
  return plateTemperature;
}

/**
 * Heat to melt steel that starts at the plate's temperature (K), J/kg: iron's enthalpy up to liquid at melting, less what
 * the plate already holds (EN 1993-1-2). Alloying of structural steel is below the error of the rest.
 * RangeError outside −40…600 °C.
 */
export function meltingEnthalpy(plateTemperature: number): number {
  return IRON_LIQUID_ENTHALPY - sensibleHeat(plateTemperature);
}

/** Heat to bring steel from the plate's temperature (K) to melting, still solid, J/kg. RangeError outside −40…600 °C. */
export function heatingEnthalpy(plateTemperature: number): number {
  return IRON_SOLID_ENTHALPY - sensibleHeat(plateTemperature);
}

/** Heat to melt a volume of plate that starts at the plate's temperature (K), J/m³. RangeError outside −40…600 °C. */
export function meltingEnthalpyPerVolume(plateTemperature: number): number {
  return STEEL_DENSITY * meltingEnthalpy(plateTemperature);
}

/** Heat the plate holds above 298.15 K, J/kg; negative for a colder plate. Below 20 °C the specific heat at 20 °C is kept. */
function sensibleHeat(plateTemperature: number): number {
  plateTemperatureChecked(plateTemperature);
  const atReference = steelEnthalpy(REFERENCE_TEMPERATURE);
  if (plateTemperature < COLD_PLATE_TEMPERATURE) {
    return (plateTemperature - COLD_PLATE_TEMPERATURE) * steelSpecificHeat(COLD_PLATE_TEMPERATURE) - atReference;
  }
  return steelEnthalpy(plateTemperature) - atReference;
}

function enthalpyPerKilogram(set: Shomate, temperature: number): number {
  const t = temperature / 1000;
  const perMole =
    set.a * t + (set.b * t ** 2) / 2 + (set.c * t ** 3) / 3 + (set.d * t ** 4) / 4 - set.e / t + set.f - set.h;
  return (perMole * 1000) / IRON_MOLAR_MASS;
}

export { carbonEquivalentCet, carbonEquivalentCev, type SteelAnalysis } from './carbon-equivalent.ts';
export { coolingTimes, type CoolingTimes, cutEdgeCoolingTime, type HeatLine } from './cooling-time.ts';
export { LEDGER_BURNT_SHARE, LEDGER_LASER, LEDGER_TOTAL } from './energy-ledger.ts';
export {
  COLD_PLATE_TEMPERATURE,
  heatingEnthalpy,
  IRON_FUSION_HEAT,
  IRON_LIQUID_ENTHALPY,
  IRON_MELTING_TEMPERATURE,
  IRON_SOLID_ENTHALPY,
  meltingEnthalpy,
  meltingEnthalpyPerVolume,
  PLATE_TEMPERATURE_RANGE,
} from './iron.ts';
export { HOT_CONDUCTIVITY, HOT_DIFFUSIVITY, kerfConductionFactor, kerfConductionHeat } from './kerf-conduction.ts';
export { oxidation, OXYGEN_MOLAR_MASS, type Oxidation, type Oxide } from './oxidation.ts';
export { STEEL_DENSITY, steelConductivity, steelDiffusivity, steelEnthalpy, steelSpecificHeat } from './plate-steel.ts';

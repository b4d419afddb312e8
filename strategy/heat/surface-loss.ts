import type { PlateProperties } from './properties.ts';

/** Stefan-Boltzmann constant, W/(m² K⁴). CODATA 2018, exact since the revision of the SI. */
const stefanBoltzmann = 5.670374419e-8;

/** Time constant of a plate that cools from both faces, s: τ = ρcd/2h. Lumped capacity, good while the Biot number is below 0.1. */
export const plateCoolingTime = (thickness: number, coefficient: number, plate: PlateProperties): number =>
  (plate.density * plate.specificHeat * thickness) / (2 * coefficient);

/** Biot number of the plate, dimensionless: h(d/2)/k. */
export const biotNumber = (thickness: number, coefficient: number, plate: PlateProperties): number =>
  (coefficient * thickness) / 2 / plate.conductivity;

/** Share of the plate's heat lost to the air within `time` s: 1 − exp(−t/τ). */
export const lostShare = (time: number, coolingTime: number): number => -Math.expm1(-time / coolingTime);

/** Radiative heat transfer coefficient, W/(m² K), temperatures in K: εσ(T² + Ta²)(T + Ta). ε = 0.7 for carbon steel in EN 1993-1-2. */
export const radiativeCoefficient = (temperature: number, ambient: number, emissivity = 0.7): number =>
  emissivity * stefanBoltzmann * (temperature ** 2 + ambient ** 2) * (temperature + ambient);

import { IRON_MOLAR_MASS } from './iron.ts';

/** Molar mass of oxygen, O₂, kg/mol (IUPAC). */
export const OXYGEN_MOLAR_MASS = 31.9988e-3;

export type Oxide = 'FeO' | 'Fe3O4' | 'Fe2O3';

/** What burning iron to one oxide gives and takes. */
export type Oxidation = {
  /** Heat, J per kg of iron burnt. */
  readonly heatPerIron: number;
  /** Oxygen, kg per kg of iron burnt. */
  readonly oxygenPerIron: number;
  /** Heat, J per kg of oxygen used: close to 17 MJ/kg whichever oxide forms. */
  readonly heatPerOxygen: number;
};

/**
 * Heat of formation at 298.15 K, J/mol of oxide, with the iron atoms and oxygen molecules in it.
 * FeO and Fe2O3: NIST Chemistry WebBook (Chase 1998). Fe3O4: NIST-JANAF, seen through an encyclopaedia.
 */
const FORMATION: Readonly<Record<Oxide, { readonly heat: number; readonly iron: number; readonly oxygen: number }>> = {
  FeO: { heat: 272.0441e3, iron: 1, oxygen: 0.5 },
  Fe3O4: { heat: 1120.894e3, iron: 3, oxygen: 2 },
  Fe2O3: { heat: 825.5032e3, iron: 2, oxygen: 1.5 },
};

/** Heat and oxygen of burning iron to an oxide, per kilogram. Reactants and product at 298.15 K. */
export function oxidation(oxide: Oxide): Oxidation {
  const { heat, iron, oxygen } = FORMATION[oxide];
  const ironMass = iron * IRON_MOLAR_MASS;
  const oxygenMass = oxygen * OXYGEN_MOLAR_MASS;
  return { heatPerIron: heat / ironMass, oxygenPerIron: oxygenMass / ironMass, heatPerOxygen: heat / oxygenMass };
}

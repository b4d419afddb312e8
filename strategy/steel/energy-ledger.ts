import { STEEL_DENSITY } from './plate-steel.ts';
import { oxidation } from './oxidation.ts';

/**
 * Energy put into a unit of melt at the least roughness of the cut face, laser and oxidation together, J/m³: about 26 J/mm³.
 * Fomin et al., J. Appl. Mech. Tech. Phys. 58 (2017), abstract.
 */
export const LEDGER_TOTAL = 26e9;

/** Of that the absorbed laser light, J/m³: 11…13 J/mm³. Golyshev et al., Quantum Electron. 45 (2015), abstract. */
export const LEDGER_LASER = 12e9;

/** Share of the iron burnt to FeO that the two figures imply: about 0.37. */
export const LEDGER_BURNT_SHARE = (LEDGER_TOTAL - LEDGER_LASER) / (STEEL_DENSITY * oxidation('FeO').heatPerIron);

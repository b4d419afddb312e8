import { LEDGER_LASER, LEDGER_TOTAL, meltingEnthalpyPerVolume } from '../steel/index.ts';
import { percent } from '../units/said.ts';

/** Where the heat of a cut comes from and where it goes, J, pierces left out; what comes is what goes. */
export type CutLedger = {
  /** Laser light absorbed, and heat of burning iron. */
  readonly absorbed: number;
  readonly oxidation: number;
  readonly melt: number;
  readonly inPlate: number;
  /** Superheat of the melt, and what leaves with jet and light. Below 0 where the plate is said to take more than there is. */
  readonly rest: number;
  /** Absorbed share of the laser's energy that this asks for; null for a cut without energy. */
  readonly absorption: number | null;
  /** What does not fit, in sentences. */
  readonly cautions: readonly string[];
};

export type LedgerInput = {
  readonly volume: number; // m³ of kerf
  readonly plateTemperature: number; // K
  readonly laser: number; // J along the path
  readonly inPlate: number; // J along the path
};

/**
 * The energy ledger of a cut, J: 26 J per mm³ of kerf in all, 12 of them absorbed light, as for the least roughness of the cut face (see `LEDGER_TOTAL`); melting from the
 * plate's temperature; what the strategy says is left in the plate; and the rest. The measured total spreads by some 8 %; cuts of 3 to 16 mm gave it, thicker ones are
 * extrapolated. Throws RangeError for a plate outside −40…600 °C.
 */
export function cutLedger({ volume, plateTemperature, laser, inPlate }: LedgerInput): CutLedger {
  const absorbed = LEDGER_LASER * volume;
  const oxidation = (LEDGER_TOTAL - LEDGER_LASER) * volume;
  const melt = meltingEnthalpyPerVolume(plateTemperature) * volume;
  const rest = absorbed + oxidation - melt - inPlate;
  const absorption = laser > 0 ? absorbed / laser : null;
  const cautions: string[] = [];
  if (rest < 0) {
    cautions.push(
      `Melting the kerf and the heat said to stay in the plate ask for ${percent((melt + inPlate) / (absorbed + oxidation))} of what laser and burning give: that heat is set too high, or the kerf too narrow.`,
    );
  }
  if (absorption !== null && absorption > 1) {
    cautions.push(
      `The kerf would need ${percent(absorption)} of the laser’s energy: feed or kerf width is above what this power cuts well.`,
    );
  }
  return { absorbed, oxidation, melt, inPlate, rest, absorption, cautions };
}

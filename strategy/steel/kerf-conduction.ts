import { IRON_MELTING_TEMPERATURE, plateTemperatureChecked } from './iron.ts';

/** Properties of the steel beside the kerf, where it is 600…1000 °C: EN 1993-1-2:2005, 3.4.1, rounded. */
export const HOT_CONDUCTIVITY = 30; // W/(m K)
export const HOT_DIFFUSIVITY = 6e-6; // m²/s

/**
 * Péclet number and net heat left in the plate, f = q/(k d ΔT), of a kerf whose front half is at melting and whose walls
 * behind it are insulated. Own finite-volume solution, ±1 %; no outside source.
 */
const KERF_TABLE: readonly Solved[] = [
  [0.2, 1.712],
  [0.5, 2.112],
  [1, 2.514],
  [2, 3.037],
  [3, 3.411],
  [5, 3.969],
];

/**
 * Net heat a moving kerf leaves in the plate, without unit: f = q/(k d ΔT) at the Péclet number v·a/α, a half the kerf width.
 * Linear in ln Pe between the solved points; beyond them the power of Pe goes on that the last two show. RangeError when Pe is not positive.
 */
export function kerfConductionFactor(peclet: number): number {
  if (!(peclet > 0) || !Number.isFinite(peclet)) throw new RangeError(`Péclet number ${peclet} is not positive`);
  const [first, second] = KERF_TABLE;
  const [before, last] = KERF_TABLE.slice(-2);
  if (first && second && peclet <= first[0]) return goneOn(peclet, first, second);
  if (before && last && peclet >= last[0]) return goneOn(peclet, last, before);
  let [lowPeclet, lowFactor] = first ?? [1, 0];
  for (const [highPeclet, highFactor] of KERF_TABLE) {
    if (peclet <= highPeclet && highPeclet > lowPeclet) {
      const part = Math.log(peclet / lowPeclet) / Math.log(highPeclet / lowPeclet);
      return lowFactor + part * (highFactor - lowFactor);
    }
    [lowPeclet, lowFactor] = [highPeclet, highFactor];
  }
  return lowFactor;
}

type Solved = readonly [peclet: number, factor: number];

const goneOn = (peclet: number, [endPeclet, endFactor]: Solved, [inPeclet, inFactor]: Solved): number =>
  endFactor * (peclet / endPeclet) ** (Math.log(endFactor / inFactor) / Math.log(endPeclet / inPeclet));

/**
 * Heat a straight cut leaves in the plate, both sides together, J per m² of cut face (length × thickness): f(Pe)·k·ΔT/v.
 * The default for `CutConditions.heatIntoPlate`: about 6.5 J/mm² for a 0.6 mm kerf at 1 m/min in a cold plate. It follows the kerf's width and the feed; the thickness cancels, since
 * the front is as high as the face. In the ledger of the cut (26 J/mm³ of melt: Fomin et al. 2017) it closes with the heat of melting, at that kerf and feed 10.8 of 26 J/mm³; own
 * solution, no measured value was found: the first thing for test cuts to fit (`heatShare`). Feed m/s, kerf width m, plate temperature K. RangeError for a feed or kerf that is not positive, or a plate outside −40…600 °C.
 */
export function kerfConductionHeat(cut: {
  readonly feed: number;
  readonly kerfWidth: number;
  readonly plateTemperature: number;
}): number {
  const { feed, kerfWidth, plateTemperature } = cut;
  if (!(feed > 0 && feed <= 10)) throw new RangeError(`feed ${feed} m/s is outside (0, 10] m/s`);
  if (!(kerfWidth > 0 && kerfWidth <= 0.01)) throw new RangeError(`kerf width ${kerfWidth} m is outside (0, 0.01] m`);
  plateTemperatureChecked(plateTemperature);
  const peclet = (feed * kerfWidth) / 2 / HOT_DIFFUSIVITY;
  return (kerfConductionFactor(peclet) * HOT_CONDUCTIVITY * (IRON_MELTING_TEMPERATURE - plateTemperature)) / feed;
}

import { IRON_MELTING_TEMPERATURE, plateTemperatureChecked } from './iron.ts';

/** Properties of the steel beside the kerf, where it is 600…1000 °C: EN 1993-1-2:2005, 3.4.1, rounded. */
export const HOT_CONDUCTIVITY = 30; // W/(m K)
export const HOT_DIFFUSIVITY = 6e-6; // m²/s

/**
 * Péclet number and net heat left in the plate, f = q/(k d ΔT), of a kerf whose front half is at melting and whose walls
 * behind it are insulated. Own finite-volume solution, ±1 %; no outside source.
 */
const KERF_TABLE: readonly (readonly [number, number])[] = [
  [0.2, 1.712],
  [0.5, 2.112],
  [1, 2.514],
  [2, 3.037],
  [3, 3.411],
  [5, 3.969],
];

/**
 * Net heat a moving kerf leaves in the plate, without unit: f = q/(k d ΔT) at the Péclet number v·a/α, a half the kerf width.
 * Linear in ln Pe between the solved points, the end values beyond them. RangeError when Pe is not positive.
 */
export function kerfConductionFactor(peclet: number): number {
  if (!(peclet > 0) || !Number.isFinite(peclet)) throw new RangeError(`Péclet number ${peclet} is not positive`);
  let [lowPeclet, lowFactor] = KERF_TABLE[0] ?? [1, 0];
  if (peclet <= lowPeclet) return lowFactor;
  for (const [highPeclet, highFactor] of KERF_TABLE) {
    if (peclet <= highPeclet) {
      const part = Math.log(peclet / lowPeclet) / Math.log(highPeclet / lowPeclet);
      return lowFactor + part * (highFactor - lowFactor);
    }
    [lowPeclet, lowFactor] = [highPeclet, highFactor];
  }
  return lowFactor;
}

/**
 * Heat a straight cut leaves in the plate, both sides together, J per m² of cut face (length × thickness): f(Pe)·k·ΔT/v.
 * The default for `CutConditions.heatIntoPlate`: about 6.5 J/mm² for a 0.6 mm kerf at 1 m/min in a cold plate. Feed m/s, kerf
 * width m, plate temperature K. RangeError for a feed or kerf that is not positive, or a plate outside −40…600 °C.
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

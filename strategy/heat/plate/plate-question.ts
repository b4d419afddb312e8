import type { Box } from '../../path/point.ts';
import type { HeatedPiece } from '../path-heat.ts';
import type { PlateProperties } from '../properties.ts';
import type { PierceHeat } from './heat-drops.ts';
import type { PlateShape } from './plate-grid.ts';

/** What a plate's field is computed from. */
export type PlateQuestion = {
  /** The box around the plate, m. Its edge is insulated. */
  readonly plate: Box;
  /** The plate's own outline where it isn't its box: a remnant. */
  readonly shape?: PlateShape;
  readonly thickness: number; // m
  /** The whole plate's before the cut, K. */
  readonly plateTemperature: number;
  /** Of the air, K; 20 °C when left out. */
  readonly ambient?: number;
  /** What each face gives off, W/(m² K): `usualLoss` when left out. */
  readonly lossCoefficient?: number;
  readonly properties?: PlateProperties;
  /** What is cut, in order of time and nothing at the same time. */
  readonly heat: readonly HeatedPiece[];
  /** Behind which pieces a kerf stays open: behind those of `heat` when left out, behind none when empty. */
  readonly kerfs?: readonly HeatedPiece[];
  readonly pierces?: readonly PierceHeat[];
  /** Side of a cell, m; 10 mm when left out, less on small plates. */
  readonly cell?: number;
  /** Time of a step, s, at most; when left out what the cell needs. */
  readonly step?: number;
  /** End of what is computed, s; the end of the heat when left out. */
  readonly until?: number;
  /** How many moments, at most, the field's `times` are: 60 when left out. */
  readonly moments?: number;
};

/**
 * Loss of a face, W/(m² K): free convection on a horizontal plate and radiation of dull steel at 100 to 200 °C add up to about this; common practice, no source. A
 * plate of 20 mm then cools with a time constant of about 40 minutes.
 */
export const usualLoss = 20;

/** Air of a hall, K. */
export const roomTemperature = 293.15;
/** Throws RangeError with a sentence for what no plate's field can be computed from. */
export function checkQuestion({
  thickness,
  plateTemperature,
  ambient,
  lossCoefficient,
  heat,
  pierces,
  step,
  moments,
  until,
}: PlateQuestion): void {
  if (!(thickness > 0 && Number.isFinite(thickness)))
    throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  for (const [name, kelvin] of [
    ['plate temperature', plateTemperature],
    ['ambient temperature', ambient ?? roomTemperature],
  ] as const) {
    if (!(kelvin > 0 && Number.isFinite(kelvin))) throw new RangeError(`${name} ${kelvin} K is outside (0, ∞)`);
  }
  if (lossCoefficient !== undefined && !(lossCoefficient >= 0 && Number.isFinite(lossCoefficient)))
    throw new RangeError(`loss coefficient ${lossCoefficient} W/(m² K) is outside [0, ∞)`);
  if (step !== undefined && !(step > 0)) throw new RangeError(`step ${step} s is outside (0, ∞)`);
  if (moments !== undefined && !(moments >= 1)) throw new RangeError(`${moments} moments are outside [1, ∞)`);
  if (until !== undefined && !(until >= 0 && Number.isFinite(until)))
    throw new RangeError(`end ${until} s is outside [0, ∞)`);
  let latest = 0;
  for (const { from, to, powerPerLength } of heat) {
    // a nanosecond is rounding of times that were added up
    if (!(from >= latest - 1e-9 && to >= from && Number.isFinite(to)))
      throw new RangeError(
        `a piece is cut from ${from} to ${to} s, after one that ends at ${latest} s: times must rise`,
      );
    if (!(powerPerLength >= 0 && Number.isFinite(powerPerLength)))
      throw new RangeError(`power ${powerPerLength} W/m of a piece is outside [0, ∞)`);
    latest = to;
  }
  let pierced = 0;
  for (const { time, heat: amount } of pierces ?? []) {
    if (!(time >= pierced && Number.isFinite(time)))
      throw new RangeError(`a pierce at ${time} s comes after one at ${pierced} s: times must rise from 0`);
    if (!(amount >= 0 && Number.isFinite(amount)))
      throw new RangeError(`heat ${amount} J of a pierce is outside [0, ∞)`);
    pierced = time;
  }
}

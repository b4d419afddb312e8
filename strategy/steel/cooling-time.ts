import { celsiusFromKelvin } from '../units/index.ts';

/** A line of heat on a plate: SI, the plate's temperature in K. `factor2` and `factor3` are the standard's F2 and F3 for the shape of a joint. */
export type HeatLine = {
  readonly heatPerLength: number; // J/m
  readonly plateTemperature: number; // K
  readonly thickness: number; // m
  readonly factor2?: number;
  readonly factor3?: number;
};

/** Cooling times from 800 to 500 °C, s, when heat flows in two directions or in three, and the thickness, m, at which the two are the same. */
export type CoolingTimes = {
  readonly thin: number;
  readonly thick: number;
  readonly transition: number;
};

/**
 * Time from 800 to 500 °C beside a line of heat, s, by EN 1011-2:2001, annex D (seen through a calculator and a public program that cite it): `thin` =
 * (4300 − 4.3·T₀)·10⁵·Q²/d²·[1/(500 − T₀)² − 1/(800 − T₀)²]·F₂ for a plate heated through, `thick` = (6700 − 5·T₀)·Q·[1/(500 − T₀) − 1/(800 − T₀)]·F₃ for one heated
 * on its surface, with T₀ in °C, Q in kJ/mm, d in mm. Its constants are fitted to arc welds. `transition` is the thickness at which both are the same with both factors 1;
 * it grows with √Q. RangeError for heat or thickness that is not positive and a plate that is not below 500 °C.
 */
export function coolingTimes(line: HeatLine): CoolingTimes {
  const { heatPerLength, plateTemperature, thickness, factor2 = 1, factor3 = 1 } = line;
  const positive = { 'heat per length': heatPerLength, thickness, 'factor F2': factor2, 'factor F3': factor3 };
  for (const [what, value] of Object.entries(positive))
    if (!(value > 0 && value < Infinity)) throw new RangeError(`${what} ${value} is outside (0, ∞)`);
  const t = celsiusFromKelvin(plateTemperature);
  if (!(t >= -60 && t < 500)) throw new RangeError(`plate temperature ${t} °C is outside [−60, 500) °C`);
  const q = heatPerLength / 1e6;
  const d = thickness * 1e3;
  const [fast, slow] = [1 / (500 - t), 1 / (800 - t)];
  const inPlane = (4300 - 4.3 * t) * 1e5;
  const inDepth = 6700 - 5 * t;
  return {
    thin: inPlane * (q / d) ** 2 * (fast ** 2 - slow ** 2) * factor2,
    thick: inDepth * q * (fast - slow) * factor3,
    transition: Math.sqrt((inPlane / inDepth) * q * (fast + slow)) / 1e3,
  };
}

/**
 * Time in which a cut edge cools from 800 to 500 °C, s: EN 1011-2's form for a plate heated through, since a cut heats it evenly whatever its thickness, which cancels. Heat into the plate in J
 * per m² of cut face, both sides together. An order of magnitude, some hundredths of a second where a weld takes seconds: the edge is hardened whatever
 * the grade. RangeError as `coolingTimes`.
 */
export const cutEdgeCoolingTime = (heatIntoPlate: number, plateTemperature: number): number =>
  coolingTimes({ heatPerLength: heatIntoPlate, plateTemperature, thickness: 1 }).thin;

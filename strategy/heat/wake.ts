import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';

/**
 * Temperature rise, K, `aside` m from a fast through-cut `time` s after it passed, with `heatPerFace` J left per m² of cut face:
 * (q/vd)/(ρc√(4παt))·exp(−y²/4αt). Valid for v²t/4α ≫ 1. Rykalin; the instantaneous plane source of Carslaw and Jaeger, ch. 10.
 */
export function cutWake(heatPerFace: number, aside: number, time: number, plate: PlateProperties): number {
  if (!(time > 0)) throw new RangeError(`time ${time} s is outside (0, ∞)`);
  const spread = 4 * diffusivity(plate) * time;
  return (
    (heatPerFace / (plate.density * plate.specificHeat * Math.sqrt(Math.PI * spread))) *
    Math.exp((-aside * aside) / spread)
  );
}

/** Temperature rise, K, `distance` m from the track of a fast surface source of `heatPerTrack` J/m, `time` s after it passed: (q/v)/(2πkt)·exp(−r²/4αt). Rykalin. */
export function surfaceWake(heatPerTrack: number, distance: number, time: number, plate: PlateProperties): number {
  if (!(time > 0)) throw new RangeError(`time ${time} s is outside (0, ∞)`);
  return (
    (heatPerTrack / (2 * Math.PI * plate.conductivity * time)) *
    Math.exp((-distance * distance) / (4 * diffusivity(plate) * time))
  );
}

/** A greatest temperature rise, K, and when after the passage it is reached, s. */
export type Peak = { readonly rise: number; readonly time: number };

/** Peak beside a fast through-cut: (q/vd)/(ρc·y·√(2πe)) after y²/2α. From the derivative of `cutWake`. */
export function cutWakePeak(heatPerFace: number, aside: number, plate: PlateProperties): Peak {
  if (!(aside > 0)) throw new RangeError(`distance ${aside} m is outside (0, ∞)`);
  return {
    rise: heatPerFace / (plate.density * plate.specificHeat * aside * Math.sqrt(2 * Math.PI * Math.E)),
    time: (aside * aside) / (2 * diffusivity(plate)),
  };
}

/** Peak beside the track of a fast surface source: 2(q/v)/(πe·ρc·r²) after r²/4α. From the derivative of `surfaceWake`. */
export function surfaceWakePeak(heatPerTrack: number, distance: number, plate: PlateProperties): Peak {
  if (!(distance > 0)) throw new RangeError(`distance ${distance} m is outside (0, ∞)`);
  return {
    rise: (2 * heatPerTrack) / (Math.PI * Math.E * plate.density * plate.specificHeat * distance * distance),
    time: (distance * distance) / (4 * diffusivity(plate)),
  };
}

/**
 * Temperature rise, K, at the end of a long straight cut whose source has been off for `time` s: half of the plane source's,
 * ½(q′/v)/(ρc√(4παt)), so it falls as t^(−1/2). Valid for v²t/4α ≫ 1 and a cut long against √(4αt). Derived from `cutWake`.
 */
export const cutEndWake = (heatPerFace: number, time: number, plate: PlateProperties): number =>
  cutWake(heatPerFace, 0, time, plate) / 2;

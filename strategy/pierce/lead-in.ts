import { continuousLine } from '../heat/line-source.ts';
import { diffusivity, type PlateProperties } from '../heat/properties.ts';
import { STEEL_DENSITY, steelConductivity, steelSpecificHeat } from '../steel/index.ts';
import { quantityText } from '../units/index.ts';
import { celsius, millimetres } from '../units/said.ts';
import { peakRiseAroundLine } from './crater.ts';

/** Heat a pierce leaves in the plate: J per m of thickness, given off evenly over so many s. */
export type PierceHeat = { readonly perLength: number; readonly duration: number };

/** Temperature for which the steel beside a pierce is taken, K: 200 °C, between the plate and what a contour may begin in. */
const BESIDE_PIERCE = 473.15;
const STEEL: PlateProperties = {
  conductivity: steelConductivity(BESIDE_PIERCE),
  density: STEEL_DENSITY,
  specificHeat: steelSpecificHeat(BESIDE_PIERCE),
};

/**
 * Greatest temperature rise, K, that the heat of a pierce ever causes at a distance (m) from the hole: a line through the plate that
 * gives its heat off evenly, q′/(4πk)·(E₁(r²/4αt) − E₁(r²/4α(t − D))) at its best moment (Carslaw & Jaeger, 2nd ed., chapter 10). For
 * heat given off at once it is `peakRiseAroundLine`. RangeError for a distance or duration that is not positive or negative heat.
 */
export function pierceWarmth({ perLength, duration }: PierceHeat, distance: number): number {
  if (!(perLength >= 0) || !Number.isFinite(perLength)) throw new RangeError(`heat ${perLength} J/m is negative`);
  if (!(duration > 0) || !Number.isFinite(duration)) throw new RangeError(`duration ${duration} s is not positive`);
  if (!(distance > 0)) throw new RangeError(`distance ${distance} m is not positive`);
  const spread = (distance * distance) / (4 * diffusivity(STEEL));
  // The crest comes s after the end: spread·D/(s·(s + D)) = ln((s + D)/s), which has one root, not beyond `spread`.
  let early = 0;
  let late = spread;
  for (let tries = 0; tries < 100 && late - early > 1e-12 * late; tries++) {
    const s = (early + late) / 2;
    if ((spread * duration) / (s * (s + duration)) > Math.log1p(duration / s)) early = s;
    else late = s;
  }
  const power = perLength / duration;
  return continuousLine(power, distance, late + duration, STEEL) - continuousLine(power, distance, late, STEEL);
}

/** How long the lead-in must be, m, and what decides it; or why no length would do. */
export type LeadInNeeded =
  | { readonly kind: 'ok'; readonly length: number; readonly decides: 'crater' | 'heat'; readonly sentence: string }
  | { readonly kind: 'none'; readonly why: string };

export type LeadInInput = {
  readonly craterRadius: number; // m
  readonly heat: PierceHeat;
  /** Of the plate before the pierce, K. */
  readonly plateTemperature: number;
  /** Hottest the plate may be where the contour begins, K; 250 °C without it, an own choice. */
  readonly startTemperature?: number;
};

/** Own choice, as for a corner's return temperature; no published figure was found. */
export const DEFAULT_START_TEMPERATURE = 523.15;

/** The crater may take up this much of the lead-in. Own choice. */
export const CRATER_SHARE = 0.7;

/**
 * Length of lead-in, m, after which the contour begins beyond the crater and in steel that the pierce has not warmed above
 * `startTemperature`. The heat is taken to be all in the plate and even through it, an upper bound. RangeError for a negative crater
 * radius, and as `pierceWarmth`.
 */
export function leadInNeeded({
  craterRadius,
  heat,
  plateTemperature,
  startTemperature = DEFAULT_START_TEMPERATURE,
}: LeadInInput): LeadInNeeded {
  if (!(craterRadius >= 0)) throw new RangeError(`crater radius ${craterRadius} m is negative`);
  const allowed = startTemperature - plateTemperature;
  if (!(allowed > 0)) {
    return {
      kind: 'none',
      why: `The plate itself, at ${celsius(plateTemperature)}, is not below the ${celsius(startTemperature)} that a contour may begin in.`,
    };
  }
  const forCrater = craterRadius / CRATER_SHARE;
  const forHeat = distanceOfWarmth(heat, allowed);
  const length = Math.max(forCrater, forHeat);
  const shown = quantityText(Math.ceil(length * 1e4 - 1e-6) / 1e4, 'length', 'metric').text;
  if (forCrater >= forHeat) {
    return {
      kind: 'ok',
      length,
      decides: 'crater',
      sentence: `${shown}, to start clear of a crater ${millimetres(craterRadius)} in radius`,
    };
  }
  const sentence = `${shown}, to start in steel that the pierce leaves below ${celsius(startTemperature)}`;
  return { kind: 'ok', length, decides: 'heat', sentence };
}

/** Distance at which `pierceWarmth` is `rise` K, m; it falls with distance. */
function distanceOfWarmth(heat: PierceHeat, rise: number): number {
  if (heat.perLength === 0) return 0;
  // Heat given off at once reaches furthest.
  let far = Math.sqrt(peakRiseAroundLine(heat.perLength, 1, STEEL.density * STEEL.specificHeat) / rise);
  let near = 0;
  for (let tries = 0; tries < 60 && far - near > 1e-9 * far; tries++) {
    const middle = (near + far) / 2;
    if (pierceWarmth(heat, middle) > rise) near = middle;
    else far = middle;
  }
  return far;
}

import type { MachineProfile } from '../machine.ts';

export type Optics = MachineProfile['optics'];

/**
 * Diameter of the waist, m: the fibre's end imaged by collimator and focusing lens. It is the beam's width by second moments
 * (4σ, ISO 11146) as far as the fibre's core diameter is.
 */
export function beamSpotDiameter(optics: Optics): number {
  const { coreDiameter, collimatorFocalLength, focusingFocalLength } = checked(optics);
  return (coreDiameter * focusingFocalLength) / collimatorFocalLength;
}

/** Beam parameter product, m·rad: half the core diameter times half the angle (ISO 11145). Imaging leaves it as it is. */
export function beamParameterProduct(optics: Optics): number {
  const { coreDiameter, halfAngle } = checked(optics);
  return (coreDiameter / 2) * halfAngle;
}

/** Beam propagation ratio M², without unit: π·BPP/λ (ISO 11146). Wavelength in m. */
export function beamPropagationRatio(optics: Optics, wavelength: number): number {
  if (!(wavelength > 0)) throw new RangeError(`wavelength ${wavelength} m is not positive`);
  return (Math.PI * beamParameterProduct(optics)) / wavelength;
}

/** Rayleigh length, m: the distance from the waist at which the beam's area has doubled, w0²/BPP (ISO 11146). */
export function beamRayleighLength(optics: Optics): number {
  const waist = beamSpotDiameter(optics) / 2;
  return (waist * waist) / beamParameterProduct(optics);
}

/** Radius of the beam in free space, m, at a distance from the waist (m, either sign): w0·√(1 + (z/zR)²) (ISO 11146). */
export function beamRadiusAt(optics: Optics, distanceFromWaist: number): number {
  return (beamSpotDiameter(optics) / 2) * Math.hypot(1, distanceFromWaist / beamRayleighLength(optics));
}

/** Mean intensity, W/m²: the power over the area of the beam's radius (m). */
export function beamMeanIntensity(power: number, radius: number): number {
  if (!(radius > 0)) throw new RangeError(`beam radius ${radius} m is not positive`);
  return power / (Math.PI * radius * radius);
}

function checked(optics: Optics): Optics {
  for (const [name, value] of Object.entries(optics)) {
    if (!(value > 0) || !Number.isFinite(value)) throw new RangeError(`optics: ${name} ${value} is not positive`);
  }
  return optics;
}

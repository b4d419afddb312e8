/** What a machine can do and how its dial reads: the part of a machine revision that the computation needs. SI. */
export type MachineProfile = {
  readonly source: {
    /** Greatest and least peak power, W. */
    readonly maxPower: number;
    readonly minPower: number;
    /** Wavelength, m. */
    readonly wavelength: number;
    /** Time the source needs to reach its power, s: a pulse must last longer. */
    readonly riseTime: number;
    readonly minFrequency: number; // Hz
    readonly maxFrequency: number; // Hz
    readonly minDuty: number; // 0..1
  };
  readonly optics: {
    /** Diameter of the fibre's core, m, and half-angle of the light leaving it, rad (ISO 11145). */
    readonly coreDiameter: number;
    readonly halfAngle: number;
    readonly collimatorFocalLength: number; // m
    readonly focusingFocalLength: number; // m
  };
  readonly focusScale: FocusScale;
  readonly standoff: { readonly min: number; readonly max: number }; // m
  readonly oxygen: { readonly minPressure: number; readonly maxPressure: number }; // Pa gauge
  readonly axes: {
    readonly maxFeed: number; // m/s
    readonly acceleration: number; // m/s²
    readonly jerk: number; // m/s³
  };
  readonly bed: { readonly length: number; readonly width: number; readonly shuttleTable: boolean }; // m
  /** How the head moves up and down: its height above the plate while it travels, m, and how fast. An own default where it is not known. */
  readonly heights?: {
    readonly travel?: number | null | undefined; // m
    readonly speed?: number | null | undefined; // m/s
    readonly acceleration?: number | null | undefined; // m/s²
  };
  /** How a plate gets onto the machine: clearing and loading a table, s, and with a second one the swap, s. An own default likewise. */
  readonly loading?: { readonly time?: number | null | undefined; readonly exchange?: number | null | undefined };
  /** Smallest arc the machine follows at cutting feed, m. */
  readonly smallestArc: number;
};

/**
 * How the number typed at the machine relates to the focus position:
 * what the dial means = offset + slope × typed; position = that, plus the standoff when the dial is referred to the nozzle tip.
 */
export type FocusScale = {
  readonly reference: 'plate' | 'nozzle';
  readonly offset: number; // m
  readonly slope: number; // m of travel per m typed; negative when reversed
  /** Least and greatest number the dial takes, m. */
  readonly minDial: number;
  readonly maxDial: number;
};

/** The nozzle that must be fitted. */
export type Nozzle = { readonly type: 'single' | 'double'; readonly diameter: number }; // m

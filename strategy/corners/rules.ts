/** What the engineer decides once about corners for a strategy; the corner plan applies it to each corner of a part. SI. */
export type CornerRules = {
  /** Corners whose angle inside the part is below this are treated, rad. */
  readonly treatBelowAngle: number;
  /** How much hotter than a straight edge the tip may be when the cut comes back to it, before it is treated, K. */
  readonly returnExcessLimit: number;
  readonly loop: {
    readonly allowed: boolean;
    /** The design number: radius of the loop's arc, m. The extension follows, e = r / tan(β/2). */
    readonly radius: number;
    /** Bounds of the extension, m. Outside them the radius gives way, never below the machine's smallest arc. */
    readonly minExtension: number;
    readonly maxExtension: number;
    /** Least free width between the loop's kerf and anything else, m. */
    readonly clearance: number;
  };
  readonly dwell: {
    readonly allowed: boolean;
    /** Longest wait accepted, s. */
    readonly maxDuration: number;
    /** What getting the cut going again costs beside the wait: the beam was off at the finished edge, s. */
    readonly restart: number;
  };
  /** Feed and mean power fall evenly towards the corner and rise evenly behind it. Not allowed when left out. */
  readonly ease?: {
    readonly allowed: boolean;
    /** Length of path on each side, m; no more than half the way to the next corner. */
    readonly length: number;
    /** Shares of the straight cut's feed and mean power in the corner, 0..1. */
    readonly feedShare: number;
    readonly powerShare: number;
  };
  /** The finished corner becomes an arc. Not allowed when left out. */
  readonly round?: {
    readonly allowed: boolean;
    /** The design number: radius of the finished arc, m; smaller where the tolerance asks for it. */
    readonly radius: number;
    /** How far a finished corner may be off the drawn one, m. */
    readonly tolerance: number;
  };
  /** How far the tip may burn back. Only the return temperature is judged when left out. */
  readonly burnBack?: {
    readonly judged: boolean;
    /** Greatest depth inside the finished tip to which the peak may pass the ignition threshold, m. */
    readonly limit: number;
    /** Ignition threshold, K: a fit parameter. */
    readonly ignition: number;
  };
};

/** An ease to start from: feed and power fall together, so that each metre of cut gets what it always gets. Own choice, no source. */
export const easeDefaults = { allowed: true, length: 5e-3, feedShare: 0.4, powerShare: 0.4 } as const;

/** A round to start from: small enough for most drawings. Own choice, no source. */
export const roundDefaults = { allowed: true, radius: 1e-3, tolerance: 0.2e-3 } as const;

/**
 * A judgement of burn-back to start from. The depth is an own choice, no source; the threshold that of bulk iron and steel in oxygen, which take fire when
 * their oxide melts (abstract of doi 10.1023/A:1017523922778): a fit parameter, down to 1233 K for tips as thin as foil.
 */
export const burnBackDefaults = { judged: true, limit: 1e-3, ignition: 1644 } as const;

/** Conditions of the straight cut. SI. */
export type CutConditions = {
  readonly feed: number; // m/s
  readonly peakPower: number; // W
  readonly duty: number; // 0..1
  readonly pulseFrequency: number | null; // Hz; null for continuous power
  readonly oxygenPressure: number; // Pa gauge
  readonly standoff: number; // m
  readonly focusPosition: number; // m, positive above the plate's top
  readonly kerfWidth: number; // m
  /** Heat the cut leaves in the plate, both sides together, J per m² of cut face (length × thickness). */
  readonly heatIntoPlate: number;
};

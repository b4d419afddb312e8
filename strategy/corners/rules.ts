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
};

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

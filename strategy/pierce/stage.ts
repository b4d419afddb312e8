/** The six quantities an engineer sets, at one moment of the pierce. SI. */
export type StageQuantities = {
  readonly standoff: number; // m, nozzle tip above the plate
  readonly focusPosition: number; // m, waist relative to the plate's top, positive above
  readonly peakPower: number; // W
  readonly duty: number; // 0..1, share of the time the beam is on
  /** Hz; null for continuous power, and then duty is 1. */
  readonly pulseFrequency: number | null;
  readonly oxygenPressure: number; // Pa gauge
};

/** One stage: every quantity goes linearly from `from` to `to` over `duration` s. The next stage may start elsewhere (a step). */
export type Stage = {
  readonly duration: number; // s
  readonly from: StageQuantities;
  readonly to: StageQuantities;
};

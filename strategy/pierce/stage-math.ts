import type { Stage, StageQuantities } from './stage.ts';

/** The six quantities at a part (0…1) of a stage; a part that rounding put outside counts as the end. */
export function stageQuantitiesAt(stage: Stage, at: number): StageQuantities {
  const { from, to } = stage;
  const part = Math.min(Math.max(at, 0), 1);
  return {
    standoff: between(from.standoff, to.standoff, part),
    focusPosition: between(from.focusPosition, to.focusPosition, part),
    peakPower: between(from.peakPower, to.peakPower, part),
    duty: between(from.duty, to.duty, part),
    pulseFrequency:
      from.pulseFrequency === null || to.pulseFrequency === null
        ? null
        : between(from.pulseFrequency, to.pulseFrequency, part),
    oxygenPressure: between(from.oxygenPressure, to.oxygenPressure, part),
  };
}

/** Mean power over a stage as set, W: the mean of peak × duty, both linear in time. */
export function stageMeanPower({ from, to }: Stage): number {
  const ends = 2 * (from.peakPower * from.duty + to.peakPower * to.duty);
  const crossed = from.peakPower * to.duty + to.peakPower * from.duty;
  return (ends + crossed) / 6;
}

/** Pulses in a stage; none when the power is continuous. Not rounded. */
export function stagePulses({ duration, from, to }: Stage): number {
  if (from.pulseFrequency === null || to.pulseFrequency === null) return 0;
  return ((from.pulseFrequency + to.pulseFrequency) / 2) * duration;
}

/** Time of the whole routine, s. */
export function routineTime(stages: readonly Stage[]): number {
  return stages.reduce((sum, stage) => sum + stage.duration, 0);
}

/** Mean power over the routine as set, W. */
export function stagesMeanPower(stages: readonly Stage[]): number {
  const energy = stages.reduce((sum, stage) => sum + stageMeanPower(stage) * stage.duration, 0);
  return energy / routineTime(stages);
}

/** Pulses of the routine, to the nearest whole one. */
export function stagesPulses(stages: readonly Stage[]): number {
  return Math.round(stages.reduce((pulses, stage) => pulses + stagePulses(stage), 0));
}

/** Greatest peak power of all stages, W. */
export function stagesPeakPower(stages: readonly Stage[]): number {
  return Math.max(...stages.flatMap(({ from, to }) => [from.peakPower, to.peakPower]));
}

function between(from: number, to: number, part: number): number {
  // This form never leaves the two ends, however it rounds: a pressure ramped to zero does not become negative.
  return from * (1 - part) + to * part;
}

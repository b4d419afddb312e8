import { leadInNeeded } from './lead-in.ts';
import type { StrategyPrediction } from './strategy-prediction.ts';

/** What a pierce comes to over the plates it is for, by name, SI; null where there is none, as the reserve of one never through. */
export type PierceResults = {
  readonly reserveCold: number | null;
  readonly reserveHot: number | null;
  readonly breakthroughCold: number | null;
  readonly breakthroughHot: number | null;
  readonly routineTime: number;
  readonly craterRadius: number;
  readonly leadInLength: number | null;
  readonly eruptionIndex: number;
  readonly eruptionLimit: number;
  readonly meanPower: number;
  readonly peakPower: number;
  readonly energy: number;
  readonly heatLeft: number;
  readonly heatPerThickness: number;
  readonly oxygenUsed: number;
  readonly pulses: number;
  readonly stageCount: number;
  readonly stalls: number;
  readonly thicknessMin: number;
  readonly thicknessMax: number;
  readonly coldPlate: number;
  readonly hottestPlate: number;
};

/** The named results of a prediction. */
export function pierceResults(prediction: StrategyPrediction): PierceResults {
  const { cold, hot, heat, craterRadius } = prediction;
  const through = ({ breakthrough }: typeof cold) => (breakthrough.kind === 'through' ? breakthrough.time : null);
  const reserve = ({ reserve: found }: typeof cold) => (found.kind === 'ok' ? found.value : null);
  const leadIn = leadInNeeded({ craterRadius, heat, plateTemperature: hot.plateTemperature });
  return {
    reserveCold: reserve(cold),
    reserveHot: reserve(hot),
    breakthroughCold: through(cold),
    breakthroughHot: through(hot),
    routineTime: prediction.routineTime,
    craterRadius,
    leadInLength: leadIn.kind === 'ok' ? leadIn.length : null,
    eruptionIndex: prediction.eruption.index,
    eruptionLimit: prediction.eruption.limit,
    meanPower: prediction.meanPower,
    peakPower: prediction.peakPower,
    energy: prediction.energy.emitted,
    heatLeft: prediction.heatLeft,
    heatPerThickness: heat.perLength,
    oxygenUsed: prediction.oxygenUsed,
    pulses: prediction.pulses,
    stageCount: cold.perStage.length,
    stalls: cold.stalls.length,
    thicknessMin: prediction.thickness.min,
    thicknessMax: prediction.thickness.max,
    coldPlate: cold.plateTemperature,
    hottestPlate: hot.plateTemperature,
  };
}

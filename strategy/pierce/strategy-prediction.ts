import type { MachineProfile, Nozzle } from '../machine.ts';
import { COLD_PLATE_TEMPERATURE } from '../steel/index.ts';
import { pierceInterval, type PierceFit, type PierceInterval } from './fit.ts';
import type { PierceHeat } from './lead-in.ts';
import { pierceParameters, type PierceParameters } from './parameters.ts';
import {
  piercePredict,
  type Breakthrough,
  type PierceInput,
  type PiercePrediction,
  type PierceStageResult,
  type PierceStall,
} from './predict.ts';
import type { Stage } from './stage.ts';

export type StrategyInput = {
  readonly stages: readonly Stage[];
  /** Thinnest and thickest plate the strategy is for, m. */
  readonly thickness: { readonly min: number; readonly max: number };
  /** K; 20 °C without it. */
  readonly coldPlateTemperature?: number;
  /** Hottest plate the strategy is good for, K. */
  readonly hottestPlateTemperature: number;
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
  readonly parameters?: Partial<PierceParameters>;
  /** What test cuts on this machine say of the parameters; it goes before `parameters`. */
  readonly fit?: PierceFit;
};

/** Routine time ÷ breakthrough time, without unit; or why there is none. */
export type Reserve = { readonly kind: 'ok'; readonly value: number } | { readonly kind: 'none'; readonly why: string };

/** How the pierce goes on the thickest plate at one temperature. */
export type StrategyOutcome = {
  readonly plateTemperature: number; // K
  readonly breakthrough: Breakthrough;
  readonly reserve: Reserve;
  /** How sure the fitted model is of both; null where nothing was fitted. */
  readonly interval: PierceInterval | null;
  readonly trace: PiercePrediction['trace'];
  readonly stalls: readonly PierceStall[];
  readonly perStage: readonly PierceStageResult[];
};

export type StrategyEruption = {
  readonly index: number;
  /** Index from which the melt is thrown out. */
  readonly limit: number;
  readonly stage: number;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
  /** Greatest index of each stage in the three cases; 0 where the hole is through before it in all of them. */
  readonly perStage: readonly number[];
};

/** What a strategy revision stores beside its content. Plain JSON. */
export type StrategyPrediction = {
  readonly modelVersion: string;
  readonly thickness: { readonly min: number; readonly max: number };
  readonly routineTime: number; // s
  readonly cold: StrategyOutcome;
  readonly hot: StrategyOutcome;
  /** Widest of the three cases predicted, m: thinnest and hottest, thickest and hottest, thickest and cold. */
  readonly craterRadius: number;
  /** Greatest eruption index of the three cases, with the stage and the plate it falls on. */
  readonly eruption: StrategyEruption;
  /** On the thickest plate, cold: the longest burning one. */
  readonly energy: PiercePrediction['energy'];
  readonly heatLeft: number; // J
  /** Most heat per metre of thickness in the three cases, J/m, and the time it is given off in: what warms the lead-in. */
  readonly heat: PierceHeat;
  readonly oxygenUsed: number; // kg
  readonly pulses: number;
  readonly meanPower: number; // W
  readonly peakPower: number; // W
};

/**
 * What a staged pierce does over the range of plates it is for: breakthrough and reserve on the thickest, cold and hot. Crater and
 * eruption are worst on the thinnest and hottest as long as the same stages act; but a thick or cold plate is still closed when
 * a later, stronger stage begins, so the worst of all three cases is taken. RangeError as from `piercePredict`, for a range
 * upside down, and for a hottest plate that is colder than the cold one.
 */
export function strategyPrediction(input: StrategyInput): StrategyPrediction {
  const { stages, thickness, profile, nozzle, hottestPlateTemperature } = input;
  const coldPlateTemperature = input.coldPlateTemperature ?? COLD_PLATE_TEMPERATURE;
  if (!(thickness.min <= thickness.max)) {
    throw new RangeError(`thickness range [${thickness.min}, ${thickness.max}] m is upside down`);
  }
  if (!(hottestPlateTemperature >= coldPlateTemperature)) {
    throw new RangeError(
      `hottest plate ${hottestPlateTemperature} K is colder than the cold plate ${coldPlateTemperature} K`,
    );
  }
  const parameters = { ...input.parameters, ...input.fit?.parameters };
  const inputAt = (plate: number, plateTemperature: number): PierceInput => ({
    stages,
    thickness: plate,
    plateTemperature,
    profile,
    nozzle,
    parameters,
  });
  const at = (plate: number, plateTemperature: number): PiercePrediction =>
    piercePredict(inputAt(plate, plateTemperature));
  const intervalAt = (plateTemperature: number): PierceInterval | null =>
    input.fit === undefined ? null : pierceInterval(inputAt(thickness.max, plateTemperature), input.fit);
  const cold = at(thickness.max, coldPlateTemperature);
  const hot = at(thickness.max, hottestPlateTemperature);
  const thinHot = thickness.min === thickness.max ? hot : at(thickness.min, hottestPlateTemperature);
  const cases: readonly PierceCase[] = [
    { prediction: thinHot, thickness: thickness.min, plateTemperature: hottestPlateTemperature },
    { prediction: hot, thickness: thickness.max, plateTemperature: hottestPlateTemperature },
    { prediction: cold, thickness: thickness.max, plateTemperature: coldPlateTemperature },
  ];
  return {
    modelVersion: cold.modelVersion,
    thickness: { min: thickness.min, max: thickness.max },
    routineTime: cold.routineTime,
    cold: outcome(cold, coldPlateTemperature, intervalAt(coldPlateTemperature)),
    hot: outcome(hot, hottestPlateTemperature, intervalAt(hottestPlateTemperature)),
    craterRadius: Math.max(thinHot.craterRadius, hot.craterRadius, cold.craterRadius),
    eruption: { ...worstEruption(cases), limit: pierceParameters(parameters).eruptionLimit },
    heat: {
      perLength: Math.max(...cases.map((one) => one.prediction.heatLeft / one.thickness)),
      duration: cold.routineTime,
    },
    energy: cold.energy,
    heatLeft: cold.heatLeft,
    oxygenUsed: cold.oxygenUsed,
    pulses: cold.pulses,
    meanPower: cold.meanPower,
    peakPower: cold.peakPower,
  };
}

/** Reserve of one prediction: routine time ÷ breakthrough time, or why there is none. */
export function pierceReserve(prediction: Pick<PiercePrediction, 'breakthrough' | 'routineTime'>): Reserve {
  const { breakthrough, routineTime } = prediction;
  if (breakthrough.kind === 'none') return { kind: 'none', why: breakthrough.why };
  return { kind: 'ok', value: routineTime / breakthrough.time };
}

function outcome(
  prediction: PiercePrediction,
  plateTemperature: number,
  interval: PierceInterval | null,
): StrategyOutcome {
  return {
    plateTemperature,
    breakthrough: prediction.breakthrough,
    reserve: pierceReserve(prediction),
    interval,
    trace: prediction.trace,
    stalls: prediction.stalls,
    perStage: prediction.perStage,
  };
}

type PierceCase = {
  readonly prediction: PiercePrediction;
  readonly thickness: number;
  readonly plateTemperature: number;
};

function worstEruption(cases: readonly PierceCase[]): Omit<StrategyEruption, 'limit'> {
  const perStage = (cases[0]?.prediction.perStage ?? []).map((_, stage) =>
    Math.max(...cases.map(({ prediction }) => prediction.perStage[stage]?.eruptionIndex ?? 0)),
  );
  const all = cases.flatMap(({ prediction, thickness, plateTemperature }) =>
    prediction.perStage.map(({ eruptionIndex }, stage) => ({
      index: eruptionIndex,
      stage,
      thickness,
      plateTemperature,
    })),
  );
  const [first, ...others] = all;
  if (first === undefined) throw new RangeError('a pierce without stages has no eruption index');
  // A stage erupts alike on every plate that it finds closed: which of them is named must not hang on rounding, which engines do
  // differently.
  const worse = (next: number, worst: number) => next > worst * (1 + 1e-9);
  return { ...others.reduce((worst, next) => (worse(next.index, worst.index) ? next : worst), first), perStage };
}

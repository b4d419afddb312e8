import type { MachineProfile, Nozzle } from '../strategy/machine.ts';
import {
  DEFAULT_RESERVE_RULES,
  pierceChecks,
  piercePredict,
  pierceReserve,
  pierceResults,
  strategyPrediction,
  type PierceFit,
  type PiercePrediction,
  type PierceResults,
  type PierceStall,
  type ReserveRules,
  type StrategyOutcome,
  type StrategyPrediction,
} from '../strategy/pierce/index.ts';
import { COLD_PLATE_TEMPERATURE } from '../strategy/steel/index.ts';
import type { Condition, Prediction, StrategyContent } from './strategies.ts';

const metres = (micrometres: number) => micrometres / 1e6;

export type Judged = {
  readonly content: StrategyContent;
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
  /** What test cuts on the machine say of the model; without it nothing is said of how sure it is. */
  readonly fit?: PierceFit;
};

/**
 * What the model says of a strategy's content: the same in the browser, for instant feedback, as on the server, which stores it.
 * Throws RangeError where the model can't follow (see `strategyPrediction`).
 */
export function predictionOf(judged: Judged, reserve: ReserveRules = DEFAULT_RESERVE_RULES): Prediction {
  const { content, profile } = judged;
  const outcome = outcomeOf(judged);
  return {
    modelVersion: outcome.modelVersion,
    routineTime: outcome.routineTime,
    cold: conditionOf(outcome.cold, outcome.thickness.max),
    hot: conditionOf(outcome.hot, outcome.thickness.max),
    craterRadius: outcome.craterRadius,
    eruptionIndex: outcome.eruption.index,
    energy: outcome.energy.emitted,
    meanPower: outcome.meanPower,
    peakPower: outcome.peakPower,
    oxygenUsed: outcome.oxygenUsed,
    pulses: outcome.pulses,
    heatLeft: outcome.heatLeft,
    heatPerThickness: outcome.heat.perLength,
    eruptions: [...outcome.eruption.perStage],
    checks: pierceChecks({ stages: content.stages, prediction: outcome, profile, rules: reserve }).map(
      ({ id, state, sentence }) => ({ id, state, sentence }),
    ),
  };
}

/** The results that house rules speak of, SI. RangeError as `predictionOf`. */
export function namedResultsOf(judged: Judged): PierceResults {
  return pierceResults(outcomeOf(judged));
}

/**
 * The least reserves that a plant's rules ask for, cold and hot, as far as they say it plainly (`reserveCold >= 2`); the strictest
 * of several. Without such a rule the usual ones stand.
 */
export function reserveRulesOf(expressions: readonly string[]): ReserveRules {
  const least = (name: string, usual: number): number => {
    const plain = new RegExp(`^\\s*${name}\\s*(?:>=|>|≥)\\s*(\\d+(?:\\.\\d+)?)\\s*$`);
    const asked = expressions.flatMap((expression) => {
      const found = plain.exec(expression);
      return found === null ? [] : [Number(found[1])];
    });
    return asked.length === 0 ? usual : Math.max(...asked);
  };
  return {
    cold: least('reserveCold', DEFAULT_RESERVE_RULES.cold),
    hot: least('reserveHot', DEFAULT_RESERVE_RULES.hot),
  };
}

function outcomeOf({ content, profile, nozzle, fit }: Judged): StrategyPrediction {
  return strategyPrediction({
    stages: content.stages,
    thickness: { min: metres(content.thickness.min), max: metres(content.thickness.max) },
    hottestPlateTemperature: content.hottestPlate,
    profile,
    nozzle,
    ...(fit === undefined ? {} : { fit }),
  });
}

/** What the card says for the plate in hand: through after how long, with which reserve, how wide the crater. */
export type CardEstimate = {
  readonly plateTemperature: number; // K
  readonly breakthrough: number | null; // s
  readonly reserve: number | null;
  readonly why: string | null;
  readonly routineTime: number; // s
  readonly craterRadius: number; // m
  /** Depth at each stage's end as a share of the thickness. */
  readonly bands: readonly number[];
};

/** The estimate for a plate's own thickness (m) and temperature (K; 20 °C when left out). RangeError as `piercePredict`. */
export function cardEstimate({
  content,
  profile,
  nozzle,
  fit,
  thickness,
  plateTemperature = COLD_PLATE_TEMPERATURE,
}: Judged & { readonly thickness: number; readonly plateTemperature?: number }): CardEstimate {
  const predicted = piercePredict({
    stages: content.stages,
    thickness,
    plateTemperature,
    profile,
    nozzle,
    ...(fit === undefined ? {} : { parameters: fit.parameters }),
  });
  const reserve = pierceReserve(predicted);
  return {
    plateTemperature,
    breakthrough: predicted.breakthrough.kind === 'through' ? predicted.breakthrough.time : null,
    reserve: reserve.kind === 'ok' ? reserve.value : null,
    why: reserve.kind === 'ok' ? null : reserve.why,
    routineTime: predicted.routineTime,
    craterRadius: predicted.craterRadius,
    bands: bandsOf(predicted.perStage, thickness),
  };
}

/** The core's bands: depth at each stage's end, as a share of the thickness. */
export function bandsOf(perStage: PiercePrediction['perStage'], thickness: number): number[] {
  return perStage.map(({ depthAtEnd }) => Math.min(1, depthAtEnd / thickness));
}

/** The same from a stored prediction, on a cold plate. */
export function bandsOfStored(prediction: Pick<Prediction, 'cold'>, durations: readonly number[]): number[] {
  const { trace, thickness } = prediction.cold;
  let end = 0;
  return durations.map((duration) => {
    end += duration;
    return Math.min(1, depthAt(trace, end) / thickness);
  });
}

function depthAt(trace: Condition['trace'], time: number): number {
  const after = trace.time.findIndex((at) => at >= time);
  const last = trace.depth.at(-1) ?? 0;
  if (after < 0) return last;
  const [t1, z1] = [trace.time[after] ?? 0, trace.depth[after] ?? 0];
  const [t0, z0] = [trace.time[after - 1] ?? 0, trace.depth[after - 1] ?? 0];
  return t1 > t0 ? z0 + ((z1 - z0) * (time - t0)) / (t1 - t0) : z1;
}

function conditionOf(outcome: StrategyOutcome, thickness: number): Condition {
  const { breakthrough } = outcome;
  return {
    plateTemperature: outcome.plateTemperature,
    thickness,
    breakthrough:
      breakthrough.kind === 'through'
        ? { kind: 'ok', value: breakthrough.time }
        : { kind: 'none', why: breakthrough.why },
    reserve: outcome.reserve,
    interval: outcome.interval,
    trace: { time: [...outcome.trace.time], depth: [...outcome.trace.depth] },
    stalls: outcome.stalls.map(({ stage, time, depth, why }: PierceStall) => ({ stage, time, depth, why })),
  };
}

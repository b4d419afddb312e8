import { bandsOfStored } from '@/shared/prediction.ts';
import type { Condition, Prediction, StrategyContent } from '@/shared/strategies.ts';
import {
  leadInNeeded,
  pierceParameterTable,
  PIERCE_DEFAULTS,
  type PierceParameterName,
  type PierceParameterRow,
} from '@/strategy/pierce/index.ts';
import { numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { reserveText } from './pierce.ts';

/** A result of the whole pierce that can be asked how it comes about. */
export type ResultName =
  | 'throughCold'
  | 'throughHot'
  | 'reserveCold'
  | 'reserveHot'
  | 'routine'
  | 'crater'
  | 'leadIn'
  | 'eruption'
  | 'meanPower'
  | 'peakPower'
  | 'energy'
  | 'pulses'
  | 'heatLeft'
  | 'oxygen';

/** The same of one stage. */
export type StageResultName = 'depth' | 'stageEruption' | 'stall';

export const resultLabel: Readonly<Record<ResultName, string>> = {
  throughCold: 'through, cold',
  throughHot: 'through, hot',
  reserveCold: 'reserve, cold',
  reserveHot: 'reserve, hot',
  routine: 'routine',
  crater: 'crater radius',
  leadIn: 'lead-in from',
  eruption: 'eruption',
  meanPower: 'mean power',
  peakPower: 'peak power',
  energy: 'laser energy',
  pulses: 'pulses',
  heatLeft: 'heat left',
  oxygen: 'oxygen used',
};

/** Three figures say all that an estimate knows. */
export const estimate = { figures: 3 } as const;

/** The shortest lead-in that clears the crater and what the pierce warms; null where the heat was not kept. */
export const leadInOf = ({ heatPerThickness, routineTime, craterRadius, hot }: Prediction) =>
  heatPerThickness === null
    ? null
    : leadInNeeded({
        craterRadius,
        heat: { perLength: heatPerThickness, duration: routineTime },
        plateTemperature: hot.plateTemperature,
      });

/** How much of what throws the melt out is reached. */
export const eruptionText = (index: number): string =>
  quantityText(index / PIERCE_DEFAULTS.eruptionLimit, 'ratio', 'metric', { unit: '%', decimals: 0 }).text;

export function resultValue(name: ResultName, prediction: Prediction, system: UnitSystem): string {
  const through = ({ breakthrough }: Condition) =>
    breakthrough.kind === 'ok' ? quantityText(breakthrough.value, 'time', system, estimate).text : 'never';
  const reserve = ({ reserve: one }: Condition) => reserveText(one.kind === 'ok' ? one.value : null);
  switch (name) {
    case 'throughCold':
      return through(prediction.cold);
    case 'throughHot':
      return through(prediction.hot);
    case 'reserveCold':
      return reserve(prediction.cold);
    case 'reserveHot':
      return reserve(prediction.hot);
    case 'crater':
      return quantityText(prediction.craterRadius, 'length', system, estimate).text;
    case 'eruption':
      return eruptionText(prediction.eruptionIndex);
    case 'leadIn': {
      const needed = leadInOf(prediction);
      if (needed === null) return notKept;
      // rounded up: a shorter one would not do
      return needed.kind === 'ok'
        ? quantityText(Math.ceil(needed.length * 1e4 - 1e-6) / 1e4, 'length', system).text
        : 'none';
    }
    case 'peakPower':
      return quantityText(prediction.peakPower, 'power', system, estimate).text;
    case 'pulses':
      return prediction.pulses === null ? notKept : numberText(prediction.pulses, 0);
    case 'heatLeft':
      return prediction.heatLeft === null
        ? notKept
        : quantityText(prediction.heatLeft, 'energy', system, estimate).text;
    case 'routine':
      return quantityText(prediction.routineTime, 'time', system, estimate).text;
    case 'energy':
      return quantityText(prediction.energy, 'energy', system, estimate).text;
    case 'oxygen':
      return quantityText(prediction.oxygenUsed, 'mass', system, estimate).text;
    case 'meanPower':
      return quantityText(prediction.meanPower, 'power', system, estimate).text;
  }
}

/** What stands where an earlier program left nothing to show. */
export const notKept = 'not kept';

/** A stage's own results: how near it comes to an eruption, and where the bottom stands still in it on the thickest cold plate. */
export function stageResults(prediction: Prediction, stage: number) {
  const index = prediction.eruptions?.[stage] ?? 0;
  const stall = prediction.cold.stalls.find((one) => one.stage === stage);
  return { eruption: index > 0 ? eruptionText(index) : null, stall: stall ?? null };
}

/** Depth on a cold plate at the end of each stage, m. */
export const depthsAtEnds = (prediction: Prediction, content: StrategyContent): number[] =>
  bandsOfStored(
    prediction,
    content.stages.map(({ duration }) => duration),
  ).map((share) => share * prediction.cold.thickness);

/** A parameter of the model as it stands in its table. */
export function parameterRow(name: PierceParameterName, system: UnitSystem) {
  const row = pierceParameterTable.find((one) => one.name === name);
  return row ? { meaning: row.meaning, value: parameterValue(row, system), origin: row.origin } : null;
}

function parameterValue({ default: value, unit }: PierceParameterRow, system: UnitSystem): string {
  if (unit === '') return percentOr(value);
  if (unit === 'm') return quantityText(value, 'length', system).text;
  if (unit === 's') return quantityText(value, 'time', system).text;
  if (unit === 'J/kg') return `${numberText(value / 1e3, 0)} kJ/kg`;
  return `${numberText(value, 2)} ${unit}`;
}

export const percent = (value: number) => quantityText(value, 'ratio', 'metric', estimate).text;
/** Shares up to one in per cent, factors as they are. */
const percentOr = (value: number) => (value < 1 ? percent(value) : numberText(value, 2));

import type { Condition, Prediction, StrategyContent } from '@/shared/strategies.ts';
import type { Nozzle } from '@/strategy/machine.ts';
import {
  pierceWarmth,
  PIERCE_DEFAULTS,
  stagePulses,
  type PierceParameterName,
  type ReserveRules,
  type Stage,
} from '@/strategy/pierce/index.ts';
import { numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import {
  depthsAtEnds,
  eruptionText,
  estimate,
  leadInOf,
  notKept,
  percent,
  resultValue,
  stageResults,
  type ResultName,
  type StageResultName,
} from './pierce-results.ts';
import { reserveText } from './pierce.ts';

export type Explained = { readonly name: ResultName } | { readonly name: StageResultName; readonly stage: number };

export type Explanation = {
  readonly title: string;
  readonly value: string;
  /** What it is. */
  readonly what: string;
  /** The formula in words. */
  readonly formula: string;
  readonly inputs: readonly { readonly label: string; readonly value: string }[];
  readonly parameters: readonly PierceParameterName[];
  readonly source: string;
};

export type ExplainedFrom = {
  readonly prediction: Prediction;
  /** The content the prediction is of. */
  readonly content: StrategyContent;
  readonly nozzle: Nozzle | null;
  /** The least reserves the plant asks for. */
  readonly rules: ReserveRules;
  readonly system: UnitSystem;
};

export const explainText = {
  spoken: (label: string, value: string) => `${label}: ${value}. How it is worked out`,
  formula: 'How it is worked out',
  inputs: 'From these numbers',
  parameters: 'What the model had to assume',
  origin: (origin: string) => `Origin: ${origin}.`,
  source: 'Source',
  model: (version: string) => `Model ${version}. An estimate until a test cut on this machine confirms it.`,
  results: 'Results',
  hint: 'Press a result to see how it is worked out.',
} as const;

const depthParameters: readonly PierceParameterName[] = [
  'coupling',
  'attenuationLength',
  'boreRadius',
  'guidedShare',
  'burntShare',
  'oxygenUse',
  'oxygenDepth',
  'jetSpread',
  'expulsionHeat',
  'conductivity',
  'deepConduction',
  'wallShare',
  'remeltTime',
  'pauseLoss',
];
const depthFormula =
  'The bottom sinks as fast as the heat that reaches it melts steel: laser that is coupled in and not lost on the way down, plus the heat of the iron that burns with the oxygen arriving there, less what is conducted away from the bottom; divided by the heat to melt and throw out the steel of the bore’s cross-section. Adding this up over the stages gives the depth.';
const depthSource =
  'Beam width by ISO 11146; heat of steel by EN 1993-1-2:2005 and NIST data; energy to cut with oxygen by Fomin et al. 2017 and Golyshev et al. 2015 (abstracts); conduction from a disk, 4·k·a·ΔT (Carslaw and Jaeger).';

/** What a result is and how it comes about, with the numbers it was worked out from. */
export function explanationOf(explained: Explained, from: ExplainedFrom): Explanation {
  const { prediction, content, nozzle, rules, system } = from;
  const length = (value: number) => quantityText(value, 'length', system).text;
  const time = (value: number) => quantityText(value, 'time', system, estimate).text;
  const power = (value: number) => quantityText(value, 'power', system, estimate).text;
  const temperature = (value: number) => quantityText(value, 'temperature', system).text;
  const { cold, hot, routineTime } = prediction;
  const stageCount = { label: 'Stages', value: String(content.stages.length) };
  const routine = { label: 'Routine, all stages together', value: time(routineTime) };
  const plate = (condition: Condition) => [
    { label: 'Thickness judged, the thickest', value: length(condition.thickness) },
    { label: 'Temperature of the plate', value: temperature(condition.plateTemperature) },
  ];
  const fitted = nozzle ? [{ label: 'Nozzle', value: `${nozzle.type}, ${length(nozzle.diameter)}` }] : [];
  const mean = (at: { peakPower: number; duty: number }) => power(at.peakPower * at.duty);
  const stageMeans = (index: number) => {
    const stage = content.stages[index];
    if (!stage) return [];
    return [
      { label: 'Mean power where the stage begins', value: mean(stage.from) },
      { label: 'and where it ends', value: mean(stage.to) },
      { label: 'The stage lasts', value: time(stage.duration) },
    ];
  };
  const head =
    'stage' in explained
      ? {
          title: stageTitle[explained.name](explained.stage + 1),
          value: stageValue(explained.name, explained.stage, from),
        }
      : { title: resultTitle[explained.name], value: resultValue(explained.name, prediction, system) };

  switch (explained.name) {
    case 'throughCold':
    case 'throughHot': {
      const condition = explained.name === 'throughCold' ? cold : hot;
      return {
        ...head,
        what:
          condition.breakthrough.kind === 'ok'
            ? 'The moment the bottom of the bore reaches the underside of the thickest plate.'
            : `The bottom never reaches the underside. ${condition.breakthrough.why}`,
        formula: depthFormula,
        inputs: [
          ...plate(condition),
          stageCount,
          routine,
          { label: 'Mean power', value: power(prediction.meanPower) },
          ...fitted,
        ],
        parameters: depthParameters,
        source: depthSource,
      };
    }
    case 'depth':
      return {
        ...head,
        what: 'How far down the bottom of the bore is when this stage ends, on the thickest cold plate.',
        formula: depthFormula,
        inputs: [...plate(cold), ...stageMeans(explained.stage), ...fitted],
        parameters: depthParameters,
        source: depthSource,
      };
    case 'stall': {
      const stall = cold.stalls.find(({ stage }) => stage === explained.stage);
      return {
        ...head,
        what: stall?.why ?? 'The bottom of the bore moves throughout this stage.',
        formula:
          'The bottom stands still once the heat that reaches it is no more than what the plate conducts away from it, the pauses between pulses counted. The deeper the bore, the less light arrives, so a power that is enough at the top is not further down: power has to rise with depth.',
        inputs: [
          ...plate(cold),
          ...(stall
            ? [
                { label: 'It stands still from', value: time(stall.time) },
                { label: 'at a depth of', value: quantityText(stall.depth, 'length', system, estimate).text },
              ]
            : []),
          ...stageMeans(explained.stage),
          ...fitted,
        ],
        parameters: ['coupling', 'attenuationLength', 'boreRadius', 'conductivity', 'deepConduction', 'pauseLoss'],
        source: depthSource,
      };
    }
    case 'stageEruption': {
      const stage = content.stages[explained.stage];
      return {
        ...head,
        what: 'How near this stage comes to throwing its melt out in one burst, before the hole is through; from 100 % it is thrown out.',
        formula: eruptionFormula,
        inputs: [
          {
            label: 'Greatest filling of the bore by a pulse',
            value: percent(prediction.eruptions?.[explained.stage] ?? 0),
          },
          { label: 'Filling from which it is thrown out', value: percent(PIERCE_DEFAULTS.eruptionLimit) },
          ...stageMeans(explained.stage),
          ...(stage ? [{ label: 'Slowest pulses', value: slowestPulses([stage], system) }] : []),
        ],
        parameters: eruptionParameters,
        source: eruptionSource,
      };
    }
    case 'reserveCold':
    case 'reserveHot': {
      const condition = explained.name === 'reserveCold' ? cold : hot;
      const rule = explained.name === 'reserveCold' ? rules.cold : rules.hot;
      return {
        ...head,
        what:
          condition.reserve.kind === 'ok'
            ? 'How many times over the routine lasts until the hole is through. At 1 it would be through at the very last moment.'
            : `There is none. ${condition.reserve.why}`,
        formula:
          'Routine time divided by the time to breakthrough on the thickest plate. Cut off after two figures, not rounded up.',
        inputs: [
          routine,
          {
            label: 'Through after',
            value: condition.breakthrough.kind === 'ok' ? time(condition.breakthrough.value) : 'never',
          },
          ...plate(condition),
          { label: 'Asked for by the plant', value: reserveText(rule) },
        ],
        parameters: ['coupling', 'attenuationLength', 'boreRadius'],
        source:
          'Definition of this product. A hot plate is through sooner, but its pierces scatter and erupt more, so more is asked of it; what a plant is founded with, 2.0 cold and 2.2 hot, is common practice, no source.',
      };
    }
    case 'crater':
      return {
        ...head,
        what: 'How far around the pierce the surface melts or is spattered: the widest of thinnest and thickest plate, cold and hot. The lead-in must be longer.',
        formula:
          'The heat left at the top is taken as released at once in a point of a thick plate; the radius is where its greatest temperature still reaches melting. It is never less than the bore at the top, and melt thrown out by an eruption adds its heat.',
        inputs: [
          {
            label: 'Thickness of the plates',
            value: `${length(content.thickness.min * 1e-6)} to ${length(content.thickness.max * 1e-6)}`,
          },
          { label: 'Hottest plate', value: temperature(content.hottestPlate) },
          { label: 'Laser energy', value: quantityText(prediction.energy, 'energy', system, estimate).text },
          { label: 'Greatest peak power', value: power(prediction.peakPower) },
        ],
        parameters: ['boreRadius', 'spotFollowing', 'meltSpeed', 'eruptionLimit', 'backfallShare'],
        source: 'Instantaneous point source, greatest temperature at a distance (Carslaw and Jaeger, 2nd ed., 10.2).',
      };
    case 'eruption':
      return {
        ...head,
        what: 'How near the pierce comes to throwing its melt out in one burst: the melt of one pulse against the bore it has to leave by, as a share of the most that it bears. From 100 % it is thrown out.',
        formula: eruptionFormula,
        inputs: [
          { label: 'Greatest filling of the bore by a pulse', value: percent(prediction.eruptionIndex) },
          { label: 'Filling from which it is thrown out', value: percent(PIERCE_DEFAULTS.eruptionLimit) },
          { label: 'Greatest peak power', value: power(prediction.peakPower) },
          { label: 'Slowest pulses', value: slowestPulses(content.stages, system) },
          ...(prediction.eruptions ?? []).map((index, stage) => ({
            label: `Stage ${stage + 1}`,
            value: index > 0 ? eruptionText(index) : 'through before it',
          })),
        ],
        parameters: eruptionParameters,
        source: eruptionSource,
      };
    case 'leadIn':
    case 'heatLeft': {
      const needed = leadInOf(prediction);
      const heat = prediction.heatPerThickness;
      const warmedAt = [5e-3, 10e-3, 20e-3, 40e-3].map((distance) => ({
        label: `Warmed at most, ${length(distance)} from the hole`,
        value:
          heat === null
            ? notKept
            : quantityText(
                pierceWarmth({ perLength: heat, duration: routineTime }, distance),
                'temperatureDifference',
                system,
                estimate,
              ).text,
      }));
      const heatRows = [
        {
          label: 'Most heat left, over the thickness',
          value: heat === null ? notKept : quantityText(heat, 'energyPerLength', system, estimate).text,
        },
        { label: 'given off evenly over the routine', value: time(routineTime) },
      ];
      if (explained.name === 'heatLeft')
        return {
          ...head,
          what: 'What stays in the thickest cold plate when the routine ends, and warms the steel the cut begins in.',
          formula:
            'What the bottom of the bore conducts away, also between pulses, and what its wall takes up, added up over the stages. It spreads as from a line through the plate that gives its heat off evenly; the warmth at a distance is the greatest there ever.',
          inputs: [...heatRows, ...warmedAt],
          parameters: ['conductivity', 'deepConduction', 'wallShare', 'pauseLoss'],
          source: 'Continuous line source in a thick plate (Carslaw and Jaeger, 2nd ed., chapter 10).',
        };
      return {
        ...head,
        what:
          needed?.kind === 'ok'
            ? `At least this far from the hole a contour may begin: ${needed.sentence}.`
            : (needed?.why ?? 'This was predicted before the heat left in the plate was kept.'),
        formula:
          'The longer of two: what leaves the crater no more than 70 % of it, and the distance at which the pierce warms the hottest plate to no more than 250 °C. Rounded up to a tenth of a millimetre.',
        inputs: [
          { label: 'Crater radius', value: resultValue('crater', prediction, system) },
          { label: 'Hottest plate', value: temperature(hot.plateTemperature) },
          ...heatRows,
          ...warmedAt,
        ],
        parameters: ['boreRadius', 'conductivity', 'deepConduction', 'wallShare'],
        source:
          'Continuous line source in a thick plate (Carslaw and Jaeger, 2nd ed., chapter 10). The share of the crater and the 250 °C are own choices, no source.',
      };
    }
    case 'peakPower':
      return {
        ...head,
        what: 'The most the source is asked for at any moment of the routine. Between pulses it gives nothing.',
        formula:
          'The greatest peak power at the beginning or end of any stage; within a stage it goes in a straight line.',
        inputs: content.stages.map((stage, index) => ({
          label: `Stage ${index + 1}, from and to`,
          value: `${power(stage.from.peakPower)}, ${power(stage.to.peakPower)}`,
        })),
        parameters: [],
        source: 'The stages as they are set.',
      };
    case 'pulses':
      return {
        ...head,
        what: 'How often the source is switched on over the whole routine. Continuous stages count none.',
        formula: 'Pulse frequency, in a straight line within a stage, added up over the time of all stages.',
        inputs: content.stages.map((stage, index) => ({
          label: `Stage ${index + 1}`,
          value: stage.from.pulseFrequency === null ? 'continuous' : numberText(stagePulses(stage), 0),
        })),
        parameters: [],
        source: 'Pulse arithmetic: pulses are frequency times time.',
      };
    case 'routine':
      return {
        ...head,
        what: 'How long the pierce takes at the machine, the reserve counted: all stages run to their end whether the hole is through or not.',
        formula: 'The durations of all stages added up.',
        inputs: content.stages.map((stage, index) => ({
          label: `Stage ${index + 1}`,
          value: quantityText(stage.duration, 'time', system).text,
        })),
        parameters: [],
        source: 'The stages as they are set.',
      };
    case 'energy':
      return {
        ...head,
        what: 'What the laser sends out over the whole routine, on the thickest cold plate.',
        formula:
          'Peak power times duty, added up over all stages; what the source loses while it rises is left out of each pulse.',
        inputs: [routine, stageCount, { label: 'Mean power as set', value: power(prediction.meanPower) }],
        parameters: [],
        source: 'Pulse arithmetic: mean power is peak power times pulse length times frequency.',
      };
    case 'oxygen':
      return {
        ...head,
        what: 'What flows through the nozzle over the whole routine.',
        formula:
          'Nozzle area times the flow of a gas into open air at the pressure set, stage by stage, times its duration. Above about 0.9 bar the nozzle chokes and the flow grows in proportion to the absolute pressure.',
        inputs: [routine, ...fitted, { label: 'Oxygen pressure', value: pressures(content, system) }],
        parameters: ['dischargeCoefficient'],
        source: 'Isentropic nozzle flow (Saint-Venant and Wantzel), critical flow as in ISO 9300.',
      };
    case 'meanPower':
      return {
        ...head,
        what: 'The power of the whole routine, evened out over its time.',
        formula:
          'Peak power times duty, averaged over every stage by its duration; both go in straight lines within a stage.',
        inputs: [
          routine,
          { label: 'Greatest peak power', value: power(prediction.peakPower) },
          ...content.stages.map((stage, index) => ({
            label: `Stage ${index + 1}, from and to`,
            value: `${power(stage.from.peakPower * stage.from.duty)}, ${power(stage.to.peakPower * stage.to.duty)}`,
          })),
        ],
        parameters: [],
        source: 'Pulse arithmetic: mean power is peak power times duty.',
      };
  }
}

const eruptionFormula =
  'Melt made by one pulse divided by the bore’s cross-section times its depth and one bore radius; the greatest before breakthrough, over the thinnest and thickest plate, cold and hot.';
const eruptionParameters: readonly PierceParameterName[] = ['eruptionLimit', 'meltSpeed', 'boreRadius', 'coupling'];
const eruptionSource = 'Own measure; the limit is to be fitted to test cuts, no source.';

const stageTitle: Readonly<Record<StageResultName, (number: number) => string>> = {
  depth: (number) => `Depth at the end of stage ${number}`,
  stageEruption: (number) => `Eruption in stage ${number}`,
  stall: (number) => `Standing still in stage ${number}`,
};

function stageValue(name: StageResultName, stage: number, { prediction, content, system }: ExplainedFrom): string {
  const { eruption, stall } = stageResults(prediction, stage);
  switch (name) {
    case 'depth':
      return quantityText(depthsAtEnds(prediction, content)[stage] ?? 0, 'length', system, estimate).text;
    case 'stageEruption':
      return eruption ?? '0 %';
    case 'stall':
      return stall ? `from ${quantityText(stall.time, 'time', system, estimate).text}` : 'it does not';
  }
}

const resultTitle: Readonly<Record<ResultName, string>> = {
  throughCold: 'Through on a cold plate',
  throughHot: 'Through on the hottest plate',
  reserveCold: 'Reserve on a cold plate',
  reserveHot: 'Reserve on the hottest plate',
  routine: 'Routine',
  crater: 'Crater radius',
  leadIn: 'Shortest lead-in',
  eruption: 'Eruption',
  meanPower: 'Mean power',
  peakPower: 'Peak power',
  energy: 'Laser energy',
  pulses: 'Pulses',
  heatLeft: 'Heat left in the plate',
  oxygen: 'Oxygen used',
};

function slowestPulses(stages: readonly Stage[], system: UnitSystem): string {
  const all = stages.flatMap(({ from, to }) => [from.pulseFrequency, to.pulseFrequency]);
  const pulsed = all.filter((one) => one !== null);
  return pulsed.length === 0 ? 'continuous' : quantityText(Math.min(...pulsed), 'frequency', system).text;
}

function pressures(content: StrategyContent, system: UnitSystem): string {
  const all = content.stages.flatMap(({ from, to }) => [from.oxygenPressure, to.oxygenPressure]);
  const least = quantityText(Math.min(...all), 'pressure', system);
  const most = quantityText(Math.max(...all), 'pressure', system);
  return least.text === most.text ? most.text : `${least.number} to ${most.text}`;
}

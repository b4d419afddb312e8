import type { ParameterFit } from '../calibrate/index.ts';
import { fitAtEnd, likeliestWay, movedInRange, mustBeFit } from '../calibrate/index.ts';
import { burnBack, ignitionRange, ignitionThreshold } from './burn-back.ts';
import { peakAfter } from './corner-peak.ts';
import type { PlateProperties } from './properties.ts';
import { midZoneProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';
import { returnOf } from './return-temperature.ts';

/** What a fit of test cuts may change about the heat of a cut. */
export type HeatParameters = {
  /** Heat into the plate as a multiple of what the strategy says. */
  readonly heatShare: number;
  /** Conductivity of the plate as a multiple of the standard's at 450 °C; the specific heat stays. */
  readonly conductivityShare: number;
  readonly ignitionThreshold: number; // K
};

export type HeatParameterName = keyof HeatParameters;

export type HeatParameterRow = {
  readonly name: HeatParameterName;
  readonly value: number;
  readonly min: number;
  readonly max: number;
  readonly unit: string;
  readonly meaning: string;
  readonly source: string;
};

/** Every parameter of the heat of a cut: default, range, unit, meaning and where it comes from. */
export const heatParameterTable: readonly HeatParameterRow[] = [
  {
    name: 'heatShare',
    value: 1,
    min: 0.3,
    max: 3,
    unit: '',
    meaning: 'heat into the plate as a multiple of what the strategy says',
    source: 'the strategy says what a moving kerf loses by conduction: own finite-volume solution, no outside source',
  },
  {
    name: 'conductivityShare',
    value: 1,
    min: 0.6,
    max: 1.6,
    unit: '',
    meaning: 'conductivity of the plate as a multiple of that at 450 °C',
    source: 'EN 1993-1-2:2005, 3.4.1.3: 1.37 at 20 °C, 0.70 above 800 °C',
  },
  {
    name: 'ignitionThreshold',
    value: ignitionThreshold,
    min: ignitionRange.min,
    max: ignitionRange.max,
    unit: 'K',
    meaning: 'temperature at which the finished tip takes fire in the oxygen',
    source: 'abstract of doi 10.1023/A:1017523922778: thin foil 1233 K, bulk 1644 K, where FeO melts',
  },
];

/** What test cuts on a machine say of the heat of its cuts. */
export type HeatFit = ParameterFit<HeatParameterName>;

/** The fitted value with the least and the most that the fit leaves open. */
export type HeatRange = { readonly value: number; readonly least: number; readonly most: number };

/** How sure a fit is of a corner's heat; or why that cannot be said. */
export type CornerHeatInterval =
  | {
      readonly kind: 'ok';
      readonly returnTemperature: HeatRange; // K
      readonly peak: HeatRange; // K
      readonly burnBack: HeatRange; // m
    }
  | { readonly kind: 'none'; readonly why: string };

/** Why there is no interval where nobody has fitted anything. */
export const notFitted = 'No test cuts have been fitted: how sure the figures are is not known.';

/** Step of u for the slope, small against any spread that matters and large against the error of a search. */
const STEP = 0.05;

/**
 * Return temperature, K, peak, K, and burn-back, m, of a corner with the interval that a fit leaves open; without a fit a reason why there is none. In the
 * coordinates u each figure is taken as straight about the fitted values (JCGM 100:2008, 5.1 and 5.2, for the linear form): with its slopes g by central differences the
 * likeliest way to a figure that is off by `coverage` deviations is u ± coverage·C·g/√(gᵀ·C·g), and the model itself is asked at those two ends.
 * RangeError for a fit that is none, and as from `returnOf`.
 */
export function cornerHeatInterval(question: ReturnQuestion, fit: HeatFit | null): CornerHeatInterval {
  if (fit === null) return { kind: 'none', why: notFitted };
  mustBeFit(fit);
  const fitted = heatParameters(fit);
  const atEnd = fit.names.find((name) => !(fitted[name] > rowOf(name).min && fitted[name] < rowOf(name).max));
  if (atEnd !== undefined) return { kind: 'none', why: fitAtEnd(atEnd) };
  const at = (moved: readonly number[]): HeatParameters =>
    fit.names.reduce(
      (parameters, name, i) => ({ ...parameters, [name]: movedInRange(fitted[name], rowOf(name), moved[i] ?? 0) }),
      fitted,
    );
  return {
    kind: 'ok',
    returnTemperature: rangeOf(fit, (moved) => returnOf(withParameters(question, at(moved)))),
    peak: rangeOf(fit, (moved) => peakAfter(withParameters(question, at(moved))).temperature),
    burnBack: rangeOf(fit, (moved) => {
      const parameters = at(moved);
      return burnBack(withParameters(question, parameters), parameters.ignitionThreshold);
    }),
  };
}

/** The parameters that a fit says, defaults for the others. Throws RangeError for one outside its range. */
export function heatParameters(fit: Pick<HeatFit, 'parameters'> | null): HeatParameters {
  const value = (name: HeatParameterName): number => {
    const { value: byDefault, min, max, unit } = rowOf(name);
    const given = fit?.parameters[name] ?? byDefault;
    if (!(given >= min && given <= max)) throw new RangeError(`${name} ${given} ${unit} is outside [${min}, ${max}]`);
    return given;
  };
  return {
    heatShare: value('heatShare'),
    conductivityShare: value('conductivityShare'),
    ignitionThreshold: value('ignitionThreshold'),
  };
}

/** The question with the heat and the plate that parameters make of it. */
export function withParameters(question: ReturnQuestion, parameters: HeatParameters): ReturnQuestion {
  const { cut, properties = midZoneProperties } = question;
  return {
    ...question,
    cut: { ...cut, heatIntoPlate: cut.heatIntoPlate * parameters.heatShare },
    properties: conducting(properties, parameters.conductivityShare),
  };
}

const conducting = (properties: PlateProperties, share: number): PlateProperties => ({
  ...properties,
  conductivity: properties.conductivity * share,
});

function rangeOf({ covariance, coverage, names }: HeatFit, figure: (moved: readonly number[]) => number): HeatRange {
  const still = names.map(() => 0);
  const value = figure(still);
  const slopes = still.map((_, k) => {
    const step = (by: number) => figure(still.map((zero, i) => (i === k ? by : zero)));
    return (step(STEP) - step(-STEP)) / (2 * STEP);
  });
  const way = likeliestWay(covariance, slopes);
  if (!way) return { value, least: value, most: value };
  const end = (deviations: number) => figure(way.map((step) => deviations * step));
  return { value, least: Math.min(value, end(-coverage)), most: Math.max(value, end(coverage)) };
}

function rowOf(name: HeatParameterName): HeatParameterRow {
  const row = heatParameterTable.find((candidate) => candidate.name === name);
  if (row === undefined) throw new RangeError(`${name} is no parameter`);
  return row;
}

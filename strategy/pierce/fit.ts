import type { ParameterFit } from '../calibrate/index.ts';
import { fitAtEnd, likeliestWay, movedInRange, mustBeFit } from '../calibrate/index.ts';
import { pierceParameterTable, type PierceParameterName, type PierceParameters } from './parameters.ts';
import { pierceOutline, type PierceInput } from './predict.ts';
import { routineTime } from './stage-math.ts';
import { toleranceFactor } from './tolerance-factor.ts';

/** What test cuts on a machine say of its pierces. */
export type PierceFit = ParameterFit<PierceParameterName> & {
  /** Pierces that were tried, and the standard deviation of ln(time) of theirs about the fitted model; null where there is none. */
  readonly trials: { readonly count: number; readonly scatter: number } | null;
};

/** From the least to the most; null for an end at which the hole is not through within the routine. */
export type PierceRange = { readonly least: number | null; readonly most: number | null };

/** How sure a fitted model is of a pierce; or why that cannot be said. */
export type PierceInterval =
  | {
      readonly kind: 'ok';
      /** Of the moment the hole is through, s. */
      readonly breakthrough: PierceRange;
      /** Of routine time ÷ that, without unit. */
      readonly reserve: PierceRange;
      /** By when 95 % of all such pierces are through, with 95 % confidence, s, and the reserve then; null without trials. */
      readonly slowest: { readonly breakthrough: number | null; readonly reserve: number | null } | null;
    }
  | { readonly kind: 'none'; readonly why: string };

/** Step of u for the slope, small against any spread that matters and large against the rounding of a prediction. */
const STEP = 1e-3;

/**
 * The interval of breakthrough and reserve that a fit leaves open. In the coordinates u the time is taken as straight about the fitted
 * values (JCGM 100:2008, 5.1 and 5.2, for the linear form): with its slopes g by central differences the likeliest way to a time that is
 * off by `coverage` deviations is u ± coverage·C·g/√(gᵀ·C·g). The model itself is asked at those two ends, since near a stall the time
 * grows without bound where a straight line does not. The parameters of `input` are replaced by the fit's. RangeError for a fit that is
 * none, and as from `piercePredict`.
 */
export function pierceInterval(input: PierceInput, fit: PierceFit): PierceInterval {
  const coordinates = coordinatesOf(fit);
  if (coordinates.kind === 'none') return coordinates;
  const { at } = coordinates;
  const routine = routineTime(input.stages);
  const timeAt = (moved: readonly number[]): number | null => {
    const parameters = { ...input.parameters, ...fit.parameters, ...at(moved) };
    return pierceOutline({ ...input, parameters }).breakthroughTime;
  };
  const time = timeAt(fit.names.map(() => 0));
  if (time === null) return { kind: 'none', why: 'The hole is not through with the fitted values: no interval.' };

  const slopes: number[] = [];
  for (const name of fit.names) {
    const step = (by: number) => timeAt(fit.names.map((other) => (other === name ? by : 0)));
    const [less, more] = [step(-STEP), step(STEP)];
    if (less === null && more === null) {
      return { kind: 'none', why: `The least change of ${name} decides whether the hole is through at all.` };
    }
    // Does the hole close at one side? Then the slope of the other side stands for both.
    slopes.push(((more ?? time) - (less ?? time)) / (less === null || more === null ? STEP : 2 * STEP));
  }
  const way = likeliestWay(fit.covariance, slopes);
  const end = (deviations: number): number | null => (way ? timeAt(way.map((step) => deviations * step)) : time);

  const reserve = (breakthrough: number | null) => (breakthrough === null ? null : routine / breakthrough);
  const [soonest, latest] = [end(-fit.coverage), end(fit.coverage)];
  return {
    kind: 'ok',
    breakthrough: { least: soonest, most: latest },
    reserve: { least: reserve(latest), most: reserve(soonest) },
    slowest: fit.trials === null ? null : slowestOf(time, routine, fit.trials),
  };
}

function slowestOf(time: number, routine: number, { count, scatter }: NonNullable<PierceFit['trials']>) {
  const slowest = time * Math.exp(toleranceFactor(count) * scatter);
  return slowest <= routine
    ? { breakthrough: slowest, reserve: routine / slowest }
    : { breakthrough: null, reserve: null };
}

/** The fitted values moved in u; or why there is no u. */
function coordinatesOf(
  fit: PierceFit,
):
  | { readonly kind: 'ok'; readonly at: (moved: readonly number[]) => Partial<PierceParameters> }
  | { readonly kind: 'none'; readonly why: string } {
  mustBeFit(fit);
  mustBeTrials(fit.trials);
  const all = fit.names.map((name) => ({ ...rowOf(name), value: fit.parameters[name] ?? Number.NaN }));
  const atEnd = all.find(({ value, min, max }) => !(value > min && value < max));
  if (atEnd !== undefined) {
    return { kind: 'none', why: fitAtEnd(atEnd.name) };
  }
  const at = (moved: readonly number[]) =>
    Object.fromEntries(all.map((row, i) => [row.name, movedInRange(row.value, row, moved[i] ?? 0)]));
  return { kind: 'ok', at };
}

function rowOf(name: PierceParameterName) {
  const row = pierceParameterTable.find((candidate) => candidate.name === name);
  if (row === undefined) throw new RangeError(`${name} is no parameter`);
  return row;
}

function mustBeTrials(trials: PierceFit['trials']): void {
  if (trials !== null && !(trials.scatter >= 0 && trials.scatter <= 10)) {
    throw new RangeError(`scatter ${trials.scatter} is outside [0, 10]`);
  }
}

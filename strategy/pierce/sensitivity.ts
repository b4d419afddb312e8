import type { Nozzle } from '../machine.ts';
import { COLD_PLATE_TEMPERATURE, PLATE_TEMPERATURE_RANGE } from '../steel/index.ts';
import { celsius } from '../units/said.ts';
import { WIDEST_NOZZLE } from './bore.ts';
import { pierceParameters, pierceParameterTable, type PierceParameters } from './parameters.ts';
import { pierceOutline, THICKEST_PLATE } from './predict.ts';
import type { Reserve, StrategyInput } from './strategy-prediction.ts';

export type SensitivityCase = 'as-set' | 'coupling-down' | 'coupling-up' | 'worn-nozzle' | 'thicker' | 'hot-plate';

/** What one thing that may differ in the hall does to the reserve on the thickest plate. */
export type SensitivityRow = {
  readonly id: SensitivityCase;
  /** What differs, as an engineer would say it. */
  readonly what: string;
  readonly reserve: Reserve;
  /** Against the reserve as set, without unit; null when one of the two is none. */
  readonly change: number | null;
};

/** Share by which the coupling may be off from plate to plate: scale, rust, paint. Own choice. */
const COUPLING_OFF = 0.1;
/** A worn nozzle: wider by a tenth, with a jet that spreads half again as fast. Own estimate, no source. */
const WORN_DIAMETER = 1.1;
const WORN_SPREAD = 1.5;
/** Thicker than said, m. */
const THICKER = 2e-3;

/**
 * The reserve on the thickest cold plate as set, and with one thing changed at a time: coupling a tenth down and up, a worn nozzle, 2 mm more
 * plate, and the hottest plate. The routine stays as it is. Where a change would leave the parameter's range or the thickest
 * plate it stops there. RangeError as from `strategyPrediction`.
 */
export function pierceSensitivity(input: StrategyInput): readonly SensitivityRow[] {
  const coldPlate = input.coldPlateTemperature ?? COLD_PLATE_TEMPERATURE;
  const parameters = pierceParameters(input.parameters);
  const thickness = input.thickness.max;
  const off = (name: 'coupling' | 'jetSpread', factor: number): PierceParameters => {
    const row = pierceParameterTable.find((candidate) => candidate.name === name);
    const value = Math.min(row?.max ?? 1, Math.max(row?.min ?? 0, parameters[name] * factor));
    return { ...parameters, [name]: value };
  };
  const worn: Nozzle = { ...input.nozzle, diameter: Math.min(WIDEST_NOZZLE, input.nozzle.diameter * WORN_DIAMETER) };
  const hottest = Math.min(input.hottestPlateTemperature, PLATE_TEMPERATURE_RANGE.max);

  const reserveOf = (changed: Partial<Parameters<typeof pierceOutline>[0]>): Reserve => {
    const { breakthroughTime, routineTime } = pierceOutline({
      stages: input.stages,
      thickness,
      plateTemperature: coldPlate,
      profile: input.profile,
      nozzle: input.nozzle,
      parameters,
      ...changed,
    });
    if (breakthroughTime === null) return { kind: 'none', why: 'Not through.' };
    return { kind: 'ok', value: routineTime / breakthroughTime };
  };
  const asSet = reserveOf({});
  const row = (id: SensitivityCase, what: string, changed: Parameters<typeof reserveOf>[0]): SensitivityRow => {
    const reserve = reserveOf(changed);
    const change = reserve.kind === 'ok' && asSet.kind === 'ok' ? reserve.value - asSet.value : null;
    return { id, what, reserve, change };
  };
  return [
    row('as-set', 'As set, on the thickest cold plate', {}),
    row('coupling-down', 'Scale or rust takes a tenth of the light', { parameters: off('coupling', 1 - COUPLING_OFF) }),
    row('coupling-up', 'A clean plate takes up a tenth more light', { parameters: off('coupling', 1 + COUPLING_OFF) }),
    row('worn-nozzle', 'The nozzle is worn: a tenth wider, its jet spreads half again as fast', {
      nozzle: worn,
      parameters: off('jetSpread', WORN_SPREAD),
    }),
    row('thicker', 'The plate is 2 mm thicker', { thickness: Math.min(THICKEST_PLATE, thickness + THICKER) }),
    row('hot-plate', `The plate is at ${celsius(hottest)}`, { plateTemperature: hottest }),
  ];
}

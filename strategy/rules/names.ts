import type { PierceResults } from '../pierce/index.ts';
import type { Dimension } from '../units/index.ts';

/** A result that a house rule can speak of. */
export type HouseRuleName = keyof PierceResults;

export type HouseRuleRow = {
  readonly name: HouseRuleName;
  /** What it is a quantity of; `count` for a plain number. */
  readonly dimension: Dimension | 'count';
  /** How a limit on it is usually written, as in `<= 1.5 mm`. */
  readonly example: string;
  readonly meaning: string;
};

/** Every named result, with its unit and meaning. */
export const houseRuleTable: readonly HouseRuleRow[] = [
  row('reserveCold', 'count', '>= 2', 'routine time over breakthrough time on the thickest cold plate'),
  row('reserveHot', 'count', '>= 2', 'the same on the hottest plate'),
  row('breakthroughCold', 'time', '<= 8 s', 'time until the thickest cold plate is through'),
  row('breakthroughHot', 'time', '>= 1 s', 'time until the thickest plate is through when it is hottest'),
  row('routineTime', 'time', '<= 15 s', 'time of all stages'),
  row('craterRadius', 'length', '<= 1.5 mm', 'radius of the crater at the top, at worst'),
  row('leadInLength', 'length', '<= 12 mm', 'shortest lead-in that clears the crater and what the pierce warms'),
  row('eruptionIndex', 'count', '<= 0.05', 'share of the bore that the melt of one pulse fills, at worst'),
  row('eruptionLimit', 'count', '> 0.05', 'share at which the melt is thrown out'),
  row('meanPower', 'power', '<= 2.5 kW', 'mean power over the routine'),
  row('peakPower', 'power', '<= 6 kW', 'greatest peak power of all stages'),
  row('energy', 'energy', '<= 30 kJ', 'energy leaving the source over the routine'),
  row('heatLeft', 'energy', '<= 6 kJ', 'heat left in the thickest cold plate'),
  row('heatPerThickness', 'energyPerLength', '<= 400 kJ/m', 'most heat left for each length of thickness'),
  row('oxygenUsed', 'mass', '<= 12 g', 'oxygen through the nozzle over the routine'),
  row('pulses', 'count', '<= 5000', 'pulses of the routine'),
  row('stageCount', 'count', '<= 6', 'number of stages'),
  row('stalls', 'count', '<= 0', 'times the bottom stands still on the thickest cold plate'),
  row('thicknessMin', 'length', '>= 8 mm', 'thinnest plate the strategy is for'),
  row('thicknessMax', 'length', '<= 32 mm', 'thickest plate the strategy is for'),
  row('coldPlate', 'temperature', '>= 15 degC', 'temperature for which the cold reserve is judged'),
  row('hottestPlate', 'temperature', '<= 200 degC', 'hottest plate the strategy is good for'),
];

/** A value for every name, SI; null where there is none. `pierceResults` has them from a prediction. */
export type HouseRuleResults = PierceResults;

function row(
  name: HouseRuleName,
  dimension: HouseRuleRow['dimension'],
  example: string,
  meaning: string,
): HouseRuleRow {
  return { name, dimension, example: `${name} ${example}`, meaning };
}

import { numberText, quantityText, type UnitSystem } from '../units/index.ts';
import { houseRuleTable, type HouseRuleName, type HouseRuleResults } from './names.ts';

/** A named result as people read it. Plain numbers are cut off, not rounded: 1.9996 does not reach 2. */
export function houseRuleValueText(name: HouseRuleName, value: number, system: UnitSystem): string {
  const dimension = houseRuleTable.find((row) => row.name === name)?.dimension ?? 'count';
  if (dimension !== 'count') return quantityText(value, dimension, system).text;
  return numberText(Math.trunc(value * 1000 + Math.sign(value) * 1e-6) / 1000, 3);
}

/** What results come to, by name, as in "craterRadius is 1.7 mm, there is no reserveHot". */
export function houseRuleValuesText(names: readonly HouseRuleName[], results: HouseRuleResults): string {
  return names
    .map((name) => {
      const value = results[name];
      return value === null ? `there is no ${name}` : `${name} is ${houseRuleValueText(name, value, 'metric')}`;
    })
    .join(', ');
}

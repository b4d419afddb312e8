export { houseRuleTable, type HouseRuleName, type HouseRuleResults, type HouseRuleRow } from './names.ts';
export { houseRuleProposed, type HouseRuleText } from './proposal-rule.ts';
export { houseRuleHolds, houseRuleRead, type HouseRuleHolds, type HouseRuleRead } from './rule.ts';
export { LONGEST_RULE } from './understand.ts';
export { houseRuleValuesText } from './value-text.ts';

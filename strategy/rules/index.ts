export { houseRuleTable, type HouseRuleName, type HouseRuleResults, type HouseRuleRow } from './names.ts';
export { houseRuleHolds, houseRuleMiss, houseRuleRead, type HouseRuleHolds, type HouseRuleRead } from './rule.ts';
export { LONGEST_RULE } from './understand.ts';

import type { ProposalRule } from '../pierce/index.ts';
import { houseRuleMiss, houseRuleRead } from './rule.ts';
import { houseRuleValuesText } from './value-text.ts';

/** A house rule as a lead wrote it. */
export type HouseRuleText = { readonly expression: string; readonly sentence: string };

/** The rule as the designer keeps it. One that cannot be read is missed by any pierce, as it blocks any. */
export function houseRuleProposed({ expression, sentence }: HouseRuleText): ProposalRule {
  const read = houseRuleRead(expression);
  return {
    sentence,
    miss: houseRuleMiss(expression),
    said: (results) => (read.kind === 'ok' ? houseRuleValuesText(read.uses, results) : read.why),
  };
}

import type { Transaction } from '../../db/database.ts';
import type { HouseRuleVerdict } from '../../shared/house-rules.ts';
import { namedResultsOf } from '../../shared/prediction.ts';
import type { StrategyContent } from '../../shared/strategies.ts';
import {
  houseRuleHolds,
  houseRuleRead,
  houseRuleValuesText,
  type HouseRuleResults,
} from '../../strategy/rules/index.ts';
import { groundOf } from '../revisions/judge.ts';
import type { RevisionRow } from '../revisions/repository.ts';
import { rulesInForce, type HouseRuleRow } from './repository.ts';

/** What is known of a pierce; or why nothing is. */
export type NamedResults =
  { readonly kind: 'ok'; readonly results: HouseRuleResults } | { readonly kind: 'none'; readonly why: string };

/** What the rules say of a revision: of a draft those in force now, of what was handed in those it was handed in under. */
export async function houseRulesOf(
  tx: Transaction,
  revision: Pick<RevisionRow, 'state' | 'content' | 'houseRules'>,
): Promise<readonly HouseRuleVerdict[]> {
  // Handed in before there were house rules?
  if (revision.state !== 'draft') return revision.houseRules ?? [];
  return verdictsOn(tx, revision.content);
}

/** What the rules in force say of a content. 400 when it names a machine or nozzle that isn't here. */
export async function verdictsOn(tx: Transaction, content: StrategyContent): Promise<HouseRuleVerdict[]> {
  const named = await namedResults(tx, content);
  return (await rulesInForce(tx)).map((rule) => verdictOf(rule, named));
}

/** The named results of a content, as the model has them today. */
export async function namedResults(tx: Transaction, content: StrategyContent): Promise<NamedResults> {
  const judged = await groundOf(tx, content);
  try {
    return { kind: 'ok', results: namedResultsOf(judged) };
  } catch (error) {
    // A draft that an older model could follow, and this one can't.
    if (!(error instanceof RangeError)) throw error;
    return { kind: 'none', why: `The model can’t follow this pierce: ${error.message}.` };
  }
}

export function verdictOf(
  { id, expression, sentence, blocks }: Pick<HouseRuleRow, 'id' | 'expression' | 'sentence' | 'blocks'>,
  named: NamedResults,
): HouseRuleVerdict {
  return { ruleId: id, expression, sentence, blocks, ...judgement(expression, named) };
}

/** Whether a rule holds and by which values; `unclear` with the reason where nothing can be said. Never throws. */
export function judgement(expression: string, named: NamedResults): Pick<HouseRuleVerdict, 'state' | 'why'> {
  if (named.kind === 'none') return { state: 'unclear', why: named.why };
  const found = houseRuleHolds(expression, named.results);
  if (found.kind === 'none') return { state: 'unclear', why: found.why };
  const read = houseRuleRead(expression);
  const values = houseRuleValuesText(read.kind === 'ok' ? read.uses : [], named.results);
  return { state: found.holds ? 'holds' : 'broken', why: `Here ${values}.` };
}

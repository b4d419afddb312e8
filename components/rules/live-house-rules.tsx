import { useQuery } from '@tanstack/react-query';
import { houseRuleVerdictsQuery } from '@/components/data/house-rules.ts';
import type { Revision, StrategyContent } from '@/shared/strategies.ts';
import { HouseRuleList } from './house-rule-list.tsx';
import { useSettled } from './use-settled.ts';

/**
 * What the rules say of the numbers on the screen. Of what is saved the revision says it itself; of what is not, the server is asked as
 * soon as one pauses, and what it said last stays until it answers.
 */
export function LiveHouseRules({
  revision,
  content,
  dirty,
  sound,
}: {
  readonly revision: Pick<Revision, 'houseRules'>;
  readonly content: StrategyContent;
  /** The content is not what is saved. */
  readonly dirty: boolean;
  /** Every number can be read and is in its range. */
  readonly sound: boolean;
}) {
  const settled = useSettled(content, 400);
  const asked = useQuery({ ...houseRuleVerdictsQuery(settled), enabled: dirty && sound });
  if (!dirty) return <HouseRuleList verdicts={revision.houseRules} />;
  return <HouseRuleList verdicts={asked.data ?? revision.houseRules} behind={!sound || asked.isError} />;
}

import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { houseRulesText, verdictText } from '@/components/text/house-rules.ts';
import type { Role } from '@/components/theme/tokens.ts';
import { Button } from '@/components/ui/button.tsx';
import { Mark, type MarkName } from '@/components/ui/mark.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { verdictBlocks, type HouseRuleVerdict } from '@/shared/house-rules.ts';

/**
 * What the plant's rules say of a revision: what is in the way first, then what is not kept or can't be told, always in sight; the
 * rest when asked for. `behind` when it is not of the numbers on the screen.
 */
export function HouseRuleList({
  verdicts,
  behind = false,
}: {
  readonly verdicts: readonly HouseRuleVerdict[];
  readonly behind?: boolean;
}) {
  const [open, setOpen] = useState(false);
  if (verdicts.length === 0) return <Small>{houseRulesText.none}</Small>;
  const kept = verdicts.filter(({ state }) => state === 'holds');
  const amiss = verdicts.filter(({ state }) => state !== 'holds');
  const inTheWay = amiss.filter(verdictBlocks);
  const others = amiss.filter((verdict) => !verdictBlocks(verdict));
  return (
    <Stack gap="s">
      {behind ? <Small strong>{houseRulesText.behind}</Small> : null}
      {amiss.length === 0 ? (
        <Line mark="ok" tone="good" spoken={verdictText.holds}>
          <Body>{houseRulesText.allKept(kept.length)}</Body>
        </Line>
      ) : null}
      {[...inTheWay, ...others, ...(open ? kept : [])].map((verdict) => (
        <Verdict key={verdict.ruleId} verdict={verdict} />
      ))}
      {kept.length > 0 ? (
        <Row>
          <Button
            kind="quiet"
            expanded={open}
            label={open ? houseRulesText.hide : houseRulesText.kept(kept.length)}
            onPress={() => setOpen(!open)}
          />
        </Row>
      ) : null}
    </Stack>
  );
}

function Verdict({ verdict }: { readonly verdict: HouseRuleVerdict }) {
  const { state, sentence, expression, why } = verdict;
  const blocks = verdictBlocks(verdict);
  const mark: MarkName = state === 'holds' ? 'ok' : blocks ? 'wrong' : state === 'broken' ? 'caution' : 'plain';
  const tone = state === 'holds' ? 'good' : blocks ? 'wrong' : state === 'broken' ? 'hot' : 'softInk';
  return (
    <Line mark={mark} tone={tone} spoken={verdictText[state]}>
      <Body>{sentence}</Body>
      <Small>{`${verdictText[state]}: ${expression}. ${why}`}</Small>
      {blocks ? (
        <Small strong tone="wrong">
          {houseRulesText.inTheWay}
        </Small>
      ) : null}
    </Line>
  );
}

function Line({
  mark,
  tone,
  spoken,
  children,
}: {
  readonly mark: MarkName;
  readonly tone: Role;
  readonly spoken: string;
  readonly children: ReactNode;
}) {
  return (
    <Row gap="m" align="flex-start" wrap={false}>
      <View role="img" aria-label={spoken} style={{ paddingTop: 1 }}>
        <Mark name={mark} tone={tone} />
      </View>
      <Stack gap="hair" grow>
        {children}
      </Stack>
    </Row>
  );
}

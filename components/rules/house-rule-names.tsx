import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { houseRuleExampleQuery } from '@/components/data/house-rules.ts';
import { houseRulesText } from '@/components/text/house-rules.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { houseRuleValueText } from '@/shared/house-rules.ts';
import { houseRuleTable, type HouseRuleName } from '@/strategy/rules/names.ts'; // the folder's face would bring the reader of expressions along

/** Every name a rule may use, how a limit on it is written, and what it comes to on a revision of this plant. */
export function HouseRuleNames({ onPick }: { readonly onPick: (name: HouseRuleName) => void }) {
  const example = useQuery(houseRuleExampleQuery());
  const system = useUnitSystem();
  const { wide } = useLayout();
  const [opened, setOpened] = useState(false);
  const valueOf = (name: HouseRuleName): string | null => {
    const found = example.data?.results.find((one) => one.name === name);
    if (found === undefined) return null;
    return found.value === null ? houseRulesText.noValue : houseRuleValueText(name, found.value, system);
  };
  if (!wide && !opened) {
    return (
      <Row>
        <Button label={houseRulesText.names} expanded={false} onPress={() => setOpened(true)} />
      </Row>
    );
  }
  return (
    <Stack gap="s">
      <Heading level={3}>{houseRulesText.names}</Heading>
      {example.isPending ? (
        <Progress label={houseRulesText.namesFetching} />
      ) : example.isError ? (
        <ErrorNotice error={example.error} onRetry={() => void example.refetch()} />
      ) : (
        <Small>
          {example.data === null || example.data === undefined
            ? houseRulesText.namesWithout
            : houseRulesText.namesAt(example.data.strategyName, example.data.number)}
        </Small>
      )}
      <ul aria-label={houseRulesText.names} style={styles.names}>
        {houseRuleTable.map(({ name, meaning, example: way }) => (
          <li key={name} style={styles.name}>
            <Row justify="space-between" wrap={false}>
              <Button kind="quiet" label={name} spoken={houseRulesText.put(name)} onPress={() => onPick(name)} />
              {valueOf(name) === null ? null : <Body strong>{valueOf(name)}</Body>}
            </Row>
            <Small>{houseRulesText.as(meaning, way)}</Small>
          </li>
        ))}
      </ul>
    </Stack>
  );
}

const styles = {
  names: {
    listStyle: 'none',
    margin: 0,
    padding: 0,
    display: 'grid',
    columnGap: 32,
    gridTemplateColumns: 'repeat(auto-fill, minmax(min(300px, 100%), 1fr))',
  },
  name: { minWidth: 0, padding: '4px 0 8px', borderTop: `1px solid ${roles.rule}` },
} as const;

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { houseRuleExampleQuery } from '@/components/data/house-rules.ts';
import { houseRulesText } from '@/components/text/house-rules.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
// not from the folder's face, which would bring the reader of expressions along
import { houseRuleTable, type HouseRuleName } from '@/strategy/rules/names.ts';
import { houseRuleValueText } from '@/strategy/rules/value-text.ts';

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
      <View role="list" aria-label={houseRulesText.names} style={styles.names}>
        {houseRuleTable.map(({ name, meaning, example: way }) => (
          <View key={name} role="listitem" style={styles.name}>
            <Row justify="space-between" wrap={false}>
              <Button kind="quiet" label={name} spoken={houseRulesText.put(name)} onPress={() => onPick(name)} />
              {valueOf(name) === null ? null : <Body strong>{valueOf(name)}</Body>}
            </Row>
            <Small>{houseRulesText.as(meaning, way)}</Small>
          </View>
        ))}
      </View>
    </Stack>
  );
}

const styles = StyleSheet.create({
  names: webStyle({
    display: 'grid',
    columnGap: 32,
    gridTemplateColumns: 'repeat(auto-fill, minmax(min(300px, 100%), 1fr))',
  }),
  name: { minWidth: 0, paddingTop: 4, paddingBottom: 8, borderTopWidth: 1, borderTopColor: roles.rule },
});

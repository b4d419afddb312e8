import { memo } from 'react';
import { StyleSheet, View } from 'react-native';
import { common, unbroken } from '@/components/text/common.ts';
import { explainText, explanationOf, type Explained, type ExplainedFrom } from '@/components/text/pierce-explain.ts';
import { parameterRow, resultLabel, resultValue, type ResultName } from '@/components/text/pierce-results.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { line } from '@/components/theme/space.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Dialog } from '@/components/ui/dialog.tsx';
import { FigureButton } from '@/components/ui/figure-button.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';

/** Results side by side, as cells of the title block; each is one press. */
export function ResultGrid({
  names,
  from,
  onExplain,
}: {
  names: readonly ResultName[];
  from: ExplainedFrom;
  onExplain: (explained: Explained) => void;
}) {
  const { width } = useLayout();
  return (
    <View
      role="group"
      aria-label={explainText.results}
      style={[styles.grid, webStyle({ gridTemplateColumns: `repeat(${columnsOf(width)}, 1fr)` })]}
    >
      {names.map((name) => (
        <ResultCell key={name} value={resultValue(name, from.prediction, from.system)} {...{ name, onExplain }} />
      ))}
    </View>
  );
}

/** As many as a figure with its unit has room in, and as fill whole rows. */
const columnsOf = (width: number): number => (width < 372 ? 2 : width < 640 ? 3 : 6);

type ResultCellProps = { name: ResultName; value: string; onExplain: (explained: Explained) => void };

const ResultCell = memo(function ResultCell({ name, value, onExplain }: ResultCellProps) {
  return (
    <FigureButton
      label={resultLabel[name]}
      value={value}
      spoken={explainText.spoken(resultLabel[name], value)}
      onPress={() => onExplain({ name })}
    />
  );
});

type ExplainDialogProps = { explained: Explained | null; from: ExplainedFrom; onClose: () => void };

/** What a result is, its formula in words, the numbers it was worked out from, what had to be assumed, and the sources. */
export function ExplainDialog({ explained, from, onClose }: ExplainDialogProps) {
  const told = explained && explanationOf(explained, from);
  return (
    <Dialog title={told?.title ?? ''} open={told !== null} onClose={onClose} closeLabel={common.close}>
      {told && (
        <Stack gap="l">
          <Figure large value={told.value} />
          <Body>{told.what}</Body>
          <Stack gap="xs">
            <Heading level={3}>{explainText.formula}</Heading>
            <Body>{told.formula}</Body>
          </Stack>
          <Stack gap="xs">
            <Heading level={3}>{explainText.inputs}</Heading>
            <Facts items={told.inputs.map(({ label, value }) => ({ label, value: unbroken(value) }))} />
          </Stack>
          {told.parameters.length > 0 && (
            <Stack gap="xs">
              <Heading level={3}>{explainText.parameters}</Heading>
              <Facts
                items={told.parameters.flatMap((name) => {
                  const row = parameterRow(name, from.system);
                  if (!row) return [];
                  const label = `${row.meaning}. ${explainText.origin(row.origin)}`;
                  return [{ label: `${label.charAt(0).toUpperCase()}${label.slice(1)}`, value: unbroken(row.value) }];
                })}
              />
            </Stack>
          )}
          <Stack gap="xs">
            <Heading level={3}>{explainText.source}</Heading>
            <Body>{told.source}</Body>
            <Small>{explainText.model(from.prediction.modelVersion)}</Small>
          </Stack>
        </Stack>
      )}
    </Dialog>
  );
}

const styles = StyleSheet.create({
  grid: {
    gap: 1,
    overflow: 'hidden',
    borderWidth: 1,
    borderColor: roles.ink,
    borderRadius: line.corner,
    backgroundColor: roles.rule,
    ...webStyle({ display: 'grid' }),
  },
});

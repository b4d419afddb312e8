import type { Dispatch } from 'react';
import { View } from 'react-native';
import { compareText, compareWords, historyText, proposeText } from '@/components/text/pierce-designer.ts';
import { Button } from '@/components/ui/button.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import type { Prediction, Revision } from '@/shared/strategies.ts';
import type { DraftHistory, HistoryAction } from './draft-history.ts';

type StepBarProps = {
  /** Null where nothing can be changed. */
  steps: DraftHistory | null;
  dispatch: Dispatch<HistoryAction>;
  proposing: boolean;
  onPropose: () => void;
  /** The revision before this one, to compare with. */
  former: Revision | null;
  comparing: boolean;
  onCompare: (comparing: boolean) => void;
  now: Prediction;
};

/** Steps back and forth, the designer's proposal, and the comparison with the revision before. */
export function StepBar({ steps, dispatch, proposing, onPropose, former, comparing, onCompare, now }: StepBarProps) {
  if (!steps && !former) return null;
  return (
    <Stack gap="xs">
      <View role="group" aria-label={historyText.bar}>
        <Row gap="s">
          {steps && (
            <>
              <Button
                label={historyText.undo}
                disabled={steps.past.length === 0}
                onPress={() => dispatch({ do: 'undo' })}
              />
              <Button
                label={historyText.redo}
                disabled={steps.future.length === 0}
                onPress={() => dispatch({ do: 'redo' })}
              />
              <Button label={proposeText.open} expanded={proposing} onPress={onPropose} />
            </>
          )}
          {former && <Tick label={compareText.toggle(former.number)} checked={comparing} onChange={onCompare} />}
        </Row>
      </View>
      {comparing && former && (
        <View role="status">
          <Small>{compareWords(compareText.label(former.number), former.prediction, now)}</Small>
        </View>
      )}
    </Stack>
  );
}

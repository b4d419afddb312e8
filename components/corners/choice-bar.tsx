import { View } from 'react-native';
import { cornerToolText } from '@/components/text/corner-preview.ts';
import { Button } from '@/components/ui/button.tsx';
import { Row } from '@/components/ui/stack.tsx';

type ChoiceBarProps = {
  canUndo: boolean;
  canRedo: boolean;
  busy: boolean;
  undo: () => void;
  redo: () => void;
};

/** What was chosen for corners, taken back and made again. */
export function ChoiceBar({ canUndo, canRedo, busy, undo, redo }: ChoiceBarProps) {
  return (
    <View role="group" aria-label={cornerToolText.steps}>
      <Row gap="s">
        <Button label={cornerToolText.undo} disabled={!canUndo || busy} onPress={undo} />
        <Button label={cornerToolText.redo} disabled={!canRedo || busy} onPress={redo} />
      </Row>
    </View>
  );
}

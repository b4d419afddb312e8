import { View } from 'react-native';
import { problemSentence } from '@/components/data/problem.ts';
import { common } from '@/components/text/common.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';
import { Body } from './text.tsx';

/** What went wrong in a sentence, and the way to try again. */
export function ErrorNotice({ error, onRetry }: { readonly error: unknown; readonly onRetry?: () => void }) {
  const sentence = problemSentence(error);
  return (
    <Notice kind="wrong" title={sentence.title} live>
      {sentence.detail === '' ? null : <Body>{sentence.detail}</Body>}
      {onRetry === undefined ? null : (
        <View style={{ marginTop: 8, alignItems: 'flex-start' }}>
          <Button label={common.retry} onPress={onRetry} />
        </View>
      )}
    </Notice>
  );
}

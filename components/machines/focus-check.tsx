import { View } from 'react-native';
import { profileText } from '@/components/text/machines.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Body } from '@/components/ui/text.tsx';

/** How the focus dial is checked at the machine, step by step. */
export function FocusCheck() {
  return (
    <Panel title={profileText.focusCheck.title}>
      <View role="list" style={{ gap: 10 }}>
        {profileText.focusCheck.words.map((words, index) => (
          <View key={words} role="listitem" style={{ flexDirection: 'row' }}>
            <View style={{ width: 22, paddingRight: 4 }}>
              <Body align="right">{`${index + 1}.`}</Body>
            </View>
            <View style={{ flex: 1, minWidth: 0 }}>
              <Body>{words}</Body>
            </View>
          </View>
        ))}
      </View>
    </Panel>
  );
}

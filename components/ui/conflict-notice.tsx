import { View } from 'react-native';
import { common } from '@/components/text/common.ts';
import { Button } from './button.tsx';
import { Notice } from './notice.tsx';
import { Body } from './text.tsx';

/** Somebody else saved first: what was typed stays, and the newest can be fetched beside it. */
export function ConflictNotice({ onLoad, busy = false }: { readonly onLoad: () => void; readonly busy?: boolean }) {
  return (
    <Notice kind="caution" title={common.conflict.title} live>
      <Body>{common.conflict.detail}</Body>
      <View style={{ marginTop: 8, alignItems: 'flex-start' }}>
        <Button label={common.loadNewest} onPress={onLoad} busy={busy} />
      </View>
    </Notice>
  );
}

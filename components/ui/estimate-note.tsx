import { View } from 'react-native';
import { safety } from '@/components/text/safety.ts';
import { Divider } from './divider.tsx';
import { Small } from './text.tsx';

/** The caution below every page with numbers on it. */
export function EstimateNote() {
  return (
    <View role="note" style={{ gap: 8, maxWidth: 720 }}>
      <Divider />
      <Small>
        {safety.estimate} {safety.hazards} {safety.first}
      </Small>
    </View>
  );
}

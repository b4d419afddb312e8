import type { ReactNode } from 'react';
import { Text, type StyleProp, type TextStyle } from 'react-native';

/** Text that takes type and colour from the press area or link it stands in (see the stylesheet). */
export function Words({ children, style }: { readonly children: ReactNode; readonly style?: StyleProp<TextStyle> }) {
  return (
    <Text dataSet={{ look: 'words' }} style={style}>
      {children}
    </Text>
  );
}

import type { ReactNode } from 'react';
import { View } from 'react-native';

/** Left out on paper; on the screen as if it were not there. */
export function NotPrinted({ children }: { readonly children: ReactNode }) {
  return (
    <View dataSet={{ print: 'hide' }} style={{ display: 'contents' }}>
      {children}
    </View>
  );
}

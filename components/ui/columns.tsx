import { Children, type ReactNode } from 'react';
import { View } from 'react-native';
import { webStyle } from '@/components/theme/web-style.ts';

/** Things beside each other as far as they fit at a least width, px; below each other on a phone. */
export function Columns({
  children,
  least = 260,
  gap = 16,
}: {
  readonly children: ReactNode;
  readonly least?: number;
  readonly gap?: number;
}) {
  return (
    <View
      style={webStyle({
        display: 'grid',
        gap,
        alignItems: 'start',
        gridTemplateColumns: `repeat(auto-fill, minmax(min(${least}px, 100%), 1fr))`,
      })}
    >
      {Children.map(children, (child) =>
        child === null || child === undefined ? null : <View style={{ minWidth: 0 }}>{child}</View>,
      )}
    </View>
  );
}

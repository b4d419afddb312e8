import type { ReactNode } from 'react';
import { Pressable, StyleSheet, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';

/** A row of a list that chooses something on the same page; at least 56 px high. */
export function PressRow({
  children,
  left,
  right,
  chosen,
  spoken,
  onPress,
}: {
  readonly children: ReactNode;
  readonly left?: ReactNode;
  readonly right?: ReactNode;
  readonly chosen: boolean;
  /** Name of the row when its content reads badly aloud. */
  readonly spoken?: string;
  readonly onPress: () => void;
}) {
  return (
    <Pressable
      role="button"
      dataSet={{ look: 'row' }}
      aria-pressed={chosen}
      aria-label={spoken}
      onPress={onPress}
      style={[styles.row, chosen && styles.chosen]}
    >
      {left}
      <View style={styles.middle}>{children}</View>
      {right}
    </Pressable>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: 12,
    width: '100%',
    minHeight: 56,
    paddingVertical: 8,
    paddingRight: 4,
    paddingLeft: 8,
    borderLeftWidth: 4,
    borderLeftColor: 'transparent',
  },
  chosen: { borderLeftColor: roles.ember, backgroundColor: roles.touched },
  middle: { flex: 1, minWidth: 0, gap: 2 },
});

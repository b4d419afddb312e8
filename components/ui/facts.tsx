import type { ReactNode } from 'react';
import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Name and value in two columns, for a profile or a list of facts. */
export function Facts({ items }: { readonly items: readonly { readonly label: string; readonly value: ReactNode }[] }) {
  return (
    <View role="list">
      {items.map(({ label, value }) => (
        <View key={label} role="listitem" style={styles.item}>
          <Text role="term" style={styles.label}>
            {label}
          </Text>
          {typeof value === 'string' || typeof value === 'number' ? (
            <Text role="definition" style={styles.value}>
              {value}
            </Text>
          ) : (
            <View role="definition" style={styles.whole}>
              {value}
            </View>
          )}
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  item: {
    flexDirection: 'row',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    gap: 16,
    paddingVertical: 7,
    borderTopWidth: 1,
    borderTopColor: roles.rule,
  },
  label: { flexShrink: 1, fontFamily: family.reading, fontSize: 16, lineHeight: 22, color: roles.softInk },
  value: {
    flexShrink: 1,
    textAlign: 'right',
    fontFamily: family.figure,
    fontSize: 19,
    lineHeight: 24,
    color: roles.ink,
    fontVariant: ['tabular-nums'],
  },
  whole: { flexShrink: 1, minWidth: 0, alignItems: 'flex-end' },
});

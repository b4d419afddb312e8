import type { ReactNode } from 'react';
import { StyleSheet, Text, View } from 'react-native';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

export type SheetCell = {
  readonly label: string;
  /** Text is set as a figure; anything else as it is. */
  readonly value: ReactNode;
  /** Share of the width on a wide screen. */
  readonly share?: number;
};

/** The title block under a drawing: what it is of. Cells beside each other on a wide screen, stacked on a phone. */
export function Sheet({ cells, label }: { readonly cells: readonly SheetCell[]; readonly label?: string }) {
  const { wide } = useLayout();
  return (
    <View role="list" aria-label={label} style={[styles.block, { flexDirection: wide ? 'row' : 'column' }]}>
      {cells.map((cell, index) => (
        <View
          key={cell.label}
          role="listitem"
          style={[
            styles.cell,
            wide ? { flexGrow: cell.share ?? 1, flexShrink: 1, flexBasis: 0 } : styles.stacked,
            index > 0 && (wide ? styles.beside : styles.below),
          ]}
        >
          <Text role="term" style={styles.label}>
            {cell.label}
          </Text>
          {typeof cell.value === 'string' || typeof cell.value === 'number' ? (
            <Text role="definition" style={[styles.value, { textAlign: wide ? 'left' : 'right' }]}>
              {cell.value}
            </Text>
          ) : (
            <View
              role="definition"
              style={{ minWidth: 0, flexShrink: 1, alignItems: wide ? 'flex-start' : 'flex-end' }}
            >
              {cell.value}
            </View>
          )}
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  block: { borderWidth: 1, borderColor: roles.ink, borderRadius: 3, backgroundColor: roles.sheet },
  cell: { paddingVertical: 9, paddingHorizontal: 12, minWidth: 0 },
  stacked: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', gap: 16 },
  beside: { borderLeftWidth: 1, borderLeftColor: roles.ink },
  below: { borderTopWidth: 1, borderTopColor: roles.rule },
  label: { fontFamily: family.label, fontSize: 14, lineHeight: 18, color: roles.softInk },
  value: {
    flexShrink: 1,
    fontFamily: family.figure,
    fontSize: 20,
    lineHeight: 25,
    color: roles.ink,
    fontVariant: ['tabular-nums'],
  },
});
